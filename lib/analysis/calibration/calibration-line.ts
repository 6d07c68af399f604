import { AnalysisError } from '../analysis-error'
import { type FTest, fTest } from '../comparison/compare-lines'
import { fitLinearModel, type LinearModelFit, quadraticForm } from '../kinetics/linear-model'
import { twoSidedTProbability } from '../statistics/student-t'

/** One injection of a standard. */
export interface CalibrationPoint {
  readonly amount: number
  readonly response: number
}

export type CalibrationWeighting = 'equal' | 'one-over-amount' | 'one-over-amount-squared'

/** A calibration line or parabola, response against amount. */
export interface CalibrationLine {
  readonly kind: 'linear' | 'quadratic'
  readonly weighting: CalibrationWeighting
  /** intercept, slope and, for a parabola, the square term */
  readonly coefficients: readonly number[]
  readonly standardErrors: readonly (number | null)[]
  /** two-sided probability of an intercept at least this far from zero; null without degrees of freedom */
  readonly interceptPValue: number | null
  /** linear against quadratic; null with too few standards or a perfect fit */
  readonly mandel: FTest | null
  readonly lowestAmount: number
  readonly highestAmount: number
  /** 3.3 s/b and 10 s/b, in amount; null without scatter to judge by */
  readonly detectionLimit: number | null
  readonly quantificationLimit: number | null
  readonly fit: LinearModelFit
}

/** An amount read back from a response. */
export type InverseReading =
  | {
      readonly ok: true
      readonly amount: number
      /** null without degrees of freedom */
      readonly standardUncertainty: number | null
      readonly degreesOfFreedom: number
    }
  | { readonly ok: false; readonly sentence: string }

/**
 * Calibration of an analyser: response against amount, straight or curved, weighted or not.
 *
 * y = a + b x (+ c x²) by weighted least squares, weights 1, 1/x or 1/x²
 *
 * Over more than two decades of amount an unweighted line wrecks its low end. The intercept is kept unless a person forces the origin.
 * Source: ISO 8466-1:2021 (linear), ISO 8466-2:2001 (second order).
 *
 * @param points - at least 3 standards (4 for a parabola) at enough distinct amounts: amount [any] >= 0, response [any]
 * @param kind - straight or curved [-]
 * @param weighting - how much a standard counts by its amount [-]
 * @returns coefficients [response over powers of amount] with standard errors, tests and limits; n − 2 or n − 3 degrees of freedom
 * @throws {AnalysisError} too-few-points | not-positive for a weighted fit with an amount of zero | collinear-design with too few distinct amounts
 */
export function fitCalibrationLine(
  points: readonly CalibrationPoint[],
  kind: 'linear' | 'quadratic' = 'linear',
  weighting: CalibrationWeighting = 'equal',
): CalibrationLine {
  const columns = kind === 'linear' ? 2 : 3
  if (points.length <= columns)
    throw new AnalysisError('too-few-points', `A ${kind} calibration needs ${String(columns + 1)} standards.`, {
      count: points.length,
    })
  const weights = points.map(({ amount }) => weightOf(amount, weighting))
  const fit = fitOf(points, weights, columns)
  const [slope = NaN, intercept = NaN] = [fit.coefficients[1], fit.coefficients[0]]
  const interceptError = fit.standardErrors[0] ?? null
  const s = fit.residualStandardDeviation
  const amounts = points.map(({ amount }) => amount)
  // of the lowest standard: with weights the scatter differs along the line and the low end is where limits matter
  const scatter = s === null ? null : s / Math.sqrt(Math.max(...weights))
  return {
    kind,
    weighting,
    coefficients: fit.coefficients,
    standardErrors: fit.standardErrors,
    interceptPValue:
      interceptError !== null && interceptError > 0
        ? twoSidedTProbability(intercept / interceptError, fit.degreesOfFreedom)
        : null,
    mandel: mandelTest(points, weights),
    lowestAmount: Math.min(...amounts),
    highestAmount: Math.max(...amounts),
    detectionLimit: scatter === null || !(slope > 0) ? null : (3.3 * scatter) / slope,
    quantificationLimit: scatter === null || !(slope > 0) ? null : (10 * scatter) / slope,
    fit,
  }
}

