import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { NASA7 } from './nasa7-coefficients'

/** What a person enters for a species that the built-in table does not hold. */
export interface EnteredThermochemistry {
  /** of formation at 298.15 K */
  readonly enthalpyJPerMol: number
  /** at 298.15 K and 1 bar */
  readonly entropyJPerMolK: number
  /** taken as constant */
  readonly heatCapacityJPerMolK: number
}

export interface StandardState {
  readonly enthalpyJPerMol: number
  readonly entropyJPerMolK: number
  readonly heatCapacityJPerMolK: number
  /** H - T S */
  readonly gibbsEnergyJPerMol: number
}

const ROOM_TEMPERATURE_K = 298.15

/**
 * Whether thermochemistry is at hand for a species.
 *
 * @param species - formula [-]
 * @param entered - values entered by a person, looked at first [-]
 * @returns true when standardState will answer [-]
 */
export function hasThermochemistry(
  species: string,
  entered: Readonly<Record<string, EnteredThermochemistry>> = {},
): boolean {
  return Object.hasOwn(entered, species) || Object.hasOwn(NASA7, species)
}

/**
 * Standard enthalpy, entropy and heat capacity of an ideal gas at 1 bar.
 *
 * Cp/R = a1 + a2 T + a3 T^2 + a4 T^3 + a5 T^4; H/RT = a1 + a2 T/2 + a3 T^2/3 + a4 T^3/4 + a5 T^4/5 + a6/T;
 * S/R = a1 ln T + a2 T + a3 T^2/2 + a4 T^3/3 + a5 T^4/4 + a7. Valid 200 to 6000 K; entered values use a constant heat capacity from 298.15 K.
 * Source: B. J. McBride, S. Gordon, M. A. Reno, NASA Technical Memorandum 4513, 1993.
 *
 * @param species - formula [-]
 * @param temperatureK - within the range of the species [K]
 * @param entered - values entered by a person, which go before the built-in ones [J mol-1; J mol-1 K-1]
 * @returns the standard state; enthalpy counts from the elements at 298.15 K [J mol-1; J mol-1 K-1]
 * @throws {AnalysisError} unknown-species | out-of-range
 */
export function standardState(
  species: string,
  temperatureK: number,
  entered: Readonly<Record<string, EnteredThermochemistry>> = {},
): StandardState {
  const R = GAS_CONSTANT_J_PER_MOL_K
  const T = temperatureK
  const own = Object.hasOwn(entered, species) ? entered[species] : undefined
  if (own !== undefined) {
    if (!(T > 0)) throw outOfRange(species, T, 0, Number.POSITIVE_INFINITY)
    const enthalpy = own.enthalpyJPerMol + own.heatCapacityJPerMolK * (T - ROOM_TEMPERATURE_K)
    const entropy = own.entropyJPerMolK + own.heatCapacityJPerMolK * ln(T / ROOM_TEMPERATURE_K)
    return assemble(enthalpy, entropy, own.heatCapacityJPerMolK, T)
  }
  const table = Object.hasOwn(NASA7, species) ? NASA7[species] : undefined
  if (table === undefined) {
    throw new AnalysisError(
      'unknown-species',
      `No thermochemistry is at hand for ${species}; enter it with the reaction.`,
      {
        species,
      },
    )
  }
  const [lowest, middle, highest] = table.rangesK
  if (!(T >= lowest && T <= highest)) throw outOfRange(species, T, lowest, highest)
  const [a1, a2, a3, a4, a5, a6, a7] = T <= middle ? table.low : table.high
  const capacity = R * (a1 + T * (a2 + T * (a3 + T * (a4 + T * a5))))
  const enthalpy = R * (a6 + T * (a1 + T * (a2 / 2 + T * (a3 / 3 + T * (a4 / 4 + (T * a5) / 5)))))
  const entropy = R * (a1 * ln(T) + a7 + T * (a2 + T * (a3 / 2 + T * (a4 / 3 + (T * a5) / 4))))
  return assemble(enthalpy, entropy, capacity, T)
}

function assemble(
  enthalpyJPerMol: number,
  entropyJPerMolK: number,
  heatCapacityJPerMolK: number,
  T: number,
): StandardState {
  return {
    enthalpyJPerMol,
    entropyJPerMolK,
    heatCapacityJPerMolK,
    gibbsEnergyJPerMol: enthalpyJPerMol - T * entropyJPerMolK,
  }
}

function outOfRange(species: string, temperatureK: number, lowest: number, highest: number): AnalysisError {
  return new AnalysisError(
    'out-of-range',
    `Thermochemistry of ${species} holds from ${lowest} to ${highest} K, not at ${temperatureK} K.`,
    { species, temperatureK },
  )
}
