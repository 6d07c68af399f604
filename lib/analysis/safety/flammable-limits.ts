import { type Species } from '../reduction/run-input'

/** Flammable range in air at about 25 °C and 1 atm, as mole fractions. */
export interface FlammableRange {
  readonly lower: number
  readonly upper: number
  /** standard and edition the range is printed in */
  readonly edition: string
}

const NFPA = 'NFPA 497:2008'
const IEC = 'IEC 60079-20-1:2010'
const NFPA_AND_IEC = `${NFPA} and ${IEC}`

const range = (lowerPercent: number, upperPercent: number, edition: string): FlammableRange => ({
  lower: lowerPercent / 100,
  upper: upperPercent / 100,
  edition,
})

/** Flammable ranges in air by species. The two standards differ, so both stand here. Source: NFPA 497:2008; IEC 60079-20-1:2010. */
export const FLAMMABLE_RANGES: Readonly<Record<Species, readonly FlammableRange[]>> = {
  H2: [range(4, 75, NFPA), range(4, 77, IEC)],
  CO: [range(12.5, 74, NFPA), range(10.9, 74, IEC)],
  CH4: [range(5, 15, NFPA), range(4.4, 17, IEC)],
  C2H4: [range(2.7, 36, NFPA), range(2.3, 36, IEC)],
  C2H6: [range(3, 12.5, NFPA), range(2.4, 15.5, IEC)],
  C3H8: [range(2.1, 9.5, NFPA), range(1.7, 10.9, IEC)],
  C3H6: [range(2.4, 10.3, NFPA), range(2, 11.1, IEC)],
  NH3: [range(15, 28, NFPA), range(15, 33.6, IEC)],
  H2S: [range(4, 44, NFPA), range(4, 45.5, IEC)],
  CH3OH: [range(6, 36, NFPA_AND_IEC)],
  HCOOH: [range(18, 57, NFPA_AND_IEC)],
  CH3OCH3: [range(3.4, 27, NFPA), range(2.7, 32, IEC)],
}

/** Species that support combustion; limits in air do not hold for those other than oxygen. */
export const OXIDISERS: readonly Species[] = ['O2', 'air', 'N2O', 'NO', 'NO2', 'O3']

/** Gases of the trade that do not burn in air. A species in neither list may burn and is said to. */
export const NOT_COMBUSTIBLE: readonly Species[] = [
  'N2',
  'Ar',
  'He',
  'Ne',
  'Kr',
  'Xe',
  'CO2',
  'H2O',
  'SO2',
  'SF6',
  ...OXIDISERS,
]

/**
 * The widest flammable range that the editions give for a species: lowest lower and highest upper limit.
 *
 * In air, about 25 °C and 1 atm. Hotter gas, higher pressure and more oxygen than air widen the range; nothing is computed for them here.
 * Source: NFPA 497:2008; IEC 60079-20-1:2010.
 *
 * @param species - formula [-]
 * @returns lower and upper limit as mole fractions in air [-] with the edition each is from; null where none is tabulated
 * @example propane: 0.017 (IEC) to 0.109 (IEC)
 */
export function widestFlammableRange(species: Species): {
  readonly lower: number
  readonly upper: number
  readonly lowerEdition: string
  readonly upperEdition: string
} | null {
  const ranges = Object.hasOwn(FLAMMABLE_RANGES, species) ? (FLAMMABLE_RANGES[species] ?? []) : []
  let lowest: FlammableRange | undefined
  let highest: FlammableRange | undefined
  for (const candidate of ranges) {
    if (lowest === undefined || candidate.lower < lowest.lower) lowest = candidate
    if (highest === undefined || candidate.upper > highest.upper) highest = candidate
  }
  if (lowest === undefined || highest === undefined) return null
  return { lower: lowest.lower, upper: highest.upper, lowerEdition: lowest.edition, upperEdition: highest.edition }
}
