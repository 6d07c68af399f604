import { type Caution } from '../caution'
import { type Species } from '../reduction/run-input'
import { NOT_COMBUSTIBLE, OXIDISERS, widestFlammableRange } from './flammable-limits'
import { mixtureFlammableLimit } from './mixture-flammable-limit'
import { type PlannedRunInput } from './planned-run-input'

/** Share of the lower limit from which fuel with an oxidiser is pointed out. Source: common practice, a quarter of the lower limit. */
export const FUEL_SHARE_OF_LOWER_LIMIT = 0.25
const OXYGEN_IN_AIR = 0.2095
/** Oxygen content above which gas counts as oxygen-enriched. Source: Compressed Gas Association G-4, 23.5 %. */
export const OXYGEN_ENRICHED = 0.235

const LIMITS_SOURCE = 'Le Chatelier 1891; limits in air of NFPA 497:2008 and IEC 60079-20-1:2010, the wider of the two'
const WIDER =
  'These limits are for air at about 25 °C and 1 atm: hotter gas, higher pressure and more oxygen widen the range.'

/**
 * Cautions about fire and explosion for a planned feed.
 *
 * Fuel fraction of the whole feed against the lower limit of the fuel mixture: above a quarter of it with an oxidiser present is pointed out,
 * between the limits is grave. Dilution with inert gas narrows the range, which is not counted on.
 * Source: Le Chatelier 1891; NFPA 497:2008; IEC 60079-20-1:2010.
 *
 * @param input - the planned run: feed as mole fractions [-], temperatures [K], pressure [Pa]
 * @returns cautions, possibly none [-]; they inform and never certify
 */
export function flammabilityCautions(input: PlannedRunInput): Caution[] {
  const feed = input.feed.filter(({ moleFraction }) => moleFraction > 0)
  const oxidisers = feed.filter(({ species }) => OXIDISERS.includes(species))
  const fuels = feed.filter(({ species }) => !NOT_COMBUSTIBLE.includes(species))
  const cautions: Caution[] = []
  const unknown = fuels.filter(({ species }) => widestFlammableRange(species) === null).map(({ species }) => species)
  if (unknown.length > 0)
    cautions.push({
      code: 'flammable-limits-unknown',
      severity: 'caution',
      tag: `no limits for ${unknown.join(', ')}`,
      sentence: `No flammable limits are tabulated here for ${inWords(unknown)}; take ${unknown.length === 1 ? 'it' : 'them'} as flammable and look the limits up on the safety data sheet.`,
      value: null,
      limit: null,
      unit: '',
      source: 'NFPA 497:2008; IEC 60079-20-1:2010',
      holdNumber: null,
    })
  if (oxidisers.length > 0 && fuels.length > 0) cautions.push(...mixtureCautions(fuels, oxidisers, unknown))
  if (oxidisers.length === 0 && fuels.length > 0) cautions.push(leakCaution(fuels.map(({ species }) => species)))
  cautions.push(...oxygenCautions(feed))
  return cautions
}

type Share = { readonly species: Species; readonly moleFraction: number }

