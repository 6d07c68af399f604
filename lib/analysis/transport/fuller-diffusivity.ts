import cbrt from '@stdlib/math-base-special-cbrt'
import pow from '@stdlib/math-base-special-pow'
import { AnalysisError } from '../analysis-error'
import { STANDARD_ATMOSPHERE_PA } from '../units/constants'

/** Relative standard uncertainty of the estimate, from ten handbook values at −9.5 to +0.6 %. */
export const FULLER_RELATIVE_STANDARD_UNCERTAINTY = 0.07

/** A pair of gases for an estimate of their diffusivity. */
export interface GasPair {
  readonly temperatureK: number
  readonly pressurePa: number
  readonly molarMassAKgPerMol: number
  readonly molarMassBKgPerMol: number
  /** diffusion volumes of one set [cm3 mol-1]: do not mix sets */
  readonly volumeA: number
  readonly volumeB: number
}

/**
 * Diffusivity of two gases in each other, Fuller-Schettler-Giddings, present form and volumes.
 *
 * D_AB = 0.00143 T^1.75 / (p √M_AB (v_A^(1/3) + v_B^(1/3))²) cm² s⁻¹, M_AB = 2 / (1/M_A + 1/M_B), p in bar, M in g mol⁻¹
 *
 * Low pressure (below about 10 bar), non-polar or weakly polar gases.
 * Source: Poling, Prausnitz and O'Connell, The Properties of Gases and Liquids, 5th edition, equation 11-4.4.
 *
 * @param pair - temperature [K] > 0, absolute pressure [Pa] > 0, molar masses [kg mol-1] > 0, diffusion volumes [cm3 mol-1] > 0
 * @returns diffusivity [m2 s-1]
 * @throws {AnalysisError} not-positive when an input is not above zero
 * @example hydrogen in nitrogen at 294 K and 2.0265 bar: 0.3794 cm2 s-1
 */
export function fullerDiffusivity(pair: GasPair): number {
  requirePositive(pair)
  const reduced = 2_000 / (1 / pair.molarMassAKgPerMol + 1 / pair.molarMassBKgPerMol)
  const size = cbrt(pair.volumeA) + cbrt(pair.volumeB)
  return (0.00143e-4 * pow(pair.temperatureK, 1.75)) / ((pair.pressurePa / 1e5) * Math.sqrt(reduced) * size * size)
}

/**
 * Diffusivity of two gases in each other, Fuller-Schettler-Giddings, the form and volumes of 1966.
 *
 * D_AB = 10⁻³ T^1.75 √(1/M_A + 1/M_B) / (p (v_A^(1/3) + v_B^(1/3))²) cm² s⁻¹, p in atm, M in g mol⁻¹
 *
 * Kept for checking older numbers. Its volumes (hydrogen 7.07, nitrogen 17.9) are not those of {@link fullerDiffusivity}.
 * Source: Fuller, Schettler and Giddings, Ind. Eng. Chem. 58 (5) (1966) 18.
 *
 * @param pair - temperature [K] > 0, absolute pressure [Pa] > 0, molar masses [kg mol-1] > 0, diffusion volumes of 1966 [cm3 mol-1] > 0
 * @returns diffusivity [m2 s-1]
 * @throws {AnalysisError} not-positive when an input is not above zero
 */
export function fullerDiffusivity1966(pair: GasPair): number {
  requirePositive(pair)
  const inverseMass = (1 / pair.molarMassAKgPerMol + 1 / pair.molarMassBKgPerMol) / 1_000
  const size = cbrt(pair.volumeA) + cbrt(pair.volumeB)
  const pressureAtm = pair.pressurePa / STANDARD_ATMOSPHERE_PA
  return (1e-7 * pow(pair.temperatureK, 1.75) * Math.sqrt(inverseMass)) / (pressureAtm * size * size)
}

function requirePositive(pair: GasPair): void {
  for (const [name, value] of Object.entries(pair))
    if (!(value > 0) || !Number.isFinite(value))
      throw new AnalysisError('not-positive', `${name} must be above zero.`, { name, value })
}
