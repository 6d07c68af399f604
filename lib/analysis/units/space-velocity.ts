import { AnalysisError } from '../analysis-error'
import { type FlowReference } from './flow-reference'
import { volumeFlowFromMolarFlow } from './molar-flow-from-volume-flow'

/**
 * Gas hourly space velocity: feed volume at a stated reference state per bed volume and time.
 *
 * GHSV = F R T_ref / (p_ref V_bed)
 *
 * Say with the number which reference state it is and whether the bed volume includes the diluent. Its reciprocal is a residence time only
 * at the reference state.
 * Source: common practice; flow by the reference state as in {@link volumeFlowFromMolarFlow}.
 *
 * @param feedMolPerS - total feed [mol s-1] >= 0
 * @param bedVolumeM3 - volume the number is per [m3] > 0
 * @param reference - state at which the feed volume is counted [K, Pa]
 * @returns space velocity [s-1]; times 3600 for the usual h-1
 * @throws {AnalysisError} not-positive when the bed volume is not above zero
 */
export function gasSpaceVelocity(feedMolPerS: number, bedVolumeM3: number, reference: FlowReference): number {
  return volumeFlowFromMolarFlow(feedMolPerS, reference) / positive(bedVolumeM3, 'bed volume')
}

/**
 * Weight hourly space velocity: feed mass per catalyst mass and time.
 *
 * WHSV = Σ F_i M_i / W
 *
 * Pass all species of the feed, or the reactants alone: say which.
 * Source: common practice.
 *
 * @param feed - molar flow [mol s-1] and molar mass [kg mol-1] of each species counted
 * @param catalystMassKg - catalyst, dry or calcined as stated [kg] > 0
 * @returns space velocity [s-1]; times 3600 for the usual h-1
 * @throws {AnalysisError} not-positive when the catalyst mass is not above zero
 */
export function weightSpaceVelocity(
  feed: readonly { readonly molarFlowMolPerS: number; readonly molarMassKgPerMol: number }[],
  catalystMassKg: number,
): number {
  let massFlow = 0
  for (const { molarFlowMolPerS, molarMassKgPerMol } of feed) massFlow += molarFlowMolPerS * molarMassKgPerMol
  return massFlow / positive(catalystMassKg, 'catalyst mass')
}

/**
 * Contact time: catalyst mass per molar flow of the key reactant.
 *
 * W / F_A0
 *
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 18.
 *
 * @param catalystMassKg - catalyst without diluent [kg] >= 0
 * @param keyFlowMolPerS - feed of the key reactant [mol s-1] > 0
 * @returns contact time [kg s mol-1]
 * @throws {AnalysisError} not-positive when the flow is not above zero
 */
export function contactTime(catalystMassKg: number, keyFlowMolPerS: number): number {
  return catalystMassKg / positive(keyFlowMolPerS, 'flow of the key reactant')
}

function positive(value: number, name: string): number {
  if (!(value > 0)) throw new AnalysisError('not-positive', `The ${name} must be above zero.`, { value })
  return value
}
