import { AnalysisError } from '../analysis-error'

/** One other gas in the mixture. */
export interface MixturePartner {
  readonly moleFraction: number
  /** diffusivity of the key gas in this one alone, at the mixture's temperature and pressure [m2 s-1] */
  readonly diffusivityM2PerS: number
  /** stoichiometric number, positive for products; 0 for a gas that takes no part */
  readonly stoichiometricNumber: number
}

/**
 * Diffusivity of one gas in a stagnant mixture.
 *
 * D_A,m = (1 − y_A) / Σ (y_j / D_Aj)
 *
 * The others do not move. For y_A → 0 it is Blanc's law.
 * Source: Wilke, Chem. Eng. Prog. 46 (1950) 95.
 *
 * @param keyMoleFraction - mole fraction of the key gas [-], 0 to 1
 * @param partners - at least 1 other gas: mole fraction [-] >= 0, binary diffusivity [m2 s-1] > 0
 * @returns diffusivity in the mixture [m2 s-1]
 * @throws {AnalysisError} too-few-points without another gas | not-positive when a diffusivity is not above zero
 */
export function stagnantMixtureDiffusivity(
  keyMoleFraction: number,
  partners: readonly Pick<MixturePartner, 'moleFraction' | 'diffusivityM2PerS'>[],
): number {
  let resistance = 0
  for (const partner of requirePartners(partners)) resistance += partner.moleFraction / partner.diffusivityM2PerS
  return (1 - keyMoleFraction) / resistance
}

/**
 * Effective diffusivity of the key reactant in a mixture whose fluxes are coupled by the reaction.
 *
 * D_A,eff = (1 − y_A Σν/ν_A) / Σ [(y_j − y_A ν_j/ν_A) / D_Aj]
 *
 * Stefan-Maxwell equations with fluxes in the proportion of the stoichiometric numbers; molecular diffusion only.
 * Source: Bird, Stewart and Lightfoot, Transport Phenomena, 2nd edition, section 17.9; worked in Benítez, Principles and Modern Applications
 * of Mass Transfer Operations, 2nd edition, example 1.11.
 *
 * @param keyMoleFraction - mole fraction of the key reactant [-], 0 to 1
 * @param keyStoichiometricNumber - its stoichiometric number [-] < 0
 * @param partners - at least 1 other gas: mole fraction [-] >= 0, binary diffusivity [m2 s-1] > 0, stoichiometric number [-]
 * @returns effective diffusivity [m2 s-1]; null where the coupled fluxes leave no resistance, so that no single diffusivity describes them
 * @throws {AnalysisError} too-few-points without another gas | not-positive when a diffusivity is not above zero | out-of-range when the key number is not below zero
 */
export function coupledMixtureDiffusivity(
  keyMoleFraction: number,
  keyStoichiometricNumber: number,
  partners: readonly MixturePartner[],
): number | null {
  if (!(keyStoichiometricNumber < 0))
    throw new AnalysisError('out-of-range', 'The key reactant needs a negative stoichiometric number.', {
      keyStoichiometricNumber,
    })
  let total = keyStoichiometricNumber
  let resistance = 0
  for (const partner of requirePartners(partners)) {
    total += partner.stoichiometricNumber
    const flux = partner.moleFraction - (keyMoleFraction * partner.stoichiometricNumber) / keyStoichiometricNumber
    resistance += flux / partner.diffusivityM2PerS
  }
  const diffusivity = (1 - (keyMoleFraction * total) / keyStoichiometricNumber) / resistance
  return diffusivity > 0 && Number.isFinite(diffusivity) ? diffusivity : null
}

function requirePartners<P extends { readonly diffusivityM2PerS: number }>(partners: readonly P[]): readonly P[] {
  if (partners.length === 0) throw new AnalysisError('too-few-points', 'A mixture needs at least one other gas.')
  for (const { diffusivityM2PerS } of partners)
    if (!(diffusivityM2PerS > 0))
      throw new AnalysisError('not-positive', 'Diffusivities must be above zero.', { diffusivityM2PerS })
  return partners
}
