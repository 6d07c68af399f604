import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { fitWeightedLine } from '../statistics/weighted-line'
import { BOLTZMANN_CONSTANT_J_PER_K, GAS_CONSTANT_J_PER_MOL_K, PLANCK_CONSTANT_J_S } from '../units/constants'

/** Activation parameters of transition-state theory. */
export interface EyringFit {
  readonly activationEnthalpyJPerMol: number
  readonly activationEnthalpyStandardError: number | null
  /** for the standard state passed in */
  readonly activationEntropyJPerMolK: number
  readonly activationEntropyStandardError: number | null
  readonly degreesOfFreedom: number
}

/** Which rates transition-state theory can be asked about. */
export type EyringQuantity =
  'first-order-rate-constant' | 'turnover-frequency' | 'rate-per-mass' | 'rate-constant-of-other-order'

/**
 * Whether an activation entropy of a fitted quantity means anything.
 *
 * Its value depends on the unit of the rate: only a first-order constant or a zero-order turnover frequency, both in s⁻¹, has one.
 * Source: IUPAC Compendium of Chemical Terminology, entropy of activation, E02150.
 *
 * @param quantity - what was fitted [-]
 * @returns true when it has meaning [-]
 */
export function hasEyringMeaning(quantity: EyringQuantity): boolean {
  return quantity === 'first-order-rate-constant' || quantity === 'turnover-frequency'
}

/**
 * Activation enthalpy and entropy from rate constants at several temperatures.
 *
 * ln(k/T) = ln(k_B/h) + ΔS‡/R − ΔH‡/(R T), transmission coefficient 1
 *
 * k in s⁻¹; a constant of another order first times c°^(n−1), and ΔS‡ then belongs to c°.
 * Source: Eyring, J. Chem. Phys. 3 (1935) 107; IUPAC Compendium of Chemical Terminology, enthalpy of activation.
 *
 * @param temperaturesK - at least 2 distinct temperatures [K] > 0
 * @param rateConstantsPerS - as many rate constants [s-1] > 0
 * @param weights - positive, 1/u² of ln k or relative; null for equal weights [-]
 * @returns enthalpy [J mol-1] and entropy [J mol-1 K-1] with standard errors scaled by the scatter; n − 2 degrees of freedom
 * @throws {AnalysisError} not-positive | as the line fit
 */
export function fitEyring(
  temperaturesK: readonly number[],
  rateConstantsPerS: readonly number[],
  weights: readonly number[] | null = null,
): EyringFit {
  if (temperaturesK.some((t) => !(t > 0)) || rateConstantsPerS.some((k) => !(k > 0)))
    throw new AnalysisError('not-positive', 'Temperatures and rate constants must be above zero.')
  const line = fitWeightedLine(
    temperaturesK.map((t) => 1 / t),
    rateConstantsPerS.map((k, i) => ln(k / (temperaturesK[i] ?? NaN))),
    weights,
  )
  const scaled = line.scaled
  return {
    activationEnthalpyJPerMol: -GAS_CONSTANT_J_PER_MOL_K * line.slope,
    activationEnthalpyStandardError: scaled === null ? null : GAS_CONSTANT_J_PER_MOL_K * scaled.slope,
    activationEntropyJPerMolK:
      GAS_CONSTANT_J_PER_MOL_K * (line.intercept - ln(BOLTZMANN_CONSTANT_J_PER_K / PLANCK_CONSTANT_J_S)),
    activationEntropyStandardError: scaled === null ? null : GAS_CONSTANT_J_PER_MOL_K * scaled.intercept,
    degreesOfFreedom: line.degreesOfFreedom,
  }
}
