import { AnalysisError } from '../analysis-error'
import { aicc } from '../kinetics/aicc'
import { fitNonlinear, type NonlinearFit } from '../kinetics/levenberg-marquardt'
import { coverageFactor } from '../statistics/student-t'
import { activity, type DecayLaw } from './activity'

/** A fitted decay. */
export interface DecayFit {
  readonly law: DecayLaw
  /** rate at time zero, in the unit put in */
  readonly startRate: number
  readonly startRateStandardError: number | null
  readonly rateConstantPerS: number
  readonly rateConstantStandardError: number | null
  readonly rateConstantInterval: readonly [number, number] | null
  /** null for laws without a residue */
  readonly residual: number | null
  readonly residualStandardError: number | null
  /** smaller is better; null with too few points for the correction */
  readonly aicc: number | null
  readonly degreesOfFreedom: number
  readonly fit: NonlinearFit
}

/** Laws compared by {@link fitAllDecays}. */
export const DECAY_LAWS: readonly DecayLaw[] = [
  { order: 0, hasResidual: false },
  { order: 1, hasResidual: false },
  { order: 2, hasResidual: false },
  { order: 3, hasResidual: false },
  { order: 1, hasResidual: true },
  { order: 2, hasResidual: true },
]

/**
 * Decay of a rate with time on stream.
 *
 * r(t) = r₀ a(t; k_d, a_ss), weighted nonlinear least squares
 *
 * Constant conditions; the rate is one on which decay acts directly (a rate constant or a differential rate, not a conversion). r₀ is an
 * extrapolation to time zero: leave the first minutes out and do not reach back over more than the window.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 21; Fuentes, Appl. Catal. 15 (1985) 33.
 *
 * @param timesS - time on stream [s], at least one more point than parameters
 * @param rates - as many rates [any] with a mean above zero
 * @param law - order and residue [-]
 * @param standardUncertainties - of the rates, above zero; null for equal ones [unit of the rate]
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns rate at time zero, decay constant [s-1] and residue [-] with standard errors; n − p degrees of freedom
 * @throws {AnalysisError} too-few-points | lengths-differ | not-positive | no-convergence
 */
export function fitDecay(
  timesS: readonly number[],
  rates: readonly number[],
  law: DecayLaw,
  standardUncertainties: readonly number[] | null = null,
  confidenceLevel = 0.95,
): DecayFit {
  if (timesS.length !== rates.length) throw new AnalysisError('lengths-differ', 'One rate for each time.')
  const count = law.hasResidual ? 3 : 2
  if (timesS.length <= count)
    throw new AnalysisError('too-few-points', `This decay needs ${String(count + 1)} points.`, { count: timesS.length })
  const span = Math.max(...timesS) - Math.min(...timesS)
  const first = rates[0] ?? NaN
  const last = rates[rates.length - 1] ?? NaN
  if (!(span > 0) || !(first > 0))
    throw new AnalysisError('not-positive', 'Times must differ and the first rate must be above zero.')
  // scaled so that all parameters are near one
  const startConstant = Math.max(0.05, Math.min(3, first / Math.max(last, 0.05 * first) - 1))
  const scaled = timesS.map((t) => t / span)
  const model = {
    values: ([r = NaN, k = NaN, residual = 0]: readonly number[]) =>
      scaled.map((t) => first * r * activity(law, k, t, residual)),
  }
  const start = law.hasResidual
    ? [1, 2 * startConstant, 0.5 * Math.max(0, Math.min(1, last / first))]
    : [1, startConstant]
  const fit = fitNonlinear(model, rates, start, standardUncertainties?.map((u) => 1 / (u * u)) ?? null)
  const [r = NaN, k = NaN, residual] = fit.parameters
  const errors = fit.standardErrors
  const constantError = scaleBy(errors[1], 1 / span)
  const reach = constantError === null ? null : coverageFactor(confidenceLevel, fit.degreesOfFreedom) * constantError
  return {
    law,
    startRate: first * r,
    startRateStandardError: scaleBy(errors[0], first),
    rateConstantPerS: k / span,
    rateConstantStandardError: constantError,
    rateConstantInterval: reach === null ? null : [k / span - reach, k / span + reach],
    residual: law.hasResidual ? (residual ?? null) : null,
    residualStandardError: law.hasResidual ? (errors[2] ?? null) : null,
    aicc: aicc(fit.residualSumOfSquares, rates.length, count + 1),
    degreesOfFreedom: fit.degreesOfFreedom,
    fit,
  }
}

/**
 * All laws of decay that the points can bear, best first by AICc.
 *
 * Laws within about 2 of the best cannot be told apart: show them all.
 * Source: Burnham and Anderson, Model Selection and Multimodel Inference, 2nd edition, 2002.
 *
 * @param timesS - time on stream [s]
 * @param rates - as many rates [any]
 * @returns fits in the order of AICc [-]; laws that do not converge or have too few points are left out
 */
export function fitAllDecays(timesS: readonly number[], rates: readonly number[]): DecayFit[] {
  const fits = DECAY_LAWS.flatMap((law) => {
    try {
      return [fitDecay(timesS, rates, law)]
    } catch (error) {
      if (error instanceof AnalysisError) return []
      throw error
    }
  })
  return fits.sort((a, b) => (a.aicc ?? Infinity) - (b.aicc ?? Infinity))
}

function scaleBy(value: number | null | undefined, factor: number): number | null {
  return value === null || value === undefined ? null : value * factor
}
