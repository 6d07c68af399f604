import { type Caution } from '../analysis/caution'
import { plannedRunCautions } from '../analysis/safety/planned-run-cautions'
import { absolutePressure } from '../analysis/units/absolute-pressure'
import { type Dimension } from '../analysis/units/dimension'
import { type FlowReference, NORMAL_REFERENCE } from '../analysis/units/flow-reference'
import { formatNumber } from '../analysis/units/format-number'
import { formatQuantity } from '../analysis/units/format-quantity'
import { volumeFlowFromMolarFlow } from '../analysis/units/molar-flow-from-volume-flow'
import { parseQuantity, splitNumber } from '../analysis/units/parse-quantity'
import { parseRange } from '../analysis/units/parse-range'
import { type FieldIssue } from './errors'
import { setFigures } from './format-estimate'
import { formatInstant } from './format-instant'
import { instantFromLocal } from './instant-in-zone'
import { type FeedEntry, type NewRun, newRunSchema } from './run'
import { formulaOfName } from './species-names'
import { referenceFromKey, type RunFormChoices, type RunFormValues } from './run-form'
import { speciesText } from './species-text'

export interface RunFormReading {
  /** the run as it would be stored, or null while something is missing or not understood */
  readonly run: NewRun | null
  /** one sentence a field at fault, by the field's name */
  readonly issues: readonly FieldIssue[]
  /** what was understood, by the field's name */
  readonly said: Readonly<Record<string, string>>
  /** share of each row in the feed [-]; null while a row is not understood, since the total is not known then */
  readonly moleFractions: readonly (number | null)[]
  readonly feedSentence: string
  readonly bedSentence: string
  /** the pressure does not say gauge or absolute, or a flow does not say what state it is counted at: a person is asked */
  readonly asksPressureKind: boolean
  readonly asksFlowReference: boolean
  readonly isGauge: boolean
  readonly cautions: readonly Caution[]
}

/**
 * Reads "Log a run" as typed: what was understood, what is at fault, and what to be careful about. The same function serves the screen
 * while somebody types and the server when the form is sent, so both say the same.
 */
