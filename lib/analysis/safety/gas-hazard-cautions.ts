import { type Caution } from '../caution'
import { CARBONYLS, EXPOSURE_LIMITS, EXPOSURE_LIST } from './exposure-limits'
import { type PlannedRunInput } from './planned-run-input'

/** Below this temperature carbon monoxide over some metals makes volatile carbonyls [K]. Source: common practice, about 200 °C. */
export const CARBONYL_TEMPERATURE_K = 473.15
/** Above this temperature hydrogen can attack carbon steel [K]. Source: American Petroleum Institute RP 941, lowest lines at about 204 °C. */
export const HYDROGEN_ATTACK_TEMPERATURE_K = 477.15

const PYROPHORIC = ['Ni', 'Co', 'Fe', 'Cu', 'Ru', 'Pd', 'Pt', 'Mo']

/**
 * Cautions about toxic gases, carbonyls, hydrogen, solid deposits and the used catalyst for a planned run.
 *
 * Species count when they are fed or can be made. Words only: no concentrations in the room are computed.
 * Source: Ontario Regulation 833; API RP 941; common practice.
 *
 * @param input - the planned run: feed as mole fractions [-], temperatures [K], pressure [Pa]
 * @returns cautions, possibly none [-]; they inform and never certify
 */
export function gasHazardCautions(input: PlannedRunInput): Caution[] {
  const fed = input.feed.filter(({ moleFraction }) => moleFraction > 0).map(({ species }) => species)
  const present = [...new Set([...fed, ...input.productsPossible])]
  const metals = metalsIn(input.activeMetal)
  const has = (...species: string[]) => species.some((name) => present.includes(name))
  const cautions: Caution[] = []
  const add = (code: string, severity: Caution['severity'], tag: string, sentence: string, source: string) =>
    cautions.push({ code, severity, tag, sentence, value: null, limit: null, unit: '', source, holdNumber: null })

  for (const species of present) {
    const limit = Object.hasOwn(EXPOSURE_LIMITS, species) ? EXPOSURE_LIMITS[species] : undefined
    if (limit === undefined) continue
    const shortTerm = limit.shortTerm === null ? '' : `, ${ppm(limit.shortTerm)} short-term`
    add(
      `toxic-${species}`,
      'caution',
      `${species} is toxic`,
      `${species} is ${fed.includes(species) ? 'in the feed' : 'a possible product'} and toxic: exposure limit ${ppm(limit.average)} as an average${shortTerm} on the list named here. ${limit.remark}${limit.remark === '' ? '' : ' '}Work with a gas detector and a vented enclosure.`,
      EXPOSURE_LIST,
    )
  }
  cautions.push(...carbonylCautions(present, metals, input))
  const hottestK = input.temperatureRangeK?.high ?? null
  if (has('H2') && hottestK !== null && hottestK > HYDROGEN_ATTACK_TEMPERATURE_K)
    add(
      'hydrogen-steel',
      'note',
      'hydrogen on hot steel',
      'Hot hydrogen can make carbon steel brittle or attack it; whether the reactor material is allowed at this temperature and hydrogen pressure is read from the Nelson curves by a competent person.',
      'American Petroleum Institute RP 941',
    )
  if (has('NH3') && has('NO', 'NO2'))
    add(
      'ammonium-nitrate',
      'caution',
      'ammonium nitrate',
      'Ammonia and nitrogen oxides form ammonium nitrate and nitrite in cold parts of the line; these plug it and can explode. Keep the lines hot to the vent.',
      'common practice',
    )
  if (has('NH3') && has('CO2'))
    add(
      'ammonium-carbonate',
      'caution',
      'deposits in cold lines',
      'Ammonia, carbon dioxide and water form solid ammonium carbamate and bicarbonate below about 60 °C; they plug cold lines, valves and the analyser. Keep the lines hot to the vent.',
      'common practice',
    )
  if (has('C2H2') && metals.some((metal) => metal === 'Cu' || metal === 'Ag'))
    add(
      'acetylide',
      'grave',
      'explosive acetylide',
      "Acetylene over copper or silver, brass parts included, forms acetylides that explode when dry. Do not start without the lead's written decision.",
      'common practice',
    )
  if (metals.some((metal) => PYROPHORIC.includes(metal)) && has('H2', 'CO'))
    add(
      'pyrophoric',
      'note',
      'used catalyst may ignite',
      'Reduced metal on a support can ignite in air. Cool under inert gas and passivate with dilute oxygen before the reactor is opened; keep the used catalyst away from anything that burns.',
      'common practice',
    )
  return cautions
}

function carbonylCautions(present: readonly string[], metals: readonly string[], input: PlannedRunInput): Caution[] {
  if (!present.includes('CO')) return []
  const forming = metals.filter((metal) => Object.hasOwn(CARBONYLS, metal))
  if (forming.length === 0) return []
  const coldestK = input.temperatureRangeK?.low ?? null
  const isCold = coldestK === null || coldestK < CARBONYL_TEMPERATURE_K
  const names = forming.map((metal) => `${CARBONYLS[metal]?.formula ?? ''} (${CARBONYLS[metal]?.limit ?? ''})`)
  return [
    {
      code: 'carbonyl',
      severity: isCold ? 'grave' : 'caution',
      tag: `${forming.join(', ')} carbonyl`,
      sentence: `Carbon monoxide over ${forming.join(', ')} forms volatile, extremely poisonous carbonyls, ${names.join('; ')}, roughly below 200 °C and more so at higher pressure of carbon monoxide. ${isCold ? "The planned temperatures reach into that range, or were not given: do not start without the lead's written decision. " : ''}Sweep carbon monoxide out with inert gas before cooling below 200 °C, lead the outlet through a hot trap, and do not open the reactor before it is swept.`,
      value: coldestK,
      limit: CARBONYL_TEMPERATURE_K,
      unit: 'K',
      source: `common practice; exposure limits: ${EXPOSURE_LIST}`,
      holdNumber: null,
    },
  ]
}

// Element symbols in what a person wrote: `Ni-Fe`, `5 wt% Ni`, `Ni, Fe`.
function metalsIn(text: string): string[] {
  return [...text.matchAll(/(?<![A-Za-z])([A-Z][a-z]?)(?![a-z])/g)].flatMap((match) =>
    match[1] === undefined ? [] : [match[1]],
  )
}

function ppm(fraction: number): string {
  return `${String(Number((fraction * 1e6).toPrecision(6)))} ppm`
}
