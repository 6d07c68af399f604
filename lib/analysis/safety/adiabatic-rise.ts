import { AnalysisError } from '../analysis-error'

/**
 * Temperature rise of a gas when a share of it reacts completely and no heat is lost.
 *
 * ΔT = y (−ΔH) / c_p
 *
 * Constant heat capacity of the feed and no change of mole number: an upper estimate for planning, not a temperature of the bed.
 * Source: energy balance; Fogler, Elements of Chemical Reaction Engineering, chapter on adiabatic operation.
 *
 * @param reactantMoleFraction - mole fraction of the reactant that the enthalpy is per mole of [-], 0 to 1
 * @param reactionEnthalpyJPerMol - reaction enthalpy per mole of that reactant [J mol-1], negative when heat is released
 * @param heatCapacityJPerMolK - molar heat capacity of the feed at constant pressure [J mol-1 K-1] > 0
 * @returns temperature rise [K], negative for a reaction that takes up heat
 * @throws {AnalysisError} not-positive when the heat capacity is not above zero | out-of-range when the mole fraction is not within 0 to 1
 * @example 1 % CO in air at 500 K: 0.01, −283657 J mol-1, 29.9087 J mol-1 K-1 give 94.84 K
 */
export function adiabaticRise(
  reactantMoleFraction: number,
  reactionEnthalpyJPerMol: number,
  heatCapacityJPerMolK: number,
): number {
  if (!(heatCapacityJPerMolK > 0))
    throw new AnalysisError('not-positive', 'The heat capacity must be above zero.', { heatCapacityJPerMolK })
  if (!(reactantMoleFraction >= 0 && reactantMoleFraction <= 1))
    throw new AnalysisError('out-of-range', 'A mole fraction lies between 0 and 1.', { reactantMoleFraction })
  return (reactantMoleFraction * -reactionEnthalpyJPerMol) / heatCapacityJPerMolK
}
