import 'server-only'
import exp from '@stdlib/math-base-special-exp'
import { type Estimate } from '../../analysis/estimate'
import { type SiteCountInput } from '../../analysis/reduction/run-input'
import { type ArrheniusFit } from '../../analysis/reduction/run-reduction'
import { intervalSentence } from '../../analysis/arrhenius/arrhenius-workings'
import { intervalOf } from '../../analysis/total-uncertainty'
import { type Working } from '../../analysis/working'
import { estimateSymbol, plainSymbol } from '../../analysis/working-symbols'
import { type MethodSettings } from '../../domain/method'

/** From the logarithm of a positive number to the number: parts become relative ones times the value. */
export function exponential(lnEstimate: Estimate): Estimate {
  const value = exp(lnEstimate.value)
  const own = lnEstimate.randomStandardUncertainty
  return {
    value,
    randomStandardUncertainty: own === null ? null : own * value,
    degreesOfFreedom: lnEstimate.degreesOfFreedom,
    sharedEffects: Object.fromEntries(
      Object.entries(lnEstimate.sharedEffects).map(([id, effect]) => [id, effect * value]),
    ),
  }
}

/** The numbers of a sample from the line over its runs, the spread between packed beds included. */
export interface SampleNumbers {
  readonly fit: ArrheniusFit
  readonly lnRate: Estimate
  readonly lnTurnover: Estimate | null
  readonly activationEnergy: Estimate
  readonly lnPreExponential: Estimate
  readonly loadingCount: number
}

/** How each number of a sample's row came about. */
export function rowWorkings(
  sampleCode: string,
  numbers: SampleNumbers,
  sites: SiteCountInput | null,
  settings: MethodSettings,
  /** what a loss of activity on stream does to the line */
  losses: readonly string[],
): Record<string, Working> {
  const { fit, lnRate, lnTurnover, loadingCount } = numbers
  const base = fit.workings
  const beds = `${loadingCount} packed bed${loadingCount === 1 ? '' : 's'}`
  const spread = (share: number, of: string) =>
    `Spread between packed beds, ${Math.round(share * 1000) / 10} % of ${of} a bed over ${beds}, is in the uncertainty (method setting; common practice).`
  // the line's own interval gives way to the sample's, in which the spread between beds is
  const notesOf = (
    notes: readonly string[],
    ofLine: readonly [number, number] | null,
    ofSample: Estimate,
    factor: number,
    unit: string,
  ): string[] => {
    const level = settings.confidenceLevel
    const interval = intervalOf(ofSample, level)
    const own = ofLine === null ? '' : intervalSentence(ofLine, level, factor, unit)
    return [
      ...losses,
      ...(interval === null ? [] : [intervalSentence(interval, level, factor, unit)]),
      ...notes.map((note) => (note === own ? `Of the line alone: ${note}` : note)),
    ]
  }
  const workings: Record<string, Working> = {}
  const energy = base['activationEnergyJPerMol']
  if (energy !== undefined)
    workings['activationEnergyJPerMol'] = {
      ...energy,
      result: estimateSymbol('E_a', energy.result.meaning, numbers.activationEnergy, 'kJ mol⁻¹', 1e-3),
      notes: notesOf(
        [spread(settings.betweenLoadingActivationEnergy, 'E_a'), ...energy.notes],
        fit.intervals.activationEnergyJPerMol,
        numbers.activationEnergy,
        1e-3,
        'kJ/mol',
      ),
    }
  const lnA = base['lnPreExponential']
  if (lnA !== undefined)
    workings['lnPreExponential'] = {
      ...lnA,
      result: estimateSymbol('ln A', lnA.result.meaning, numbers.lnPreExponential, 'ln(mol kg⁻¹ s⁻¹)', 1),
      notes: notesOf(
        [spread(settings.betweenLoadingRate, 'the rate'), ...lnA.notes],
        fit.intervals.lnPreExponential,
        numbers.lnPreExponential,
        1,
        'ln(mol kg⁻¹ s⁻¹)',
      ),
    }
  const rate = base['lnRateAtReference']
  const rateResult = estimateSymbol('r', 'rate at the reference', exponential(lnRate), 'µmol g⁻¹ s⁻¹', 1e3)
  if (rate !== undefined) {
    workings['rateMolPerKgS'] = {
      ...rate,
      result: rateResult,
      notes: notesOf(
        [spread(settings.betweenLoadingRate, 'the rate'), ...rate.notes],
        fit.intervals.lnRateAtReference,
        lnRate,
        1,
        'ln(mol kg⁻¹ s⁻¹)',
      ),
    }
    if (lnTurnover !== null && sites !== null)
      workings['turnoverFrequencyPerS'] = {
        ...rate,
        title: `Turnover frequency of ${sampleCode} at the reference`,
        formula: 'TOF = r / n_s',
        symbols: [
          rateResult,
          {
            ...plainSymbol('n_s', `surface sites by ${sites.method}`, sites.molPerKg * 1e3, 'µmol g⁻¹'),
            standardUncertainty: sites.molPerKg * sites.relativeStandardUncertainty * 1e3,
            uncertaintyKind: 'shared',
          },
        ],
        result: estimateSymbol('TOF', 'turnover frequency', exponential(lnTurnover), 's⁻¹', 1),
        source: 'M. Boudart, Chem. Rev. 95 (1995) 661 (turnover rates)',
        notes: [
          'The site count is one error for all temperatures: it moves ln A and the turnover frequency, not E_a.',
          spread(settings.betweenLoadingRate, 'the rate'),
        ],
      }
  }
  return workings
}
