import regression from 'regression'
import { AnalysisError } from '../analysis-error'

/** Two standard errors of one fitted number, and which is which stays said. */
export interface LineUncertainty {
  /** standard errors of slope, value at the centre and intercept */
  readonly slope: number
  readonly centreValue: number
  readonly intercept: number
  /** covariance of intercept and slope */
  readonly interceptSlopeCovariance: number
}

/** A straight line y = intercept + slope x, held as its value at the weighted mean of x, where level and slope are uncorrelated. */
export interface WeightedLine {
  readonly count: number
  readonly x: readonly number[]
  readonly y: readonly number[]
  readonly weights: readonly number[]
  readonly isWeighted: boolean
  readonly slope: number
  readonly intercept: number
  readonly centreX: number
  readonly centreValue: number
  readonly sumOfWeights: number
  /** sum of w (x - centreX)^2 */
  readonly sumOfSquaresX: number
  readonly fitted: readonly number[]
  readonly residuals: readonly number[]
  readonly leverage: readonly number[]
  /** sum of w e^2; with weights 1/sigma^2 this is chi-squared */
  readonly residualSumOfSquares: number
  readonly degreesOfFreedom: number
  /** sqrt(residual sum of squares / degrees of freedom); null without degrees of freedom */
  readonly residualStandardDeviation: number | null
  readonly rSquared: number | null
  /** scaled by the residual scatter, as R's `lm` reports them; null without degrees of freedom */
  readonly scaled: LineUncertainty | null
  /** with the weights taken as 1/sigma^2 of known errors */
  readonly unscaled: LineUncertainty
}

function sum(values: readonly number[]): number {
  // Neumaier's compensated sum: the order is fixed and terms of very different size keep their digits
  let total = 0
  let lost = 0
  for (const value of values) {
    const next = total + value
    lost += Math.abs(total) >= Math.abs(value) ? total - next + value : value - next + total
    total = next
  }
  return total + lost
}

function checkInput(x: readonly number[], y: readonly number[], weights: readonly number[] | null): void {
  if (x.length !== y.length || (weights !== null && weights.length !== x.length)) {
    throw new AnalysisError(
      'lengths-differ',
      `A line needs as many y as x values: ${x.length} and ${y.length} were given.`,
      {
        x: x.length,
        y: y.length,
        weights: weights?.length ?? null,
      },
    )
  }
  if (x.length < 2) {
    throw new AnalysisError('too-few-points', `A line needs at least 2 points; ${x.length} were given.`, {
      count: x.length,
    })
  }
  for (let i = 0; i < x.length; i++) {
    const w = weights === null ? 1 : (weights[i] ?? Number.NaN)
    if (!Number.isFinite(x[i]) || !Number.isFinite(y[i]) || !Number.isFinite(w)) {
      throw new AnalysisError('not-finite', `Point ${i + 1} is not a finite number.`, { index: i })
    }
    if (!(w > 0)) {
      throw new AnalysisError('not-positive', `Point ${i + 1} has the weight ${w}; weights are positive.`, {
        index: i,
        weight: w,
      })
    }
  }
}

// Slope of centred data by the unweighted least squares of `regression`, at full precision (its default rounds to two decimals).
function unweightedSlope(dx: readonly number[], dy: readonly number[]): number {
  const scaleX = Math.max(...dx.map(Math.abs))
  const scaleY = Math.max(...dy.map(Math.abs))
  if (scaleY === 0) return 0
  const data = dx.map((value, i): [number, number] => [value / scaleX, (dy[i] ?? 0) / scaleY])
  const slope = regression.linear(data, { precision: 22 }).equation[0] ?? Number.NaN
  return (slope * scaleY) / scaleX
}

function uncertainty(variance: number, sumOfWeights: number, sumOfSquaresX: number, centreX: number): LineUncertainty {
  const slopeVariance = variance / sumOfSquaresX
  const centreVariance = variance / sumOfWeights
  return {
    slope: Math.sqrt(slopeVariance),
    centreValue: Math.sqrt(centreVariance),
    intercept: Math.sqrt(centreVariance + centreX * centreX * slopeVariance),
    interceptSlopeCovariance: -centreX * slopeVariance,
  }
}

