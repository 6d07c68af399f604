import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor, type Transaction } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertLoading, updateLoading } from '../../db/mutations/samples'
import { selectRunSummaries } from '../../db/queries/runs'
import {
  lockLargestLoadingNumber,
  selectLoading,
  selectLoadings,
  selectLots,
  type LoadingFilter,
  type SampleScope,
} from '../../db/queries/samples'
import { changedFields } from '../audit/changed-fields'
import { wholeList, type Page } from '../domain/page'
import { type Actor } from '../domain/role'
import { type Loading, type LoadingChange, type NewLoading, type Run } from '../domain/run'
import { can } from '../policy/can'
import { authorise, hideUnless } from './authorise'
import { holdOpenCampaign, readableSamples, touchableSamples } from './campaign-rights'
import { codeAfter } from './code-after'
import { refuseEmpty, refuseField, refuseStale } from './stale'

async function foundLoading(db: Executor, scope: SampleScope, id: string): Promise<Loading> {
  const loading = await selectLoading(db, scope, id)
  hideUnless(loading !== null)
  return loading
}

/** Latest packed first: the first one of a rig's channel is the bed that is in. */
export async function listLoadings(
  actor: Actor,
  filter: LoadingFilter = {},
  page: Page<string> = wholeList,
): Promise<Loading[]> {
  authorise(can.readHouse(actor))
  return selectLoadings(await getDatabase(), readableSamples(actor), filter, page)
}

export async function getLoading(actor: Actor, id: string): Promise<Loading> {
  hideUnless(can.readHouse(actor))
  return foundLoading(await getDatabase(), readableSamples(actor), id)
}

/** What a bed cannot be: a catalyst run on no catalyst, or particles larger at the small end. */
export function checkBed(
  bed: Pick<NewLoading, 'catalystMassKg' | 'particleMinimumM' | 'particleMaximumM'>,
  kind: Run['kind'],
): void {
  if (kind === 'catalyst' && bed.catalystMassKg <= 0)
    refuseField('loading.catalystMassKg', 'A run on a catalyst needs a mass above zero; a run on none is a blank.')
  const { particleMinimumM, particleMaximumM } = bed
  if (particleMinimumM !== null && particleMaximumM !== null && particleMinimumM > particleMaximumM)
    refuseField('loading.particleMaximumM', 'The largest particles cannot be smaller than the smallest.')
}

async function checkLot(tx: Transaction, sampleId: string, lotId: string | null | undefined): Promise<void> {
  if (lotId === null || lotId === undefined) return
  const known = await selectLots(tx, { campaigns: 'all', makerId: null }, sampleId)
  if (!known.some((lot) => lot.id === lotId)) refuseField('loading.lotId', 'The sample has no such lot.')
}

/** Keeps a bed under the next `L-0001`. The caller has asked for the right and writes the entry of the whole change. */
export async function packLoading(
  tx: Transaction,
  actor: Actor,
  input: NewLoading,
  place: { readonly rigId: string; readonly channel: string; readonly packedAt: Date },
): Promise<Pick<Loading, 'id'>> {
  await checkLot(tx, input.sampleId, input.lotId)
  const id = randomUUID()
  const code = codeAfter('L', await lockLargestLoadingNumber(tx))
  await insertLoading(tx, { ...input, ...place, id, code, createdBy: actor.userId })
  return { id }
}

/** Corrects what was noted of a bed; whoever may edit every run on it may do so. */
export async function changeLoading(
  actor: Actor,
  id: string,
  change: LoadingChange,
  version: number,
): Promise<Loading> {
  refuseEmpty(change)
  const db = await getDatabase()
  return db.transaction((tx) => changeLoadingIn(tx, actor, id, change, version))
}

/** The same within a larger change. */
export async function changeLoadingIn(
  tx: Transaction,
  actor: Actor,
  id: string,
  change: LoadingChange,
  version: number,
): Promise<Loading> {
  const scope = touchableSamples(actor)
  const before = await foundLoading(tx, scope, id)
  const runs = await selectRunSummaries(tx, 'all', { loadingId: id }, wholeList)
  const campaignIds = [...new Set(runs.map((run) => run.campaignId))].sort()
  authorise(
    runs.length > 0 && runs.every((run) => can.editRun(actor, run)),
    'A loading is corrected by who may edit every run on it.',
  )
  for (const campaignId of campaignIds) await holdOpenCampaign(tx, campaignId)
  await checkLot(tx, before.sampleId, change.lotId)
  if (!(await updateLoading(tx, id, version, change))) refuseStale(await foundLoading(tx, scope, id))
  const after = await foundLoading(tx, scope, id)
  for (const run of runs) checkBed(after, run.kind)
  for (const campaignId of campaignIds)
    await insertAuditEntry(tx, {
      actor,
      action: 'loading.change',
      entity: 'loading',
      entityId: id,
      campaignId,
      ...changedFields(before, after),
    })
  return after
}
