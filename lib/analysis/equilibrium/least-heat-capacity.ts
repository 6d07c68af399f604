import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { hasThermochemistry, standardState } from './thermochemistry'

const MONATOMIC = ['He', 'Ne', 'Ar', 'Kr', 'Xe']
const TABLE_LOW_K = 200
const TABLE_HIGH_K = 6_000

/** A heat capacity, and whether it is the least such a gas can have because no table has it. */
export interface HeatCapacity {
  readonly valueJPerMolK: number
  readonly isLeast: boolean
}

/**
 * Heat capacity of a gas, or the least it can have where no table has the gas.
 *
 * Tabulated c_p; 5/2 R for monatomic gases; 7/2 R for all others, since no gas of more atoms has less
 *
 * For estimates in which a small heat capacity is the safe side.
 * Source: B. J. McBride, S. Gordon, M. A. Reno, NASA Technical Memorandum 4513, 1993; equipartition.
 *
 * @param species - formula [-]
 * @param temperatureK - temperature, taken into 200 to 6000 K [K]
 * @returns heat capacity at constant pressure [J mol-1 K-1]
 */
export function heatCapacityOrLeast(species: string, temperatureK: number): HeatCapacity {
  if (MONATOMIC.includes(species)) return { valueJPerMolK: 2.5 * GAS_CONSTANT_J_PER_MOL_K, isLeast: false }
  if (!hasThermochemistry(species)) return { valueJPerMolK: 3.5 * GAS_CONSTANT_J_PER_MOL_K, isLeast: true }
  const within = Math.min(TABLE_HIGH_K, Math.max(TABLE_LOW_K, temperatureK))
  return { valueJPerMolK: standardState(species, within).heatCapacityJPerMolK, isLeast: false }
}
