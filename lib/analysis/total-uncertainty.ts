import { type Estimate } from './estimate'
import { coverageFactor } from './statistics/student-t'

export interface TotalUncertainty {
  readonly standardUncertainty: number
  /** null stands for infinite */
  readonly degreesOfFreedom: number | null
  /** the shared parts alone */
  readonly sharedStandardUncertainty: number
}

/**
 * Combined standard uncertainty of an estimate from its own and its shared parts.
 *
 * u^2 = u_random^2 + sum of (effect of a source)^2; nu = u^4 / (u_random^4 / nu_random), shared parts with infinite degrees of freedom.
 * Source: JCGM 100:2008, 5.1.2 and G.4.1.
 *
 * @param estimate - value in parts [its own unit]
 * @returns the combined uncertainty; null where the random part is not known [same unit]
 */
export function totalUncertainty(estimate: Estimate): TotalUncertainty | null {
  const random = estimate.randomStandardUncertainty
  if (random === null) return null
  let shared = 0
  for (const id of Object.keys(estimate.sharedEffects).sort()) {
    const effect = estimate.sharedEffects[id] ?? 0
    shared += effect * effect
  }
  const variance = random * random + shared
  const nu = estimate.degreesOfFreedom
  return {
    standardUncertainty: Math.sqrt(variance),
    degreesOfFreedom:
      nu === null || random === 0 ? null : (nu * (variance * variance)) / (random * random * random * random),
    sharedStandardUncertainty: Math.sqrt(shared),
  }
}

/**
 * Two-sided interval of an estimate, shared parts included.
 *
 * value +- t((1 + level) / 2; nu) u
 * Source: JCGM 100:2008, G.6.4.
 *
 * @param estimate - value in parts [its own unit]
 * @param confidenceLevel - between 0 and 1 [-]
 * @returns lower and upper end; null where the random part is not known [same unit]
 * @throws {AnalysisError} out-of-range
 */
export function intervalOf(estimate: Estimate, confidenceLevel: number): readonly [number, number] | null {
  const total = totalUncertainty(estimate)
  if (total === null) return null
  const reach = coverageFactor(confidenceLevel, total.degreesOfFreedom) * total.standardUncertainty
  return [estimate.value - reach, estimate.value + reach]
}
