import { type Estimate } from '../estimate'
import { leastDegreesOfFreedom } from '../propagate'
import { combineUncertainty } from '../statistics/welch'

export interface MeanOptions {
  /** true where the random parts all rest on one scatter, pooled: its degrees of freedom then count once, not once a number */
  readonly hasPooledScatter: boolean
  /** spread between the numbers that is put into the result elsewhere, as one standard deviation in their unit */
  readonly expectedSpread?: number
}

/**
 * Plain mean of several estimates, whose scatter about each other counts where it is larger than their own uncertainties explain.
 *
 * m = sum v_i / n; u^2 = W + B with W = sum u_i^2 / n^2 (inside) and B = max(0, (s^2 - e^2 - sum d_k^2) / n - W) (between), s the standard
 * deviation of the v_i, d_k that of the effects of shared source k on them (none where all have it alike), e the spread that is accounted for elsewhere; nu = (W + B)^2 / (W^2 / nu_W + B^2 / (n - 1)). The effect of a shared source is the mean of its
 * effects: one that all have does not shrink, one of each alone does. Every number has the same weight; the between part is never below zero, so that
 * numbers which agree by luck are not made surer than they are one by one.
 * Source: R. DerSimonian, N. Laird, Control. Clin. Trials 7 (1986) 177, doi:10.1016/0197-2456(86)90046-2, in the unweighted form (moment estimate of
 * the variance between); JCGM 100:2008, 5.2.2 (shared sources) and G.4.1 (degrees of freedom).
 *
 * @param estimates - the numbers, in a fixed order [one unit for all]
 * @param options - how their random parts hang together [same unit]
 * @returns the mean in parts, degrees of freedom null for infinite; null without a number; its random part is null where one of theirs is [same unit]
 */
export function meanOfEstimates(estimates: readonly Estimate[], options: MeanOptions): Estimate | null {
  const n = estimates.length
  if (n === 0) return null
  let value = 0
  const sharedEffects: Record<string, number> = {}
  for (const estimate of estimates) {
    value += estimate.value / n
    for (const id of Object.keys(estimate.sharedEffects).sort())
      sharedEffects[id] = (sharedEffects[id] ?? 0) + (estimate.sharedEffects[id] ?? 0) / n
  }
  const own = estimates.flatMap(({ randomStandardUncertainty: u }) => (u === null ? [] : [u / n]))
  if (own.length < n) return { value, randomStandardUncertainty: null, degreesOfFreedom: null, sharedEffects }
  let inside = 0
  for (const u of own) inside += u * u
  let squares = 0
  for (const estimate of estimates) squares += (estimate.value - value) * (estimate.value - value)
  // what sources that not all of them have explain of the scatter: it is in the shared part already
  for (const id of Object.keys(sharedEffects).sort()) {
    for (const estimate of estimates) {
      const apart = (estimate.sharedEffects[id] ?? 0) - (sharedEffects[id] ?? 0)
      squares -= apart * apart
    }
  }
  const spread = options.expectedSpread ?? 0
  const between = n < 2 ? 0 : Math.max(0, squares / (n - 1) / n - inside - (spread * spread) / n)
  const insideDegreesOfFreedom = options.hasPooledScatter
    ? leastDegreesOfFreedom(estimates)
    : combineUncertainty(
        own.map((u, i) => ({ standardUncertainty: u, degreesOfFreedom: estimates[i]?.degreesOfFreedom ?? null })),
      ).degreesOfFreedom
  const combined = combineUncertainty([
    { standardUncertainty: Math.sqrt(inside), degreesOfFreedom: insideDegreesOfFreedom },
    { standardUncertainty: Math.sqrt(between), degreesOfFreedom: n - 1 },
  ])
  return {
    value,
    randomStandardUncertainty: combined.standardUncertainty,
    degreesOfFreedom: combined.degreesOfFreedom,
    sharedEffects,
  }
}
