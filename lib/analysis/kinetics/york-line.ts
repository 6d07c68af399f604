import { AnalysisError } from '../analysis-error'
import { fitWeightedLine } from '../statistics/weighted-line'

/** One point with errors in both directions. */
export interface YorkPoint {
  readonly x: number
  readonly y: number
  readonly standardUncertaintyX: number
  readonly standardUncertaintyY: number
  /** correlation of the two errors; 0 without it */
  readonly correlation?: number
}

/** Line with errors in both variables. */
export interface YorkLine {
  readonly intercept: number
  readonly slope: number
  /** from the stated uncertainties alone */
  readonly internal: { readonly intercept: number; readonly slope: number }
  /** internal ones times √(χ²/ν); null without degrees of freedom */
  readonly external: { readonly intercept: number; readonly slope: number } | null
  /** internal covariance of intercept and slope */
  readonly covariance: number
  readonly chiSquared: number
  readonly degreesOfFreedom: number
  /** χ²/ν: near 1 when the stated uncertainties are right; null without degrees of freedom */
  readonly reducedChiSquared: number | null
  readonly iterations: number
}

const MAXIMUM_ITERATIONS = 500

/**
 * Straight line when both variables have errors.
 *
 * W_i = w_x w_y/(w_x + b² w_y − 2 b r √(w_x w_y)); b = Σ W β V / Σ W β U, iterated; errors from the adjusted points
 *
 * Errors of different points independent. Internal errors are those of the stated uncertainties, external ones scaled by the scatter: say which.
 * Source: York, Evensen, Martínez and De Basabe Delgado, Am. J. Phys. 72 (2004) 367.
 *
 * @param points - at least 2 points at distinct x: values [any], standard uncertainties [same units] > 0, correlation [-] within −1 to 1
 * @returns intercept and slope with internal and external errors [units of y and x]; n − 2 degrees of freedom
 * @throws {AnalysisError} too-few-points | not-positive for an uncertainty not above zero | no-convergence | as the line fit
 */
export function fitYorkLine(points: readonly YorkPoint[]): YorkLine {
  if (points.length < 2) throw new AnalysisError('too-few-points', 'A line needs at least two points.')
  for (const point of points)
    if (!(point.standardUncertaintyX > 0) || !(point.standardUncertaintyY > 0))
      throw new AnalysisError('not-positive', 'Each point needs uncertainties above zero in both directions.')
  let slope = fitWeightedLine(
    points.map((point) => point.x),
    points.map((point) => point.y),
    points.map((point) => 1 / (point.standardUncertaintyY * point.standardUncertaintyY)),
  ).slope
  for (let iterations = 1; iterations <= MAXIMUM_ITERATIONS; iterations += 1) {
    const state = yorkStep(points, slope)
    const change = Math.abs(state.slope - slope)
    slope = state.slope
    if (!Number.isFinite(slope)) break
    if (change <= 1e-15 * Math.abs(slope)) return yorkResult(points, slope, iterations)
  }
  // the last digits can flicker: a further pass that moves nothing that matters is an end too
  if (Number.isFinite(slope) && Math.abs(yorkStep(points, slope).slope - slope) <= 1e-12 * Math.abs(slope))
    return yorkResult(points, slope, MAXIMUM_ITERATIONS)
  throw new AnalysisError('no-convergence', 'The line with errors in both variables does not settle.')
}

function yorkStep(points: readonly YorkPoint[], slope: number) {
  const terms = points.map((point) => {
    const wx = 1 / (point.standardUncertaintyX * point.standardUncertaintyX)
    const wy = 1 / (point.standardUncertaintyY * point.standardUncertaintyY)
    const alpha = Math.sqrt(wx * wy)
    const r = point.correlation ?? 0
    return { point, wx, wy, alpha, r, weight: (wx * wy) / (wx + slope * slope * wy - 2 * slope * r * alpha) }
  })
  const total = terms.reduce((sum, { weight }) => sum + weight, 0)
  const meanX = terms.reduce((sum, { weight, point }) => sum + weight * point.x, 0) / total
  const meanY = terms.reduce((sum, { weight, point }) => sum + weight * point.y, 0) / total
  let numerator = 0
  let denominator = 0
  const adjusted: { weight: number; x: number }[] = []
  for (const { point, wx, wy, alpha, r, weight } of terms) {
    const u = point.x - meanX
    const v = point.y - meanY
    const beta = weight * (u / wy + (slope * v) / wx - (slope * u + v) * (r / alpha))
    numerator += weight * beta * v
    denominator += weight * beta * u
    adjusted.push({ weight, x: meanX + beta })
  }
  return { slope: numerator / denominator, meanX, meanY, total, adjusted, terms }
}

function yorkResult(points: readonly YorkPoint[], slope: number, iterations: number): YorkLine {
  const { meanX, meanY, total, adjusted, terms } = yorkStep(points, slope)
  const intercept = meanY - slope * meanX
  const adjustedMean = adjusted.reduce((sum, { weight, x }) => sum + weight * x, 0) / total
  const spread = adjusted.reduce((sum, { weight, x }) => sum + weight * (x - adjustedMean) * (x - adjustedMean), 0)
  const slopeVariance = 1 / spread
  const internal = {
    slope: Math.sqrt(slopeVariance),
    intercept: Math.sqrt(1 / total + adjustedMean * adjustedMean * slopeVariance),
  }
  let chiSquared = 0
  for (const { point, weight } of terms) {
    const residual = point.y - intercept - slope * point.x
    chiSquared += weight * residual * residual
  }
  const degreesOfFreedom = points.length - 2
  const reduced = degreesOfFreedom > 0 ? chiSquared / degreesOfFreedom : null
  const factor = reduced === null ? null : Math.sqrt(reduced)
  return {
    intercept,
    slope,
    internal,
    external: factor === null ? null : { slope: internal.slope * factor, intercept: internal.intercept * factor },
    covariance: -adjustedMean * slopeVariance,
    chiSquared,
    degreesOfFreedom,
    reducedChiSquared: reduced,
    iterations,
  }
}
