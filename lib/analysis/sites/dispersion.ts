import { AnalysisError } from '../analysis-error'
import { ATOMIC_WEIGHTS_G_PER_MOL } from '../units/molar-mass'
import { AVOGADRO_CONSTANT_PER_MOL } from '../units/constants'

/** Area of one surface atom, polycrystalline mean [nm2], and density [kg m-3]. Source: Scholten, Pijpers and Hustings, Catal. Rev. 27 (1985) 151; densities: CRC Handbook of Chemistry and Physics. */
const METALS: Readonly<Record<string, { readonly areaNm2: number; readonly densityKgPerM3: number }>> = {
  Pt: { areaNm2: 0.0807, densityKgPerM3: 21_450 },
  Pd: { areaNm2: 0.0793, densityKgPerM3: 12_020 },
  Rh: { areaNm2: 0.0758, densityKgPerM3: 12_410 },
  Ru: { areaNm2: 0.0817, densityKgPerM3: 12_370 },
  Ir: { areaNm2: 0.0758, densityKgPerM3: 22_560 },
  Ni: { areaNm2: 0.0651, densityKgPerM3: 8_908 },
  Co: { areaNm2: 0.0659, densityKgPerM3: 8_900 },
  Fe: { areaNm2: 0.0609, densityKgPerM3: 7_874 },
  Cu: { areaNm2: 0.0685, densityKgPerM3: 8_960 },
  Ag: { areaNm2: 0.0875, densityKgPerM3: 10_490 },
  Au: { areaNm2: 0.0875, densityKgPerM3: 19_300 },
}

/**
 * Metal per mass of catalyst, as an amount.
 *
 * n_M = w_M/M_M
 *
 * Source: definition.
 *
 * @param massFraction - metal content by mass [-], 0 to 1
 * @param metal - element symbol [-]
 * @returns total metal [mol kg-1]
 * @throws {AnalysisError} out-of-range for a content outside 0 to 1 | unknown-species for an unknown element
 * @example 1.5 wt% Rh is 0.1457648 mol kg-1
 */
export function metalContent(massFraction: number, metal: string): number {
  if (!(massFraction >= 0 && massFraction <= 1))
    throw new AnalysisError('out-of-range', 'A metal content lies between 0 and 1.', { massFraction })
  const weight = Object.hasOwn(ATOMIC_WEIGHTS_G_PER_MOL, metal) ? ATOMIC_WEIGHTS_G_PER_MOL[metal] : undefined
  if (weight === undefined) throw new AnalysisError('unknown-species', `“${metal}” is not a known element.`, { metal })
  return massFraction / (weight / 1_000)
}

/** Share above which a dispersion points at a wrong stoichiometry or spill-over. */
export const HIGHEST_CREDIBLE_DISPERSION = 1.1

/**
 * Dispersion: share of the metal atoms that lie at the surface, also called percentage exposed.
 *
 * D = n_s/n_M
 *
 * Values above 1 are given as they are; above {@link HIGHEST_CREDIBLE_DISPERSION} the stoichiometry is in doubt.
 * Source: IUPAC Compendium of Chemical Terminology, percentage exposed in metallic catalysts, P04485.
 *
 * @param sitesMolPerKg - surface sites [mol kg-1]
 * @param metalMolPerKg - total metal [mol kg-1] > 0
 * @returns dispersion [-]
 * @throws {AnalysisError} not-positive for a metal content not above zero
 */
export function dispersion(sitesMolPerKg: number, metalMolPerKg: number): number {
  if (!(metalMolPerKg > 0) || !Number.isFinite(sitesMolPerKg) || !Number.isFinite(metalMolPerKg))
    throw new AnalysisError('not-positive', 'The metal content must be a number above zero, and the sites a number.', {
      metalMolPerKg,
    })
  return sitesMolPerKg / metalMolPerKg
}

/**
 * Mean diameter of metal spheres from their dispersion (volume over area mean).
 *
 * d = 6 (v_m/a_m)/D, v_m = M/(ρ N_A)
 *
 * Spheres of one size; polycrystalline mean area of an atom.
 * Source: Scholten, Pijpers and Hustings, Catal. Rev. 27 (1985) 151; Bergeret and Gallezot, Handbook of Heterogeneous Catalysis, 2nd edition, section 3.1.2.
 *
 * @param dispersionValue - dispersion [-] > 0
 * @param metal - element symbol [-]
 * @returns diameter [m]; null for a metal without a tabulated area
 * @throws {AnalysisError} not-positive for a dispersion not above zero
 * @example platinum of dispersion 1: 1.12 nm
 */
export function meanDiameter(dispersionValue: number, metal: string): number | null {
  if (!(dispersionValue > 0) || !Number.isFinite(dispersionValue))
    throw new AnalysisError('not-positive', 'The dispersion must be above zero.', { dispersionValue })
  const entry = Object.hasOwn(METALS, metal) ? METALS[metal] : undefined
  const weight = Object.hasOwn(ATOMIC_WEIGHTS_G_PER_MOL, metal) ? ATOMIC_WEIGHTS_G_PER_MOL[metal] : undefined
  if (entry === undefined || weight === undefined) return null
  const volume = weight / 1_000 / (entry.densityKgPerM3 * AVOGADRO_CONSTANT_PER_MOL)
  return (6 * volume) / (entry.areaNm2 * 1e-18) / dispersionValue
}

/** A rate per site with its relative standard uncertainty. */
export interface RatePerSite {
  readonly ratePerS: number
  readonly relativeStandardUncertainty: number
}

/**
 * Rate per site: turnover frequency on surface sites, site-time yield on all metal atoms.
 *
 * r/n; u_r² = u_r(r)² + u_r(n)²
 *
 * The count's uncertainty is shared by all temperatures: it moves ln A and not the activation energy.
 * Source: Boudart, Chem. Rev. 95 (1995) 661; Kozuch and Martin, ACS Catal. 2 (2012) 2787.
 *
 * @param rateMolPerKgS - rate [mol kg-1 s-1]
 * @param rateRelative - its relative standard uncertainty [-]
 * @param sitesMolPerKg - sites, or total metal [mol kg-1] > 0
 * @param sitesRelative - its relative standard uncertainty [-]
 * @returns rate per site [s-1] with relative standard uncertainty [-]
 * @throws {AnalysisError} not-positive for a count not above zero
 */
export function ratePerSite(
  rateMolPerKgS: number,
  rateRelative: number,
  sitesMolPerKg: number,
  sitesRelative: number,
): RatePerSite {
  if (!(sitesMolPerKg > 0) || !Number.isFinite(sitesMolPerKg) || !Number.isFinite(rateMolPerKgS))
    throw new AnalysisError('not-positive', 'The site count must be a number above zero, and the rate a number.', {
      sitesMolPerKg,
    })
  return {
    ratePerS: rateMolPerKgS / sitesMolPerKg,
    relativeStandardUncertainty: Math.sqrt(rateRelative * rateRelative + sitesRelative * sitesRelative),
  }
}
