import pow from '@stdlib/math-base-special-pow'
import { AnalysisError } from '../analysis-error'
import { type Species, type Stoichiometry } from '../reduction/run-input'

/** A feed and the reaction that changes it. */
export interface FeedComposition {
  readonly pressurePa: number
  readonly moleFraction: Readonly<Record<Species, number>>
  readonly keyReactant: Species
  /** key reactant negative */
  readonly stoichiometry: Stoichiometry
}

/**
 * Partial pressures after a given conversion of the key reactant by one reaction.
 *
 * p_i = p (y_i0 + ν_i y_A0 X/|ν_A|) / (1 + ε X), ε = y_A0 Σν/|ν_A|
 *
 * Isobaric, ideal gas, one reaction.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 5 (varying density).
 *
 * @param feed - pressure [Pa], mole fractions [-] and reaction [-]
 * @param conversion - X [-]; may be negative or beyond what the feed allows, then a pressure is negative
 * @returns partial pressures by species [Pa]
 * @throws {AnalysisError} out-of-range when the key reactant has no negative stoichiometric number
 */
export function partialPressures(feed: FeedComposition, conversion: number): Readonly<Record<Species, number>> {
  const key = feed.stoichiometry[feed.keyReactant] ?? 0
  if (!(key < 0))
    throw new AnalysisError('out-of-range', 'The key reactant needs a negative stoichiometric number.', { key })
  const converted = ((feed.moleFraction[feed.keyReactant] ?? 0) * conversion) / -key
  let total = 1
  for (const number of Object.values(feed.stoichiometry)) total += number * converted
  const pressures: Record<Species, number> = {}
  for (const species of new Set([...Object.keys(feed.moleFraction), ...Object.keys(feed.stoichiometry)])) {
    const amount = (feed.moleFraction[species] ?? 0) + (feed.stoichiometry[species] ?? 0) * converted
    pressures[species] = (feed.pressurePa * amount) / total
  }
  return pressures
}

/**
 * Composition term of a power law relative to a reference composition.
 *
 * Π (p_i / p_i,ref)^(a_i)
 *
 * A species with order 0 may be absent.
 * Source: common practice.
 *
 * @param pressuresPa - partial pressures [Pa], above 0 for each species with an order
 * @param orders - a_i by species [-]
 * @param referencePa - reference pressures [Pa] by species, above 0; 1 Pa each where not given
 * @returns the product [-]
 * @throws {AnalysisError} not-positive when a species with an order is absent
 */
export function powerLawTerm(
  pressuresPa: Readonly<Record<Species, number>>,
  orders: Readonly<Record<Species, number>>,
  referencePa: Readonly<Record<Species, number>> = {},
): number {
  let product = 1
  for (const species of Object.keys(orders).sort()) {
    const order = orders[species] ?? 0
    if (order === 0) continue
    const ratio = (pressuresPa[species] ?? 0) / (referencePa[species] ?? 1)
    if (!(ratio > 0))
      throw new AnalysisError('not-positive', `The power law needs ${species}, which is absent here.`, {
        species,
        order,
      })
    product *= pow(ratio, order)
  }
  return product
}