function mixtureCautions(fuels: readonly Share[], oxidisers: readonly Share[], unknown: readonly Species[]): Caution[] {
  const known = fuels.flatMap(({ species, moleFraction }) => {
    const range = widestFlammableRange(species)
    return range === null ? [] : [{ amount: moleFraction, range }]
  })
  if (known.length === 0) return []
  const lower = mixtureFlammableLimit(known.map(({ amount, range }) => ({ amount, limit: range.lower })))
  const upper = mixtureFlammableLimit(known.map(({ amount, range }) => ({ amount, limit: range.upper })))
  const fuel = fuels.reduce((sum, { moleFraction }) => sum + moleFraction, 0)
  const isOnlyOxygen = oxidisers.every(({ species }) => species === 'O2' || species === 'air')
  const otherOxidiser = isOnlyOxygen
    ? ''
    : ` The limits are for air; with ${inWords(oxidisers.map(({ species }) => species).filter((species) => species !== 'O2' && species !== 'air'))} they are different and can be wider.`
  const unknownFuel = unknown.length === 0 ? '' : ` ${inWords(unknown)} could not be counted in the limits.`
  const common = { value: fuel, unit: 'mole fraction', source: LIMITS_SOURCE, holdNumber: null }
  const what = `${percent(fuel)} fuel (${inWords(fuels.map(({ species }) => species))}) with ${inWords(oxidisers.map(({ species }) => species))}`
  if (fuel >= lower && fuel <= upper)
    return [
      {
        ...common,
        code: 'flammable-inside',
        severity: 'grave',
        tag: 'feed can burn',
        limit: lower,
        sentence: `The feed has ${what}: inside the flammable range of ${percent(lower)} to ${percent(upper)} in air. Do not start without the lead's written decision. ${WIDER}${otherOxidiser}${unknownFuel}`,
      },
    ]
  if (fuel > upper)
    return [
      {
        ...common,
        code: 'flammable-above-upper',
        severity: 'grave',
        tag: 'fuel above the upper limit',
        limit: upper,
        sentence: `The feed has ${what}: above the upper limit of ${percent(upper)} in air, which Le Chatelier's rule gives only roughly. Starting, stopping and a blocked fuel line pass through the flammable range. Do not start without the lead's written decision. ${WIDER}${otherOxidiser}${unknownFuel}`,
      },
    ]
  if (fuel > FUEL_SHARE_OF_LOWER_LIMIT * lower || !isOnlyOxygen || unknown.length > 0)
    return [
      {
        ...common,
        code: 'flammable-near',
        severity: 'caution',
        tag: `fuel ${(100 * (fuel / lower)).toFixed(0)} % of lower limit`,
        limit: FUEL_SHARE_OF_LOWER_LIMIT * lower,
        sentence: `The feed has ${what}: ${(100 * (fuel / lower)).toFixed(0)} % of the lower flammable limit of ${percent(lower)} in air; the usual bound is ${(100 * FUEL_SHARE_OF_LOWER_LIMIT).toFixed(0)} % of it. A wrong flow of one controller can bring the feed into the range. ${WIDER}${otherOxidiser}${unknownFuel}`,
      },
    ]
  return []
}

function leakCaution(fuels: readonly Species[]): Caution {
  const ranges = fuels.flatMap((species) => {
    const range = widestFlammableRange(species)
    return range === null ? [] : [`${species} ${percent(range.lower)} to ${percent(range.upper)}`]
  })
  const hydrogen = fuels.includes('H2') ? ' Hydrogen ignites very easily and needs a leak test of its own.' : ''
  return {
    code: 'flammable-feed',
    severity: 'note',
    tag: 'flammable feed',
    sentence: `The feed burns when it meets air (${ranges.length === 0 ? 'limits on the safety data sheet' : ranges.join('; ')}). Leak-test before heating, purge with inert gas before and after, and vent the outlet to where it is allowed.${hydrogen}`,
    value: null,
    limit: null,
    unit: '',
    source: 'NFPA 497:2008; IEC 60079-20-1:2010',
    holdNumber: null,
  }
}

function oxygenCautions(feed: readonly Share[]): Caution[] {
  const oxygen = feed.reduce(
    (sum, { species, moleFraction }) =>
      sum + (species === 'O2' ? moleFraction : species === 'air' ? OXYGEN_IN_AIR * moleFraction : 0),
    0,
  )
  if (oxygen <= OXYGEN_ENRICHED) return []
  return [
    {
      code: 'oxygen-enriched',
      severity: 'caution',
      tag: `${(100 * oxygen).toFixed(0)} % oxygen`,
      sentence: `The feed has ${percent(oxygen)} oxygen, more than air: flammable limits widen, and grease, unsuitable seals and steel dust can burn in the lines. Use parts cleaned for oxygen.`,
      value: oxygen,
      limit: OXYGEN_ENRICHED,
      unit: 'mole fraction',
      source: 'Compressed Gas Association G-4',
      holdNumber: null,
    },
  ]
}

function percent(fraction: number): string {
  return `${(100 * fraction)
    .toPrecision(3)
    .replace(/(\.\d*?)0+$/, '$1')
    .replace(/\.$/, '')} %`
}

function inWords(names: readonly string[]): string {
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names[names.length - 1] ?? ''}`
}
