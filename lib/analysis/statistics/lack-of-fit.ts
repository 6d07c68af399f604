import { AnalysisError } from '../analysis-error'
import { upperFProbability } from './f-distribution'

export interface LackOfFit {
  readonly f: number
  readonly pValue: number
  readonly lackOfFitSumOfSquares: number
  readonly lackOfFitDegreesOfFreedom: number
  readonly pureErrorSumOfSquares: number
  readonly pureErrorDegreesOfFreedom: number
}

/**
 * Test of a fitted model against the scatter of true repeats at the same x.
 *
 * F = [SSLF / (c - p)] / [SSPE / (n - c)], c distinct x. Repeats must be independent re-runs, not repeat injections at one steady state.
 * Source: N. R. Draper, H. Smith, Applied Regression Analysis, 3rd edition, 1998, section 2.1.
 *
 * @param x - places; repeats have exactly the same value [unit of x]
 * @param y - observations [unit of y]
 * @param fitted - the model's values at the same places [unit of y]
 * @param parameterCount - parameters of the model, at least 1 [-]
 * @returns the test; null where there are no repeats, no spare places or no scatter among the repeats [-]
 * @throws {AnalysisError} lengths-differ
 */
export function testLackOfFit(
  x: readonly number[],
  y: readonly number[],
  fitted: readonly number[],
  parameterCount: number,
): LackOfFit | null {
  if (x.length !== y.length || x.length !== fitted.length) {
    throw new AnalysisError('lengths-differ', 'x, y and fitted values must be as many.', { x: x.length, y: y.length })
  }
  const groups = new Map<number, number[]>()
  x.forEach((value, i) => groups.set(value, [...(groups.get(value) ?? []), i]))
  let pureError = 0
  for (const members of groups.values()) {
    let mean = 0
    for (const i of members) mean += y[i] ?? 0
    mean /= members.length
    for (const i of members) pureError += ((y[i] ?? 0) - mean) * ((y[i] ?? 0) - mean)
  }
  let residual = 0
  y.forEach((value, i) => {
    const difference = value - (fitted[i] ?? Number.NaN)
    residual += difference * difference
  })
  const lackOfFitDegreesOfFreedom = groups.size - parameterCount
  const pureErrorDegreesOfFreedom = x.length - groups.size
  if (lackOfFitDegreesOfFreedom < 1 || pureErrorDegreesOfFreedom < 1 || !(pureError > 0)) return null
  const lackOfFit = Math.max(0, residual - pureError)
  const f = lackOfFit / lackOfFitDegreesOfFreedom / (pureError / pureErrorDegreesOfFreedom)
  return {
    f,
    pValue: upperFProbability(f, lackOfFitDegreesOfFreedom, pureErrorDegreesOfFreedom),
    lackOfFitSumOfSquares: lackOfFit,
    lackOfFitDegreesOfFreedom,
    pureErrorSumOfSquares: pureError,
    pureErrorDegreesOfFreedom,
  }
}
