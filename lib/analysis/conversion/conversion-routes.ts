import { AnalysisError } from '../analysis-error'

/** A conversion with its standard uncertainty. */
export interface RouteConversion {
  /** may be negative or above one: nothing is clipped */
  readonly value: number
  readonly standardUncertainty: number
}

/** A measured number above zero with its relative standard uncertainty. */
export interface Measured {
  readonly value: number
  readonly relativeStandardUncertainty: number
}

/**
 * Conversion from the key reactant's flows, total outlet flow measured (route X1).
 *
 * X = (F_A0 − F_A)/F_A0; u(X) = (1 − X) √(u_r²(F_A) + u_r²(F_A0))
 *
 * The outlet flow must be measured: taken as the inlet flow it is wrong whenever the number of moles changes.
 * Source: definition; JCGM 100:2008, equation 10.
 *
 * @param inlet - flow of the key reactant in the feed [mol s-1] > 0
 * @param outlet - flow of the key reactant at the outlet [mol s-1]
 * @returns conversion with standard uncertainty [-]
 * @throws {AnalysisError} not-finite | not-positive for an inlet flow not above zero
 */
export function conversionByFlow(inlet: Measured, outlet: Measured): RouteConversion {
  requirePositive(inlet.value, 'flow of the key reactant in the feed')
  requireFinite(outlet.value)
  const left = outlet.value / inlet.value
  return { value: 1 - left, standardUncertainty: Math.abs(left) * root(inlet, outlet) }
}

/**
 * Conversion by an internal standard (route X2).
 *
 * X = 1 − (y_A/y_A0)(y_S0/y_S); u(X) = (1 − X) √(Σ u_r²) over the four
 *
 * Any number of reactions, wet or dry, as long as reactant and standard are on one basis. Explodes at low conversion.
 * Source: definition; JCGM 100:2008, equation 10.
 *
 * @param key - mole fraction of the key reactant at the outlet [-]
 * @param keyInFeed - and in the feed [-] > 0
 * @param standard - mole fraction of the standard at the outlet [-] > 0
 * @param standardInFeed - and in the feed [-] > 0
 * @returns conversion with standard uncertainty [-]
 * @throws {AnalysisError} not-finite | not-positive
 */
export function conversionByInternalStandard(
  key: Measured,
  keyInFeed: Measured,
  standard: Measured,
  standardInFeed: Measured,
): RouteConversion {
  requirePositive(keyInFeed.value, 'key reactant in the feed')
  requirePositive(standard.value, 'internal standard at the outlet')
  requirePositive(standardInFeed.value, 'internal standard in the feed')
  requireFinite(key.value)
  const left = (key.value / keyInFeed.value) * (standardInFeed.value / standard.value)
  return { value: 1 - left, standardUncertainty: Math.abs(left) * root(key, keyInFeed, standard, standardInFeed) }
}

/**
 * Conversion by one known reaction, without a standard (routes X3 and, with dry fractions and dry expansion, X3d).
 *
 * ε = y_A0 Σν/|ν_A|; X = (y_A0 − y_A)/(y_A0 + ε y_A)
 *
 * One reaction only. For dry analysis pass fractions without water and the sum of the stoichiometric numbers without water.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 5.
 *
 * @param keyMoleFraction - at the outlet [-]
 * @param keyMoleFractionInFeed - in the feed [-] > 0
 * @param molesPerMoleOfKey - Σν/|ν_A| over the species on this basis [-]
 * @returns conversion [-]
 * @throws {AnalysisError} not-finite | not-positive | out-of-range where the fraction cannot come from this reaction
 * @example nitrogen 0.25 in N2 + 3 H2 and 0.23684210526 at the outlet: X = 0.1
 */
export function conversionBySingleReaction(
  keyMoleFraction: number,
  keyMoleFractionInFeed: number,
  molesPerMoleOfKey: number,
): number {
  requirePositive(keyMoleFractionInFeed, 'key reactant in the feed')
  requireFinite(keyMoleFraction, molesPerMoleOfKey)
  const expansion = keyMoleFractionInFeed * molesPerMoleOfKey
  const denominator = keyMoleFractionInFeed + expansion * keyMoleFraction
  if (!(denominator > 0))
    throw new AnalysisError('out-of-range', 'This composition cannot come from that reaction.', { keyMoleFraction })
  return (keyMoleFractionInFeed - keyMoleFraction) / denominator
}

/**
 * Mole fraction of a species after a given conversion by one reaction.
 *
 * y = (y_0 + ν y_A0 X/|ν_A|)/(1 + ε X)
 *
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 5.
 *
 * @param inFeed - mole fraction of the species in the feed [-]
 * @param molesPerMoleOfKey - ν/|ν_A| of the species [-]
 * @param keyInFeed - mole fraction of the key reactant in the feed [-]
 * @param totalPerMoleOfKey - Σν/|ν_A| [-]
 * @param conversion - X [-]
 * @returns mole fraction [-]
 */
export function moleFractionAt(
  inFeed: number,
  molesPerMoleOfKey: number,
  keyInFeed: number,
  totalPerMoleOfKey: number,
  conversion: number,
): number {
  return (inFeed + molesPerMoleOfKey * keyInFeed * conversion) / (1 + keyInFeed * totalPerMoleOfKey * conversion)
}

