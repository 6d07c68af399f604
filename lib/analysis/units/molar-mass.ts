import { AnalysisError } from '../analysis-error'
import { elementCount } from '../element-count'

/** Standard atomic weights, conventional values [g mol-1]. Source: IUPAC, Standard atomic weights of the elements 2021. */
export const ATOMIC_WEIGHTS_G_PER_MOL: Readonly<Record<string, number>> = {
  H: 1.008,
  He: 4.002602,
  Li: 6.94,
  B: 10.81,
  C: 12.011,
  N: 14.007,
  O: 15.999,
  F: 18.998403162,
  Ne: 20.1797,
  Na: 22.98976928,
  Mg: 24.305,
  Al: 26.9815384,
  Si: 28.085,
  P: 30.973761998,
  S: 32.06,
  Cl: 35.45,
  Ar: 39.95,
  K: 39.0983,
  Ca: 40.078,
  Ti: 47.867,
  V: 50.9415,
  Cr: 51.9961,
  Mn: 54.938043,
  Fe: 55.845,
  Co: 58.933194,
  Ni: 58.6934,
  Cu: 63.546,
  Zn: 65.38,
  Ga: 69.723,
  Ge: 72.63,
  Se: 78.971,
  Br: 79.904,
  Kr: 83.798,
  Sr: 87.62,
  Y: 88.905838,
  Zr: 91.224,
  Nb: 92.90637,
  Mo: 95.95,
  Ru: 101.07,
  Rh: 102.90549,
  Pd: 106.42,
  Ag: 107.8682,
  Cd: 112.414,
  In: 114.818,
  Sn: 118.71,
  Sb: 121.76,
  Te: 127.6,
  I: 126.90447,
  Xe: 131.293,
  Cs: 132.90545196,
  Ba: 137.327,
  La: 138.90547,
  Ce: 140.116,
  Pr: 140.90766,
  Nd: 144.242,
  Sm: 150.36,
  Gd: 157.25,
  Hf: 178.486,
  Ta: 180.94788,
  W: 183.84,
  Re: 186.207,
  Os: 190.23,
  Ir: 192.217,
  Pt: 195.084,
  Au: 196.96657,
  Hg: 200.592,
  Pb: 207.2,
  Bi: 208.9804,
}

/** Dry air. Source: ISO 2533:1975. */
const AIR_G_PER_MOL = 28.9644

/**
 * Molar mass of a species from its formula.
 *
 * M = Σ n_i A_i
 *
 * Natural isotopic composition. `air` stands for dry air.
 * Source: IUPAC, Standard atomic weights of the elements 2021; ISO 2533:1975 for air.
 *
 * @param species - formula, or `air` [-]
 * @returns molar mass [kg mol-1]
 * @throws {AnalysisError} unknown-species when the text is not a formula of known elements
 * @example CO2 is 0.044009 kg mol-1
 */
export function molarMass(species: string): number {
  if (species === 'air') return AIR_G_PER_MOL / 1_000
  let sum = 0
  for (const [element, count] of Object.entries(elementCount(species))) {
    const weight = Object.hasOwn(ATOMIC_WEIGHTS_G_PER_MOL, element) ? ATOMIC_WEIGHTS_G_PER_MOL[element] : undefined
    if (weight === undefined)
      throw new AnalysisError(
        'unknown-species',
        `“${element}” in “${species}” is not a known element; enter the molar mass.`,
        { species },
      )
    sum += count * weight
  }
  return sum / 1_000
}
