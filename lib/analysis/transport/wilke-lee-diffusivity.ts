import pow from '@stdlib/math-base-special-pow'
import { AnalysisError } from '../analysis-error'
import { diffusionCollisionIntegral } from './collision-integral'
import { type LennardJones } from './lennard-jones'

/**
 * Diffusivity of two gases in each other, Wilke-Lee.
 *
 * D_AB = 10⁻³ (3.03 − 0.98/√M_AB) T^1.5 / (p √M_AB σ_AB² Ω_D) cm² s⁻¹, M_AB = 2 / (1/M_A + 1/M_B), σ_AB the mean, ε_AB the geometric mean
 *
 * Low pressure (below about 10 bar), p in bar, M in g mol⁻¹, σ in Å.
 * Source: Wilke and Lee, Ind. Eng. Chem. 47 (1955) 1253; Poling, Prausnitz and O'Connell, 5th edition, equation 11-4.1.
 *
 * @param temperatureK - temperature [K] > 0
 * @param pressurePa - absolute pressure [Pa] > 0
 * @param a - first gas: molar mass [kg mol-1] > 0, Lennard-Jones diameter [Å] and well [K]
 * @param b - second gas, likewise: molar mass [kg mol-1] > 0, diameter [Å], well [K]
 * @returns diffusivity [m2 s-1]
 * @throws {AnalysisError} not-positive when temperature, pressure or a molar mass is not above zero
 * @example carbon disulfide in air at 273 K and 1 bar: 0.0952 cm2 s-1
 */
export function wilkeLeeDiffusivity(
  temperatureK: number,
  pressurePa: number,
  a: LennardJones & { readonly molarMassKgPerMol: number },
  b: LennardJones & { readonly molarMassKgPerMol: number },
): number {
  for (const value of [temperatureK, pressurePa, a.molarMassKgPerMol, b.molarMassKgPerMol])
    if (!(value > 0) || !Number.isFinite(value))
      throw new AnalysisError('not-positive', 'Temperature, pressure and molar masses must be above zero.', { value })
  const root = Math.sqrt(2_000 / (1 / a.molarMassKgPerMol + 1 / b.molarMassKgPerMol))
  const diameter = (a.diameterAngstrom + b.diameterAngstrom) / 2
  const omega = diffusionCollisionIntegral(temperatureK / Math.sqrt(a.wellK * b.wellK))
  return (
    (1e-7 * (3.03 - 0.98 / root) * pow(temperatureK, 1.5)) / ((pressurePa / 1e5) * root * diameter * diameter * omega)
  )
}
