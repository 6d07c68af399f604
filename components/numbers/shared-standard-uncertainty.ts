import { type Estimate } from '@/lib/analysis/estimate'

/** Root of the summed squares of the shared effects; the sources are independent of one another. */
export function sharedStandardUncertainty(estimate: Estimate): number {
  return Math.sqrt(Object.values(estimate.sharedEffects).reduce((sum, effect) => sum + effect * effect, 0))
}
