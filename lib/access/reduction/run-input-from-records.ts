import 'server-only'
import { createHash } from 'node:crypto'
import { type SharedSource } from '@/lib/analysis/estimate'
import { elementCount } from '@/lib/analysis/element-count'
import {
  type InjectionTable,
  type ReactionInput,
  type ReductionMethod,
  type ResponseFactor,
  type RigLog,
  type RunInput,
  type SiteCountInput,
  type Species,
} from '@/lib/analysis/reduction/run-input'
import { calibrationEntrySchema, type CalibrationEntry } from '@/lib/domain/calibration'
import { canonicalJson } from '@/lib/domain/canonical-json'
import { type MethodSettings } from '@/lib/domain/method'
import { stoichiometrySchema, thermochemistrySchema } from '@/lib/domain/reaction'
import {
  type CalibrationRecord,
  type CampaignRecords,
  type RunDetailRecords,
  type RunRecords,
  type SiteCountRecord,
} from '@/db/queries/reduction-inputs'
import { type CurrentReadingSet } from '@/db/queries/results'

/** Records of one run with everything beside it that its numbers rest on. */
export interface RunBundle {
  readonly run: RunRecords
  readonly campaign: CampaignRecords
  readonly settings: MethodSettings
  readonly calibrations: readonly CalibrationRecord[]
  readonly siteCounts: readonly SiteCountRecord[]
  readonly details: RunDetailRecords
  readonly readingSets: readonly CurrentReadingSet[]
}

/** Loads the values of a reading set; called only when no stored result answers. */
export type LoadChannels = (readingSetId: string) => Promise<Map<string, Float64Array>>

/** What stands in the way of numbers, in a sentence for the person at the rig; empty when nothing does. */
export function whatIsMissing(bundle: RunBundle): string {
  const kinds = new Set(bundle.readingSets.map((set) => set.kind))
  if (!kinds.has('rig-log') && !kinds.has('injections'))
    return 'No file is confirmed yet: add the rig log and the analyser file.'
  if (!kinds.has('rig-log')) return 'The rig log is missing: add it, look at what was understood and confirm.'
  if (!kinds.has('injections')) return 'The analyser file is missing: add it, look at what was understood and confirm.'
  if (bundle.run.catalystMassKg <= 0) return 'The mass of the bed is zero: a rate per gram needs it.'
  return ''
}

const entriesOf = (record: CalibrationRecord): CalibrationEntry[] =>
  calibrationEntrySchema.array().parse(record.entries)

/**
 * The calibration of a kind that holds for the run: one made for its rig before one for the house, a newer before an older, and none
 * that was superseded by one valid at that time. The other runs that are looked at together have no say in it.
 */
function validCalibration(bundle: RunBundle, kind: string): CalibrationRecord | null {
  const at = bundle.run.startedAt.getTime()
  const timely = bundle.calibrations.filter(
    (record) =>
      record.kind === kind &&
      record.validFrom.getTime() <= at &&
      (record.validTo === null || record.validTo.getTime() > at),
  )
  const timelyIds = new Set(timely.map((record) => record.id))
  const valid = timely.filter(
    (record) =>
      (record.rigId === null || record.rigId === bundle.run.rigId) &&
      !record.supersededByIds.some((id) => timelyIds.has(id)),
  )
  return valid.find((record) => record.rigId === bundle.run.rigId) ?? valid[0] ?? null
}

function responseFactors(bundle: RunBundle): { factors: Record<Species, ResponseFactor>; sources: SharedSource[] } {
  const record = validCalibration(bundle, 'response-factors')
  const factors: Record<Species, ResponseFactor> = {}
  const sources: SharedSource[] = []
  if (record === null) return { factors, sources }
  for (const entry of entriesOf(record)) {
    if (entry.species === null || entry.value <= 0) continue
    const sourceId = `calibration:${record.id}:${entry.species}`
    const relative =
      entry.relativeStandardUncertainty ??
      (entry.absoluteStandardUncertainty === null
        ? bundle.settings.responseFactorRelativeStandardUncertainty
        : entry.absoluteStandardUncertainty / entry.value)
    factors[entry.species] = {
      molePerArea: record.convention === 'sensitivity' ? 1 / entry.value : entry.value,
      relativeStandardUncertainty: relative,
      sourceId,
    }
    sources.push({
      id: sourceId,
      kind: 'response-factor',
      label: `response factor of ${entry.species}, ${record.name}`,
      standardUncertainty: relative,
      unit: '1',
    })
  }
  return { factors, sources }
}

