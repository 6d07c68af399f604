import { type Caution } from '../caution'
import { heatCapacityOrLeast } from '../equilibrium/least-heat-capacity'
import { formatQuantity } from '../units/format-quantity'
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
/** Mass from which a test bed is unusual and the unit is asked about [kg]. */
export const CATALYST_MASS_LIMIT_KG = 0.01
/** Relative standard uncertainty of a weighing from which every rate is mostly doubt. */
export const WEIGHING_LIMIT = 0.2
/** Inner diameter from which a tube is unusual for a test rig [m]. */
export const TUBE_LIMIT_M = 0.05
/** Share of the rig's limit from which the distance is pointed out. */
const NEAR_LIMIT = 0.9
const FEED_SUM_TOLERANCE = 0.005
/** Temperature for heat capacities where none was planned [K]: low, since heat capacities rise with temperature. */
const COLDEST_USUAL_K = 298.15

/**
 * Everything to point out about a planned run before it starts: fire, poison, deposits, heat, the rig's limits and the bed.
 *
 * Built for the form in which a run is logged. It informs and never certifies; the last entry is always the standing sentence that local
 * codes, the safety data sheet and a competent or licensed person decide.
 * Source: see the single cautions.
 *
 * @param planned - the planned run: feed as mole fractions [-], temperatures [K], absolute pressure [Pa], limits of the rig [Pa, K], reaction enthalpy [J mol-1], lengths [m]
 * @returns cautions, grave ones first, the standing sentence last [-]
 */
export function plannedRunCautions(planned: PlannedRunInput): Caution[] {
  const input = withoutNonNumbers(planned)
  const cautions = [
    ...rigCautions(input),
    ...flammabilityCautions(input),
    ...gasHazardCautions(input),
    ...heatCautions(input),
    ...bedCautions(input),
    ...unusualFigureCautions(input),
    ...feedCautions(input),
  ]
  const weight = { grave: 0, caution: 1, note: 2 }
  return [...cautions.sort((a, b) => weight[a.severity] - weight[b.severity]), standing()]
}

// A field that holds no number yet counts as not filled in.
function withoutNonNumbers(planned: PlannedRunInput): PlannedRunInput {
  const known = (value: number | null | undefined) =>
    value !== null && value !== undefined && Number.isFinite(value) ? value : null
  const low = known(planned.temperatureRangeK?.low)
  const high = known(planned.temperatureRangeK?.high)
  return {
    ...planned,
    feed: planned.feed.filter(({ moleFraction }) => Number.isFinite(moleFraction)),
    temperatureRangeK: low === null || high === null ? null : { low, high },
    pressurePa: known(planned.pressurePa),
    rigLimits: {
      maximumPressurePa: known(planned.rigLimits.maximumPressurePa),
      maximumTemperatureK: known(planned.rigLimits.maximumTemperatureK),
    },
    reactionEnthalpyJPerMol: known(planned.reactionEnthalpyJPerMol),
    feedHeatCapacityJPerMolK: known(planned.feedHeatCapacityJPerMolK),
    particleDiameterM: known(planned.particleDiameterM),
    tubeInnerDiameterM: known(planned.tubeInnerDiameterM),
    bedLengthM: known(planned.bedLengthM),
    catalystMassKg: known(planned.catalystMassKg),
    massRelativeStandardUncertainty: known(planned.massRelativeStandardUncertainty),
  }
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
  const feedHeat = feedHeatCapacity(input, total)
  const heatCapacity = stated !== null && stated > 0 ? stated : feedHeat.valueJPerMolK
  const rise = adiabaticRise(share, enthalpy, heatCapacity)
  if (!(rise > ADIABATIC_RISE_LIMIT_K)) return []
  const isLeast = !(stated !== null && stated > 0) && feedHeat.isLeast
  const basis = isLeast
    ? ', taken with the lowest heat capacity its gases can have and so too high rather than too low'
    : ''
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

// At the lowest planned temperature, where heat capacities are least, so the rise is not understated.
function feedHeatCapacity({ feed, temperatureRangeK }: PlannedRunInput, total: number) {
  const parts = feed.map(({ species, moleFraction }) => ({
    moleFraction,
    heat: heatCapacityOrLeast(species, temperatureRangeK?.low ?? COLDEST_USUAL_K),
  }))
  return {
    valueJPerMolK: parts.reduce((sum, { moleFraction, heat }) => sum + moleFraction * heat.valueJPerMolK, 0) / total,
    isLeast: parts.some(({ moleFraction, heat }) => moleFraction > 0 && heat.isLeast),
  }
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

// Figures that are possible and seldom meant: a wrong unit or a slipped comma.
function unusualFigureCautions(input: PlannedRunInput): Caution[] {
  const cautions: Caution[] = []
  const massKg = input.catalystMassKg ?? 0
  if (massKg > CATALYST_MASS_LIMIT_KG)
    cautions.push(
      caution(
        'large-catalyst-mass',
        'caution',
        `${formatQuantity(massKg, 'mass')} of catalyst`,
        `${formatQuantity(massKg, 'mass')} of catalyst is much for a test bed, which holds milligrams to a few grams. Check the unit: every rate is divided by this mass.`,
        massKg,
        CATALYST_MASS_LIMIT_KG,
        'kg',
        'common practice',
      ),
    )
  const weighing = input.massRelativeStandardUncertainty ?? 0
  if (weighing > WEIGHING_LIMIT)
    cautions.push(
      caution(
        'uncertain-weighing',
        'caution',
        `weighing uncertain by ${(100 * weighing).toFixed(0)} %`,
        `The weighing is given as uncertain by ${(100 * weighing).toFixed(0)} % of the mass; above ${String(100 * WEIGHING_LIMIT)} % it outweighs all else in every rate. Check figure and unit.`,
        weighing,
        WEIGHING_LIMIT,
        '1',
        'common practice',
      ),
    )
  const tubeM = input.tubeInnerDiameterM ?? 0
  if (tubeM > TUBE_LIMIT_M)
    cautions.push(
      caution(
        'wide-tube',
        'caution',
        `tube ${formatQuantity(tubeM, 'length')} wide`,
        `A tube of ${formatQuantity(tubeM, 'length')} inner diameter is wide for a test rig, where 2 to 25 mm are usual. Check the unit.`,
        tubeM,
        TUBE_LIMIT_M,
        'm',
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
