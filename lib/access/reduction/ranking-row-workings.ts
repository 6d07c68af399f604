import 'server-only'
import exp from '@stdlib/math-base-special-exp'
import { type Estimate } from '../../analysis/estimate'
import { type SiteCountInput } from '../../analysis/reduction/run-input'
import { type ArrheniusFit, type RunReduction } from '../../analysis/reduction/run-reduction'
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
  others: {
    readonly runs: readonly RunReduction[]
    readonly temperatureForConversionK: number | null
    readonly carbonBalance: number | null
    readonly decayPerH: number | null
  },
): Record<string, Working> {
  const { fit, lnRate, lnTurnover, loadingCount } = numbers
  const base = fit.workings
  const beds = `${loadingCount} packed bed${loadingCount === 1 ? '' : 's'}`
  const spread = (share: number, of: string) =>
    `Spread between packed beds, ${Math.round(share * 1000) / 10} % of ${of} a bed over ${beds}, is in the uncertainty (method setting; common practice).`
  const workings: Record<string, Working> = {}
  const energy = base['activationEnergyJPerMol']
  if (energy !== undefined)
    workings['activationEnergyJPerMol'] = {
      ...energy,
      result: estimateSymbol('E_a', energy.result.meaning, numbers.activationEnergy, 'kJ mol⁻¹', 1e-3),
      notes: [spread(settings.betweenLoadingActivationEnergy, 'E_a'), ...energy.notes],
    }
  const lnA = base['lnPreExponential']
  if (lnA !== undefined)
    workings['lnPreExponential'] = {
      ...lnA,
      result: estimateSymbol('ln A', lnA.result.meaning, numbers.lnPreExponential, 'ln(mol kg⁻¹ s⁻¹)', 1),
      notes: [spread(settings.betweenLoadingRate, 'the rate'), ...lnA.notes],
    }
  const rate = base['lnRateAtReference']
  const rateResult = estimateSymbol('r', 'rate at the reference', exponential(lnRate), 'µmol g⁻¹ s⁻¹', 1e3)
  if (rate !== undefined) {
    workings['rateMolPerKgS'] = {
      ...rate,
      result: rateResult,
      notes: [spread(settings.betweenLoadingRate, 'the rate'), ...rate.notes],
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
  const codes = others.runs.map((run) => run.runCode)
  const common = {
    assumptions: [],
    source: 'common practice',
    from: codes.map((code) => `${code}: points in the line`),
    leftOut: [],
    notes: [],
  }
  if (others.temperatureForConversionK !== null)
    workings['temperatureForConversionK'] = {
      ...common,
      title: `Temperature at which ${sampleCode} converts ${settings.targetConversion * 100} %`,
      formula: '1/T = 1/T_1 + (ln X − ln X_1)/(ln X_2 − ln X_1) · (1/T_2 − 1/T_1)',
      symbols: [plainSymbol('X', 'target conversion of the method', settings.targetConversion * 100, '%')],
      result: plainSymbol(
        'T',
        'temperature, at the run’s own contact time',
        others.temperatureForConversionK - 273.15,
        '°C',
      ),
      assumptions: [
        'Between the two neighbouring holds ln X is straight in 1/T; nothing is said outside the measured range.',
      ],
    }
  if (others.carbonBalance !== null)
    workings['carbonBalance'] = {
      ...common,
      title: `Carbon balance of ${sampleCode}`,
      formula: 'B_C = Σ n_C F_out / Σ n_C F_in',
      symbols: others.runs.map((run) => plainSymbol('B_C', `mean of ${run.runCode}`, run.meanCarbonBalance, '')),
      result: plainSymbol('B_C', 'mean of the runs in the line', others.carbonBalance, ''),
    }
  if (others.decayPerH !== null)
    workings['decayPerH'] = {
      ...common,
      title: `Loss of activity of ${sampleCode}`,
      formula: 'k_d = −ln(r_returned / r_first) / Δt',
      symbols: others.runs.flatMap((run) =>
        run.returnedHold === null
          ? []
          : [
              plainSymbol(
                'r_returned / r_first',
                `${run.runCode}, hold ${run.returnedHold.holdNumber} against hold ${run.returnedHold.returnsTo}`,
                run.returnedHold.ratio.value,
                '',
              ),
            ],
      ),
      result: plainSymbol('k_d', 'loss per hour on stream, mean of the runs', others.decayPerH * 100, '% h⁻¹'),
    }
  return workings
}