export function readRunForm(values: RunFormValues, choices: RunFormChoices): RunFormReading {
  const reader = new Reader()
  const rig = choices.rigs.find(({ id }) => id === values.rigId)
  const campaign = choices.campaigns.find(({ id }) => id === values.campaignId)
  if (campaign === undefined) reader.fault('campaignId', 'Choose the campaign this run belongs to.')
  if (rig === undefined) reader.fault('rigId', 'Choose the rig.')
  if (rig !== undefined && !rig.channels.some(({ code }) => code === values.channel))
    reader.fault('channel', `Choose a channel of ${rig.code}.`)

  const bedIn = choices.bedsIn.find((loading) => loading.rigId === values.rigId && loading.channel === values.channel)
  const isNewBed = values.bed === 'new' || bedIn === undefined
  const sampleId = isNewBed ? values.sampleId : bedIn.sampleId
  const sample = choices.samples.find(({ id }) => id === sampleId)
  if (isNewBed && sample === undefined) reader.fault('sampleId', 'Choose the sample in the bed.')

  const bed = readBed(reader, values, isNewBed)
  const geometry = isNewBed
    ? bed
    : {
        ...bed,
        catalystMassKg: bedIn.catalystMassKg,
        massRelativeStandardUncertainty: bedIn.massRelativeStandardUncertainty,
        particleMinimumM: bedIn.particleMinimumM,
        particleMaximumM: bedIn.particleMaximumM,
        tubeInnerDiameterM: bedIn.tubeInnerDiameterM,
        bedLengthM: bedIn.bedLengthM,
      }
  const feed = readFeed(reader, values)
  const pressure = readPressure(reader, values)
  const hottestK = reader.quantity('highestTemperature', values.highestTemperature, 'temperature')

  const started = rig === undefined ? null : instantFromLocal(values.start, rig.timeZone)
  if (rig !== undefined && started !== null) {
    if (started.ok)
      reader.say(
        'start',
        `${formatInstant(started.instant, rig.timeZone)} in ${rig.timeZone} (${started.instant.slice(-6).replace('-', '−')} from UTC)${started.isAmbiguous ? '; the clocks go back then, and the first of the two hours is taken' : ''}`,
      )
    else reader.fault('start', started.sentence)
  }

  const particleM =
    geometry.particleMinimumM === null || geometry.particleMaximumM === null
      ? null
      : (geometry.particleMinimumM + geometry.particleMaximumM) / 2
  const cautions = plannedRunCautions({
    feed: feed.entries.flatMap((entry) =>
      entry === null || !(feed.totalMolPerS > 0)
        ? []
        : [{ species: entry.species, moleFraction: entry.flowMolPerS / feed.totalMolPerS }],
    ),
    productsPossible: [
      ...new Set(
        (campaign?.reaction?.steps ?? []).flatMap((step) =>
          Object.entries(step)
            .filter(([, number]) => number > 0)
            .map(([species]) => species),
        ),
      ),
    ],
    activeMetal: values.kind === 'catalyst' ? (sample?.activeMetal ?? '') : '',
    temperatureRangeK: hottestK === null ? null : { low: 298.15, high: hottestK },
    // gauge or absolute not said yet: it is this much at least
    pressurePa: pressure.absolutePa ?? pressure.leastPa,
    rigLimits: {
      maximumPressurePa: rig?.maximumPressurePa ?? null,
      maximumTemperatureK: rig?.maximumTemperatureK ?? null,
    },
    reactionEnthalpyJPerMol: campaign?.reactionEnthalpyJPerMol ?? null,
    keyReactant: campaign?.reaction?.keyReactant ?? '',
    particleDiameterM: particleM,
    tubeInnerDiameterM: geometry.tubeInnerDiameterM,
    bedLengthM: geometry.bedLengthM,
    catalystMassKg: geometry.catalystMassKg,
    massRelativeStandardUncertainty: geometry.massRelativeStandardUncertainty,
  })

  const candidate = {
    campaignId: values.campaignId,
    code: values.code.trim() === '' ? null : values.code.trim(),
    rigId: values.rigId,
    channel: values.channel,
    kind: values.kind,
    loading: isNewBed
      ? { sampleId, lotId: values.lotId === '' ? null : values.lotId, ...bed }
      : { loadingId: bedIn.id },
    startedAt: started?.ok === true ? started.instant : '',
    pressurePa: pressure.typedPa,
    pressureKind: pressure.kind,
    barometerPa: pressure.barometerPa,
    pressureText: values.pressure.trim(),
    feed: feed.entries.filter((entry) => entry !== null),
    pretreatment: values.pretreatment.trim(),
    notes: [values.notes.trim(), hottestK === null ? '' : `Planned up to ${formatQuantity(hottestK, 'temperature')}.`]
      .filter((text) => text !== '')
      .join('\n'),
  }
  const parsed = newRunSchema.safeParse(candidate)
  if (!parsed.success)
    for (const issue of parsed.error.issues) {
      const field = fieldOf(issue.path.map(String))
      if (!reader.issues.some((known) => known.field === field)) reader.fault(field, issue.message)
    }
  return {
    run: parsed.success && reader.issues.length === 0 ? parsed.data : null,
    issues: reader.issues,
    said: reader.said,
    moleFractions: feed.entries.map((entry) =>
      entry === null || !(feed.totalMolPerS > 0) ? null : entry.flowMolPerS / feed.totalMolPerS,
    ),
    feedSentence: feedSentence(feed.totalMolPerS, feed.reference, geometry.catalystMassKg),
    bedSentence: bedSentence(particleM, geometry.tubeInnerDiameterM, geometry.bedLengthM),
    asksPressureKind: pressure.isUnstated,
    asksFlowReference: feed.asksReference,
    isGauge: pressure.kind === 'gauge',
    cautions,
  }
}

class Reader {
  readonly issues: FieldIssue[] = []
  readonly said: Record<string, string> = {}

  fault(field: string, message: string): void {
    this.issues.push({ field, message })
  }

  say(field: string, words: string): void {
    this.said[field] = words
  }

