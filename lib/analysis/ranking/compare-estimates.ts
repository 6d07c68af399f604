import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { type Estimate } from '../estimate'
import { combineUncertainty } from '../statistics/welch'
import { coverageFactor, twoSidedTProbability } from '../statistics/student-t'

/** Difference of two estimates, with what cancels already gone. */
export interface EstimateDifference {
  readonly difference: number
  readonly standardUncertainty: number
  /** null stands for infinite */
  readonly degreesOfFreedom: number | null
  readonly interval: readonly [number, number]
  /** that there is no difference; null where neither estimate has an uncertainty */
  readonly pValue: number | null
}

/**
 * Difference of two estimates that may share sources of error.
 *
 * d = a − b; u²(d) = u_a² + u_b² + Σ_s (c_a,s − c_b,s)², with c the effect of one standard uncertainty of source s: an error that moves both
 * by the same amount cancels. Degrees of freedom after Welch and Satterthwaite, shared parts counted as infinite.
 * Source: JCGM 100:2008, 5.2.2 and G.4.1.
 *
 * @param first - value in parts [any unit]
 * @param second - value in parts [same unit]
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns difference with its interval and test [same unit]; null where the random part of either cannot be known
 * @throws {AnalysisError} out-of-range
 */
export function compareEstimates(
  first: Estimate,
  second: Estimate,
  confidenceLevel: number,
): EstimateDifference | null {
  if (first.randomStandardUncertainty === null || second.randomStandardUncertainty === null) return null
  let shared = 0
  // in sorted order, so that the sum has the same last digits every time
  for (const id of [...new Set([...Object.keys(first.sharedEffects), ...Object.keys(second.sharedEffects)])].sort()) {
    const step = (first.sharedEffects[id] ?? 0) - (second.sharedEffects[id] ?? 0)
    shared += step * step
  }
  const combined = combineUncertainty([
    { standardUncertainty: first.randomStandardUncertainty, degreesOfFreedom: first.degreesOfFreedom },
    { standardUncertainty: second.randomStandardUncertainty, degreesOfFreedom: second.degreesOfFreedom },
    { standardUncertainty: Math.sqrt(shared), degreesOfFreedom: null },
  ])
  const difference = first.value - second.value
  const reach = coverageFactor(confidenceLevel, combined.degreesOfFreedom) * combined.standardUncertainty
  return {
    difference,
    standardUncertainty: combined.standardUncertainty,
    degreesOfFreedom: combined.degreesOfFreedom,
    interval: [difference - reach, difference + reach],
    pValue:
      combined.standardUncertainty > 0
        ? twoSidedTProbability(difference / combined.standardUncertainty, combined.degreesOfFreedom)
        : null,
  }
}

/**
 * Natural logarithm of a positive estimate, its parts carried over to first order.
 *
 * u(ln a) = u_a / a; c_s(ln a) = c_s / a. Good while the relative uncertainty is small beside 1.
 * Source: JCGM 100:2008, 5.1.2.
 *
 * @param estimate - value in parts, value above 0 [any unit]
 * @returns the logarithm in parts [-]
 * @throws {AnalysisError} not-positive
 */
export function lnOfEstimate(estimate: Estimate): Estimate {
  if (!(estimate.value > 0)) {
    throw new AnalysisError('not-positive', `A logarithm needs a positive value, not ${estimate.value}.`, {
      value: estimate.value,
    })
  }
  return {
    value: ln(estimate.value),
    randomStandardUncertainty:
      estimate.randomStandardUncertainty === null ? null : estimate.randomStandardUncertainty / estimate.value,
    degreesOfFreedom: estimate.degreesOfFreedom,
    sharedEffects: Object.fromEntries(
      Object.entries(estimate.sharedEffects).map(([id, effect]) => [id, effect / estimate.value]),
    ),
  }
}
