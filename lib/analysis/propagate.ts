import { type Estimate } from './estimate'
import { combineUncertainty } from './statistics/welch'

/** One number that goes into another, with the change of the result per change of it. */
export interface Share {
  readonly estimate: Estimate
  readonly sensitivity: number
}

/**
 * Least of several degrees of freedom.
 *
 * @param estimates - whose own parts rest on one scatter [any unit]
 * @returns the least; null stands for infinite [-]
 */
export function leastDegreesOfFreedom(estimates: readonly Estimate[]): number | null {
  let least: number | null = null
  for (const { degreesOfFreedom } of estimates)
    if (degreesOfFreedom !== null) least = least === null ? degreesOfFreedom : Math.min(least, degreesOfFreedom)
  return least
}

/**
 * A number computed from others, its uncertainty carried over to first order and kept in parts.
 *
 * u^2 = sum (c_i u_i)^2 of the own parts; effect of a shared source = sum c_i times its effect on number i, with signs, so that what moves all of them
 * alike can cancel. Degrees of freedom after Welch and Satterthwaite over the groups; inside a group the own parts rest on one pooled scatter, whose
 * degrees of freedom count once.
 * Source: JCGM 100:2008, 5.1.2, 5.2.2 and G.4.1.
 *
 * @param value - the number itself [any unit]
 * @param groups - what it is computed from, in groups of one scatter [sensitivities in its unit per unit of theirs]
 * @returns the number in parts, degrees of freedom null for infinite; the random part is null where one of theirs is [same unit]
 */
export function propagate(value: number, groups: readonly (readonly Share[])[]): Estimate {
  const sharedEffects: Record<string, number> = {}
  let isKnown = true
  const parts = groups.map((group) => {
    let variance = 0
    for (const { estimate, sensitivity } of group) {
      const own = estimate.randomStandardUncertainty
      if (own === null) isKnown = false
      else variance += sensitivity * own * (sensitivity * own)
      for (const id of Object.keys(estimate.sharedEffects).sort())
        sharedEffects[id] = (sharedEffects[id] ?? 0) + sensitivity * (estimate.sharedEffects[id] ?? 0)
    }
    return {
      standardUncertainty: Math.sqrt(variance),
      degreesOfFreedom: leastDegreesOfFreedom(group.map(({ estimate }) => estimate)),
    }
  })
  if (!isKnown) return { value, randomStandardUncertainty: null, degreesOfFreedom: null, sharedEffects }
  const own = combineUncertainty(parts)
  return {
    value,
    randomStandardUncertainty: own.standardUncertainty,
    degreesOfFreedom: own.degreesOfFreedom,
    sharedEffects,
  }
}