  /** A quantity that may be missing. */
  quantity(field: string, text: string, dimension: Dimension): number | null {
    if (text.trim() === '') return null
    const read = parseQuantity(text, dimension)
    if (!read.ok) {
      this.fault(field, read.sentence)
      return null
    }
    this.say(field, read.said)
    return read.valueSi
  }
}

function readBed(reader: Reader, values: RunFormValues, isNewBed: boolean) {
  const nothing = {
    catalystMassKg: 0,
    massRelativeStandardUncertainty: 0.005,
    diluentMassKg: 0,
    diluentMaterial: '',
    particleMinimumM: null,
    particleMaximumM: null,
    tubeInnerDiameterM: null,
    bedLengthM: null,
  }
  if (!isNewBed) return nothing
  const catalystMassKg = reader.quantity('catalyst', values.catalyst, 'mass')
  if (catalystMassKg === null && values.kind === 'catalyst' && values.catalyst.trim() === '')
    reader.fault('catalyst', 'Give the mass of catalyst, for example 80 mg.')
  const diluent = readDiluent(reader, values.diluent)
  const sieve = values.sieve.trim() === '' ? null : parseRange(values.sieve, 'length')
  if (sieve !== null) {
    if (sieve.ok) reader.say('sieve', sieve.said)
    else reader.fault('sieve', sieve.sentence)
  }
  return {
    catalystMassKg: catalystMassKg ?? 0,
    massRelativeStandardUncertainty: readWeighing(reader, values.weighing, catalystMassKg),
    ...diluent,
    particleMinimumM: sieve?.ok === true ? sieve.lowSi : null,
    particleMaximumM: sieve?.ok === true ? sieve.highSi : null,
    tubeInnerDiameterM: reader.quantity('tube', values.tube, 'length'),
    bedLengthM: reader.quantity('bedLength', values.bedLength, 'length'),
  }
}

// `450 mg SiC` or `SiC 450 mg`: a mass and what it is
function readDiluent(reader: Reader, text: string): { diluentMassKg: number; diluentMaterial: string } {
  const trimmed = text.trim()
  if (trimmed === '') return { diluentMassKg: 0, diluentMaterial: '' }
  const split = /^(.*?\d[.,]?\s*[^\s\d.,]+)(?:\s+(.*))?$/u.exec(trimmed)
  const reversed = /^(\p{L}.*?)[\s,:]+(\d[\d.,]*\s*[^\s\d.,]+)$/u.exec(trimmed)
  const read = parseQuantity(reversed?.[2] ?? split?.[1] ?? trimmed, 'mass')
  if (!read.ok) {
    reader.fault('diluent', read.sentence.replace('80 mg', '450 mg SiC'))
    return { diluentMassKg: 0, diluentMaterial: '' }
  }
  const diluentMaterial = (reversed?.[1] ?? split?.[2] ?? '').trim()
  reader.say(
    'diluent',
    diluentMaterial === '' ? `${read.said}; say of what, if known` : `${read.said} of ${diluentMaterial}`,
  )
  return { diluentMassKg: read.valueSi, diluentMaterial }
}

/** Relative standard uncertainty of the weighing, given as a share or as a mass. */
function readWeighing(reader: Reader, text: string, massKg: number | null): number {
  if (text.trim() === '') return 0.005
  const share = parseQuantity(text, 'fraction')
  if (share.ok) {
    reader.say(
      'weighing',
      massKg === null
        ? share.said
        : `${share.said}, ${formatQuantity(share.valueSi * massKg, 'mass', { significantDigits: 2 })}`,
    )
    return share.valueSi
  }
  const mass = parseQuantity(text, 'mass')
  if (!mass.ok) {
    const isBare = splitNumber(text)?.unit === ''
    reader.fault(
      'weighing',
      isBare ? share.sentence : `“${text.trim()}” is neither a share nor a mass; write it like 0.5 % or 0.4 mg.`,
    )
    return 0.005
  }
  if (massKg === null || !(massKg > 0)) return 0.005
  const relative = mass.valueSi / massKg
  reader.say(
    'weighing',
    `${mass.said}, ${formatQuantity(relative, 'fraction', { significantDigits: 2 })} of the catalyst`,
  )
  return relative
}

