import { AnalysisError } from '../analysis-error'
import { studentTQuantile } from '../statistics/student-t'

/** Limits for the reference catalyst. */
export interface ReferenceLimits {
  readonly mean: number
  readonly standardDeviation: number
  readonly count: number
  readonly warning: readonly [number, number]
  readonly action: readonly [number, number]
}

/** Earlier results from which on limits can be set. Source: common practice. */
export const REFERENCE_MINIMUM = 5

/**
 * Limits within which the next result of the reference catalyst is expected.
 *
 * ȳ ± t(1 − α/2; n − 1) s √(1 + 1/n), α = 5 % (warning) and 0.3 % (action)
 *
 * Limits for a new value, which for few earlier ones are wider than two and three standard deviations. Use ln rate or activation energy.
 * Source: Montgomery, Introduction to Statistical Quality Control, 7th edition; prediction interval: Hahn and Meeker, Statistical Intervals, 1991.
 *
 * @param earlier - results accepted so far, at least 5 [any]
 * @returns mean, standard deviation and limits [unit of the results]; n − 1 degrees of freedom
 * @throws {AnalysisError} too-few-points | not-finite
 */
export function referenceLimits(earlier: readonly number[]): ReferenceLimits {
  const count = earlier.length
  if (count < REFERENCE_MINIMUM)
    throw new AnalysisError(
      'too-few-points',
      `Limits need ${String(REFERENCE_MINIMUM)} accepted results of the reference catalyst.`,
      { count },
    )
  if (earlier.some((value) => !Number.isFinite(value)))
    throw new AnalysisError('not-finite', 'A result is not a finite number.')
  const mean = earlier.reduce((sum, value) => sum + value, 0) / count
  const standardDeviation = Math.sqrt(
    earlier.reduce((sum, value) => sum + (value - mean) * (value - mean), 0) / (count - 1),
  )
  const around = (alpha: number): readonly [number, number] => {
    const reach = studentTQuantile(1 - alpha / 2, count - 1) * standardDeviation * Math.sqrt(1 + 1 / count)
    return [mean - reach, mean + reach]
  }
  return { mean, standardDeviation, count, warning: around(0.05), action: around(0.003) }
}

/**
 * Where a new result of the reference catalyst stands.
 *
 * Source: as {@link referenceLimits}.
 *
 * @param limits - from earlier results [any]
 * @param value - the new result [same unit]
 * @returns within, outside the warning limits, or outside the action limits [-]
 */
export function judgeReference(limits: ReferenceLimits, value: number): 'within' | 'warning' | 'action' {
  const isInside = ([low, high]: readonly [number, number]) => low <= value && value <= high
  if (isInside(limits.warning)) return 'within'
  return isInside(limits.action) ? 'warning' : 'action'
}
