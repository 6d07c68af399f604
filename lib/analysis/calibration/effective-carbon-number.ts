import { AnalysisError } from '../analysis-error'

/** Contribution of each group to the effective carbon number. Source: Sternberg, Gallaway and Jones 1962; Scanlon and Willis, J. Chromatogr. Sci. 23 (1985) 333. */
export const CARBON_CONTRIBUTIONS = {
  'aliphatic-carbon': 1,
  'aromatic-carbon': 1,
  'olefinic-carbon': 0.95,
  'acetylenic-carbon': 1.3,
  'carbonyl-carbon': 0,
  'carboxyl-carbon': 0,
  'nitrile-carbon': 0.3,
  'ether-oxygen': -1,
  'primary-alcohol-oxygen': -0.55,
  'secondary-alcohol-oxygen': -0.75,
  'tertiary-alcohol-oxygen': -0.25,
  'ester-oxygen': -0.25,
} as const

/** One of the groups in {@link CARBON_CONTRIBUTIONS}. */
export type CarbonGroup = keyof typeof CARBON_CONTRIBUTIONS

/** Relative standard uncertainty of a response from the rule, and of one for a light oxygenate (two or three carbon atoms). */
export const CARBON_NUMBER_RELATIVE_STANDARD_UNCERTAINTY = { usual: 0.07, lightOxygenate: 0.2 } as const

/**
 * Effective carbon number of a compound in a flame-ionisation detector, relative to an alkane.
 *
 * N_eff = Σ count × contribution
 *
 * A rule for compounds without a standard: 7 % doubt, 20 % for oxygenates with two or three carbon atoms. Compounds of one carbon atom with oxygen
 * (methanol, formaldehyde, formic acid, carbon oxides) are refused: calibrate them. Check against a calibration before use.
 * Source: Scanlon and Willis, J. Chromatogr. Sci. 23 (1985) 333.
 *
 * @param groups - count of each group in the molecule [-]
 * @returns effective carbon number [-] and its relative standard uncertainty [-]
 * @throws {AnalysisError} out-of-range for a compound of one carbon atom with oxygen, or when the sum is not above zero
 * @example ethanol, two aliphatic carbons and a primary alcohol: 1.45 with 20 %
 */
export function effectiveCarbonNumber(groups: Readonly<Partial<Record<CarbonGroup, number>>>): {
  readonly value: number
  readonly relativeStandardUncertainty: number
} {
  let value = 0
  let carbons = 0
  let isOxygenate = false
  for (const name of Object.keys(CARBON_CONTRIBUTIONS)) {
    if (!isCarbonGroup(name)) continue
    const count = groups[name] ?? 0
    value += count * CARBON_CONTRIBUTIONS[name]
    if (name.endsWith('carbon')) carbons += count
    if (count > 0 && (name.endsWith('oxygen') || name === 'carbonyl-carbon' || name === 'carboxyl-carbon'))
      isOxygenate = true
  }
  if (isOxygenate && carbons <= 1)
    throw new AnalysisError(
      'out-of-range',
      'Compounds of one carbon atom with oxygen do not follow the rule; calibrate them.',
      { carbons },
    )
  if (!(value > 0))
    throw new AnalysisError('out-of-range', 'The detector would not see this compound by the rule; calibrate it.', {
      value,
    })
  const { usual, lightOxygenate } = CARBON_NUMBER_RELATIVE_STANDARD_UNCERTAINTY
  return { value, relativeStandardUncertainty: isOxygenate && carbons <= 3 ? lightOxygenate : usual }
}

function isCarbonGroup(name: string): name is CarbonGroup {
  return Object.hasOwn(CARBON_CONTRIBUTIONS, name)
}
