import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor, type Transaction } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import {
  insertDecision,
  insertExclusion,
  insertHoldEdit,
  insertRemark,
  insertRun,
  replaceFeed,
  updateRun,
  withdrawExclusionRow,
  withdrawHoldEdits,
} from '../../db/mutations/runs'
import { selectCampaignSample } from '../../db/queries/campaigns'
import { selectRig } from '../../db/queries/rigs'
import {
  lockRun,
  selectDecisions,
  selectExclusions,
  selectHoldEdits,
  selectLargestRunNumber,
  selectLastRunIdOnRig,
  selectRemarks,
  selectRun,
  selectRunCampaign,
  selectRunSummaries,
  type RunFilter,
  type RunKey,
} from '../../db/queries/runs'
import { selectLoading } from '../../db/queries/samples'
import { changedFields } from '../audit/changed-fields'
import { AppError } from '../domain/errors'
import { wholeList, type Page } from '../domain/page'
import { type Actor } from '../domain/role'
import {
  type FeedEntry,
  type Loading,
  type LoadingChange,
  type NewDecision,
  type NewExclusion,
  type NewHoldEdit,
  type NewRun,
  type Run,
  type RunChange,
  type RunDecisionRecord,
  type RunExclusion,
  type RunHoldEdit,
  type RunRemark,
  type RunSummary,
} from '../domain/run'
import { can } from '../policy/can'
import { readableCampaigns } from '../policy/campaign-scope'
import { authorise, hideUnless } from './authorise'
import { authoriseIn, hideUnlessReadable, holdOpenCampaign, touchableCampaigns } from './campaign-rights'
import { codeAfter } from './code-after'
import { changeLoadingIn, checkBed, packLoading } from './loadings'
import { refuseEmpty, refuseField, refuseStale } from './stale'

const EDITORS =
  'A technician edits their own run while it is open, a researcher until it is decided, a lead until an edition holds it.'
const LEAVERS_OUT = 'Points are left out by researchers and leads.'

async function foundRun(db: Executor, campaignId: string, id: string): Promise<Run> {
  const run = await selectRun(db, [campaignId], id)
  hideUnless(run !== null)
  return run
}

/** The run and its campaign, held for the transaction; not found for who does not work in it. */
async function holdRun(tx: Transaction, actor: Actor, id: string): Promise<Run> {
  const campaignId = await selectRunCampaign(tx, touchableCampaigns(actor), id)
  hideUnless(campaignId !== null)
  await holdOpenCampaign(tx, campaignId)
  hideUnless(await lockRun(tx, [campaignId], id))
  return foundRun(tx, campaignId, id)
}

/** Runs the actor may see, latest start first. */
export async function listRuns(
  actor: Actor,
  filter: RunFilter = {},
  page: Page<RunKey> = wholeList,
): Promise<RunSummary[]> {
  authorise(can.readHouse(actor), 'Runs are read by the people who work in their campaign.')
  if (filter.campaignId !== undefined) await hideUnlessReadable(actor, filter.campaignId)
  return selectRunSummaries(await getDatabase(), readableCampaigns(actor), filter, page)
}

export async function getRun(actor: Actor, id: string): Promise<Run> {
  const run = await selectRun(await getDatabase(), readableCampaigns(actor), id)
  hideUnless(run !== null)
  return run
}

/** What the form is filled from: the run that started last on the rig (and its channel), of those the actor may see. */
export async function lastRunOnRig(actor: Actor, rigId: string, channel: string | null = null): Promise<Run | null> {
  authorise(can.readHouse(actor), 'Runs are read by the people who work in their campaign.')
  const db = await getDatabase()
  const scope = readableCampaigns(actor)
  const id = await selectLastRunIdOnRig(db, scope, rigId, channel)
  return id === null ? null : selectRun(db, scope, id)
}

function checkFeed(feed: readonly FeedEntry[]): void {
  feed.forEach((entry, index) => {
    if (feed.findIndex((other) => other.species === entry.species) !== index)
      refuseField(`feed.${index}.species`, `${entry.species} stands in the feed twice; give its whole flow once.`)
  })
}