interface FeedReading {
  readonly entries: readonly (FeedEntry | null)[]
  readonly totalMolPerS: number
  readonly reference: FlowReference | null
  readonly asksReference: boolean
}

function readFeed(reader: Reader, values: RunFormValues): FeedReading {
  const chosen = referenceFromKey(values.flowReference)
  let asksReference = false
  const seen = new Set<string>()
  const entries = values.feed.map((row, position): FeedEntry | null => {
    const named = formulaOfName(row.species)
    const species = named ?? row.species.trim()
    const flow = row.flow.trim()
    if (species === '' && flow === '') return null
    if (!/^[A-Za-z][A-Za-z0-9()+-]{0,19}$/.test(species)) {
      reader.fault(`feed.${String(position)}.species`, 'Write the gas as a formula, for example CO2 or Ar.')
      return null
    }
    if (named !== null)
      reader.say(`feed.${String(position)}.species`, `${row.species.trim()} read as ${speciesText(named)}`)
    if (seen.has(species)) {
      reader.fault(`feed.${String(position)}.species`, `${speciesText(species)} stands twice; add the flows up.`)
      return null
    }
    seen.add(species)
    if (flow === '') {
      reader.fault(
        `feed.${String(position)}.flow`,
        `Give the flow of ${speciesText(species)}, for example 7.2 mL/min, or take the line out.`,
      )
      return null
    }
    const asVolume = parseQuantity(flow, 'volume-flow')
    const isAsked = asVolume.ok && (asVolume.flowReference ?? null) === null
    if (isAsked) asksReference = true
    const read = parseQuantity(flow, 'molar-flow', { flowReference: chosen })
    if (!read.ok) {
      if (isAsked && chosen === null) return null
      reader.fault(`feed.${String(position)}.flow`, read.sentence)
      return null
    }
    const reference = read.flowReference ?? chosen ?? NORMAL_REFERENCE
    reader.say(`feed.${String(position)}.flow`, read.said)
    return {
      species,
      flowText: flow,
      flowMolPerS: read.valueSi,
      referenceTemperatureK: reference.temperatureK,
      referencePressurePa: reference.pressurePa,
      isInternalStandard: row.isStandard,
    }
  })
  if (asksReference && chosen === null)
    reader.fault(
      'flowReference',
      'Say at which temperature and pressure the flows are counted: the same figure means up to 10 % more or less gas.',
    )
  if (values.feed.filter((row) => row.isStandard).length > 1)
    reader.fault('feed', 'Only one gas can be the internal standard.')
  const known = entries.filter((entry) => entry !== null)
  const isWhole = values.feed.every(
    (row, position) => (row.species.trim() === '' && row.flow.trim() === '') || (entries[position] ?? null) !== null,
  )
  const first = known[0]
  return {
    entries,
    // while one gas is not understood, the total is not known, and no share of it
    totalMolPerS: isWhole ? known.reduce((sum, entry) => sum + entry.flowMolPerS, 0) : 0,
    reference:
      chosen ??
      (first === undefined
        ? null
        : { temperatureK: first.referenceTemperatureK, pressurePa: first.referencePressurePa }),
    asksReference,
  }
}