/**
 * Amount behind the mean response of a sample, with its uncertainty.
 *
 * x = (y − a)/b, or [−b + √(b² − 4c(a − y))]/(2c); u² = [s²/(m w(x)) + gᵀ cov g]/(dy/dx)², g = (1, x, x²)
 *
 * For a straight unweighted line it is s_x = (s/b) √[1/m + 1/n + (y − ȳ)²/(b² S_xx)]. Amounts outside the standards and responses past the
 * vertex of a parabola are refused: a calibration is not extrapolated.
 * Source: ISO 8466-1:2021; IUPAC, Pure Appl. Chem. 70 (1998) 993.
 *
 * @param line - calibration [any]
 * @param meanResponse - mean response of the sample [response]
 * @param replicates - injections in the mean, at least 1 [-]
 * @returns amount with standard uncertainty and n − 2 or n − 3 degrees of freedom [amount], or a sentence why there is none
 */
export function amountFromResponse(line: CalibrationLine, meanResponse: number, replicates = 1): InverseReading {
  if (!Number.isFinite(meanResponse) || !((line.coefficients[1] ?? 0) !== 0))
    return {
      ok: false,
      sentence: 'The response is no number, or the calibration is flat: no amount can be read from it.',
    }
  const amount = rootOf(line, meanResponse)
  if (amount === null)
    return {
      ok: false,
      sentence:
        'The response lies past the turning point of the calibration curve; dilute the sample or use a smaller loop.',
    }
  const tolerance = 1e-9 * line.highestAmount
  if (amount < line.lowestAmount - tolerance || amount > line.highestAmount + tolerance)
    return {
      ok: false,
      sentence: `The amount would be ${amount.toPrecision(4)}, outside the standards from ${String(line.lowestAmount)} to ${String(line.highestAmount)}; add a standard there.`,
    }
  const s = line.fit.residualStandardDeviation
  const [, b = NaN, c = 0] = line.coefficients
  const gradient = line.kind === 'linear' ? [1, amount] : [1, amount, amount * amount]
  const slope = b + 2 * c * amount
  const own = 1 / (replicates * weightOf(amount, line.weighting))
  const standardUncertainty =
    s === null ? null : (s * Math.sqrt(own + quadraticForm(gradient, line.fit.unscaledCovariance))) / Math.abs(slope)
  return { ok: true, amount, standardUncertainty, degreesOfFreedom: line.fit.degreesOfFreedom }
}

/**
 * Mandel's test: whether a parabola fits better than a line.
 *
 * F = (RSS_line − RSS_parabola)/(RSS_parabola/(n − 3)) against F(1, n − 3)
 *
 * Source: Mandel, The Statistical Analysis of Experimental Data, 1964; ISO 8466-1:2021.
 *
 * @param points - at least 4 standards at 3 or more distinct amounts [any]
 * @param weights - positive, one a standard [-]
 * @returns F with 1 and n − 3 degrees of freedom [-]; null with too few standards, amounts or no scatter
 */
export function mandelTest(points: readonly CalibrationPoint[], weights: readonly number[]): FTest | null {
  if (points.length < 4 || new Set(points.map(({ amount }) => amount)).size < 3) return null
  const parabola = fitOf(points, weights, 3)
  if (!(parabola.residualSumOfSquares > 0)) return null
  return fTest(fitOf(points, weights, 2), parabola)
}

function fitOf(points: readonly CalibrationPoint[], weights: readonly number[], columns: number): LinearModelFit {
  return fitLinearModel(
    points.map(({ amount }) => [1, amount, amount * amount].slice(0, columns)),
    points.map(({ response }) => response),
    weights,
  )
}

function weightOf(amount: number, weighting: CalibrationWeighting): number {
  if (weighting === 'equal') return 1
  if (!(amount > 0))
    throw new AnalysisError('not-positive', 'A weighted calibration needs amounts above zero.', { amount })
  return weighting === 'one-over-amount' ? 1 / amount : 1 / (amount * amount)
}

function rootOf(line: CalibrationLine, response: number): number | null {
  const [a = NaN, b = NaN, c = 0] = line.coefficients
  if (c === 0) return (response - a) / b
  const inside = b * b - 4 * c * (a - response)
  if (!(inside >= 0)) return null
  // the branch that turns into the straight line as c goes to zero, in the form that does not cancel
  return (2 * (response - a)) / (b + Math.sign(b) * Math.sqrt(inside))
}
