import regression from 'regression'
import { twoSidedTProbability } from './student-t'
import { fitWeightedLine } from './weighted-line'

/** Least-squares parabola y = value at the centre + slope d + curvature d^2, d = x - centreX. */
export interface Quadratic {
  readonly centreX: number
  readonly centreValue: number
  readonly slope: number
  readonly curvature: number
  readonly residualSumOfSquares: number
  readonly degreesOfFreedom: number
  /** null without degrees of freedom or without scatter */
  readonly curvatureStandardError: number | null
  readonly t: number | null
  readonly pValue: number | null
  readonly fitted: readonly number[]
}

/**
 * Parabola through weighted points with the test of its curvature.
 *
 * Unweighted, the coefficients are those of the polynomial of `regression` in centred, scaled coordinates; weighted, those of the polynomials
 * that are orthogonal under the weights. The quadratic column is made orthogonal to 1 and x, so its sum of squares gives the standard error
 * without inverting a matrix: Var(c) = s^2 / sum w q^2.
 * Source: N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, chapter 22.
 *
 * @param x - at least 3 distinct values [unit of x]
 * @param y - as many values [unit of y]
 * @param weights - positive; null for equal weights [1 / unit of y squared, or -]
 * @returns the parabola, n - 3 degrees of freedom; null where fewer than 3 distinct x were given [units of x and y]
 * @throws {AnalysisError} lengths-differ | too-few-points | not-finite | not-positive | collinear-design
 */
export function fitQuadratic(
  x: readonly number[],
  y: readonly number[],
  weights: readonly number[] | null,
): Quadratic | null {
  const line = fitWeightedLine(x, y, weights)
  const distances = x.map((value) => value - line.centreX)
  const scale = Math.max(...distances.map(Math.abs))
  const u = distances.map((value) => value / scale)
  const w = line.weights
  const squares = u.map((value) => value * value)
  const squareLine = fitWeightedLine(u, squares, weights)
  const q = squareLine.residuals
  let qq = 0
  let total = 0
  for (let i = 0; i < q.length; i++) {
    qq += (w[i] ?? 0) * (q[i] ?? 0) * (q[i] ?? 0)
    total += (w[i] ?? 0) * (squares[i] ?? 0) * (squares[i] ?? 0)
  }
  if (!(qq > 1e-20 * total)) return null
  let curvature = 0
  let height = 0
  for (const residual of line.residuals) height = Math.max(height, Math.abs(residual))
  if (weights === null && height > 0) {
    // the residuals of the line carry all of the curvature and none of the slope: nothing is lost to cancellation
    const data = u.map((value, i): [number, number] => [value, (line.residuals[i] ?? 0) / height])
    curvature = (regression.polynomial(data, { order: 2, precision: 22 }).equation[0] ?? 0) * height
  } else {
    for (let i = 0; i < q.length; i++) curvature += (w[i] ?? 0) * (q[i] ?? 0) * (line.residuals[i] ?? 0)
    curvature /= qq
  }
  let correction = 0
  for (let i = 0; i < q.length; i++) {
    correction += (w[i] ?? 0) * (q[i] ?? 0) * ((line.residuals[i] ?? 0) - curvature * (q[i] ?? 0))
  }
  curvature += correction / qq
  let residualSumOfSquares = 0
  const fitted: number[] = []
  for (let i = 0; i < q.length; i++) {
    const residual = (line.residuals[i] ?? 0) - curvature * (q[i] ?? 0)
    residualSumOfSquares += (w[i] ?? 0) * residual * residual
    fitted.push((y[i] ?? 0) - residual)
  }
  const degreesOfFreedom = line.count - 3
  const standardError =
    degreesOfFreedom > 0 && residualSumOfSquares > 0 ? Math.sqrt(residualSumOfSquares / degreesOfFreedom / qq) : null
  const t = standardError === null ? null : curvature / standardError
  return {
    centreX: line.centreX,
    centreValue: line.centreValue - curvature * squareLine.intercept,
    slope: line.slope - (curvature * squareLine.slope) / scale,
    curvature: curvature / (scale * scale),
    residualSumOfSquares,
    degreesOfFreedom,
    curvatureStandardError: standardError === null ? null : standardError / (scale * scale),
    t,
    pValue: t === null ? null : twoSidedTProbability(t, degreesOfFreedom),
    fitted,
  }
}
