import { AnalysisError } from '../analysis-error'
import { fDistributionQuantile } from './f-distribution'
import { coverageFactor } from './student-t'
import { type WeightedLine } from './weighted-line'

export interface BandValue {
  readonly value: number
  /** of the mean, or of a new observation for a prediction */
  readonly standardError: number
  readonly low: number
  readonly high: number
}

function meanAt(line: WeightedLine, x: number): { value: number; standardError: number; s: number } {
  const s = line.residualStandardDeviation
  if (s === null) {
    throw new AnalysisError('too-few-points', `A band needs at least 3 points; the line has ${line.count}.`, {
      count: line.count,
    })
  }
  const distance = x - line.centreX
  return {
    value: line.centreValue + line.slope * distance,
    standardError: s * Math.sqrt(1 / line.sumOfWeights + (distance * distance) / line.sumOfSquaresX),
    s,
  }
}

/**
 * Mean of a line at one place with its interval for that place alone.
 *
 * y(x) +- t((1 + level) / 2; n - 2) s sqrt(1 / sum w + (x - xm)^2 / Sxx)
 * Source: N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, section 3.1.
 *
 * @param line - at least 3 points [-]
 * @param x - place [unit of x]
 * @param confidenceLevel - between 0 and 1 [-]
 * @returns value, standard error and interval, n - 2 degrees of freedom [unit of y]
 * @throws {AnalysisError} too-few-points
 */
export function pointwiseBand(line: WeightedLine, x: number, confidenceLevel: number): BandValue {
  const { value, standardError } = meanAt(line, x)
  const reach = coverageFactor(confidenceLevel, line.degreesOfFreedom) * standardError
  return { value, standardError, low: value - reach, high: value + reach }
}

/**
 * Mean of a line at one place with an interval that holds for all places together.
 *
 * W = sqrt(2 F(level; 2, n - 2))
 * Source: H. Working, H. Hotelling, J. Am. Stat. Assoc. 24 (1929) 73; doi:10.1080/01621459.1929.10506274.
 *
 * @param line - at least 3 points [-]
 * @param x - place [unit of x]
 * @param confidenceLevel - between 0 and 1 [-]
 * @returns value, standard error and interval, n - 2 degrees of freedom [unit of y]
 * @throws {AnalysisError} too-few-points
 */
export function workingHotellingBand(line: WeightedLine, x: number, confidenceLevel: number): BandValue {
  const { value, standardError } = meanAt(line, x)
  const reach = Math.sqrt(2 * fDistributionQuantile(confidenceLevel, 2, line.degreesOfFreedom)) * standardError
  return { value, standardError, low: value - reach, high: value + reach }
}

/**
 * Interval for one new observation at one place.
 *
 * y(x) +- t((1 + level) / 2; n - 2) s sqrt(1 / w + 1 / sum w + (x - xm)^2 / Sxx)
 * Source: N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, section 3.1.
 *
 * @param line - at least 3 points [-]
 * @param x - place [unit of x]
 * @param confidenceLevel - between 0 and 1 [-]
 * @param weight - weight of the new observation, 1 without weights [1 / unit of y squared, or -]
 * @returns value, standard error and interval, n - 2 degrees of freedom [unit of y]
 * @throws {AnalysisError} too-few-points
 */
export function predictionBand(line: WeightedLine, x: number, confidenceLevel: number, weight = 1): BandValue {
  const mean = meanAt(line, x)
  const standardError = Math.sqrt(mean.standardError * mean.standardError + (mean.s * mean.s) / weight)
  const reach = coverageFactor(confidenceLevel, line.degreesOfFreedom) * standardError
  return { value: mean.value, standardError, low: mean.value - reach, high: mean.value + reach }
}