/**
 * Weighted least-squares straight line, with standard errors in R's conventions.
 *
 * b = sum w (x - xm)(y - ym) / Sxx, a = ym - b xm, Var(b) = s^2 / Sxx, Var(ym) = s^2 / sum w, s^2 = sum w e^2 / (n - 2).
 * The columns 1 and x - xm are orthogonal under the weights, so this is the QR solution of the line; x is centred twice and the slope is
 * refined once against its own residuals, so that large offsets cost no digits. Without weights the slope is that of `regression`.
 * Errors in x are neglected.
 * Source: N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, sections 1.2 to 1.4 and 9.2; doi:10.1002/9781118625590.
 *
 * @param x - at least 2 values at 2 or more distinct places [unit of x]
 * @param y - as many values [unit of y]
 * @param weights - positive, 1/sigma^2 or relative; null for equal weights [1 / unit of y squared, or -]
 * @returns the line with residuals, leverage and both sets of standard errors, n - 2 degrees of freedom [units of x and y]
 * @throws {AnalysisError} lengths-differ | too-few-points | not-finite | not-positive | collinear-design
 */
export function fitWeightedLine(
  x: readonly number[],
  y: readonly number[],
  weights: readonly number[] | null,
): WeightedLine {
  checkInput(x, y, weights)
  const count = x.length
  const w = weights === null ? x.map(() => 1) : [...weights]
  const at = (values: readonly number[], i: number): number => values[i] ?? Number.NaN
  const sumOfWeights = sum(w)
  const firstX = at(x, 0)
  const firstY = at(y, 0)
  // distances from the first point first: exact for close values, so that an offset of 1e8 does no harm
  const offsetX = sum(x.map((value, i) => at(w, i) * (value - firstX))) / sumOfWeights
  const offsetY = sum(y.map((value, i) => at(w, i) * (value - firstY))) / sumOfWeights
  const rawX = x.map((value) => value - firstX - offsetX)
  const rawY = y.map((value) => value - firstY - offsetY)
  const shiftX = sum(rawX.map((value, i) => at(w, i) * value)) / sumOfWeights
  const shiftY = sum(rawY.map((value, i) => at(w, i) * value)) / sumOfWeights
  const dx = rawX.map((value) => value - shiftX)
  const dy = rawY.map((value) => value - shiftY)
  const centreX = firstX + (offsetX + shiftX)
  const centreValue = firstY + (offsetY + shiftY)
  const sumOfSquaresX = sum(dx.map((value, i) => at(w, i) * value * value))
  const spread = Math.max(...dx.map(Math.abs))
  if (!(spread > 1e-14 * Math.max(...x.map(Math.abs))) || !(sumOfSquaresX > 0)) {
    throw new AnalysisError('collinear-design', `All ${count} points lie at the same x; a line needs two places.`, {
      count,
    })
  }
  let slope =
    weights === null ? unweightedSlope(dx, dy) : sum(dx.map((value, i) => at(w, i) * value * at(dy, i))) / sumOfSquaresX
  slope += sum(dx.map((value, i) => at(w, i) * value * (at(dy, i) - slope * value))) / sumOfSquaresX
  const residuals = dx.map((value, i) => at(dy, i) - slope * value)
  const fitted = y.map((value, i) => value - at(residuals, i))
  const residualSumOfSquares = sum(residuals.map((value, i) => at(w, i) * value * value))
  const totalSumOfSquares = sum(dy.map((value, i) => at(w, i) * value * value))
  const degreesOfFreedom = count - 2
  const variance = degreesOfFreedom > 0 ? residualSumOfSquares / degreesOfFreedom : null
  return {
    count,
    x: [...x],
    y: [...y],
    weights: w,
    isWeighted: weights !== null,
    slope,
    intercept: centreValue - slope * centreX,
    centreX,
    centreValue,
    sumOfWeights,
    sumOfSquaresX,
    fitted,
    residuals,
    leverage: dx.map((value, i) => Math.min(1, at(w, i) * (1 / sumOfWeights + (value * value) / sumOfSquaresX))),
    residualSumOfSquares,
    degreesOfFreedom,
    residualStandardDeviation: variance === null ? null : Math.sqrt(variance),
    rSquared: totalSumOfSquares > 0 ? 1 - residualSumOfSquares / totalSumOfSquares : null,
    scaled: variance === null ? null : uncertainty(variance, sumOfWeights, sumOfSquaresX, centreX),
    unscaled: uncertainty(1, sumOfWeights, sumOfSquaresX, centreX),
  }
}
