import { type Caution } from '../caution'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { adiabaticRise } from './adiabatic-rise'
import { flammabilityCautions } from './flammability-cautions'
import { gasHazardCautions } from './gas-hazard-cautions'
import { type PlannedRunInput } from './planned-run-input'

/** Sentence that stands with every list of safety cautions, and the only one when there are none. */
export const STANDING_SENTENCE =
  'Indicative values for planning only. Limits change with temperature, pressure, oxidant, vessel and edition of the standard. Local codes, the safety data sheet and a competent or licensed person decide.'

/** Adiabatic rise from which it is pointed out [K]. */
export const ADIABATIC_RISE_LIMIT_K = 50
/** Tube diameters per particle below which gas slips along the wall. */
export const TUBE_PER_PARTICLE_LIMIT = 10
/** Bed lengths per particle below which the bed is too short to count as plug flow. */
export const BED_PER_PARTICLE_LIMIT = 50
/** Share of the rig's limit from which the distance is pointed out. */
const NEAR_LIMIT = 0.9
const FEED_SUM_TOLERANCE = 0.005
const MONATOMIC = ['He', 'Ne', 'Ar', 'Kr', 'Xe']

/**
 * Everything to point out about a planned run before it starts: fire, poison, deposits, heat, the rig's limits and the bed.
 *
 * Built for the form in which a run is logged. It informs and never certifies; the last entry is always the standing sentence that local
 * codes, the safety data sheet and a competent or licensed person decide.
 * Source: see the single cautions.
 *
 * @param input - the planned run: feed as mole fractions [-], temperatures [K], absolute pressure [Pa], limits of the rig [Pa, K], reaction enthalpy [J mol-1], lengths [m]
 * @returns cautions, grave ones first, the standing sentence last [-]
 */
export function plannedRunCautions(input: PlannedRunInput): Caution[] {
  const cautions = [
    ...rigCautions(input),
    ...flammabilityCautions(input),
    ...gasHazardCautions(input),
    ...heatCautions(input),
    ...bedCautions(input),
    ...feedCautions(input),
  ]
  const weight = { grave: 0, caution: 1, note: 2 }
  return [...cautions.sort((a, b) => weight[a.severity] - weight[b.severity]), standing()]
}

function standing(): Caution {
  return caution('standing-sentence', 'note', 'for planning only', STANDING_SENTENCE, null, null, '', 'common practice')
}

function rigCautions({ pressurePa, temperatureRangeK, rigLimits }: PlannedRunInput): Caution[] {
  const cautions: Caution[] = []
  const maximumPa = rigLimits.maximumPressurePa
  if (pressurePa !== null && maximumPa !== null && pressurePa > NEAR_LIMIT * maximumPa)
    cautions.push(
      caution(
        pressurePa > maximumPa ? 'over-pressure' : 'near-pressure-limit',
        pressurePa > maximumPa ? 'grave' : 'caution',
        pressurePa > maximumPa ? 'above the rig’s pressure' : 'near the rig’s pressure',
        `${bar(pressurePa)} is planned and the rig is entered for at most ${bar(maximumPa)} (absolute). ${pressurePa > maximumPa ? 'Do not start. ' : 'A blocked outlet reaches the limit quickly. '}Sizing and setting of the relief belong to a qualified person.`,
        pressurePa,
        maximumPa,
        'Pa',
        'limit entered for the rig',
      ),
    )
  const hottestK = temperatureRangeK?.high ?? null
  const maximumK = rigLimits.maximumTemperatureK
  if (hottestK !== null && maximumK !== null && hottestK > maximumK)
    cautions.push(
      caution(
        'over-temperature',
        'grave',
        'above the rig’s temperature',
        `${celsius(hottestK)} is planned and the rig is entered for at most ${celsius(maximumK)}. Do not start.`,
        hottestK,
        maximumK,
        'K',
        'limit entered for the rig',
      ),
    )
  return cautions
}