function readPressure(reader: Reader, values: RunFormValues) {
  const nothing = {
    typedPa: null,
    absolutePa: null,
    kind: 'absolute' as const,
    barometerPa: null,
    leastPa: null as number | null,
    isUnstated: false,
  }
  if (values.pressure.trim() === '') return nothing
  const read = parseQuantity(values.pressure, 'pressure')
  if (!read.ok) {
    reader.fault('pressure', read.sentence)
    return nothing
  }
  const isUnstated = read.pressureKind === undefined || read.pressureKind === 'unstated'
  const kind = isUnstated ? values.pressureKind : read.pressureKind === 'gauge' ? 'gauge' : 'absolute'
  if (kind === '') {
    reader.fault('pressureKind', 'Say whether this is gauge (above the air around) or absolute.')
    reader.say('pressure', read.said)
    return { ...nothing, leastPa: read.valueSi, isUnstated }
  }
  if (kind === 'absolute') {
    reader.say('pressure', `${formatQuantity(read.valueSi, 'pressure')} absolute`)
    return {
      typedPa: read.valueSi,
      absolutePa: read.valueSi,
      kind,
      barometerPa: null,
      leastPa: read.valueSi,
      isUnstated,
    }
  }
  const barometer = parseQuantity(values.barometer, 'pressure')
  if (!barometer.ok) {
    reader.fault('barometer', 'A gauge pressure needs the air pressure beside it, for example 1013 mbar.')
    return { ...nothing, leastPa: read.valueSi, isUnstated, kind }
  }
  reader.say('barometer', formatQuantity(barometer.valueSi, 'pressure', { unit: 'mbar' }))
  const absolutePa = absolutePressure(read.valueSi, barometer.valueSi)
  reader.say(
    'pressure',
    `${formatQuantity(read.valueSi, 'pressure')} gauge and ${formatQuantity(barometer.valueSi, 'pressure', { unit: 'mbar' })} of air make ${formatQuantity(absolutePa, 'pressure')} absolute`,
  )
  return { typedPa: read.valueSi, absolutePa, kind, barometerPa: barometer.valueSi, leastPa: absolutePa, isUnstated }
}

function feedSentence(totalMolPerS: number, reference: FlowReference | null, catalystMassKg: number): string {
  if (!(totalMolPerS > 0)) return ''
  const inAll = `${formatNumber(totalMolPerS * 1e6, 3)} µmol s⁻¹ in all`
  if (reference === null) return inAll
  const volumeM3PerS = volumeFlowFromMolarFlow(totalMolPerS, reference)
  const state = `${formatNumber(volumeM3PerS * 6e7, 3)} mL min⁻¹ at ${formatNumber(reference.temperatureK - 273.15, 3)} °C and ${formatNumber(reference.pressurePa / 1_000, 6)} kPa`
  if (!(catalystMassKg > 0)) return `${state}, ${inAll}`
  const perMass = (volumeM3PerS * 3_600 * 1e6) / (catalystMassKg * 1e3)
  return `${state}, ${inAll}; ${setFigures(String(Number(perMass.toPrecision(3))))} mL g⁻¹ h⁻¹`
}

function bedSentence(particleM: number | null, tubeM: number | null, bedLengthM: number | null): string {
  if (particleM === null || !(particleM > 0)) return ''
  const long = bedLengthM === null ? null : bedLengthM / particleM
  const wide = tubeM === null ? null : tubeM / particleM
  const words = [
    long === null ? '' : `${long.toFixed(0)} particles long`,
    wide === null ? '' : `${wide.toFixed(0)} wide`,
  ].filter((text) => text !== '')
  if (words.length === 0) return ''
  const holds = long !== null && wide !== null && long >= 50 && wide >= 10
  return `The bed is ${words.join(' and ')}${holds ? ': it counts as plug flow (50 and 10 at least, common practice)' : ''}.`
}

/** Name of the form's field behind a path of the record. */
function fieldOf(path: readonly string[]): string {
  const [head = '', ...rest] = path
  if (head === 'loading') {
    const inner: Readonly<Record<string, string>> = {
      sampleId: 'sampleId',
      lotId: 'lotId',
      catalystMassKg: 'catalyst',
      massRelativeStandardUncertainty: 'weighing',
      diluentMassKg: 'diluent',
      diluentMaterial: 'diluent',
      particleMinimumM: 'sieve',
      particleMaximumM: 'sieve',
      tubeInnerDiameterM: 'tube',
      bedLengthM: 'bedLength',
    }
    return inner[rest[0] ?? ''] ?? 'catalyst'
  }
  if (head === 'feed') return rest.length === 0 ? 'feed' : `feed.${rest[0] ?? '0'}.flow`
  const outer: Readonly<Record<string, string>> = {
    startedAt: 'start',
    pressurePa: 'pressure',
    pressureText: 'pressure',
    barometerPa: 'barometer',
  }
  return outer[head] ?? head
}
