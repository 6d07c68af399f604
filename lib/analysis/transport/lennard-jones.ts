/** Parameters of the Lennard-Jones potential. */
export interface LennardJones {
  readonly diameterAngstrom: number
  readonly wellK: number
}

const pair = (diameterAngstrom: number, wellK: number): LennardJones => ({ diameterAngstrom, wellK })

/**
 * Collision diameter and well depth of gases of the trade.
 * Source: Svehla, NASA TR R-132, 1962, as in Poling, Prausnitz and O'Connell, The Properties of Gases and Liquids, 5th edition, appendix B.
 */
export const LENNARD_JONES: Readonly<Record<string, LennardJones>> = {
  He: pair(2.551, 10.22),
  Ne: pair(2.82, 32.8),
  Ar: pair(3.542, 93.3),
  Kr: pair(3.655, 178.9),
  Xe: pair(4.047, 231),
  air: pair(3.711, 78.6),
  H2: pair(2.827, 59.7),
  N2: pair(3.798, 71.4),
  O2: pair(3.467, 106.7),
  CO: pair(3.69, 91.7),
  CO2: pair(3.941, 195.2),
  CH4: pair(3.758, 148.6),
  H2O: pair(2.641, 809.1),
  NH3: pair(2.9, 558.3),
  NO: pair(3.492, 116.7),
  N2O: pair(3.828, 232.4),
  SO2: pair(4.112, 335.4),
  H2S: pair(3.623, 301.1),
  C2H2: pair(4.033, 231.8),
  C2H4: pair(4.163, 224.7),
  C2H6: pair(4.443, 215.7),
  C3H6: pair(4.678, 298.9),
  C3H8: pair(5.118, 237.1),
  CH3OH: pair(3.626, 481.8),
  CH3OCH3: pair(4.307, 395),
}
