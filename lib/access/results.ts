import 'server-only'
import { createHash } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { selectReadingChannels } from '../../db/queries/readings'
import { selectCampaignRunIds } from '../../db/queries/reduction-inputs'
import { selectCurrentReadingSets } from '../../db/queries/results'
import { canonicalJson } from '../domain/canonical-json'
import { type MethodSettings } from '../domain/method'
import { type Ranking, type RankingOptions } from '../domain/ranking'
import { type Actor } from '../domain/role'
import { type RunResult, type RunTrace } from '../domain/run-result'
import { thinTrace } from '../domain/thin-trace'
import { can } from '../policy/can'
import { hideUnless } from './authorise'
import { getCampaign, listCampaignSamples } from './campaigns'
import { engineId } from './engine-id'
import { KeptResults } from './reduction/kept-results'
import { rankingRows } from './reduction/ranking-rows'
import { methodInForce, reduceRuns, type MethodInForce, type ReducedRun } from './reduction/reduce-runs'
import { getRun } from './runs'
import { listUploads } from './uploads'

type RankingTable = ReturnType<typeof rankingRows> & { readonly computedAt: string }

const shared = globalThis as typeof globalThis & { [key: symbol]: unknown }
const keptTraces = (shared[Symbol.for('inverse-kelvin.traces')] ??=
  new KeptResults<RunTrace>()) as KeptResults<RunTrace>
const keptTables = (shared[Symbol.for('inverse-kelvin.ranking-tables')] ??=
  new KeptResults<RankingTable>()) as KeptResults<RankingTable>

/** The log of a run as drawn; null while none is confirmed. */
async function traceOf(runId: string): Promise<RunTrace | null> {
  const db = await getDatabase()
  const set = (await selectCurrentReadingSets(db, [runId])).find((entry) => entry.kind === 'rig-log')
  if (set === undefined) return null
  // the set is never changed in place, so its own name says enough
  return keptTraces.getOrCompute(set.id, async () => {
    const channels = await selectReadingChannels(db, set.id, ['time', 'bedTemperatureK', 'setTemperatureK'])
    const empty = new Float64Array()
    return thinTrace(
      channels.get('time') ?? empty,
      channels.get('bedTemperatureK') ?? empty,
      channels.get('setTemperatureK') ?? null,
    )
  })
}

/** One run with its files, its log as drawn and what was made of them under the method in force. */
export async function getRunResult(actor: Actor, runId: string): Promise<RunResult> {
  const run = await getRun(actor, runId)
  const uploads = await listUploads(actor, runId)
  const { runs } = await reduceRuns(run.campaignId, [run.id])
  return {
    run,
    uploads,
    reduction: runs[0]?.reduction ?? null,
    notReadyReason: runs[0]?.notReadyReason ?? '',
    trace: await traceOf(run.id),
  }
}

/** The settings a ranking was computed with. */
export async function getMethodSettings(actor: Actor, campaignId: string, number: number): Promise<MethodSettings> {
  hideUnless(can.readCampaign(actor, campaignId))
  return (await methodInForce(await getDatabase(), campaignId, number)).settings
}

/**
 * The live ranking: every run reduced (or found under its content), every sample's line, and the ranks by draws. It follows a change of any
 * input without being asked, since nothing is looked up but by content.
 */
export async function getRanking(actor: Actor, campaignId: string, options: RankingOptions = {}): Promise<Ranking> {
  return (await rankCampaign(actor, campaignId, options)).ranking
}

/** The same with the method and the reduced runs that it was made of. */
export async function rankCampaign(
  actor: Actor,
  campaignId: string,
  options: RankingOptions = {},
): Promise<{ readonly ranking: Ranking; readonly method: MethodInForce; readonly runs: readonly ReducedRun[] }> {
  hideUnless(can.readCampaign(actor, campaignId))
  const summary = await getCampaign(actor, campaignId)
  const samples = await listCampaignSamples(actor, campaignId)
  const runIds = await selectCampaignRunIds(await getDatabase(), campaignId)
  const { method, runs } = await reduceRuns(campaignId, runIds, options.methodNumber)
  const { settings } = method
  const referenceTemperatureK = options.referenceTemperatureK ?? settings.referenceTemperatureK
  const includeProvisional = options.includeProvisional ?? true
  const named = {
    settings,
    referenceTemperatureK,
    includeProvisional,
    samples,
    engine: engineId(),
    runs: runs.map((entry) => ({
      key: entry.key,
      why: entry.notReadyReason,
      run: entry.run.runId,
      state: entry.run.state,
      decision: entry.run.decision,
      loading: entry.run.loadingId,
      sites: entry.siteCount,
    })),
  }
  const key = createHash('sha256').update(canonicalJson(named)).digest('hex')
  const table = await keptTables.getOrCompute(key, async () => ({
    ...rankingRows({ samples, runs, settings, referenceTemperatureK, includeProvisional }),
    // of the computing, not of the answer: a kept table is as old as it is
    computedAt: new Date().toISOString(),
  }))
  const ranking: Ranking = {
    campaignId,
    campaignCode: summary.code,
    campaignName: summary.name,
    methodId: method.id,
    methodNumber: method.number,
    rankedBy: settings.rankedBy,
    referenceTemperatureK,
    methodReferenceTemperatureK: settings.referenceTemperatureK,
    targetConversion: settings.targetConversion,
    confidenceLevel: settings.confidenceLevel,
    draws: settings.draws,
    seed: settings.seed,
    engineId: engineId(),
    computedAt: table.computedAt,
    includesProvisional: includeProvisional,
    rows: table.rows,
    holdTemperaturesK: runs.flatMap((entry) =>
      (entry.reduction?.points ?? []).map((point) => point.temperatureK.value),
    ),
    summary: table.summary,
  }
  return { ranking, method, runs }
}
