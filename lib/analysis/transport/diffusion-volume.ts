import { AnalysisError } from '../analysis-error'
import { elementCount } from '../element-count'

/** Diffusion volumes of simple molecules [cm3 mol-1]. Source: Poling, Prausnitz and O'Connell, The Properties of Gases and Liquids, 5th edition, table 11-1. */
const MOLECULES: Readonly<Record<string, number>> = {
  He: 2.67,
  Ne: 5.98,
  Ar: 16.2,
  Kr: 24.5,
  Xe: 32.7,
  H2: 6.12,
  D2: 6.84,
  N2: 18.5,
  O2: 16.3,
  air: 19.7,
  CO: 18.0,
  CO2: 26.9,
  N2O: 35.9,
  NH3: 20.7,
  H2O: 13.1,
  SF6: 71.3,
  Cl2: 38.4,
  Br2: 69.0,
  SO2: 41.8,
}

/** Atomic increments for all others [cm3 mol-1]. Source: as above. */
const ATOMS: Readonly<Record<string, number>> = {
  C: 15.9,
  H: 2.31,
  O: 6.11,
  N: 4.54,
  F: 14.7,
  Cl: 21.0,
  Br: 21.9,
  I: 29.8,
  S: 22.9,
}
const RING = -18.3

/**
 * Diffusion volume of a species for the Fuller-Schettler-Giddings estimate.
 *
 * Tabulated for simple molecules, else the sum of atomic increments.
 * Source: Fuller, Ensley and Giddings, J. Phys. Chem. 73 (1969) 3679; Poling, Prausnitz and O'Connell, 5th edition, table 11-1.
 *
 * @param species - formula, or `air` [-]
 * @param rings - aromatic or heterocyclic rings in the molecule [-]
 * @returns diffusion volume [cm3 mol-1]; null where an element has no increment, or the text is no formula
 * @example CH4 is 25.14
 */
export function diffusionVolume(species: string, rings = 0): number | null {
  const tabulated = Object.hasOwn(MOLECULES, species) ? MOLECULES[species] : undefined
  if (tabulated !== undefined) return tabulated
  const atoms = atomsOf(species)
  if (atoms === null) return null
  let sum = rings * RING
  for (const [element, count] of Object.entries(atoms)) {
    const increment = Object.hasOwn(ATOMS, element) ? ATOMS[element] : undefined
    if (increment === undefined) return null
    sum += count * increment
  }
  return sum
}

function atomsOf(species: string): Readonly<Record<string, number>> | null {
  try {
    return elementCount(species)
  } catch (error) {
    if (error instanceof AnalysisError) return null
    throw error
  }
}
