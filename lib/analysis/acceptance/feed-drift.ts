import { AnalysisError } from '../analysis-error'

/** Two analyses of the same feed through the bypass. */
export interface FeedDrift {
  /** after over before, less one */
  readonly drift: number
  readonly standardUncertainty: number
  readonly limit: number
  readonly verdict: 'within' | 'beyond' | 'cannot-tell'
}

/** Largest drift of the feed analysis over a run. Source: common practice, 2 %. */
export const FEED_DRIFT_LIMIT = 0.02

/**
 * Drift of the feed analysis between a bypass before and one after the run.
 *
 * d = y_after/y_before − 1; u(d) = (1 + d) √(u_r²(before) + u_r²(after))
 *
 * Beyond when |d| is above the limit by more than twice its uncertainty, within when below it by as much; else it cannot be told.
 * Source: common practice; JCGM 100:2008, equation 10.
 *
 * @param before - analysis before [any] > 0, relative standard uncertainty [-]
 * @param after - analysis after [any] > 0, relative standard uncertainty [-]
 * @param limit - largest drift [-]
 * @returns drift with standard uncertainty [-]
 * @throws {AnalysisError} not-positive for an analysis not above zero
 */
export function feedDrift(before: FeedAnalysis, after: FeedAnalysis, limit: number = FEED_DRIFT_LIMIT): FeedDrift {
  if (![before.value, after.value].every((value) => value > 0 && Number.isFinite(value)))
    throw new AnalysisError('not-positive', 'Both feed analyses must be above zero.')
  const ratio = after.value / before.value
  const standardUncertainty =
    ratio *
    Math.sqrt(
      before.relativeStandardUncertainty * before.relativeStandardUncertainty +
        after.relativeStandardUncertainty * after.relativeStandardUncertainty,
    )
  const size = Math.abs(ratio - 1)
  const verdict =
    size - 2 * standardUncertainty > limit
      ? 'beyond'
      : size + 2 * standardUncertainty <= limit
        ? 'within'
        : 'cannot-tell'
  return { drift: ratio - 1, standardUncertainty, limit, verdict }
}

/** One analysis of the feed. */
export interface FeedAnalysis {
  readonly value: number
  readonly relativeStandardUncertainty: number
}
