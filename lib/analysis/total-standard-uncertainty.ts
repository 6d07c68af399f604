import { type Estimate } from './estimate'

/**
 * Total standard uncertainty of an estimate: its own random part and every shared part, added in quadrature.
 *
 * u² = u_random² + Σ (effect of one standard uncertainty of each shared source)²; the sources are independent of each other by
 * construction. Source: JCGM 100:2008, equation 10.
 *
 * @param estimate - value with its parts [unit of the value]
 * @returns total standard uncertainty [unit of the value]; null where the random part cannot be known
 */
export function totalStandardUncertainty(estimate: Estimate): number | null {
  if (estimate.randomStandardUncertainty === null) return null
  let variance = estimate.randomStandardUncertainty * estimate.randomStandardUncertainty
  for (const id of Object.keys(estimate.sharedEffects).sort()) {
    const effect = estimate.sharedEffects[id] ?? 0
    variance += effect * effect
  }
  return Math.sqrt(variance)
}
