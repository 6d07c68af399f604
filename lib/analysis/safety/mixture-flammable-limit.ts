import { AnalysisError } from '../analysis-error'

/**
 * Flammable limit of a mixture of combustible gases, by Le Chatelier's rule.
 *
 * L_mix = 1 / Σ (z_i / L_i), z_i normalised over the combustibles
 *
 * Good for lower limits; for upper limits only a first idea. Holds at the temperature and pressure of the limits put in.
 * Source: H. Le Chatelier, Annales des Mines 19 (1891) 388; worked example in Crowl and Louvar, Chemical Process Safety, 3rd edition, chapter 6.
 *
 * @param parts - at least 1 combustible: amount in any common unit [-] >= 0 with a sum above 0, its limit in air as a mole fraction [-] > 0
 * @returns limit for all the combustibles together, as a mole fraction in air [-]
 * @throws {AnalysisError} too-few-points when there is no combustible | not-positive when an amount is negative, all are zero or a limit is not above zero
 * @example 0.24, 0.61, 0.15 of limits 0.012, 0.053, 0.031 give 0.02751172137
 */
export function mixtureFlammableLimit(parts: readonly { readonly amount: number; readonly limit: number }[]): number {
  if (parts.length === 0)
    throw new AnalysisError('too-few-points', 'A mixture limit needs at least one combustible gas.')
  let total = 0
  let sum = 0
  for (const { amount, limit } of parts) {
    if (!(amount >= 0) || !(limit > 0))
      throw new AnalysisError('not-positive', 'Amounts must be zero or more and limits above zero.', { amount, limit })
    total += amount
    sum += amount / limit
  }
  if (!(total > 0)) throw new AnalysisError('not-positive', 'The amounts of the combustible gases add up to nothing.')
  return total / sum
}
