import 'server-only'
import { getDatabase } from '../../../db/client'
import { type Executor } from '../../../db/executor'
import { insertReduction } from '../../../db/mutations/results'
import { selectReadingChannels } from '../../../db/queries/readings'
import {
  selectCalibrationRecords,
  selectCampaignRecords,
  selectMethodSettings,
  selectRunDetailRecords,
  selectRunRecords,
  selectSiteCountRecords,
  type CampaignRecords,
  type RunRecords,
} from '../../../db/queries/reduction-inputs'
import { selectCurrentReadingSets, selectReductions, type StoredReduction } from '../../../db/queries/results'
import { AnalysisError } from '../../analysis/analysis-error'
import { reduceRun } from '../../analysis/reduction/reduce-run'
import { type SiteCountInput } from '../../analysis/reduction/run-input'
import { type RunReduction } from '../../analysis/reduction/run-reduction'
import { AppError } from '../../domain/errors'
import { methodSettingsSchema, type MethodSettings } from '../../domain/method'
import { engineId } from '../engine-id'
import { KeptResults } from './kept-results'
import { completeRunInput, prepareRun, whatIsMissing, type PreparedRun } from './run-input-from-records'

export interface ReducedRun {
  readonly run: RunRecords
  /** content key of the result; null while something is missing */
  readonly key: string | null
  readonly reduction: RunReduction | null
  /** sites of the bed in the tube; null where none are counted */
  readonly siteCount: SiteCountInput | null
  /** what stands in the way, in a sentence; empty when nothing does */
  readonly notReadyReason: string
}

export interface MethodInForce {
  readonly id: string
  readonly number: number
  readonly settings: MethodSettings
}

export interface ReducedCampaign {
  readonly campaign: CampaignRecords
  readonly method: MethodInForce
  readonly runs: readonly ReducedRun[]
}

/** Either the result or, as a value too, why the engine could not give one: a refusal is kept like a result. */
type Outcome = { readonly reduction: RunReduction } | { readonly refusal: string }

const shared = globalThis as typeof globalThis & { [key: symbol]: KeptResults<Outcome> | undefined }
const STORE = Symbol.for('inverse-kelvin.reductions')
const kept = (shared[STORE] ??= new KeptResults<Outcome>())

function fromStore(stored: StoredReduction): RunReduction {
  // written by keep() below from the same type; the store adds nothing and loses nothing
  return { ...(stored.summary as object), holds: stored.holds, points: stored.points } as unknown as RunReduction
}

async function keep(prepared: PreparedRun, methodId: string, engine: string, reduction: RunReduction): Promise<void> {
  const { holds, points, ...summary } = reduction
  const db = await getDatabase()
  await db.transaction((tx) =>
    insertReduction(tx, {
      key: prepared.key,
      runId: prepared.bundle.run.runId,
      methodId,
      engineId: engine,
      summary,
      holds: holds.map((hold) => ({
        kind: hold.kind,
        number: hold.number,
        startedAt: new Date(hold.startS * 1000),
        endedAt: new Date(hold.endS * 1000),
        setTemperatureK: hold.setTemperatureK,
        content: hold,
      })),
      points: points.map((point) => ({
        holdNumber: point.hold.number,
        temperatureK: point.temperatureK.value,
        rateMolPerKgS: point.rateMolPerKgS?.value ?? null,
        conversion: point.conversion?.value ?? null,
        content: point,
      })),
    }),
  )
}

async function compute(db: Executor, prepared: PreparedRun, methodId: string, engine: string): Promise<Outcome> {
  try {
    const input = await completeRunInput(prepared, (readingSetId) => selectReadingChannels(db, readingSetId))
    const reduction = reduceRun(input)
    await keep(prepared, methodId, engine, reduction)
    return { reduction }
  } catch (error) {
    if (error instanceof AnalysisError) return { refusal: error.message }
    throw error
  }
}

/** The method a campaign is computed with: its newest version, or the one asked for. */
export async function methodInForce(db: Executor, campaignId: string, number?: number): Promise<MethodInForce> {
  const versions = await selectMethodSettings(db, campaignId)
  const found = number === undefined ? versions.at(-1) : versions.find((version) => version.number === number)
  if (found === undefined)
    throw new AppError(
      'not-found',
      number === undefined ? 'The campaign has no method yet.' : `There is no method ${number}.`,
    )
  return { id: found.id, number: found.number, settings: methodSettingsSchema.parse(found.settings) }
}

/**
 * Results of these runs of one campaign, computed where none is stored under their content. The caller has settled that the actor may
 * read the campaign.
 */
export async function reduceRuns(
  campaignId: string,
  runIds: readonly string[],
  methodNumber?: number,
): Promise<ReducedCampaign> {
  const db = await getDatabase()
  const engine = engineId()
  const campaign = await selectCampaignRecords(db, campaignId)
  if (campaign === undefined)
    throw new AppError('not-found', 'There is nothing here under this address, or not for you.')
  const method = await methodInForce(db, campaignId, methodNumber)
  const records = await selectRunRecords(db, runIds)
  const first = records.reduce((least, run) => Math.min(least, run.startedAt.getTime()), Infinity)
  const last = records.reduce((most, run) => Math.max(most, run.startedAt.getTime()), -Infinity)
  const calibrations = records.length === 0 ? [] : await selectCalibrationRecords(db, new Date(first), new Date(last))
  const siteCounts = await selectSiteCountRecords(db, [...new Set(records.map((run) => run.sampleId))])
  const details = await selectRunDetailRecords(db, runIds)
  const sets = await selectCurrentReadingSets(db, runIds)

  const prepared = new Map<string, PreparedRun>()
  const missing = new Map<string, string>()
  for (const run of records) {
    const bundle = {
      run,
      campaign,
      settings: method.settings,
      calibrations,
      siteCounts,
      details,
      readingSets: sets.filter((set) => set.runId === run.runId),
    }
    const reason = whatIsMissing(bundle)
    if (reason === '') prepared.set(run.runId, prepareRun(bundle, engine))
    else missing.set(run.runId, reason)
  }
  const unknown = [...prepared.values()].map((entry) => entry.key).filter((key) => kept.get(key) === undefined)
  for (const stored of await selectReductions(db, unknown)) kept.set(stored.key, { reduction: fromStore(stored) })

  const runs: ReducedRun[] = []
  for (const run of records) {
    const entry = prepared.get(run.runId)
    if (entry === undefined) {
      runs.push({ run, key: null, reduction: null, siteCount: null, notReadyReason: missing.get(run.runId) ?? '' })
      continue
    }
    const { siteCount } = entry.withoutReadings
    const outcome = await kept.getOrCompute(entry.key, () => compute(db, entry, method.id, engine))
    runs.push(
      'reduction' in outcome
        ? { run, key: entry.key, reduction: outcome.reduction, siteCount, notReadyReason: '' }
        : { run, key: null, reduction: null, siteCount, notReadyReason: outcome.refusal },
    )
  }
  return { campaign, method, runs }
}