function flowSource(bundle: RunBundle): SharedSource {
  const record = validCalibration(bundle, 'flow-controller')
  const stated = record === null ? null : (entriesOf(record)[0]?.relativeStandardUncertainty ?? null)
  return {
    id: `flow:${bundle.run.rigId}`,
    kind: 'flow',
    label: `flow controllers of ${bundle.run.rigCode}${record === null ? '' : `, ${record.name}`}`,
    standardUncertainty: stated ?? bundle.settings.flowRelativeStandardUncertainty,
    unit: '1',
  }
}

function thermocoupleSource(bundle: RunBundle): SharedSource {
  const record = validCalibration(bundle, 'thermocouple')
  const stated = record === null ? null : (entriesOf(record)[0]?.absoluteStandardUncertainty ?? null)
  return {
    // where the tip sits in the bed is settled anew with every loading
    id: `thermocouple:${bundle.run.loadingId}`,
    kind: 'thermocouple',
    label: `bed thermocouple in loading ${bundle.run.loadingCode}${record === null ? '' : `, ${record.name}`}`,
    standardUncertainty: stated ?? bundle.settings.temperatureStandardUncertaintyK,
    unit: 'K',
  }
}

function massSource(bundle: RunBundle): SharedSource {
  return {
    id: `mass:${bundle.run.loadingId}`,
    kind: 'mass',
    label: `weighing of loading ${bundle.run.loadingCode}`,
    standardUncertainty: bundle.run.massRelativeStandardUncertainty,
    unit: '1',
  }
}

/** The newest count of the lot in the tube, else of the sample. */
function siteCount(bundle: RunBundle): { input: SiteCountInput | null; source: SharedSource | null } {
  const ofSample = bundle.siteCounts.filter((count) => count.sampleId === bundle.run.sampleId)
  const found =
    ofSample.find((count) => count.lotId !== null && count.lotId === bundle.run.lotId) ??
    ofSample.find((count) => count.lotId === null) ??
    null
  if (found === null || bundle.run.kind !== 'catalyst') return { input: null, source: null }
  const sourceId = `sites:${found.id}`
  return {
    input: {
      molPerKg: found.molPerKg,
      relativeStandardUncertainty: found.relativeStandardUncertainty,
      sourceId,
      method: found.method,
    },
    source: {
      id: sourceId,
      kind: 'site-count',
      label: `site count by ${found.method}`,
      standardUncertainty: found.relativeStandardUncertainty,
      unit: '1',
    },
  }
}

function reactionInput(campaign: CampaignRecords): ReactionInput {
  const steps = stoichiometrySchema.array().parse(campaign.steps)
  const thermochemistry = thermochemistrySchema.nullable().parse(campaign.thermochemistry)
  const species = [...new Set(steps.flatMap((step) => Object.keys(step)))].sort()
  const carbonNumber = Object.fromEntries(
    species.map((name) => [name, elementCount(name)['C'] ?? 0] as const).filter(([, count]) => count > 0),
  )
  return {
    name: campaign.reactionName,
    keyReactant: campaign.keyReactant,
    steps,
    carbonNumber,
    ...(thermochemistry === null ? {} : { thermochemistry }),
  }
}

function reductionMethod(settings: MethodSettings): ReductionMethod {
  return {
    rateLaw: settings.rateLaw,
    rateOrders: settings.rateOrders,
    inletSource: settings.inletSource,
    internalStandard: settings.internalStandard,
    condensedSpecies: settings.condensedSpecies,
    maximumConversion: settings.maximumConversion,
    carbonBalanceWindow: settings.carbonBalanceWindow,
    graveCarbonBalanceWindow: settings.graveCarbonBalanceWindow,
    holdToleranceK: settings.holdToleranceK,
    minimumHoldS: settings.minimumHoldS,
    settlingTimeS: settings.settlingTimeS,
    purgeInjections: settings.purgeInjections,
    steadyLimitPerH: settings.steadyLimitPerH,
    returnedHoldLimit: settings.returnedHoldLimit,
    referenceTemperatureK: settings.referenceTemperatureK,
    confidenceLevel: settings.confidenceLevel,
    correctForEquilibrium: settings.correctForEquilibrium,
  }
}

