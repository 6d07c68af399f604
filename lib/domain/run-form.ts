import { z } from 'zod'
import { type FlowReference } from '../analysis/units/flow-reference'
import { typedQuantity } from './typed-quantity'
import { localFromInstant } from './instant-in-zone'
import { type Reaction } from './reaction'
import { type Rig } from './rig'
import { type Loading, type Run, runKinds } from './run'

const line = z.string().max(200)

/** What stands in the fields of "Log a run", as typed. A draft is this and nothing else. */
export const runFormValuesSchema = z.strictObject({
  /** one try at logging this run: sent twice, it is logged once */
  key: z.string().min(8).max(64),
  campaignId: line,
  kind: z.enum(runKinds),
  code: line,
  sampleId: line,
  lotId: line,
  rigId: line,
  channel: line,
  bed: z.enum(['new', 'in']),
  catalyst: line,
  weighing: line,
  diluent: line,
  sieve: line,
  tube: line,
  bedLength: line,
  feed: z.array(z.strictObject({ species: line, flow: line, isStandard: z.boolean() })).max(20),
  /** `273.15;101325`: kelvin and pascal of the state the flows are counted at; empty until said */
  flowReference: line,
  pressure: line,
  pressureKind: z.enum(['', 'absolute', 'gauge']),
  barometer: line,
  highestTemperature: line,
  pretreatment: z.string().max(2_000),
  start: line,
  notes: z.string().max(4_000),
})
export type RunFormValues = z.infer<typeof runFormValuesSchema>

export interface RunFormCampaign {
  readonly id: string
  readonly code: string
  readonly name: string
  readonly reaction: Pick<Reaction, 'keyReactant' | 'steps' | 'name'> | null
  /** of the main step, per mole of key reactant, at 298.15 K; null where it is not known */
  readonly reactionEnthalpyJPerMol: number | null
}

export interface RunFormSample {
  readonly id: string
  readonly code: string
  readonly name: string
  readonly activeMetal: string | null
  readonly campaignIds: readonly string[]
  readonly lots: readonly { readonly id: string; readonly code: string }[]
}

/** What the form chooses from. */
export interface RunFormChoices {
  readonly campaigns: readonly RunFormCampaign[]
  readonly samples: readonly RunFormSample[]
  readonly rigs: readonly Rig[]
  /** the last bed packed into each rig and channel */
  readonly bedsIn: readonly Loading[]
  /** the last run on each rig */
  readonly lastRuns: readonly Run[]
}

export function referenceKey(reference: FlowReference): string {
  return `${String(reference.temperatureK)};${String(reference.pressurePa)}`
}

export function referenceFromKey(key: string): FlowReference | null {
  const [temperatureK, pressurePa] = key.split(';').map(Number)
  return temperatureK !== undefined && pressurePa !== undefined && temperatureK > 0 && pressurePa > 0
    ? { temperatureK, pressurePa }
    : null
}

export function rigReference(rig: Rig | undefined): FlowReference | null {
  return rig !== undefined && rig.flowReferenceTemperatureK !== null && rig.flowReferencePressurePa !== null
    ? { temperatureK: rig.flowReferenceTemperatureK, pressurePa: rig.flowReferencePressurePa }
    : null
}

/** The form as it opens on a rig: filled in from the last run there, else with what rig and reaction tell. */
export function openRunForm(
  choices: RunFormChoices,
  rigId: string,
  campaignId: string,
  key: string,
  now: Date,
): RunFormValues {
  const rig = choices.rigs.find(({ id }) => id === rigId) ?? choices.rigs[0]
  const last = choices.lastRuns.find((run) => run.rigId === rig?.id)
  const campaign =
    choices.campaigns.find(({ id }) => id === campaignId) ??
    choices.campaigns.find(({ id }) => id === last?.campaignId) ??
    choices.campaigns[0]
  const reference = rigReference(rig)
  const start = rig === undefined ? '' : localFromInstant(now, rig.timeZone)
  const tube = rig?.channels[0]?.tubeInnerDiameterM ?? null
  const blank: RunFormValues = {
    key,
    campaignId: campaign?.id ?? '',
    kind: 'catalyst',
    code: '',
    sampleId: '',
    lotId: '',
    rigId: rig?.id ?? '',
    channel: rig?.channels[0]?.code ?? '',
    bed: 'new',
    catalyst: '',
    weighing: '0.5 %',
    diluent: '',
    sieve: '',
    tube: tube === null ? '' : typedQuantity(tube, 'length'),
    bedLength: '',
    feed: reactantsOf(campaign).map((species) => ({ species, flow: '', isStandard: false })),
    flowReference: reference === null ? '' : referenceKey(reference),
    pressure: '',
    pressureKind: '',
    barometer: rig === undefined ? '' : typedQuantity(rig.barometerPa, 'pressure'),
    highestTemperature: '',
    pretreatment: '',
    start,
    notes: '',
  }
  return last === undefined ? blank : { ...blank, ...fromLastRun(last), campaignId: blank.campaignId }
}

