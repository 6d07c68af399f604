import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { fitLinearModel, varianceInflation } from '../kinetics/linear-model'
import { coverageFactor } from '../statistics/student-t'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'

/** Temperature and decay fitted together. */
export interface DecayCorrectedArrhenius {
  readonly activationEnergyJPerMol: number
  readonly activationEnergyStandardError: number | null
  readonly activationEnergyInterval: readonly [number, number] | null
  /** ln rate of the fresh catalyst at the centre temperature */
  readonly lnRateAtCentre: number
  readonly lnRateAtCentreStandardError: number | null
  readonly centreTemperatureK: number
  readonly decayPerS: number
  readonly decayStandardError: number | null
  /** how much the mixing of temperature and time inflates the variance of the activation energy */
  readonly inflation: number
  readonly degreesOfFreedom: number
  readonly residualStandardDeviation: number | null
}

/** Variance inflation above which temperature and time count as confounded. Source: Marquardt, Technometrics 12 (1970) 591. */
export const CONFOUNDED_INFLATION = 10

/**
 * Arrhenius line and first-order decay from holds at different times on stream.
 *
 * ln r = ln r_c − (Ea/R)(1/T − 1/T_c) − k_d t, t from the start
 *
 * One decay constant for all temperatures. Needs temperatures in another order than time, with a returned hold: an ascending series alone is
 * refused, since its decay looks like a lower activation energy.
 * Source: Draper and Smith, Applied Regression Analysis, 3rd edition, chapter 6; decay of order 1: Levenspiel, 3rd edition, chapter 21.
 *
 * @param points - at least 4 holds: temperature [K] > 0, time on stream [s], rate [any] > 0, weight [-] > 0 (1 without)
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns Ea [J mol-1], decay [s-1] and ln rate of the fresh catalyst [-]; n − 3 degrees of freedom
 * @throws {AnalysisError} confounded-design | too-few-points | not-positive | no-spread-in-temperature
 */
export function fitDecayCorrectedArrhenius(
  points: readonly {
    readonly temperatureK: number
    readonly timeS: number
    readonly rate: number
    readonly weight?: number
  }[],
  confidenceLevel = 0.95,
): DecayCorrectedArrhenius {
  if (points.length < 4)
    throw new AnalysisError('too-few-points', 'Temperature and decay together need four holds.', {
      count: points.length,
    })
  for (const { temperatureK, rate } of points)
    if (!(temperatureK > 0) || !(rate > 0))
      throw new AnalysisError('not-positive', 'Temperatures and rates must be above zero.')
  if (new Set(points.map(({ temperatureK }) => temperatureK)).size < 2)
    throw new AnalysisError('no-spread-in-temperature', 'An activation energy needs two temperatures.')
  const weights = points.map(({ weight }) => weight ?? 1)
  const total = weights.reduce((sum, w) => sum + w, 0)
  const centre = points.reduce((sum, { temperatureK }, i) => sum + (weights[i] ?? NaN) / temperatureK, 0) / total
  const span = Math.max(...points.map(({ timeS }) => Math.abs(timeS)), 1)
  const rows = points.map(({ temperatureK, timeS }) => [
    -(1 / temperatureK - centre) / GAS_CONSTANT_J_PER_MOL_K,
    -timeS / span,
  ])
  const inflation = varianceInflation(rows)[0] ?? null
  if (inflation === null || inflation > CONFOUNDED_INFLATION)
    throw new AnalysisError(
      'confounded-design',
      'Temperature and time rose together, so decay and activation energy cannot be told apart; return to an earlier temperature.',
      { inflation },
    )
  const fit = fitLinearModel(
    rows.map((row) => [1, ...row]),
    points.map(({ rate }) => ln(rate)),
    weights,
  )
  const energy = fit.coefficients[1] ?? NaN
  const error = fit.standardErrors[1] ?? null
  const reach = error === null ? null : coverageFactor(confidenceLevel, fit.degreesOfFreedom) * error
  return {
    activationEnergyJPerMol: energy,
    activationEnergyStandardError: error,
    activationEnergyInterval: reach === null ? null : [energy - reach, energy + reach],
    lnRateAtCentre: fit.coefficients[0] ?? NaN,
    lnRateAtCentreStandardError: fit.standardErrors[0] ?? null,
    centreTemperatureK: 1 / centre,
    decayPerS: (fit.coefficients[2] ?? NaN) / span,
    decayStandardError:
      fit.standardErrors[2] === null || fit.standardErrors[2] === undefined ? null : fit.standardErrors[2] / span,
    inflation,
    degreesOfFreedom: fit.degreesOfFreedom,
    residualStandardDeviation: fit.residualStandardDeviation,
  }
}