/** Logs a run, with the bed packed for it or the one that is in already. */
export async function createRun(actor: Actor, input: NewRun): Promise<Run> {
  const { campaignId } = input
  authoriseIn(actor, campaignId, can.addRun(actor, campaignId))
  checkFeed(input.feed)
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    const rig = await selectRig(tx, input.rigId)
    if (rig === null) refuseField('rigId', 'There is no such rig.')
    if (!rig.channels.some((channel) => channel.code === input.channel))
      refuseField(
        'channel',
        `${rig.code} has no channel ${input.channel}; it has ${rig.channels.map((channel) => channel.code).join(', ')}.`,
      )
    const code = input.code ?? codeAfter('R', await selectLargestRunNumber(tx, [campaignId], campaignId))
    const loading = await loadingFor(tx, actor, input)
    await insertRun(tx, {
      ...input,
      id,
      code,
      loadingId: loading.id,
      // what the gauge was open to on the day stays with the run, whatever the rig's record says later
      barometerPa: input.barometerPa ?? (input.pressureKind === 'gauge' ? rig.barometerPa : null),
      createdBy: actor.userId,
    })
    await replaceFeed(tx, id, input.feed)
    const run = await foundRun(tx, campaignId, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'run.create',
      entity: 'run',
      entityId: id,
      campaignId,
      after: { ...input, code, loading: run.loading, barometerPa: run.barometerPa },
    })
    return run
  })
}

async function loadingFor(tx: Transaction, actor: Actor, input: NewRun): Promise<Pick<Loading, 'id'>> {
  const { campaignId, rigId, channel, kind } = input
  if (!('loadingId' in input.loading)) {
    checkBed(input.loading, kind)
    if ((await selectCampaignSample(tx, [campaignId], campaignId, input.loading.sampleId)) === null)
      refuseField('loading.sampleId', 'The campaign has no such sample; add it to the campaign first.')
    return packLoading(tx, actor, input.loading, { rigId, channel, packedAt: new Date(input.startedAt) })
  }
  const loading = await selectLoading(tx, { campaigns: [campaignId], makerId: null }, input.loading.loadingId)
  if (loading === null)
    refuseField('loading.loadingId', 'There is no such loading, or its sample is not in this campaign.')
  if (loading.rigId !== rigId || loading.channel !== channel)
    refuseField('loading.loadingId', `${loading.code} was packed into another rig or channel.`)
  checkBed(loading, kind)
  return loading
}

/** Changes what was noted of a run. */
export async function changeRun(actor: Actor, id: string, change: RunChange, version: number): Promise<Run> {
  refuseEmpty(change)
  const db = await getDatabase()
  return db.transaction((tx) => changeRunIn(tx, actor, id, change, version))
}

async function changeRunIn(
  tx: Transaction,
  actor: Actor,
  id: string,
  change: RunChange,
  version: number,
): Promise<Run> {
  const { feed, ...fields } = change
  if (feed !== undefined) checkFeed(feed)
  const before = await holdRun(tx, actor, id)
  authorise(can.editRun(actor, before), EDITORS)
  const { campaignId } = before
  const isChanged = await updateRun(tx, [campaignId], { id, version, states: [before.state] }, fields)
  if (!isChanged) refuseStale(before)
  if (feed !== undefined) await replaceFeed(tx, id, feed)
  const after = await foundRun(tx, campaignId, id)
  await insertAuditEntry(tx, {
    actor,
    action: 'run.change',
    entity: 'run',
    entityId: id,
    campaignId,
    ...changedFields(before, after),
  })
  return after
}

/** Corrects what was logged, the bed's record with it: both or neither. A part without a field is left alone. */
export async function correctRun(
  actor: Actor,
  id: string,
  corrected: { readonly run: RunChange; readonly bed: LoadingChange },
  versions: { readonly run: number; readonly bed: number },
): Promise<Run> {
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const before = await holdRun(tx, actor, id)
    authorise(can.editRun(actor, before), EDITORS)
    if (Object.keys(corrected.bed).length > 0)
      await changeLoadingIn(tx, actor, before.loadingId, corrected.bed, versions.bed)
    return Object.keys(corrected.run).length > 0
      ? changeRunIn(tx, actor, id, corrected.run, versions.run)
      : foundRun(tx, before.campaignId, id)
  })
}

