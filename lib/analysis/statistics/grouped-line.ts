import { AnalysisError } from '../analysis-error'
import { fitWeightedLine } from './weighted-line'

/** One group's own level on the common slope. */
export interface GroupLevel {
  readonly centreX: number
  readonly centreValue: number
  readonly sumOfWeights: number
}

/** Parallel lines: one slope, one level a group. With one group it is the weighted line. */
export interface GroupedLine {
  readonly slope: number
  /** sum over groups of w (x - group mean)^2 */
  readonly sumOfSquaresX: number
  readonly groups: readonly GroupLevel[]
  readonly residuals: readonly number[]
  readonly leverage: readonly number[]
  readonly residualSumOfSquares: number
  /** n - groups - 1 */
  readonly degreesOfFreedom: number
}

/**
 * Weighted parallel lines with one slope and a level for each group.
 *
 * b = sum over groups of sum w (x - xg) y / sum over groups of sum w (x - xg)^2; level of group g at its own mean xg: yg.
 * Source: N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, chapter 14.
 *
 * @param x - places [unit of x]
 * @param y - as many values [unit of y]
 * @param weights - positive; null for equal weights [1 / unit of y squared, or -]
 * @param groupOf - group number of each point, from 0 without gaps [-]
 * @returns slope, levels and residuals, n - groups - 1 degrees of freedom [units of x and y]
 * @throws {AnalysisError} lengths-differ | too-few-points | not-finite | not-positive | collinear-design
 */
export function fitGroupedLine(
  x: readonly number[],
  y: readonly number[],
  weights: readonly number[] | null,
  groupOf: readonly number[],
): GroupedLine {
  const groupCount = groupOf.reduce((most, group) => Math.max(most, group + 1), 0)
  if (groupCount <= 1) {
    const line = fitWeightedLine(x, y, weights)
    return {
      slope: line.slope,
      sumOfSquaresX: line.sumOfSquaresX,
      groups: [{ centreX: line.centreX, centreValue: line.centreValue, sumOfWeights: line.sumOfWeights }],
      residuals: line.residuals,
      leverage: line.leverage,
      residualSumOfSquares: line.residualSumOfSquares,
      degreesOfFreedom: line.degreesOfFreedom,
    }
  }
  if (x.length !== y.length || x.length !== groupOf.length) {
    throw new AnalysisError('lengths-differ', 'x, y and groups must be as many.', { x: x.length, y: y.length })
  }
  const w = (i: number): number => (weights === null ? 1 : (weights[i] ?? Number.NaN))
  const sums = Array.from({ length: groupCount }, () => ({ w: 0, x: 0, y: 0 }))
  const firstX = x[0] ?? 0
  for (let i = 0; i < x.length; i++) {
    const group = sums[groupOf[i] ?? 0]
    if (!Number.isFinite(x[i]) || !Number.isFinite(y[i]) || !Number.isFinite(w(i))) {
      throw new AnalysisError('not-finite', `Point ${i + 1} is not a finite number.`, { index: i })
    }
    if (!(w(i) > 0)) throw new AnalysisError('not-positive', `Point ${i + 1} has the weight ${w(i)}.`, { index: i })
    if (group === undefined) continue
    group.w += w(i)
    group.x += w(i) * ((x[i] ?? 0) - firstX)
    group.y += w(i) * (y[i] ?? 0)
  }
  const groups = sums.map((group) => ({
    centreX: firstX + group.x / group.w,
    centreValue: group.y / group.w,
    sumOfWeights: group.w,
  }))
  const centre = (i: number): GroupLevel =>
    groups[groupOf[i] ?? 0] ?? { centreX: Number.NaN, centreValue: Number.NaN, sumOfWeights: Number.NaN }
  let sumOfSquaresX = 0
  let product = 0
  let largest = 0
  for (let i = 0; i < x.length; i++) {
    const dx = (x[i] ?? 0) - centre(i).centreX
    sumOfSquaresX += w(i) * dx * dx
    product += w(i) * dx * ((y[i] ?? 0) - centre(i).centreValue)
    largest = Math.max(largest, Math.abs(dx) / Math.abs(x[i] ?? 1))
  }
  if (!(largest > 1e-14) || !(sumOfSquaresX > 0)) {
    throw new AnalysisError('collinear-design', 'No group has points at two different x; a slope needs two places.', {
      count: x.length,
    })
  }
  const slope = product / sumOfSquaresX
  const residuals: number[] = []
  const leverage: number[] = []
  let residualSumOfSquares = 0
  for (let i = 0; i < x.length; i++) {
    const dx = (x[i] ?? 0) - centre(i).centreX
    const residual = (y[i] ?? 0) - centre(i).centreValue - slope * dx
    residuals.push(residual)
    leverage.push(Math.min(1, w(i) * (1 / centre(i).sumOfWeights + (dx * dx) / sumOfSquaresX)))
    residualSumOfSquares += w(i) * residual * residual
  }
  return {
    slope,
    sumOfSquaresX,
    groups,
    residuals,
    leverage,
    residualSumOfSquares,
    degreesOfFreedom: x.length - groupCount - 1,
  }
}
