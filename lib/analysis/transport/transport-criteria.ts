import ln from '@stdlib/math-base-special-ln'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'

/**
 * Weisz-Prater modulus of a particle on its radius.
 *
 * Φ_R = r‴ R_p² / (D_e C_s)
 *
 * On the length V_p/S_p it is a ninth of this for a sphere: say which one a limit is for.
 * Source: Weisz and Prater, Adv. Catal. 6 (1954) 143.
 *
 * @param rateMolPerM3S - observed rate per particle volume [mol m-3 s-1]
 * @param radiusM - particle radius, or any length the limit is stated for [m]
 * @param effectiveDiffusivityM2PerS - effective diffusivity [m2 s-1]
 * @param surfaceConcentrationMolPerM3 - concentration at the outer surface [mol m-3]
 * @returns modulus [-]
 * @example Levenspiel 18.1: 144 on the radius, 16 on V/S
 */
export function weiszPraterModulus(
  rateMolPerM3S: number,
  radiusM: number,
  effectiveDiffusivityM2PerS: number,
  surfaceConcentrationMolPerM3: number,
): number {
  return (rateMolPerM3S * radiusM * radiusM) / (effectiveDiffusivityM2PerS * surfaceConcentrationMolPerM3)
}

/**
 * Weisz-Prater limit for less than 5 % effect, by reaction order.
 *
 * 6 for order 0, 0.6 for order 1, 0.3 for order 2; between these the value of the next higher one, and 0.3 where the order is unknown or negative
 *
 * Source: Weisz and Prater 1954; Dekker, Bliek, Kapteijn and Moulijn, Chem. Eng. Sci. 50 (1995) 3573.
 *
 * @param order - order in the key reactant [-]; null when unknown
 * @returns largest modulus on the radius [-]
 */
export function weiszPraterLimit(order: number | null): number {
  if (order === null || order < 0 || order > 1) return 0.3
  return order === 0 ? 6 : 0.6
}

/**
 * Mears number of the film around a particle, mass, in the particle-volume form.
 *
 * n r‴ R_p / (k_c C_b), to be below 0.15, which is n r‴ R_p / (3 k_c C_b) below 0.05
 *
 * Textbooks often print the bed density in place of the particle density; that form is looser by 1/(1 − ε_b).
 * Source: Mears, Ind. Eng. Chem. Process Des. Dev. 10 (1971) 541.
 *
 * @param order - order in the key reactant, taken positive [-]
 * @param rateMolPerM3S - observed rate per particle volume [mol m-3 s-1]
 * @param radiusM - particle radius [m]
 * @param filmCoefficientMPerS - mass transfer coefficient [m s-1]
 * @param bulkConcentrationMolPerM3 - concentration in the gas [mol m-3]
 * @returns criterion [-]
 * @example Levenspiel 18.1: 0.02
 */
export function filmMassCriterion(
  order: number,
  rateMolPerM3S: number,
  radiusM: number,
  filmCoefficientMPerS: number,
  bulkConcentrationMolPerM3: number,
): number {
  return (Math.abs(order) * rateMolPerM3S * radiusM) / (filmCoefficientMPerS * bulkConcentrationMolPerM3)
}

/** A particle that gives off or takes up heat. */
export interface HotParticle {
  readonly reactionEnthalpyJPerMol: number
  readonly rateMolPerM3S: number
  readonly radiusM: number
  readonly activationEnergyJPerMol: number
  readonly temperatureK: number
}

/**
 * Mears number of the film around a particle, heat.
 *
 * |ΔH| r‴ R_p E / (h R T²), to be below 0.15: three times the film's temperature difference times E/(R T²), limit 0.05
 *
 * Source: Mears, Ind. Eng. Chem. Process Des. Dev. 10 (1971) 541.
 *
 * @param particle - enthalpy [J mol-1], rate per particle volume [mol m-3 s-1], radius [m], activation energy [J mol-1], temperature [K]
 * @param heatCoefficientWPerM2K - heat transfer coefficient [W m-2 K-1]
 * @returns criterion [-]
 */
export function filmHeatCriterion(particle: HotParticle, heatCoefficientWPerM2K: number): number {
  return 3 * Math.abs(filmTemperatureRise(particle, heatCoefficientWPerM2K)) * sensitivity(particle)
}

/**
 * Anderson number: heat inside the particle.
 *
 * |ΔH| r‴ R_p² E / (λ_e T² R), to be below 0.75
 *
 * Source: Anderson, Chem. Eng. Sci. 18 (1963) 147.
 *
 * @param particle - enthalpy [J mol-1], rate per particle volume [mol m-3 s-1], radius [m], activation energy [J mol-1], surface temperature [K]
 * @param conductivityWPerMK - effective thermal conductivity of the particle [W m-1 K-1]
 * @returns criterion [-]
 */
export function pelletHeatCriterion(particle: HotParticle, conductivityWPerMK: number): number {
  const { reactionEnthalpyJPerMol, rateMolPerM3S, radiusM } = particle
  return (
    ((Math.abs(reactionEnthalpyJPerMol) * rateMolPerM3S * radiusM * radiusM) / conductivityWPerMK) *
    sensitivity(particle)
  )
}