function heatCautions(input: PlannedRunInput): Caution[] {
  const enthalpy = input.reactionEnthalpyJPerMol ?? null
  const share = input.feed.find(({ species }) => species === input.keyReactant)?.moleFraction ?? 0
  const total = input.feed.reduce((sum, { moleFraction }) => sum + moleFraction, 0)
  if (enthalpy === null || !(share > 0 && share <= 1) || !(total > 0)) return []
  const stated = input.feedHeatCapacityJPerMolK ?? null
  const heatCapacity = stated !== null && stated > 0 ? stated : lowestHeatCapacity(input.feed, total)
  const rise = adiabaticRise(share, enthalpy, heatCapacity)
  if (!(rise > ADIABATIC_RISE_LIMIT_K)) return []
  const basis =
    stated !== null && stated > 0
      ? ''
      : ', taken with the lowest heat capacity such gases can have and so too high rather than too low'
  return [
    caution(
      'adiabatic-rise',
      'caution',
      `adiabatic rise ${rise.toFixed(0)} K`,
      `If all ${input.keyReactant} reacted and no heat were lost, the gas would become ${rise.toFixed(0)} K hotter${basis}; above ${String(ADIABATIC_RISE_LIMIT_K)} K the bed can run away from its set-point. Dilute the feed or the bed, approach the temperature slowly, and set an independent over-temperature trip.`,
      rise,
      ADIABATIC_RISE_LIMIT_K,
      'K',
      'energy balance; threshold common practice',
    ),
  ]
}

// 5/2 R for monatomic gases and 7/2 R for all others: no gas has less, so the rise is never understated.
function lowestHeatCapacity(feed: PlannedRunInput['feed'], total: number): number {
  const inR = feed.reduce(
    (sum, { species, moleFraction }) => sum + moleFraction * (MONATOMIC.includes(species) ? 2.5 : 3.5),
    0,
  )
  return (inR / total) * GAS_CONSTANT_J_PER_MOL_K
}

function bedCautions({ particleDiameterM, tubeInnerDiameterM, bedLengthM }: PlannedRunInput): Caution[] {
  const particle = particleDiameterM ?? null
  if (particle === null || !(particle > 0)) return []
  const cautions: Caution[] = []
  const acrossTube = (tubeInnerDiameterM ?? NaN) / particle
  if (acrossTube < TUBE_PER_PARTICLE_LIMIT)
    cautions.push(
      caution(
        'tube-per-particle',
        'caution',
        `tube ${acrossTube.toFixed(1)} particles wide`,
        `The tube is ${acrossTube.toFixed(1)} particles wide; below ${String(TUBE_PER_PARTICLE_LIMIT)} gas slips along the wall and the conversion reads low. Use a finer sieve fraction.`,
        acrossTube,
        TUBE_PER_PARTICLE_LIMIT,
        '1',
        'common practice',
      ),
    )
  const alongBed = (bedLengthM ?? NaN) / particle
  if (alongBed < BED_PER_PARTICLE_LIMIT)
    cautions.push(
      caution(
        'bed-per-particle',
        'caution',
        `bed ${alongBed.toFixed(0)} particles long`,
        `The bed is ${alongBed.toFixed(0)} particles long; below ${String(BED_PER_PARTICLE_LIMIT)} back-mixing can matter. Use a finer sieve fraction or more diluent.`,
        alongBed,
        BED_PER_PARTICLE_LIMIT,
        '1',
        'common practice',
      ),
    )
  return cautions
}

function feedCautions({ feed, keyReactant }: PlannedRunInput): Caution[] {
  if (feed.length === 0) return []
  const cautions: Caution[] = []
  const total = feed.reduce((sum, { moleFraction }) => sum + moleFraction, 0)
  if (Math.abs(total - 1) > FEED_SUM_TOLERANCE)
    cautions.push(
      caution(
        'feed-sum',
        'caution',
        `feed adds up to ${(100 * total).toFixed(1)} %`,
        `The feed adds up to ${(100 * total).toFixed(1)} % and not to 100 %; the cautions here are computed from the fractions as entered. Check them, the inert gas included.`,
        total,
        1,
        'mole fraction',
        'common practice',
      ),
    )
  if (!feed.some(({ species, moleFraction }) => species === keyReactant && moleFraction > 0))
    cautions.push(
      caution(
        'no-key-reactant',
        'caution',
        `no ${keyReactant} in the feed`,
        `The reaction's key reactant ${keyReactant} is not in the feed; no conversion can be computed.`,
        0,
        null,
        'mole fraction',
        'common practice',
      ),
    )
  return cautions
}

function caution(
  code: string,
  severity: Caution['severity'],
  tag: string,
  sentence: string,
  value: number | null,
  limit: number | null,
  unit: string,
  source: string,
): Caution {
  return { code, severity, tag, sentence, value, limit, unit, source, holdNumber: null }
}

function bar(pascal: number): string {
  return `${(pascal / 1e5).toFixed(2)} bar`
}

function celsius(kelvin: number): string {
  return `${(kelvin - 273.15).toFixed(0)} °C`
}