/** Says that nothing more comes: the run is complete and waits for a decision. */
export async function handIn(actor: Actor, id: string, version: number, now = new Date()): Promise<Run> {
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const before = await holdRun(tx, actor, id)
    authorise(can.handIn(actor, before), 'A run is handed in by who logged it, a researcher or a lead.')
    if (before.version !== version) refuseStale(before)
    if (before.state !== 'open')
      throw new AppError('conflict', `${before.code} was handed in already; it is ${before.state.replace('-', ' ')}.`)
    const { campaignId } = before
    const change = { state: 'handed-in', decision: null, handedInAt: now, handedInBy: actor.userId } as const
    if (!(await updateRun(tx, [campaignId], { id, version, states: ['open'] }, change))) refuseStale(before)
    const after = await foundRun(tx, campaignId, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'run.hand-in',
      entity: 'run',
      entityId: id,
      campaignId,
      ...changedFields(before, after),
    })
    return after
  })
}

/** Takes a decision on a run that was handed in; a later one takes the place of an earlier, and both are kept. */
export async function decide(actor: Actor, id: string, input: NewDecision, version: number): Promise<Run> {
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const before = await holdRun(tx, actor, id)
    const { campaignId } = before
    authorise(can.decide(actor, campaignId, before), 'Decisions are taken by a lead of the campaign.')
    if (before.version !== version) refuseStale(before)
    if (before.state === 'open')
      throw new AppError('conflict', `${before.code} is still open. It has to be handed in before it is decided on.`)
    const change = { state: 'decided', decision: input.decision } as const
    const key = { id, version, states: ['handed-in', 'decided'] } as const
    if (!(await updateRun(tx, [campaignId], key, change))) refuseStale(before)
    await insertDecision(tx, { ...input, id: randomUUID(), runId: id, createdBy: actor.userId })
    const after = await foundRun(tx, campaignId, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'run.decide',
      entity: 'run',
      entityId: id,
      campaignId,
      reason: input.reason,
      ...changedFields(before, after),
    })
    return after
  })
}

/** Every decision taken on the run, latest first. */
export async function listDecisions(actor: Actor, runId: string): Promise<RunDecisionRecord[]> {
  return selectDecisions(await getDatabase(), await scopeOfRun(actor, runId), runId)
}

/** The scope of a run the actor reads; not found otherwise, as an empty list would say that the run exists. */
async function scopeOfRun(actor: Actor, runId: string): Promise<readonly string[]> {
  const campaignId = await selectRunCampaign(await getDatabase(), readableCampaigns(actor), runId)
  hideUnless(campaignId !== null)
  return [campaignId]
}

/** What people left out, and what of it was put back, in time order. */
export async function listExclusions(actor: Actor, runId: string): Promise<RunExclusion[]> {
  return selectExclusions(await getDatabase(), await scopeOfRun(actor, runId), runId)
}

/** Leaves a hold or an injection out, with the reason. It stays to be seen, and both fits are shown. */
export async function addExclusion(actor: Actor, runId: string, input: NewExclusion): Promise<RunExclusion> {
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const run = await holdRun(tx, actor, runId)
    const scope = [run.campaignId]
    authorise(can.leaveOut(actor, run), LEAVERS_OUT)
    const inForce = (await selectExclusions(tx, scope, runId)).find(
      (one) => one.withdrawnAt === null && one.kind === input.kind && one.atS === input.atS,
    )
    if (inForce !== undefined)
      throw new AppError('conflict', `${inForce.createdByName} left this ${input.kind} out already: ${inForce.reason}`)
    await insertExclusion(tx, { ...input, id, runId, createdBy: actor.userId })
    await insertAuditEntry(tx, {
      actor,
      action: 'run.leave-out',
      entity: 'run',
      entityId: runId,
      campaignId: run.campaignId,
      reason: input.reason,
      after: { exclusionId: id, kind: input.kind, atS: input.atS },
    })
    return foundIn(await selectExclusions(tx, scope, runId), id)
  })
}

function foundIn<T extends { readonly id: string }>(rows: readonly T[], id: string): T {
  const row = rows.find((one) => one.id === id)
  hideUnless(row !== undefined)
  return row
}

