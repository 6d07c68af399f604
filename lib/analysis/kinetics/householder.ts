import { AnalysisError } from '../analysis-error'

/** A tall matrix turned upper triangular, with the same turns applied to a right-hand side. */
export interface TurnedSystem {
  /** upper triangle, row by row, of the columns after scaling to unit length */
  readonly r: readonly (readonly number[])[]
  /** Qᵀ y, first as many as there are columns */
  readonly qty: readonly number[]
  /** sum of squares of the rest of Qᵀ y: the residual sum of squares */
  readonly rest: number
  readonly columnLengths: readonly number[]
}

/** Columns nearer to each other than this, relative to their length, count as the same. */
const RANK_TOLERANCE = 1e-13

/**
 * Least squares by Householder reflections on columns scaled to unit length.
 *
 * A = Q R; the scaling keeps columns of very different units from spoiling the rank decision.
 * Source: Golub and Van Loan, Matrix Computations, 4th edition, algorithm 5.2.1.
 *
 * @param rows - matrix by rows, at least as many rows as columns [any]
 * @param y - right-hand side [any]
 * @returns triangle, turned right-hand side, residual sum of squares [unit of y squared]
 * @throws {AnalysisError} collinear-design when a column depends on the others | not-finite when an entry is not finite | too-few-points with fewer rows than columns
 */
export function turnSystem(rows: readonly (readonly number[])[], y: readonly number[]): TurnedSystem {
  const n = rows.length
  const p = rows[0]?.length ?? 0
  if (n < p || p === 0)
    throw new AnalysisError('too-few-points', `${String(n)} points cannot settle ${String(p)} unknowns.`, { n, p })
  const a = rows.map((row) => Float64Array.from(row))
  const b = Float64Array.from(y)
  const columnLengths: number[] = []
  for (let j = 0; j < p; j += 1) {
    let square = 0
    for (const row of a) square += (row[j] ?? NaN) * (row[j] ?? NaN)
    const length = Math.sqrt(square)
    if (!Number.isFinite(length))
      throw new AnalysisError('not-finite', 'A value of the design is not finite.', { column: j })
    if (length === 0)
      throw new AnalysisError('collinear-design', 'A column of the design is zero throughout.', { column: j })
    columnLengths.push(length)
    for (const row of a) row[j] = (row[j] ?? NaN) / length
  }
  if (b.some((value) => !Number.isFinite(value)))
    throw new AnalysisError('not-finite', 'A measured value is not finite.')
  for (let k = 0; k < p; k += 1) {
    let square = 0
    for (let i = k; i < n; i += 1) square += at(a, i, k) * at(a, i, k)
    const length = Math.sqrt(square)
    if (length < RANK_TOLERANCE)
      throw new AnalysisError('collinear-design', 'The design cannot tell its unknowns apart.', { column: k })
    const pivot = at(a, k, k)
    const alpha = pivot > 0 ? -length : length
    const v = Float64Array.from({ length: n - k }, (_unused, i) => at(a, k + i, k))
    v[0] = pivot - alpha
    let norm = 0
    for (const value of v) norm += value * value
    if (norm > 0) {
      for (let j = k; j < p; j += 1)
        reflect(
          v,
          norm,
          (i) => at(a, k + i, j),
          (i, value) => void ((a[k + i] ?? v)[j] = value),
        )
      reflect(
        v,
        norm,
        (i) => b[k + i] ?? NaN,
        (i, value) => void (b[k + i] = value),
      )
    }
  }
  let rest = 0
  for (let i = p; i < n; i += 1) rest += (b[i] ?? NaN) * (b[i] ?? NaN)
  return {
    r: a.slice(0, p).map((row, i) => Array.from(row, (value, j) => (j < i ? 0 : value))),
    qty: Array.from(b.subarray(0, p)),
    rest,
    columnLengths,
  }
}

/**
 * Solution of the turned system in the units of the columns as given.
 *
 * @param system - from {@link turnSystem} [any]
 * @returns unknowns, one a column [unit of y over unit of the column]
 */
export function solveTurned(system: TurnedSystem): number[] {
  const p = system.r.length
  const x = new Array<number>(p).fill(0)
  for (let i = p - 1; i >= 0; i -= 1) {
    let sum = system.qty[i] ?? NaN
    for (let j = i + 1; j < p; j += 1) sum -= (system.r[i]?.[j] ?? NaN) * (x[j] ?? NaN)
    x[i] = sum / (system.r[i]?.[i] ?? NaN)
  }
  return x.map((value, j) => value / (system.columnLengths[j] ?? NaN))
}

/**
 * Inverse of AᵀA, from the triangle, in the units of the columns as given.
 *
 * @param system - from {@link turnSystem} [any]
 * @returns symmetric matrix [1 / product of the units of the two columns]
 */
export function inverseNormal(system: TurnedSystem): number[][] {
  const p = system.r.length
  const inverse = Array.from({ length: p }, () => new Array<number>(p).fill(0))
  for (let j = 0; j < p; j += 1)
    for (let i = j; i >= 0; i -= 1) {
      let sum = i === j ? 1 : 0
      for (let k = i + 1; k <= j; k += 1) sum -= (system.r[i]?.[k] ?? NaN) * (inverse[k]?.[j] ?? NaN)
      const row = inverse[i]
      if (row !== undefined) row[j] = sum / (system.r[i]?.[i] ?? NaN)
    }
  return inverse.map((row, i) =>
    row.map((_unused, j) => {
      let sum = 0
      for (let k = Math.max(i, j); k < p; k += 1) sum += (inverse[i]?.[k] ?? NaN) * (inverse[j]?.[k] ?? NaN)
      return sum / ((system.columnLengths[i] ?? NaN) * (system.columnLengths[j] ?? NaN))
    }),
  )
}

/**
 * Leverage of one row of the design: its length after division by the triangle.
 *
 * h = |R⁻ᵀ x|², x the row with its columns scaled like the design's
 *
 * Keeps the digits that a product with the inverse of AᵀA loses for nearly dependent columns.
 * Source: Golub and Van Loan, Matrix Computations, 4th edition, section 5.3.
 *
 * @param system - from {@link turnSystem} [any]
 * @param row - a row as given to it [any]
 * @returns leverage [-], 0 to 1 for a row of the design
 */
export function leverageOf(system: TurnedSystem, row: readonly number[]): number {
  const z: number[] = []
  let h = 0
  for (let j = 0; j < system.r.length; j += 1) {
    let sum = (row[j] ?? NaN) / (system.columnLengths[j] ?? NaN)
    for (let i = 0; i < j; i += 1) sum -= (system.r[i]?.[j] ?? NaN) * (z[i] ?? NaN)
    const value = sum / (system.r[j]?.[j] ?? NaN)
    z.push(value)
    h += value * value
  }
  return h
}

function at(a: readonly Float64Array[], i: number, j: number): number {
  return a[i]?.[j] ?? NaN
}

function reflect(
  v: Float64Array,
  norm: number,
  get: (i: number) => number,
  set: (i: number, value: number) => void,
): void {
  let dot = 0
  for (let i = 0; i < v.length; i += 1) dot += (v[i] ?? NaN) * get(i)
  const factor = (2 * dot) / norm
  for (let i = 0; i < v.length; i += 1) set(i, get(i) - factor * (v[i] ?? NaN))
}
