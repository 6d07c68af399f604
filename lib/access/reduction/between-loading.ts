import 'server-only'
import { type Estimate } from '../../analysis/estimate'

/** Spread from one packed bed to another: it belongs to the sample's number beside the scatter of the line, and shrinks with the number of beds. */
export function withBetweenLoading(estimate: Estimate, standardDeviation: number): Estimate {
  const own = estimate.randomStandardUncertainty
  if (own === null || standardDeviation === 0) return estimate
  const variance = own * own + standardDeviation * standardDeviation
  const nu = estimate.degreesOfFreedom
  return {
    ...estimate,
    randomStandardUncertainty: Math.sqrt(variance),
    degreesOfFreedom: nu === null || own === 0 ? null : (nu * variance * variance) / (own * own * own * own),
  }
}