/** A packed bed whose wall is held at the set temperature. */
export interface HeatedBed {
  readonly voidFraction: number
  /** diluent share of the solid volume */
  readonly diluentFraction: number
  readonly tubeRadiusM: number
  /** radial */
  readonly conductivityWPerMK: number
  readonly wallBiot: number
}

/**
 * Mears number of the bed: heat between the middle and the wall.
 *
 * |ΔH| r‴ (1−ε_b)(1−b) R_t² E / (λ_er R T_w²) · [1 + 8 R_p/(R_t Bi_w)], to be below 0.4
 *
 * Source: Mears, J. Catal. 20 (1971) 127.
 *
 * @param particle - enthalpy [J mol-1], rate per particle volume [mol m-3 s-1], radius [m], activation energy [J mol-1], wall temperature [K]
 * @param bed - void fraction [-], diluent share of the solid volume [-], tube radius [m], radial conductivity [W m-1 K-1], wall Biot number [-]
 * @returns criterion [-]
 */
export function bedHeatCriterion(particle: HotParticle, bed: HeatedBed): number {
  const heat =
    Math.abs(particle.reactionEnthalpyJPerMol) *
    particle.rateMolPerM3S *
    (1 - bed.voidFraction) *
    (1 - bed.diluentFraction)
  const wall = 1 + (8 * particle.radiusM) / (bed.tubeRadiusM * bed.wallBiot)
  return ((heat * bed.tubeRadiusM * bed.tubeRadiusM) / bed.conductivityWPerMK) * sensitivity(particle) * wall
}

/**
 * Shortest bed, in particles, that still counts as plug flow.
 *
 * L_b/d_p > (20 n/Bo) ln(1/(1−X))
 *
 * Source: Mears, Chem. Eng. Sci. 26 (1971) 1361.
 *
 * @param order - order in the key reactant, taken positive [-]
 * @param bodenstein - Bo = u d_p / D_ax [-] > 0, about 0.3 to 2 for gas
 * @param conversion - conversion [-] below 1
 * @returns least bed length over particle diameter [-]
 */
export function plugFlowBedLength(order: number, bodenstein: number, conversion: number): number {
  return ((20 * Math.abs(order)) / bodenstein) * ln(1 / (1 - conversion))
}

/**
 * Relative error of the conversion by a diluted bed.
 *
 * [b/(1−b)] X d_p/(2 L_b), to be below 0.05
 *
 * First order, catalyst and diluent of one size and well mixed.
 * Source: Berger, Pérez-Ramírez, Kapteijn and Moulijn, Chem. Eng. Sci. 57 (2002) 4921.
 *
 * @param diluentFraction - diluent share of the solid volume [-], 0 to below 1
 * @param conversion - conversion [-]
 * @param particleDiameterM - particle diameter [m]
 * @param bedLengthM - bed length [m]
 * @returns relative error [-]
 */
export function dilutionError(
  diluentFraction: number,
  conversion: number,
  particleDiameterM: number,
  bedLengthM: number,
): number {
  return ((diluentFraction / (1 - diluentFraction)) * conversion * particleDiameterM) / (2 * bedLengthM)
}

/**
 * Largest temperature difference inside a particle.
 *
 * ΔT = −ΔH D_e C_s / λ_e
 *
 * Source: Prater, Chem. Eng. Sci. 8 (1958) 284.
 *
 * @param reactionEnthalpyJPerMol - reaction enthalpy [J mol-1]
 * @param effectiveDiffusivityM2PerS - effective diffusivity [m2 s-1]
 * @param surfaceConcentrationMolPerM3 - concentration at the surface [mol m-3]
 * @param conductivityWPerMK - effective thermal conductivity of the particle [W m-1 K-1] > 0
 * @returns temperature of the middle less that of the surface [K]
 * @example Levenspiel 18.1: 0.1 K
 */
export function praterTemperatureRise(
  reactionEnthalpyJPerMol: number,
  effectiveDiffusivityM2PerS: number,
  surfaceConcentrationMolPerM3: number,
  conductivityWPerMK: number,
): number {
  return (-reactionEnthalpyJPerMol * effectiveDiffusivityM2PerS * surfaceConcentrationMolPerM3) / conductivityWPerMK
}

/**
 * Temperature difference over the film around a particle.
 *
 * ΔT = −ΔH r‴ R_p / (3 h)
 *
 * Source: heat balance of a sphere.
 *
 * @param particle - enthalpy [J mol-1], rate per particle volume [mol m-3 s-1], radius [m]
 * @param heatCoefficientWPerM2K - heat transfer coefficient [W m-2 K-1] > 0
 * @returns temperature of the surface less that of the gas [K]
 * @example Levenspiel 18.1: 40 K
 */
export function filmTemperatureRise(
  particle: Pick<HotParticle, 'reactionEnthalpyJPerMol' | 'rateMolPerM3S' | 'radiusM'>,
  heatCoefficientWPerM2K: number,
): number {
  return (-particle.reactionEnthalpyJPerMol * particle.rateMolPerM3S * particle.radiusM) / (3 * heatCoefficientWPerM2K)
}

function sensitivity({ activationEnergyJPerMol, temperatureK }: HotParticle): number {
  return Math.abs(activationEnergyJPerMol) / (GAS_CONSTANT_J_PER_MOL_K * temperatureK * temperatureK)
}
