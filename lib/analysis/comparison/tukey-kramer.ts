import studentizedRangeCdf from '@stdlib/stats-base-dists-studentized-range-cdf'
import { AnalysisError } from '../analysis-error'

/** One group of a comparison. */
export interface GroupMean {
  readonly mean: number
  /** observations behind the mean */
  readonly count: number
}

/** One pair. */
export interface PairComparison {
  readonly first: number
  readonly second: number
  /** mean of the first less mean of the second */
  readonly difference: number
  readonly low: number
  readonly high: number
  readonly pValue: number
}

/**
 * All pairs of group means, with intervals that hold for all pairs together.
 *
 * q = |m_i − m_j| / (s √[(1/n_i + 1/n_j)/2]), p from the studentised range of g groups and ν degrees of freedom
 *
 * Equal variances. With equal counts it is Tukey's test; with unequal ones the intervals are slightly wide.
 * Source: Kramer, Biometrics 12 (1956) 307; Hayter, Ann. Stat. 12 (1984) 61.
 *
 * @param groups - at least 2 groups: mean [any], count [-] at least 1
 * @param standardDeviation - pooled within groups [unit of the mean] > 0
 * @param degreesOfFreedom - of the pooled standard deviation [-] > 0
 * @param confidenceLevel - for all intervals together, between 0 and 1 [-]
 * @returns pairs in order of the groups, the first one earlier [unit of the mean]; ν degrees of freedom
 * @throws {AnalysisError} too-few-points with fewer than 2 groups | not-positive for a standard deviation, count or degrees of freedom that is not above zero
 */
export function compareAllPairs(
  groups: readonly GroupMean[],
  standardDeviation: number,
  degreesOfFreedom: number,
  confidenceLevel = 0.95,
): PairComparison[] {
  if (groups.length < 2) throw new AnalysisError('too-few-points', 'A comparison needs at least two groups.')
  if (!(standardDeviation > 0) || !(degreesOfFreedom > 0) || groups.some(({ count }) => !(count > 0)))
    throw new AnalysisError('not-positive', 'Standard deviation, degrees of freedom and counts must be above zero.')
  const quantile = studentizedRangeQuantile(confidenceLevel, groups.length, degreesOfFreedom)
  return groups.flatMap((first, i) =>
    groups.slice(i + 1).map((second, k) => {
      const error = standardDeviation * Math.sqrt((1 / first.count + 1 / second.count) / 2)
      const difference = first.mean - second.mean
      const pValue = 1 - studentizedRangeCdf(Math.abs(difference) / error, groups.length, degreesOfFreedom)
      return {
        first: i,
        second: i + 1 + k,
        difference,
        low: difference - quantile * error,
        high: difference + quantile * error,
        pValue,
      }
    }),
  )
}

/**
 * Quantile of the studentised range.
 *
 * The value q at which the distribution function is the probability, by bisection.
 * Source: Copenhaver and Holland, J. Stat. Comput. Simul. 30 (1988) 1, for the distribution function.
 *
 * @param probability - between 0 and 1 [-]
 * @param groups - number of groups, at least 2 [-]
 * @param degreesOfFreedom - of the standard deviation [-] > 0
 * @returns quantile [-]
 * @throws {AnalysisError} out-of-range when the probability is not between 0 and 1
 * @example 0.95, 3 groups, 27 degrees of freedom: 3.50642612
 */
export function studentizedRangeQuantile(probability: number, groups: number, degreesOfFreedom: number): number {
  if (!(probability > 0 && probability < 1))
    throw new AnalysisError('out-of-range', 'A probability lies between 0 and 1.', { probability })
  let low = 0
  let high = 4
  while (studentizedRangeCdf(high, groups, degreesOfFreedom) < probability) {
    low = high
    high *= 2
  }
  for (let i = 0; i < 60 && high - low > 1e-10 * high; i += 1) {
    const middle = (low + high) / 2
    if (studentizedRangeCdf(middle, groups, degreesOfFreedom) < probability) low = middle
    else high = middle
  }
  return (low + high) / 2
}
