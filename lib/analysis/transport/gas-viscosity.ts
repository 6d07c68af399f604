import { AnalysisError } from '../analysis-error'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { viscosityCollisionIntegral } from './collision-integral'
import { type LennardJones } from './lennard-jones'

/**
 * Viscosity of a pure gas at low pressure.
 *
 * μ = 26.69 √(M T) / (σ² Ω_v) µP, M in g mol⁻¹, σ in Å
 *
 * Non-polar gases within about 3 %, polar ones within about 10 %.
 * Source: Chapman and Enskog; Poling, Prausnitz and O'Connell, The Properties of Gases and Liquids, 5th edition, equation 9-3.9.
 *
 * @param temperatureK - temperature [K] > 0
 * @param molarMassKgPerMol - molar mass [kg mol-1] > 0
 * @param parameters - Lennard-Jones diameter [Å] > 0 and well [K] > 0
 * @returns viscosity [Pa s]
 * @example nitrogen at 300 K: 17.9e-6 Pa s
 */
export function gasViscosity(temperatureK: number, molarMassKgPerMol: number, parameters: LennardJones): number {
  const omega = viscosityCollisionIntegral(temperatureK / parameters.wellK)
  return (
    (26.69e-7 * Math.sqrt(1_000 * molarMassKgPerMol * temperatureK)) /
    (parameters.diameterAngstrom * parameters.diameterAngstrom * omega)
  )
}

/** One gas of a mixture. */
export interface MixtureGas {
  readonly moleFraction: number
  readonly viscosityPaS: number
  readonly molarMassKgPerMol: number
}

/**
 * Viscosity of a gas mixture.
 *
 * μ = Σ y_i μ_i / Σ_j y_j φ_ij, φ_ij = [1 + (μ_i/μ_j)^½ (M_j/M_i)^¼]² / [8 (1 + M_i/M_j)]^½
 *
 * Low pressure.
 * Source: Wilke, J. Chem. Phys. 18 (1950) 517.
 *
 * @param gases - at least 1 gas: mole fraction [-] >= 0, viscosity [Pa s] > 0, molar mass [kg mol-1] > 0
 * @returns viscosity [Pa s]
 * @throws {AnalysisError} too-few-points without a gas
 * @example 5 % of 13.4 µPa s and 64.06 g mol-1 in 9.5029 µPa s and 46.07 g mol-1: 9.701614886 µPa s
 */
export function mixtureViscosity(gases: readonly MixtureGas[]): number {
  return mix(gases, (gas) => gas.viscosityPaS)
}

/**
 * Thermal conductivity of a gas mixture, each gas by the modified Eucken relation.
 *
 * λ_i = (c_p,i + 5/4 R) μ_i / M_i; mixed like the viscosity, with the same φ_ij
 *
 * Low pressure, within about 10 %. A heat capacity that is too low gives a conductivity that is too low.
 * Source: Poling, Prausnitz and O'Connell, 5th edition, equation 10-3.2 (Eucken) and 10-6.1 (Wassiljewa, Mason and Saxena).
 *
 * @param gases - at least 1 gas: mole fraction [-] >= 0, viscosity [Pa s] > 0, molar mass [kg mol-1] > 0, heat capacity [J mol-1 K-1] > 0
 * @returns thermal conductivity [W m-1 K-1]
 * @throws {AnalysisError} too-few-points without a gas
 */
export function mixtureThermalConductivity(
  gases: readonly (MixtureGas & { readonly heatCapacityJPerMolK: number })[],
): number {
  return mix(
    gases,
    (gas) => ((gas.heatCapacityJPerMolK + 1.25 * GAS_CONSTANT_J_PER_MOL_K) * gas.viscosityPaS) / gas.molarMassKgPerMol,
  )
}

function mix<G extends MixtureGas>(gases: readonly G[], property: (gas: G) => number): number {
  if (gases.length === 0) throw new AnalysisError('too-few-points', 'A mixture needs at least one gas.')
  let sum = 0
  for (const gas of gases) {
    let weight = 0
    for (const other of gases) {
      const massRatio = other.molarMassKgPerMol / gas.molarMassKgPerMol
      const root = 1 + Math.sqrt(gas.viscosityPaS / other.viscosityPaS) * Math.sqrt(Math.sqrt(massRatio))
      weight += (other.moleFraction * root * root) / Math.sqrt(8 * (1 + 1 / massRatio))
    }
    if (weight > 0) sum += (gas.moleFraction * property(gas)) / weight
  }
  return sum
}