/** Puts back what was left out; the row stays, with the reason in the trail. */
export async function withdrawExclusion(
  actor: Actor,
  runId: string,
  exclusionId: string,
  reason: string,
): Promise<RunExclusion> {
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const run = await holdRun(tx, actor, runId)
    const scope = [run.campaignId]
    authorise(can.leaveOut(actor, run), LEAVERS_OUT)
    const exclusion = foundIn(await selectExclusions(tx, scope, runId), exclusionId)
    if (!(await withdrawExclusionRow(tx, { runId, id: exclusionId }, actor.userId)))
      throw new AppError('conflict', `This ${exclusion.kind} was put back already.`)
    await insertAuditEntry(tx, {
      actor,
      action: 'run.put-back',
      entity: 'run',
      entityId: runId,
      campaignId: run.campaignId,
      reason,
      before: { exclusionId, kind: exclusion.kind, atS: exclusion.atS, reason: exclusion.reason },
    })
    return foundIn(await selectExclusions(tx, scope, runId), exclusionId)
  })
}

/** Windows people moved, and those given back to the rule, in time order. */
export async function listHoldEdits(actor: Actor, runId: string): Promise<RunHoldEdit[]> {
  return selectHoldEdits(await getDatabase(), await scopeOfRun(actor, runId), runId)
}

/** Moves the window of a hold. An edit of the same hold takes the place of an earlier one, which is kept. */
export async function editHold(actor: Actor, runId: string, input: NewHoldEdit): Promise<RunHoldEdit> {
  if (input.startS === null && input.endS === null)
    refuseField(
      'startS',
      'Say where the window starts or ends. To have the window of the rule again, withdraw the edit.',
    )
  if (input.startS !== null && input.endS !== null && input.startS >= input.endS)
    refuseField('endS', 'The window has to end after it starts.')
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const run = await holdRun(tx, actor, runId)
    const scope = [run.campaignId]
    authorise(can.leaveOut(actor, run), 'Windows are moved by researchers and leads.')
    const before = (await selectHoldEdits(tx, scope, runId)).find(
      (one) => one.withdrawnAt === null && one.foundStartS === input.foundStartS,
    )
    await withdrawHoldEdits(tx, { runId, foundStartS: input.foundStartS })
    await insertHoldEdit(tx, { ...input, id, runId, createdBy: actor.userId })
    const windowOf = (edit: NewHoldEdit) => ({
      foundStartS: edit.foundStartS,
      startS: edit.startS,
      endS: edit.endS,
    })
    await insertAuditEntry(tx, {
      actor,
      action: 'run.move-window',
      entity: 'run',
      entityId: runId,
      campaignId: run.campaignId,
      reason: input.reason,
      ...(before === undefined ? {} : { before: windowOf(before) }),
      after: { holdEditId: id, ...windowOf(input) },
    })
    return foundIn(await selectHoldEdits(tx, scope, runId), id)
  })
}

/** Gives a window back to the rule. */
export async function withdrawHoldEdit(
  actor: Actor,
  runId: string,
  holdEditId: string,
  reason: string,
): Promise<RunHoldEdit> {
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const run = await holdRun(tx, actor, runId)
    const scope = [run.campaignId]
    authorise(can.leaveOut(actor, run), 'Windows are moved by researchers and leads.')
    const edit = foundIn(await selectHoldEdits(tx, scope, runId), holdEditId)
    if ((await withdrawHoldEdits(tx, { runId, id: holdEditId })) === 0)
      throw new AppError('conflict', 'This edit is not in force any more.')
    await insertAuditEntry(tx, {
      actor,
      action: 'run.give-window-back',
      entity: 'run',
      entityId: runId,
      campaignId: run.campaignId,
      reason,
      before: { holdEditId, foundStartS: edit.foundStartS, startS: edit.startS, endS: edit.endS },
    })
    return foundIn(await selectHoldEdits(tx, scope, runId), holdEditId)
  })
}

/** Oldest first. */
export async function listRemarks(actor: Actor, runId: string): Promise<RunRemark[]> {
  return selectRemarks(await getDatabase(), await scopeOfRun(actor, runId), runId)
}

export async function addRemark(actor: Actor, runId: string, body: string): Promise<RunRemark> {
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const run = await holdRun(tx, actor, runId)
    authorise(can.remark(actor, run.campaignId), 'Remarks are written by researchers and leads.')
    await insertRemark(tx, { id, runId, body, createdBy: actor.userId })
    await insertAuditEntry(tx, {
      actor,
      action: 'run.remark',
      entity: 'run',
      entityId: runId,
      campaignId: run.campaignId,
      after: { remarkId: id, body },
    })
    return foundIn(await selectRemarks(tx, [run.campaignId], runId), id)
  })
}