/** The run's input but for the readings, and the key under which its result is kept. */
export interface PreparedRun {
  readonly bundle: RunBundle
  readonly key: string
  readonly withoutReadings: Omit<RunInput, 'log' | 'injections'>
}

function fileNames(bundle: RunBundle, kind: string): { uploadId: string; fileName: string } {
  const sets = bundle.readingSets.filter((set) => set.kind === kind)
  const names = sets.map((set) => bundle.details.files.find((file) => file.uploadId === set.uploadId)?.fileName ?? '')
  return { uploadId: sets.map((set) => set.uploadId).join('+'), fileName: names.join(' + ') }
}

/** Gathers what a run's numbers rest on and names it by its content. The readings stand for themselves by their hashes. */
export function prepareRun(bundle: RunBundle, engine: string): PreparedRun {
  const { run, details } = bundle
  const { factors, sources } = responseFactors(bundle)
  const flow = flowSource(bundle)
  const thermocouple = thermocoupleSource(bundle)
  const mass = massSource(bundle)
  const sites = siteCount(bundle)
  const withoutReadings: PreparedRun['withoutReadings'] = {
    runCode: run.code,
    kind: run.kind === 'blank' || run.kind === 'diluent' ? run.kind : 'catalyst',
    responseFactors: factors,
    reaction: reactionInput(bundle.campaign),
    loading: {
      catalystMassKg: run.catalystMassKg,
      massRelativeStandardUncertainty: run.massRelativeStandardUncertainty,
      massSourceId: mass.id,
      diluentMassKg: run.diluentMassKg,
      particleDiameterM:
        run.particleMinimumM !== null && run.particleMaximumM !== null
          ? (run.particleMinimumM + run.particleMaximumM) / 2
          : (run.particleMinimumM ?? run.particleMaximumM),
      tubeInnerDiameterM: run.tubeInnerDiameterM,
      bedLengthM: run.bedLengthM,
      particleDensityKgPerM3: run.particleDensityKgPerM3,
      poreFraction: run.poreFraction,
      tortuosity: run.tortuosity,
      meanPoreRadiusM: run.meanPoreRadiusM,
      bedVoidFraction: run.bedVoidFraction,
    },
    siteCount: sites.input,
    method: reductionMethod(bundle.settings),
    holdEdits: details.holdEdits
      .filter((edit) => edit.runId === run.runId)
      .map(({ foundStartS, startS, endS }) => ({ foundStartS, startS, endS })),
    exclusions: details.exclusions
      .filter((exclusion) => exclusion.runId === run.runId)
      .map(({ kind, atS, reason, by }) => ({ kind: kind === 'hold' ? 'hold' : 'injection', atS, reason, by })),
    flowSourceId: flow.id,
    thermocoupleSourceId: thermocouple.id,
    sharedSources: [flow, mass, thermocouple, ...(sites.source === null ? [] : [sites.source]), ...sources],
  }
  const named = {
    engine,
    input: withoutReadings,
    readings: bundle.readingSets.map((set) => ({ kind: set.kind, content: set.contentSha256 })),
    files: [fileNames(bundle, 'rig-log'), fileNames(bundle, 'injections')],
    feed: plannedFeed(bundle),
    pressurePa: absolutePressurePa(run),
    clock: { offsetS: run.clockOffsetS, lineLagS: run.lineLagS },
  }
  const key = createHash('sha256').update(canonicalJson(named)).digest('hex')
  return { bundle, key, withoutReadings }
}

function absolutePressurePa(run: RunRecords): number | null {
  if (run.pressurePa === null) return null
  return run.pressureKind === 'gauge' ? run.pressurePa + (run.barometerPa ?? run.rigBarometerPa) : run.pressurePa
}

function plannedFeed(bundle: RunBundle): Record<Species, number> {
  return Object.fromEntries(
    bundle.details.feeds
      .filter((entry) => entry.runId === bundle.run.runId)
      .map((entry) => [entry.species, entry.flowMolPerS] as const),
  )
}

type Channels = ReadonlyMap<string, Float64Array>

