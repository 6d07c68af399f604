import { AnalysisError } from '../analysis-error'
import { BOLTZMANN_CONSTANT_J_PER_K, GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'

/**
 * Knudsen diffusivity in a straight cylindrical pore.
 *
 * D_K = (2/3) r √(8 R T / (π M)) = 97.0 r √(T / M[g mol⁻¹])
 *
 * Free path long against the pore.
 * Source: Satterfield, Mass Transfer in Heterogeneous Catalysis, 1970, equation 1.33 (9700 cm² s⁻¹ with r in cm).
 *
 * @param poreRadiusM - pore radius [m] > 0
 * @param temperatureK - temperature [K] > 0
 * @param molarMassKgPerMol - molar mass of the gas [kg mol-1] > 0
 * @returns diffusivity [m2 s-1]
 * @throws {AnalysisError} not-positive when an input is not above zero
 */
export function knudsenDiffusivity(poreRadiusM: number, temperatureK: number, molarMassKgPerMol: number): number {
  if ([poreRadiusM, temperatureK, molarMassKgPerMol].some((value) => !(value > 0) || !Number.isFinite(value)))
    throw new AnalysisError('not-positive', 'Pore radius, temperature and molar mass must be above zero.', {
      poreRadiusM,
      temperatureK,
      molarMassKgPerMol,
    })
  return (
    (2 / 3) * poreRadiusM * Math.sqrt((8 * GAS_CONSTANT_J_PER_MOL_K * temperatureK) / (Math.PI * molarMassKgPerMol))
  )
}

/**
 * Diffusivity in a pore where molecules meet the wall and each other.
 *
 * 1/D_pore = 1/D_AB + 1/D_K
 *
 * Equimolar counter-diffusion or a dilute gas.
 * Source: Bosanquet, British TA report BR-507, 1944; Pollard and Present, Phys. Rev. 73 (1948) 762.
 *
 * @param molecularM2PerS - molecular diffusivity [m2 s-1] > 0
 * @param knudsenM2PerS - Knudsen diffusivity [m2 s-1] > 0
 * @returns diffusivity in the pore [m2 s-1]
 */
export function bosanquetDiffusivity(molecularM2PerS: number, knudsenM2PerS: number): number {
  return 1 / (1 / molecularM2PerS + 1 / knudsenM2PerS)
}

/**
 * Effective diffusivity in a porous particle, per area of particle.
 *
 * D_e = ε_p D_pore / τ
 *
 * A mean pore radius 2 V_g/S_g underestimates transport in solids with two sizes of pores.
 * Source: Satterfield, Mass Transfer in Heterogeneous Catalysis, 1970, equation 1.40.
 *
 * @param poreM2PerS - diffusivity in the pores [m2 s-1] > 0
 * @param poreFraction - pore volume per particle volume [-], 0 to 1
 * @param tortuosity - tortuosity [-], usually 2 to 6
 * @returns effective diffusivity [m2 s-1]
 */
export function effectiveDiffusivity(poreM2PerS: number, poreFraction: number, tortuosity: number): number {
  return (poreFraction * poreM2PerS) / tortuosity
}

/**
 * Knudsen number of a gas in a pore: mean free path over pore diameter.
 *
 * λ = k T / (√2 π σ² p), Kn = λ / d
 *
 * Below 0.05 molecules meet each other only; above 10 they meet the wall only.
 * Source: Benítez, Principles and Modern Applications of Mass Transfer Operations, 2nd edition, equation 1-101 and example 1.20.
 *
 * @param temperatureK - temperature [K] > 0
 * @param pressurePa - absolute pressure [Pa] > 0
 * @param collisionDiameterM - collision diameter of the pair [m] > 0
 * @param poreDiameterM - pore diameter [m] > 0
 * @returns Knudsen number [-]
 */
export function knudsenNumber(
  temperatureK: number,
  pressurePa: number,
  collisionDiameterM: number,
  poreDiameterM: number,
): number {
  const meanFreePath =
    (BOLTZMANN_CONSTANT_J_PER_K * temperatureK) /
    (Math.SQRT2 * Math.PI * collisionDiameterM * collisionDiameterM * pressurePa)
  return meanFreePath / poreDiameterM
}
