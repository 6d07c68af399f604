import cbrt from '@stdlib/math-base-special-cbrt'
import pow from '@stdlib/math-base-special-pow'

/**
 * Sherwood number of a single sphere (or its Nusselt number, with Pr in place of Sc).
 *
 * Sh = 2 + 0.6 Re^½ Sc^⅓
 *
 * Source: Ranz and Marshall, Chem. Eng. Prog. 48 (1952) 141 and 173.
 *
 * @param reynolds - Re = ρ u d / μ [-] >= 0
 * @param schmidt - Sc = μ / (ρ D) [-] > 0
 * @returns Sherwood number [-]
 */
export function sphereSherwood(reynolds: number, schmidt: number): number {
  return 2 + 0.6 * Math.sqrt(reynolds) * cbrt(schmidt)
}

/** Range of the packed-bed correlation in the Reynolds number with the superficial velocity. */
export const PACKED_BED_REYNOLDS = { low: 3, high: 10_000 } as const

/**
 * Sherwood number of a particle in a packed bed (or its Nusselt number, with Pr in place of Sc).
 *
 * Sh = 2 + 1.1 Re^0.6 Sc^⅓ for 3 < Re < 10⁴; Sh = 2 below, which is on the safe side for a criterion but can still be too high at Re < 1
 *
 * Source: Wakao and Funazkri, Chem. Eng. Sci. 33 (1978) 1375.
 *
 * @param reynolds - Re = ρ u d / μ with the superficial velocity [-] >= 0
 * @param schmidt - Sc = μ / (ρ D) [-] > 0
 * @returns Sherwood number [-]
 */
export function packedBedSherwood(reynolds: number, schmidt: number): number {
  if (!(reynolds >= PACKED_BED_REYNOLDS.low)) return 2
  return 2 + 1.1 * pow(reynolds, 0.6) * cbrt(schmidt)
}