/** One product seen at the outlet. */
export interface SeenProduct extends Measured {
  /** mole fraction on the same basis in the feed; 0 when it is not fed */
  readonly inFeed: number
  /** key reactant used per mole made: |ν_A|/ν_j, or n_C,j/n_C,A for carbon from the key reactant alone */
  readonly keyPerMole: number
}

/**
 * Conversion by the products, amounts by flow or internal standard (route X4).
 *
 * X = Σ c_j (y_j q − y_j0)/y_A0, q = F_out/F_in; u from the products, the feed and q
 *
 * Best below a conversion of about 0.1. Products that are not seen (coke, heavies) make it too low.
 * Source: definition; JCGM 100:2008, equation 10.
 *
 * @param products - mole fractions at the outlet [-] with relative standard uncertainty, in the feed [-], and key reactant used per mole [-]
 * @param keyInFeed - mole fraction of the key reactant in the feed [-] > 0
 * @param outletPerInlet - F_out/F_in, for example y_S0/y_S of a standard [-] > 0
 * @returns conversion with standard uncertainty [-]
 * @throws {AnalysisError} not-finite | not-positive
 */
export function conversionByProducts(
  products: readonly SeenProduct[],
  keyInFeed: Measured,
  outletPerInlet: Measured,
): RouteConversion {
  requirePositive(keyInFeed.value, 'key reactant in the feed')
  requirePositive(outletPerInlet.value, 'ratio of outlet to inlet flow')
  for (const product of products) requireFinite(product.value, product.inFeed, product.keyPerMole)
  let made = 0
  let gross = 0
  let own = 0
  for (const product of products) {
    const part = (product.keyPerMole * product.value * outletPerInlet.value) / keyInFeed.value
    made += part - (product.keyPerMole * product.inFeed) / keyInFeed.value
    gross += part
    own += part * product.relativeStandardUncertainty * part * product.relativeStandardUncertainty
  }
  const ratio = gross * outletPerInlet.relativeStandardUncertainty
  const feed = made * keyInFeed.relativeStandardUncertainty
  return { value: made, standardUncertainty: Math.sqrt(own + ratio * ratio + feed * feed) }
}

/**
 * Conversion by normalising to the carbon seen (route X5).
 *
 * X = P/(P + n_C,A y_A), P = Σ n_C,j y_j; u(X) = X (1 − X) √(u_r²(P) + u_r²(A))
 *
 * Forces the carbon balance to one: it hides losses and is never evidence of a balance.
 * Source: definition; JCGM 100:2008, equation 10.
 *
 * @param productCarbon - carbon in the products [any]
 * @param keyCarbon - carbon in the key reactant left, same unit [any]
 * @returns conversion with standard uncertainty [-]
 * @throws {AnalysisError} not-finite | not-positive when no carbon is seen
 */
export function conversionByNormalising(productCarbon: Measured, keyCarbon: Measured): RouteConversion {
  const total = productCarbon.value + keyCarbon.value
  requirePositive(total, 'carbon seen')
  const value = productCarbon.value / total
  return { value, standardUncertainty: Math.abs(value * (1 - value)) * root(productCarbon, keyCarbon) }
}

/**
 * Whether two routes agree within their uncertainties.
 *
 * z = (X_a − X_b)/√(u_a² + u_b² − 2 cov); beyond 2 they disagree
 *
 * Source: JCGM 100:2008; limit common practice.
 *
 * @param first - one route [-]
 * @param second - the other [-]
 * @param covariance - of the two, where they share inputs [-]
 * @returns z [-]; null without uncertainty
 */
export function routeConsistency(first: RouteConversion, second: RouteConversion, covariance = 0): number | null {
  const variance =
    first.standardUncertainty * first.standardUncertainty +
    second.standardUncertainty * second.standardUncertainty -
    2 * covariance
  return variance > 0 ? (first.value - second.value) / Math.sqrt(variance) : null
}

/**
 * Closure of the converted carbon: carbon found in products over carbon lost from the reactant.
 *
 * CC = X_products/X_reactant; u(CC) ≈ √[(u_p/X_r)² + (CC u_r/X_r)²]
 *
 * Says something at low conversion, where a total balance near one says nothing.
 * Source: definition; JCGM 100:2008, equation 10.
 *
 * @param byProducts - conversion by the products [-]
 * @param byReactant - conversion by the reactant [-]
 * @returns closure with standard uncertainty [-]; null when the reactant shows no loss
 */
export function convertedCarbonClosure(
  byProducts: RouteConversion,
  byReactant: RouteConversion,
): RouteConversion | null {
  if (!(byReactant.value > 0)) return null
  const value = byProducts.value / byReactant.value
  const first = byProducts.standardUncertainty / byReactant.value
  const second = (value * byReactant.standardUncertainty) / byReactant.value
  return { value, standardUncertainty: Math.sqrt(first * first + second * second) }
}

function root(...parts: readonly Measured[]): number {
  return Math.sqrt(parts.reduce((sum, { relativeStandardUncertainty: u }) => sum + u * u, 0))
}

function requireFinite(...values: readonly number[]): void {
  if (values.some((value) => !Number.isFinite(value)))
    throw new AnalysisError('not-finite', 'A measured composition or flow is not a finite number.', { values })
}

function requirePositive(value: number, name: string): void {
  requireFinite(value)
  if (!(value > 0)) throw new AnalysisError('not-positive', `The ${name} must be above zero.`, { value })
}
