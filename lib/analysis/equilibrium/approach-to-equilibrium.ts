import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import pow from '@stdlib/math-base-special-pow'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { type EnteredThermochemistry, standardState } from './thermochemistry'

/** Standard pressure of the thermochemistry. */
const STANDARD_PRESSURE_PA = 100_000

/**
 * Natural logarithm of the equilibrium constant of one reaction.
 *
 * ln K = -sum nu_i G_i(T) / (R T), standard state ideal gas at 1 bar.
 * Source: B. J. McBride, S. Gordon, M. A. Reno, NASA Technical Memorandum 4513, 1993.
 *
 * @param stoichiometry - numbers positive for products [-]
 * @param temperatureK - within the range of every species [K]
 * @param entered - thermochemistry entered by a person [J mol-1; J mol-1 K-1]
 * @returns ln K for activities p_i / 1 bar [-]
 * @throws {AnalysisError} unknown-species | out-of-range
 */
export function lnEquilibriumConstant(
  stoichiometry: Readonly<Record<string, number>>,
  temperatureK: number,
  entered: Readonly<Record<string, EnteredThermochemistry>> = {},
): number {
  let gibbs = 0
  for (const species of Object.keys(stoichiometry).sort()) {
    gibbs += (stoichiometry[species] ?? 0) * standardState(species, temperatureK, entered).gibbsEnergyJPerMol
  }
  return -gibbs / (GAS_CONSTANT_J_PER_MOL_K * temperatureK)
}

/**
 * Standard reaction enthalpy.
 *
 * dH = sum nu_i H_i(T)
 * Source: B. J. McBride, S. Gordon, M. A. Reno, NASA Technical Memorandum 4513, 1993.
 *
 * @param stoichiometry - numbers positive for products [-]
 * @param temperatureK - within the range of every species [K]
 * @param entered - thermochemistry entered by a person [J mol-1; J mol-1 K-1]
 * @returns the enthalpy for the equation as written [J mol-1]
 * @throws {AnalysisError} unknown-species | out-of-range
 */
export function reactionEnthalpy(
  stoichiometry: Readonly<Record<string, number>>,
  temperatureK: number,
  entered: Readonly<Record<string, EnteredThermochemistry>> = {},
): number {
  let enthalpy = 0
  for (const species of Object.keys(stoichiometry).sort()) {
    enthalpy += (stoichiometry[species] ?? 0) * standardState(species, temperatureK, entered).enthalpyJPerMol
  }
  return enthalpy
}

/**
 * Approach to equilibrium of one reaction in a gas.
 *
 * eta = Q / K, Q = prod (p_i / 1 bar)^nu_i; the net rate is the forward rate times 1 - eta (stoichiometric number of the slow step: 1).
 * Ideal gas; zero where a product is absent, infinite where a reactant is.
 * Source: M. Boudart, G. Djega-Mariadassou, Kinetics of Heterogeneous Catalytic Reactions, 1984, section 3.3.
 *
 * @param stoichiometry - numbers positive for products [-]
 * @param partialPressurePa - of every species; absent ones are zero [Pa]
 * @param lnEquilibrium - ln K at the temperature [-]
 * @returns eta [-]
 */
export function approachToEquilibrium(
  stoichiometry: Readonly<Record<string, number>>,
  partialPressurePa: Readonly<Record<string, number>>,
  lnEquilibrium: number,
): number {
  let lnQuotient = 0
  for (const species of Object.keys(stoichiometry).sort()) {
    const nu = stoichiometry[species] ?? 0
    const pressure = partialPressurePa[species] ?? 0
    if (nu === 0) continue
    if (!(pressure > 0)) return nu > 0 ? 0 : Number.POSITIVE_INFINITY
    lnQuotient += nu * ln(pressure / STANDARD_PRESSURE_PA)
  }
  return exp(lnQuotient - lnEquilibrium)
}

/**
 * Approach to equilibrium by plain powers, for the inner loop of a bed's integration; the same number as approachToEquilibrium.
 *
 * eta = prod (p_i / 1 bar)^nu_i / K
 * Source: M. Boudart, G. Djega-Mariadassou, Kinetics of Heterogeneous Catalytic Reactions, 1984, section 3.3.
 *
 * @param numbers - stoichiometric numbers [-]
 * @param pressuresPa - partial pressures in the same order [Pa]
 * @param equilibriumConstant - K at the temperature [-]
 * @returns eta [-]
 */
export function equilibriumQuotient(
  numbers: readonly number[],
  pressuresPa: ArrayLike<number>,
  equilibriumConstant: number,
): number {
  let quotient = 1
  for (let i = 0; i < numbers.length; i++) {
    const nu = numbers[i] ?? 0
    if (nu === 0) continue
    const activity = Math.max(0, pressuresPa[i] ?? 0) / STANDARD_PRESSURE_PA
    if (activity === 0) return nu > 0 ? 0 : Number.POSITIVE_INFINITY
    quotient *= powerOf(activity, nu)
  }
  return quotient / equilibriumConstant
}

// Whole small exponents are products: faster than a general power, and exact to rounding
function powerOf(base: number, exponent: number): number {
  if (exponent === 1) return base
  if (exponent === -1) return 1 / base
  if (Number.isInteger(exponent) && Math.abs(exponent) <= 8) {
    let result = 1
    for (let i = 0; i < Math.abs(exponent); i++) result *= base
    return exponent > 0 ? result : 1 / result
  }
  return pow(base, exponent)
}
