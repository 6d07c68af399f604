import { AnalysisError } from '../analysis-error'
import { inverseNormal, leverageOf, solveTurned, turnSystem } from './householder'

/** Weighted linear least squares with any number of columns. */
export interface LinearModelFit {
  readonly coefficients: readonly number[]
  /** scaled by the residual standard deviation; null at zero degrees of freedom */
  readonly standardErrors: readonly (number | null)[]
  /** inverse of XᵀWX: the covariance for known standard deviations, times s² for unknown ones */
  readonly unscaledCovariance: readonly (readonly number[])[]
  readonly fitted: readonly number[]
  readonly residuals: readonly number[]
  readonly leverage: readonly number[]
  /** weighted */
  readonly residualSumOfSquares: number
  readonly degreesOfFreedom: number
  readonly residualStandardDeviation: number | null
  /** about the mean; null when the measured values do not differ */
  readonly rSquared: number | null
}

/**
 * Linear model y = X b by weighted least squares.
 *
 * b minimises Σ w (y − X b)²; cov(b) = s² (XᵀWX)⁻¹, s² = Σ w e²/(n − p). Householder reflections, no normal equations.
 *
 * Errors of y independent, X without error. R² is about the weighted mean and only means something with a constant column.
 * Source: Draper and Smith, Applied Regression Analysis, 3rd edition, chapters 4 to 6.
 *
 * @param rows - design by rows, a constant column included where wanted [any]
 * @param y - measured values, as many as rows [any]
 * @param weights - positive, 1/σ² or relative; null for equal weights [1/unit of y squared, or -]
 * @returns coefficients with standard errors, n − p degrees of freedom [unit of y over unit of the column]
 * @throws {AnalysisError} too-few-points | lengths-differ | not-finite | not-positive for a weight | collinear-design
 */
export function fitLinearModel(
  rows: readonly (readonly number[])[],
  y: readonly number[],
  weights: readonly number[] | null = null,
): LinearModelFit {
  if (rows.length !== y.length || (weights !== null && weights.length !== y.length))
    throw new AnalysisError('lengths-differ', 'Design, values and weights must be equally long.')
  if (weights !== null && weights.some((w) => !(w > 0)))
    throw new AnalysisError('not-positive', 'Weights must be above zero.')
  const w = weights ?? y.map(() => 1)
  const roots = w.map((value) => Math.sqrt(value))
  const weighted = rows.map((row, i) => row.map((value) => value * (roots[i] ?? NaN)))
  const system = turnSystem(
    weighted,
    y.map((value, i) => value * (roots[i] ?? NaN)),
  )
  const coefficients = refine(weighted, y, roots, solveTurned(system))
  const fitted = rows.map((row) => row.reduce((sum, value, j) => sum + value * (coefficients[j] ?? NaN), 0))
  const residuals = y.map((value, i) => value - (fitted[i] ?? NaN))
  const unscaledCovariance = inverseNormal(system)
  const residualSumOfSquares = residuals.reduce((sum, e, i) => sum + (w[i] ?? NaN) * e * e, 0)
  const degreesOfFreedom = y.length - coefficients.length
  const s = degreesOfFreedom > 0 ? Math.sqrt(residualSumOfSquares / degreesOfFreedom) : null
  return {
    coefficients,
    standardErrors: coefficients.map((_unused, j) =>
      s === null ? null : s * Math.sqrt(unscaledCovariance[j]?.[j] ?? NaN),
    ),
    unscaledCovariance,
    fitted,
    residuals,
    leverage: weighted.map((row) => leverageOf(system, row)),
    residualSumOfSquares,
    degreesOfFreedom,
    residualStandardDeviation: s,
    rSquared: rSquaredOf(y, w, residualSumOfSquares),
  }
}

/**
 * Variance inflation of each column: 1/(1 − R²) of that column on the others.
 *
 * Above 10 the columns say nearly the same and their coefficients cannot be told apart.
 * Source: Marquardt, Technometrics 12 (1970) 591.
 *
 * @param rows - design by rows without a constant column [any]
 * @returns one factor a column [-]; null where the others settle the column completely
 */
export function varianceInflation(rows: readonly (readonly number[])[]): (number | null)[] {
  const columns = rows[0]?.length ?? 0
  return Array.from({ length: columns }, (_unused, j) => {
    const others = rows.map((row) => [1, ...row.filter((_value, k) => k !== j)])
    try {
      const { rSquared } = fitLinearModel(
        others,
        rows.map((row) => row[j] ?? NaN),
      )
      return rSquared === null || 1 - rSquared < 1e-14 ? null : 1 / (1 - rSquared)
    } catch (error) {
      if (error instanceof AnalysisError) return null
      throw error
    }
  })
}

// One step of iterative refinement: takes the rounding of the reflections out of nearly dependent designs.
function refine(
  weighted: readonly (readonly number[])[],
  y: readonly number[],
  roots: readonly number[],
  start: readonly number[],
): number[] {
  const rest = weighted.map(
    (row, i) => (y[i] ?? NaN) * (roots[i] ?? NaN) - row.reduce((sum, value, j) => sum + value * (start[j] ?? NaN), 0),
  )
  const correction = solveTurned(turnSystem(weighted, rest))
  return start.map((value, j) => value + (correction[j] ?? 0))
}

function rSquaredOf(y: readonly number[], w: readonly number[], residual: number): number | null {
  const total = w.reduce((sum, value) => sum + value, 0)
  const mean = y.reduce((sum, value, i) => sum + (w[i] ?? NaN) * value, 0) / total
  const about = y.reduce((sum, value, i) => sum + (w[i] ?? NaN) * (value - mean) * (value - mean), 0)
  return about > 0 ? 1 - residual / about : null
}

/**
 * Quadratic form xᵀ M x.
 *
 * @param x - vector [any]
 * @param matrix - square matrix of the same size [any]
 * @returns the form [unit of x squared times unit of the matrix]
 */
export function quadraticForm(x: readonly number[], matrix: readonly (readonly number[])[]): number {
  let sum = 0
  for (const [i, row] of matrix.entries())
    for (const [j, value] of row.entries()) sum += (x[i] ?? NaN) * value * (x[j] ?? NaN)
  return sum
}
