import studentizedRangeCdf from '@stdlib/stats-base-dists-studentized-range-cdf'
import { AnalysisError } from '../analysis-error'
import { type PairComparison, studentizedRangeQuantile } from './tukey-kramer'

/** A result with its own uncertainty, as fits of different runs have it. */
export interface UnequalGroup {
  readonly mean: number
  readonly standardUncertainty: number
  /** finite: the test rests on them */
  readonly degreesOfFreedom: number
}

/**
 * All pairs of results of unequal variance, with intervals that hold for all pairs together.
 *
 * q = |m_i − m_j| √2/√(u_i² + u_j²), ν by Welch and Satterthwaite, p from the studentised range of g groups
 *
 * Independent results. What they share (one flow controller, one calibration) must be taken out of the uncertainties first: it cancels.
 * Source: Games and Howell, J. Educ. Stat. 1 (1976) 113.
 *
 * @param groups - at least 2 results: value [any], standard uncertainty [same unit] > 0, degrees of freedom [-] > 0
 * @param confidenceLevel - for all intervals together, between 0 and 1 [-]
 * @returns pairs in order of the groups, the first one earlier [unit of the value]
 * @throws {AnalysisError} too-few-points with fewer than 2 groups | not-positive for an uncertainty or degrees of freedom not above zero
 */
export function compareUnequalPairs(groups: readonly UnequalGroup[], confidenceLevel = 0.95): PairComparison[] {
  if (groups.length < 2) throw new AnalysisError('too-few-points', 'A comparison needs at least two results.')
  if (groups.some(({ standardUncertainty, degreesOfFreedom }) => !(standardUncertainty > 0) || !(degreesOfFreedom > 0)))
    throw new AnalysisError('not-positive', 'Each result needs an uncertainty and degrees of freedom above zero.')
  return groups.flatMap((first, i) =>
    groups.slice(i + 1).map((second, k) => {
      const a = first.standardUncertainty * first.standardUncertainty
      const b = second.standardUncertainty * second.standardUncertainty
      const degreesOfFreedom =
        ((a + b) * (a + b)) / ((a * a) / first.degreesOfFreedom + (b * b) / second.degreesOfFreedom)
      const error = Math.sqrt((a + b) / 2)
      const difference = first.mean - second.mean
      const reach = studentizedRangeQuantile(confidenceLevel, groups.length, degreesOfFreedom) * error
      return {
        first: i,
        second: i + 1 + k,
        difference,
        low: difference - reach,
        high: difference + reach,
        pValue: 1 - studentizedRangeCdf(Math.abs(difference) / error, groups.length, degreesOfFreedom),
      }
    }),
  )
}
