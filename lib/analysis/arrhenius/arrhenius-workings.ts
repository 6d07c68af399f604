import exp from '@stdlib/math-base-special-exp'
import { type Estimate } from '../estimate'
import { numberText } from '../number-text'
import { type ArrheniusFit } from '../reduction/run-reduction'
import { type Working } from '../working'
import { estimateSymbol, plainSymbol } from '../working-symbols'

const LINE_SOURCE =
  'M. Schwaab, J. C. Pinto, Chem. Eng. Sci. 62 (2007) 2750; N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, chapters 1 and 9'

// What the uncertainty consists of, largest part first.
function partsInWords(estimate: Estimate, factor: number, unit: string): string[] {
  if (estimate.randomStandardUncertainty === null)
    return ['Two points leave nothing to judge the uncertainty by: none is given.']
  const nu = estimate.degreesOfFreedom
  const words = [
    `Own part (scatter): ${numberText(estimate.randomStandardUncertainty * factor, 2)} ${unit}, ${nu === null ? 'infinite' : numberText(nu, 3)} degrees of freedom.`,
  ]
  const shared = Object.keys(estimate.sharedEffects)
    .map((id) => ({ id, effect: (estimate.sharedEffects[id] ?? 0) * factor }))
    // what is nothing but rounding (a flow moves the level, not the slope) is not told
    .filter(({ effect }) => Math.abs(effect) > 1e-9 * Math.abs(estimate.value * factor))
    .sort((a, b) => Math.abs(b.effect) - Math.abs(a.effect) || (a.id < b.id ? -1 : 1))
  for (const { id, effect } of shared)
    words.push(`Shared part ${id}: ${numberText(effect, 2)} ${unit} for one standard uncertainty.`)
  return words
}

function errorModelInWords(fit: ArrheniusFit, meanInjectionError: number | null): string[] {
  const tau = fit.betweenHoldStandardDeviation
  if (meanInjectionError === null) {
    return ['The injections give no scatter of their own; equal weights, scatter from the residuals.']
  }
  return [
    `Weights 1/σ²; injections explain ${numberText(meanInjectionError * 100, 2)} % a hold (pooled over the run)${
      tau !== null && tau > 0
        ? `, and ${numberText(tau * 100, 2)} % between holds was added because the residuals ask for it.`
        : '; the residuals agree, so both were pooled.'
    }`,
  ]
}

/**
 * An interval as the working of a number says it.
 *
 * @param interval - low and high end [SI]
 * @param confidenceLevel - between 0 and 1 [-]
 * @param factor - practical unit per SI unit
 * @param unit - practical unit
 * @returns one sentence
 */
export function intervalSentence(
  interval: readonly [number, number],
  confidenceLevel: number,
  factor: number,
  unit: string,
): string {
  return `${numberText(confidenceLevel * 100, 3)} % interval ${numberText(interval[0] * factor, 5)} to ${numberText(interval[1] * factor, 5)} ${unit}.`
}

/**
 * The full derivation of a line's numbers: activation energy, pre-exponential factor, rate at the reference temperature.
 *
 * Source: as stated in each working.
 *
 * @param fit - the finished line [-]
 * @param subject - whose line it is [-]
 * @param meanInjectionError - root mean square relative error of the points from their injections; null where not known [-]
 * @returns workings keyed by the field name of the line [practical units, stated in each]
 */