/** Several files of one kind in a run (a restarted log, say) become one series in time order. */
function joinInTime(parts: readonly Channels[]): Channels {
  const only = parts[0]
  if (parts.length === 1 && only !== undefined) return only
  const names = [...new Set(parts.flatMap((part) => [...part.keys()]))].sort()
  const stamps: { time: number; part: number; row: number }[] = []
  parts.forEach((part, index) => {
    const time = part.get('time') ?? new Float64Array()
    for (let row = 0; row < time.length; row++) stamps.push({ time: time[row] ?? Number.NaN, part: index, row })
  })
  stamps.sort((a, b) => a.time - b.time || a.part - b.part || a.row - b.row)
  return new Map(
    names.map((name) => [
      name,
      Float64Array.from(stamps, (stamp) => parts[stamp.part]?.get(name)?.[stamp.row] ?? Number.NaN),
    ]),
  )
}

function withPrefix(channels: Channels, prefix: string): Record<Species, Float64Array> {
  return Object.fromEntries(
    [...channels.keys()]
      .filter((name) => name.startsWith(prefix))
      .sort()
      .map((name) => [name.slice(prefix.length), channels.get(name) ?? new Float64Array()]),
  )
}

/** Reads the stored values and puts the whole input together. Called only when the result is not stored yet. */
export async function completeRunInput(prepared: PreparedRun, load: LoadChannels): Promise<RunInput> {
  const { bundle, withoutReadings } = prepared
  const channelsOf = async (kind: string): Promise<Channels> => {
    const parts: Channels[] = []
    for (const set of bundle.readingSets.filter((entry) => entry.kind === kind)) parts.push(await load(set.id))
    return joinInTime(parts)
  }
  const logChannels = await channelsOf('rig-log')
  const injectionChannels = await channelsOf('injections')
  const empty = new Float64Array()
  const count = logChannels.get('time')?.length ?? 0
  const constant = (value: number) => new Float64Array(count).fill(value)
  const pressurePa = absolutePressurePa(bundle.run)
  const logged = withPrefix(logChannels, 'flowMolPerS.')
  const planned = plannedFeed(bundle)
  const log: RigLog = {
    ...fileNames(bundle, 'rig-log'),
    timeS: logChannels.get('time') ?? empty,
    sourceRow: logChannels.get('sourceRow') ?? constant(Number.NaN),
    bedTemperatureK: logChannels.get('bedTemperatureK') ?? constant(Number.NaN),
    setTemperatureK: logChannels.get('setTemperatureK') ?? null,
    wallTemperatureK: logChannels.get('wallTemperatureK') ?? null,
    // a rig that does not log its pressure has the one written down with the run
    inletPressurePa: logChannels.get('inletPressurePa') ?? (pressurePa === null ? null : constant(pressurePa)),
    outletPressurePa: logChannels.get('outletPressurePa') ?? null,
    flowMolPerS:
      Object.keys(logged).length > 0
        ? logged
        : Object.fromEntries(Object.entries(planned).map(([name, flow]) => [name, constant(flow)])),
    isBypass: logChannels.get('isBypass') ?? null,
  }
  const areas = withPrefix(injectionChannels, 'area.')
  const fractions = withPrefix(injectionChannels, 'moleFraction.')
  const quantity = Object.keys(areas).length > 0 ? 'area' : 'mole-fraction'
  const response = quantity === 'area' ? areas : fractions
  const injectionTime = injectionChannels.get('time') ?? empty
  const shiftS = bundle.run.clockOffsetS - bundle.run.lineLagS
  const flags = withPrefix(injectionChannels, 'isCensored.')
  const injections: InjectionTable = {
    ...fileNames(bundle, 'injections'),
    timeS: injectionTime.map((time) => time + shiftS),
    number: injectionChannels.get('number') ?? injectionTime.map((_, index) => index + 1),
    sourceRow: injectionChannels.get('sourceRow') ?? injectionTime.map(() => Number.NaN),
    lastSourceRow:
      injectionChannels.get('lastSourceRow') ??
      injectionChannels.get('sourceRow') ??
      injectionTime.map(() => Number.NaN),
    response,
    isCensored: Object.fromEntries(
      Object.keys(response).map((name) => [name, flags[name] ?? new Float64Array(injectionTime.length)]),
    ),
    quantity,
  }
  return { ...withoutReadings, log, injections }
}
