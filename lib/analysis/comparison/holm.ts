import { AnalysisError } from '../analysis-error'

/**
 * Probabilities adjusted for having been looked at together, by Holm's step-down.
 *
 * p_(i) adjusted = max over j ≤ i of min(1, (m − j + 1) p_(j))
 *
 * Needs no independence of the tests.
 * Source: Holm, Scand. J. Stat. 6 (1979) 65.
 *
 * @param pValues - probabilities [-], 0 to 1
 * @returns adjusted probabilities in the order given [-]
 * @throws {AnalysisError} out-of-range when a probability is not within 0 to 1
 * @example 0.01, 0.04, 0.03, 0.005 become 0.03, 0.06, 0.06, 0.02
 */
export function adjustByHolm(pValues: readonly number[]): number[] {
  if (pValues.some((p) => !(p >= 0 && p <= 1)))
    throw new AnalysisError('out-of-range', 'A probability lies between 0 and 1.')
  const order = pValues.map((_unused, i) => i).sort((a, b) => (pValues[a] ?? 0) - (pValues[b] ?? 0) || a - b)
  const adjusted = new Array<number>(pValues.length).fill(0)
  let largest = 0
  for (const [rank, index] of order.entries()) {
    largest = Math.max(largest, Math.min(1, (pValues.length - rank) * (pValues[index] ?? 1)))
    adjusted[index] = largest
  }
  return adjusted
}
