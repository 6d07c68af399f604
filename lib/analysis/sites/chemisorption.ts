import { AnalysisError } from '../analysis-error'
import { fitWeightedLine } from '../statistics/weighted-line'

/** One point of an uptake isotherm. */
export interface UptakePoint {
  readonly pressurePa: number
  readonly uptakeMolPerKg: number
}

/** Monolayer uptake. */
export interface MonolayerUptake {
  readonly uptakeMolPerKg: number
  /** null with two points on the straight part */
  readonly standardUncertaintyMolPerKg: number | null
  readonly degreesOfFreedom: number
  /** of the straight part: weak uptake by the support and the gas phase */
  readonly slopeMolPerKgPa: number
  readonly pointsUsed: number
}

/** Metal atoms per molecule of probe gas, with what to mind. Source: Scholten, Pijpers and Hustings, Catal. Rev. 27 (1985) 151; Benson and Boudart, J. Catal. 4 (1965) 704 (titration). */
export const PROBE_STOICHIOMETRY: Readonly<
  Record<string, { readonly atomsPerMolecule: number; readonly remark: string }>
> = {
  H2: {
    atomsPerMolecule: 2,
    remark:
      'Dissociative. Above one atom a metal atom on small clusters; palladium forms a hydride; cobalt and ruthenium need activation.',
  },
  'CO-linear': { atomsPerMolecule: 1, remark: 'Not for nickel or iron near ambient temperature: carbonyls.' },
  'CO-bridged': { atomsPerMolecule: 2, remark: 'Usual on palladium, 1 to 2.' },
  'CO-twin': { atomsPerMolecule: 0.5, remark: 'Two molecules a metal atom, on highly dispersed rhodium.' },
  O2: { atomsPerMolecule: 2, remark: 'Oxidation below the surface is a risk.' },
  'H2-titration-of-O': {
    atomsPerMolecule: 2 / 3,
    remark: 'Platinum covered with oxygen, per molecule of hydrogen used.',
  },
  N2O: { atomsPerMolecule: 2, remark: 'Copper, at 90 °C or below.' },
}

/**
 * Monolayer uptake by extrapolation of the straight high-pressure part of an isotherm to zero pressure.
 *
 * q(p) = q_m + b p for p ≥ p_low; q_m is the intercept
 *
 * The knee of the isotherm is not read: weak uptake by the support adds to it.
 * Source: ASTM D3908-03; Scholten, Pijpers and Hustings, Catal. Rev. 27 (1985) 151.
 *
 * @param points - isotherm: pressure [Pa] >= 0, uptake [mol kg-1]
 * @param straightFromPa - lowest pressure of the straight part [Pa]
 * @returns uptake with standard uncertainty [mol kg-1]; n − 2 degrees of freedom
 * @throws {AnalysisError} too-few-points with fewer than 2 points on the straight part | as the line fit
 */
export function monolayerUptake(points: readonly UptakePoint[], straightFromPa: number): MonolayerUptake {
  const used = points.filter(({ pressurePa }) => pressurePa >= straightFromPa * (1 - 1e-12))
  if (used.length < 2)
    throw new AnalysisError('too-few-points', 'The straight part of the isotherm needs at least two points.', {
      count: used.length,
    })
  const line = fitWeightedLine(
    used.map(({ pressurePa }) => pressurePa),
    used.map(({ uptakeMolPerKg }) => uptakeMolPerKg),
    null,
  )
  return {
    uptakeMolPerKg: line.intercept,
    standardUncertaintyMolPerKg: line.scaled?.intercept ?? null,
    degreesOfFreedom: line.degreesOfFreedom,
    slopeMolPerKgPa: line.slope,
    pointsUsed: used.length,
  }
}

/**
 * Surface metal atoms per mass of catalyst from an uptake.
 *
 * n_s = S_F q
 *
 * Source: Scholten, Pijpers and Hustings, Catal. Rev. 27 (1985) 151.
 *
 * @param uptakeMolPerKg - irreversible monolayer uptake of gas [mol kg-1]
 * @param atomsPerMolecule - S_F, metal atoms per gas molecule [-] > 0
 * @returns surface sites [mol kg-1]
 * @throws {AnalysisError} not-positive for a stoichiometry not above zero
 */
export function surfaceSites(uptakeMolPerKg: number, atomsPerMolecule: number): number {
  if (!(atomsPerMolecule > 0))
    throw new AnalysisError('not-positive', 'The stoichiometry must be above zero.', { atomsPerMolecule })
  return atomsPerMolecule * uptakeMolPerKg
}