/** The form of a run that was logged, to correct it. */
export function formOfRun(run: Run, timeZone: string, key: string): RunFormValues {
  return {
    key,
    campaignId: run.campaignId,
    kind: run.kind,
    code: run.code,
    sampleId: run.sampleId,
    lotId: '',
    rigId: run.rigId,
    channel: run.channel,
    bed: 'new',
    catalyst: '',
    weighing: '',
    diluent: '',
    sieve: '',
    tube: '',
    bedLength: '',
    feed: [],
    flowReference: '',
    pressure: '',
    pressureKind: '',
    highestTemperature: '',
    pretreatment: '',
    ...fromLastRun(run),
    barometer: run.barometerPa === null ? '' : typedQuantity(run.barometerPa, 'pressure'),
    start: localFromInstant(new Date(run.startedAt), timeZone),
    notes: run.notes,
  }
}

function fromLastRun(run: Run): Partial<RunFormValues> {
  const { loading } = run
  const firstFeed = run.feed[0]
  return {
    kind: run.kind,
    sampleId: run.sampleId,
    lotId: loading.lotId ?? '',
    channel: run.channel,
    catalyst: loading.catalystMassKg > 0 ? typedQuantity(loading.catalystMassKg, 'mass') : '',
    weighing: typedQuantity(loading.massRelativeStandardUncertainty, 'fraction'),
    diluent:
      loading.diluentMassKg > 0
        ? `${typedQuantity(loading.diluentMassKg, 'mass')} ${loading.diluentMaterial}`.trim()
        : '',
    sieve: sieveText(loading.particleMinimumM, loading.particleMaximumM),
    tube: loading.tubeInnerDiameterM === null ? '' : typedQuantity(loading.tubeInnerDiameterM, 'length'),
    bedLength: loading.bedLengthM === null ? '' : typedQuantity(loading.bedLengthM, 'length'),
    feed: run.feed.map((entry) => ({
      species: entry.species,
      flow: entry.flowText,
      isStandard: entry.isInternalStandard,
    })),
    ...(firstFeed === undefined
      ? {}
      : {
          flowReference: referenceKey({
            temperatureK: firstFeed.referenceTemperatureK,
            pressurePa: firstFeed.referencePressurePa,
          }),
        }),
    pressure: run.pressureText,
    pressureKind: run.pressureText === '' ? '' : run.pressureKind,
    pretreatment: run.pretreatment,
  }
}

function sieveText(minimumM: number | null, maximumM: number | null): string {
  if (minimumM === null || maximumM === null) return ''
  if (minimumM === maximumM) return typedQuantity(minimumM, 'length')
  const [low, lowUnit] = typedQuantity(minimumM, 'length').split(' ')
  const upper = typedQuantity(maximumM, 'length')
  return upper.endsWith(` ${lowUnit ?? ''}`)
    ? `${low ?? ''} to ${upper}`
    : `${typedQuantity(minimumM, 'length')} to ${upper}`
}

/** Species that the reaction uses up, the key reactant first. */
function reactantsOf(campaign: RunFormCampaign | undefined): string[] {
  const reaction = campaign?.reaction ?? null
  if (reaction === null) return []
  const others = Object.entries(reaction.steps[0] ?? {})
    .filter(([species, number]) => number < 0 && species !== reaction.keyReactant)
    .map(([species]) => species)
  return [reaction.keyReactant, ...others]
}
