import { AnalysisError } from '../analysis-error'
import { upperFProbability } from '../statistics/f-distribution'
import { fitGroupedLine } from '../statistics/grouped-line'
import { fitWeightedLine } from '../statistics/weighted-line'

/** Points of one line. */
export interface LinePoints {
  readonly x: readonly number[]
  readonly y: readonly number[]
  /** null for equal weights */
  readonly weights?: readonly number[] | null
}

/** One F test. */
export interface FTest {
  readonly f: number
  readonly numeratorDegreesOfFreedom: number
  readonly denominatorDegreesOfFreedom: number
  readonly pValue: number
}

/** What a model leaves over. */
export interface ResidualScatter {
  readonly residualSumOfSquares: number
  readonly degreesOfFreedom: number
}

/** Whether several lines are one. */
export interface LineComparison {
  readonly commonLine: ResidualScatter
  readonly commonSlope: ResidualScatter
  readonly separate: ResidualScatter
  /** parallel against separate */
  readonly equalSlopes: FTest
  /** one line against parallel ones */
  readonly equalLevels: FTest
  /** largest over smallest residual variance of the lines; above 4 equal variances are in doubt and Welch's test serves better; null where a line has no degrees of freedom or no scatter */
  readonly varianceRatio: number | null
}

/**
 * Analysis of covariance of several straight lines: equal slopes, then equal levels.
 *
 * F = [(RSS_common − RSS_separate)/(g − 1)] / [RSS_separate/(N − 2g)]
 *
 * Assumes the same residual variance in all groups. A large probability does not show that lines are equal: look at the interval of the difference.
 * Source: Draper and Smith, Applied Regression Analysis, 3rd edition, chapter 14; Kutner et al., Applied Linear Statistical Models, chapter 22.
 *
 * @param groups - at least 2 lines, each with 2 or more distinct x [any]
 * @returns sums of squares and tests [-], with their degrees of freedom
 * @throws {AnalysisError} too-few-points with fewer than 2 groups or no degrees of freedom | as the line fit
 */
export function compareLines(groups: readonly LinePoints[]): LineComparison {
  if (groups.length < 2) throw new AnalysisError('too-few-points', 'A comparison needs at least two lines.')
  const x = groups.flatMap((group) => group.x)
  const y = groups.flatMap((group) => group.y)
  const hasWeights = groups.some((group) => (group.weights ?? null) !== null)
  const weights = hasWeights ? groups.flatMap((group) => group.weights ?? group.x.map(() => 1)) : null
  const groupOf = groups.flatMap((group, index) => group.x.map(() => index))
  const one = fitWeightedLine(x, y, weights)
  const parallel = fitGroupedLine(x, y, weights, groupOf)
  const each = groups.map((group) => fitWeightedLine(group.x, group.y, group.weights ?? null))
  const separate = {
    residualSumOfSquares: each.reduce((sum, line) => sum + line.residualSumOfSquares, 0),
    degreesOfFreedom: each.reduce((sum, line) => sum + line.degreesOfFreedom, 0),
  }
  if (!(separate.degreesOfFreedom > 0))
    throw new AnalysisError('too-few-points', 'The lines have no degrees of freedom left to judge by.')
  const variances = each.map((line) =>
    line.degreesOfFreedom > 0 ? line.residualSumOfSquares / line.degreesOfFreedom : 0,
  )
  const least = Math.min(...variances)
  return {
    commonLine: one,
    commonSlope: parallel,
    separate,
    equalSlopes: fTest(parallel, separate),
    equalLevels: fTest(one, parallel),
    varianceRatio: least > 0 ? Math.max(...variances) / least : null,
  }
}

/**
 * Extra-sum-of-squares test of a simpler model against a fuller one.
 *
 * F = [(RSS_simple − RSS_full)/(ν_simple − ν_full)] / [RSS_full/ν_full]
 *
 * The simpler model must be a special case of the fuller one.
 * Source: Bates and Watts, Nonlinear Regression Analysis and Its Applications, 1988, section 3.10.
 *
 * @param simple - residual sum of squares and degrees of freedom of the simpler model [any]
 * @param full - the same of the fuller model [any]
 * @returns F, degrees of freedom and probability [-]
 * @throws {AnalysisError} out-of-range when the fuller model has not fewer degrees of freedom, or none
 */
export function fTest(simple: ResidualScatter, full: ResidualScatter): FTest {
  const numerator = simple.degreesOfFreedom - full.degreesOfFreedom
  const denominator = full.degreesOfFreedom
  if (!(numerator > 0) || !(denominator > 0) || !(full.residualSumOfSquares > 0))
    throw new AnalysisError(
      'out-of-range',
      'The fuller model must have scatter, degrees of freedom, and fewer of them than the simpler one.',
    )
  const f = Math.max(
    0,
    (simple.residualSumOfSquares - full.residualSumOfSquares) / numerator / (full.residualSumOfSquares / denominator),
  )
  return {
    f,
    numeratorDegreesOfFreedom: numerator,
    denominatorDegreesOfFreedom: denominator,
    pValue: upperFProbability(f, numerator, denominator),
  }
}
