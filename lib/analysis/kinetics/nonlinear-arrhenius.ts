import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { fitWeightedLine } from '../statistics/weighted-line'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { fitNonlinear, type NonlinearFit } from './levenberg-marquardt'

/** Arrhenius parameters from a fit of k itself. */
export interface NonlinearArrhenius {
  readonly activationEnergyJPerMol: number
  readonly activationEnergyStandardError: number | null
  readonly lnRateAtCentre: number
  readonly lnRateAtCentreStandardError: number | null
  readonly centreTemperatureK: number
  /** parameters: ln k at the centre [-], Ea [J mol-1] */
  readonly fit: NonlinearFit
}

/**
 * Arrhenius equation fitted to the rate constants themselves, weighted.
 *
 * k = exp[ln k_c − (Ea/R)(1/T − 1/T_c)], Σ w (k − k̂)² least, T_c the harmonic mean temperature
 *
 * For rates with known absolute errors, as near the limit of detection, where a value may even be negative. With constant relative errors the
 * line in ln k is better: without weights the hottest point decides.
 * Source: Brauner and Shacham, Chem. Eng. Process. 36 (1997) 243.
 *
 * @param temperaturesK - at least 3 values at 2 or more distinct temperatures [K] > 0
 * @param rateConstants - as many rate constants [any], at least 2 above zero
 * @param standardUncertainties - of the rate constants, above zero; null for equal weights [unit of the rate constant]
 * @returns Ea [J mol-1] and ln k at the centre with Wald errors scaled by the scatter; n − 2 degrees of freedom
 * @throws {AnalysisError} not-positive | too-few-points | no-convergence | as the line fit
 */
export function fitNonlinearArrhenius(
  temperaturesK: readonly number[],
  rateConstants: readonly number[],
  standardUncertainties: readonly number[] | null = null,
): NonlinearArrhenius {
  if (temperaturesK.length !== rateConstants.length)
    throw new AnalysisError('lengths-differ', 'One rate constant for each temperature.')
  if (temperaturesK.some((t) => !(t > 0))) throw new AnalysisError('not-positive', 'Temperatures must be above zero.')
  const x = temperaturesK.map((t) => 1 / t)
  const centre = x.reduce((sum, value) => sum + value, 0) / x.length
  const positive = rateConstants.flatMap((k, i) => (k > 0 ? [i] : []))
  const start = fitWeightedLine(
    positive.map((i) => x[i] ?? NaN),
    positive.map((i) => ln(rateConstants[i] ?? NaN)),
    null,
  )
  const fit = fitNonlinear(
    {
      values: ([lnK = NaN, energy = NaN]) =>
        x.map((value) => exp(lnK - (energy / GAS_CONSTANT_J_PER_MOL_K) * (value - centre))),
      jacobian: ([lnK = NaN, energy = NaN]) =>
        x.map((value) => {
          const distance = (value - centre) / GAS_CONSTANT_J_PER_MOL_K
          const k = exp(lnK - energy * distance)
          return [k, -distance * k]
        }),
    },
    rateConstants,
    [start.intercept + start.slope * centre, -GAS_CONSTANT_J_PER_MOL_K * start.slope],
    standardUncertainties?.map((u) => 1 / (u * u)) ?? null,
  )
  return {
    activationEnergyJPerMol: fit.parameters[1] ?? NaN,
    activationEnergyStandardError: fit.standardErrors[1] ?? null,
    lnRateAtCentre: fit.parameters[0] ?? NaN,
    lnRateAtCentreStandardError: fit.standardErrors[0] ?? null,
    centreTemperatureK: 1 / centre,
    fit,
  }
}