export function arrheniusWorkings(
  fit: ArrheniusFit,
  subject: string,
  meanInjectionError: number | null,
): Readonly<Record<string, Working>> {
  const isRate = fit.quantity === 'rate'
  const quantityName = isRate ? 'rate' : 'turnover frequency'
  const unit = isRate ? 'ln(mol kg⁻¹ s⁻¹)' : 'ln(s⁻¹)'
  const used = fit.points.filter((point) => point.isUsed)
  const from = fit.runCodes.map((code) => {
    const holds = used.filter((point) => point.runCode === code)
    return `${code}: holds ${holds
      .map((point) => `${point.holdNumber} (${numberText(point.temperatureK - 273.15, 5)} °C)`)
      .join(', ')}`
  })
  const leftOut = fit.points
    .filter((point) => !point.isUsed)
    .map((point) => `${point.runCode} hold ${point.holdNumber}: ${point.reason}`)
  const assumptions = [
    'One straight line: one kinetic regime over the whole range.',
    'Errors of the bed temperature that are common to all holds are kept apart from the scatter and included in the interval.',
  ]
  const common = { assumptions, source: LINE_SOURCE, from, leftOut }
  const intervalWords = (interval: readonly [number, number] | null, factor: number, name: string): string[] =>
    interval === null ? [] : [intervalSentence(interval, fit.confidenceLevel, factor, name)]
  const Ea = estimateSymbol('E_a', 'apparent activation energy', fit.activationEnergyJPerMol, 'kJ mol⁻¹', 1e-3)
  const lnA = estimateSymbol('ln A', 'logarithm of the pre-exponential factor', fit.lnPreExponential, unit, 1)
  const centre = estimateSymbol(
    'ln r_c',
    `ln of the ${quantityName} at the centre of the line`,
    fit.lnRateAtCentre,
    unit,
    1,
  )
  const centreT = plainSymbol(
    'T_c',
    'weighted harmonic mean temperature, where level and slope are uncorrelated',
    fit.centreTemperatureK,
    'K',
  )
  const gas = plainSymbol('R', 'molar gas constant', 8.31446261815324, 'J mol⁻¹ K⁻¹')
  const shape = [
    plainSymbol('n', 'points in the line', used.length, ''),
    plainSymbol('s', 'residual standard deviation of ln r', fit.residualStandardDeviation, ''),
  ]
  const curvatureNote =
    fit.curvature === null
      ? []
      : [
          `Curvature: p ${numberText(fit.curvature.pValue, 2)}; ${numberText(fit.curvature.activationEnergyColdJPerMol / 1000, 4)} kJ/mol at the cold end, ${numberText(fit.curvature.activationEnergyHotJPerMol / 1000, 4)} kJ/mol at the hot end.`,
        ]
  return {
    activationEnergyJPerMol: {
      title: `Activation energy of ${subject}`,
      formula: 'E_a = −R · Σ w (1/T − 1/T_c) ln r / Σ w (1/T − 1/T_c)²',
      symbols: [gas, centreT, ...shape],
      result: Ea,
      ...common,
      notes: [
        ...intervalWords(fit.intervals.activationEnergyJPerMol, 1e-3, 'kJ/mol'),
        ...partsInWords(fit.activationEnergyJPerMol, 1e-3, 'kJ/mol'),
        ...errorModelInWords(fit, meanInjectionError),
        ...curvatureNote,
      ],
    },
    lnPreExponential: {
      title: `Pre-exponential factor of ${subject}`,
      formula: 'ln A = ln r_c + E_a / (R T_c)',
      symbols: [centre, Ea, gas, centreT],
      result: lnA,
      ...common,
      notes: [
        ...intervalWords(fit.intervals.lnPreExponential, 1, unit),
        ...partsInWords(fit.lnPreExponential, 1, 'in ln A'),
        'A and E_a of one line move together: compare rates at a temperature inside the range, not A.',
      ],
    },
    lnRateAtReference: {
      title: `${isRate ? 'Rate' : 'Turnover frequency'} of ${subject} at ${numberText(fit.referenceTemperatureK - 273.15, 4)} °C`,
      formula: 'ln r = ln r_c − (E_a / R)(1/T_ref − 1/T_c)',
      symbols: [
        centre,
        Ea,
        gas,
        centreT,
        plainSymbol('T_ref', 'reference temperature', fit.referenceTemperatureK, 'K'),
        plainSymbol('r', quantityName, exp(fit.lnRateAtReference.value), isRate ? 'mol kg⁻¹ s⁻¹' : 's⁻¹'),
      ],
      result: estimateSymbol('ln r', `ln of the ${quantityName} at the reference`, fit.lnRateAtReference, unit, 1),
      ...common,
      notes: [
        ...intervalWords(fit.intervals.lnRateAtReference, 1, unit),
        ...partsInWords(fit.lnRateAtReference, 1, 'in ln r'),
      ],
    },
  }
}
