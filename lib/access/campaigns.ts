import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor, type Transaction } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import {
  deleteMember,
  insertCampaign,
  insertCampaignSample,
  insertMember,
  insertMethod,
  updateCampaign,
  updateCampaignSample,
  updateMember,
} from '../../db/mutations/campaigns'
import {
  lockCampaign,
  selectCampaign,
  selectCampaigns,
  selectCampaignSample,
  selectCampaignSamples,
  selectCurrentMethod,
  selectMemberRole,
  selectMembers,
  selectMethod,
  selectMethods,
  type CampaignFilter,
  type CampaignRow,
} from '../../db/queries/campaigns'
import { selectAccount } from '../../db/queries/people'
import { selectReaction } from '../../db/queries/reactions'
import { selectSample } from '../../db/queries/samples'
import { changedFields } from '../audit/changed-fields'
import {
  type CampaignChange,
  type CampaignSample,
  type CampaignSampleChange,
  type CampaignSummary,
  type Member,
  type NewCampaign,
  type NewMember,
} from '../domain/campaign'
import { AppError } from '../domain/errors'
import { methodSettingsSchema, type Method, type NewMethod } from '../domain/method'
import { wholeList, type Page } from '../domain/page'
import { type Actor, type CampaignRole } from '../domain/role'
import { can } from '../policy/can'
import { readableCampaigns } from '../policy/campaign-scope'
import { authorise, hideUnless } from './authorise'
import { authoriseIn, hideUnlessReadable, holdOpenCampaign, touchableSamples } from './campaign-rights'
import { refuseEmpty, refuseField, refuseStale } from './stale'

const LEADS_ONLY = 'This is for a lead of the campaign.'
const NO_SUCH_SAMPLE = 'There is no such sample, or it is in no campaign of yours.'

function summaryFor(actor: Actor, row: CampaignRow): CampaignSummary {
  return { ...row, myRole: actor.memberships[row.id] ?? 'admin' }
}

async function foundCampaign(db: Executor, id: string): Promise<CampaignRow> {
  const campaign = await selectCampaign(db, [id], id)
  hideUnless(campaign !== null)
  return campaign
}

/** Campaigns whose runs and ranking the actor reads, by code. */
export async function listCampaigns(
  actor: Actor,
  filter: CampaignFilter = {},
  page: Page<string> = wholeList,
): Promise<CampaignSummary[]> {
  authorise(can.listCampaigns(actor))
  const rows = await selectCampaigns(await getDatabase(), readableCampaigns(actor), filter, page)
  return rows.map((row) => summaryFor(actor, row))
}

export async function getCampaign(actor: Actor, campaignId: string): Promise<CampaignSummary> {
  const row = await selectCampaign(await getDatabase(), readableCampaigns(actor), campaignId)
  hideUnless(row !== null)
  return summaryFor(actor, row)
}

/** Starts a campaign with its maker as lead and method 1 from the defaults. */
export async function createCampaign(actor: Actor, input: NewCampaign): Promise<CampaignSummary> {
  authorise(can.makeCampaign(actor), 'Campaigns are started by leads and admins.')
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    if ((await selectReaction(tx, input.reactionId)) === null) refuseField('reactionId', 'There is no such reaction.')
    await checkReferenceSample(tx, actor, input.referenceSampleId)
    await insertCampaign(tx, { ...input, id, createdBy: actor.userId })
    await insertMember(tx, id, { userId: actor.userId, role: 'lead' })
    const settings = methodSettingsSchema.parse({})
    await insertMethod(tx, {
      id: randomUUID(),
      campaignId: id,
      number: 1,
      settings,
      reason: 'Defaults, at the start of the campaign.',
      createdBy: actor.userId,
    })
    if (input.referenceSampleId !== null) await insertCampaignSample(tx, id, input.referenceSampleId)
    await insertAuditEntry(tx, {
      actor,
      action: 'campaign.create',
      entity: 'campaign',
      entityId: id,
      campaignId: id,
      after: { ...input, lead: actor.userId, method: { number: 1, settings } },
    })
    return { ...(await foundCampaign(tx, id)), myRole: 'lead' }
  })
}

async function checkReferenceSample(tx: Transaction, actor: Actor, sampleId: string | null | undefined): Promise<void> {
  if (sampleId === null || sampleId === undefined) return
  if ((await selectSample(tx, touchableSamples(actor), sampleId)) === null)
    refuseField('referenceSampleId', NO_SUCH_SAMPLE)
}

export async function changeCampaign(
  actor: Actor,
  campaignId: string,
  change: CampaignChange,
  version: number,
): Promise<CampaignSummary> {
  authoriseIn(actor, campaignId, can.editCampaign(actor, campaignId), LEADS_ONLY)
  refuseEmpty(change)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    const { referenceSampleId } = change
    if (referenceSampleId !== null && referenceSampleId !== undefined) {
      if ((await selectCampaignSample(tx, [campaignId], campaignId, referenceSampleId)) === null)
        refuseField('referenceSampleId', 'The reference sample has to be one of the campaign; add it first.')
    }
    return writeCampaign(tx, actor, campaignId, version, change, 'campaign.change')
  })
}

async function writeCampaign(
  tx: Transaction,
  actor: Actor,
  campaignId: string,
  version: number,
  change: Parameters<typeof updateCampaign>[4],
  action: string,
  reason = '',
): Promise<CampaignSummary> {
  const before = await foundCampaign(tx, campaignId)
  if (!(await updateCampaign(tx, [campaignId], campaignId, version, change)))
    refuseStale(summaryFor(actor, await foundCampaign(tx, campaignId)))
  const after = await foundCampaign(tx, campaignId)
  await insertAuditEntry(tx, {
    actor,
    action,
    entity: 'campaign',
    entityId: campaignId,
    campaignId,
    reason,
    ...changedFields(before, after),
  })
  return summaryFor(actor, after)
}

/** Ends the work in a campaign: it is read as before, and nothing in it changes until it is opened again. */
export async function closeCampaign(
  actor: Actor,
  campaignId: string,
  reason: string,
  version: number,
  now = new Date(),
): Promise<CampaignSummary> {
  authoriseIn(actor, campaignId, can.editCampaign(actor, campaignId), LEADS_ONLY)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    return writeCampaign(tx, actor, campaignId, version, { closedAt: now }, 'campaign.close', reason)
  })
}

export async function reopenCampaign(
  actor: Actor,
  campaignId: string,
  reason: string,
  version: number,
): Promise<CampaignSummary> {
  authoriseIn(actor, campaignId, can.editCampaign(actor, campaignId), LEADS_ONLY)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const held = await lockCampaign(tx, [campaignId], campaignId)
    hideUnless(held !== null)
    if (held.closedAt === null) throw new AppError('conflict', 'The campaign is open already.')
    return writeCampaign(tx, actor, campaignId, version, { closedAt: null }, 'campaign.reopen', reason)
  })
}

/** Everybody who has a part in the campaign, by name. */
export async function listMembers(actor: Actor, campaignId: string): Promise<Member[]> {
  await hideUnlessReadable(actor, campaignId)
  return selectMembers(await getDatabase(), readableCampaigns(actor), campaignId)
}

async function foundMember(tx: Transaction, campaignId: string, userId: string): Promise<Member> {
  const member = (await selectMembers(tx, [campaignId], campaignId)).find((one) => one.userId === userId)
  hideUnless(member !== undefined)
  return member
}

async function checkMember(tx: Transaction, { userId, role }: NewMember): Promise<void> {
  const account = await selectAccount(tx, userId)
  if (account === null || account.disabledAt !== null)
    refuseField('userId', 'There is no such person, or their account is closed.')
  if (account.role === 'guest' && role !== 'guest')
    refuseField('role', `${account.displayName} is a guest of the house and can only be a guest of a campaign.`)
}

async function keepALead(tx: Transaction, campaignId: string, userId: string, next: CampaignRole | null) {
  if (next === 'lead') return
  const others = (await selectMembers(tx, [campaignId], campaignId)).filter((one) => one.userId !== userId)
  if (!others.some((one) => one.role === 'lead' && !one.isDisabled))
    throw new AppError('conflict', 'The campaign would be without a lead. Make somebody else lead of it first.')
}

export async function addMember(actor: Actor, campaignId: string, input: NewMember): Promise<Member> {
  authoriseIn(actor, campaignId, can.manageMembers(actor, campaignId), 'Members are managed by leads and admins.')
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    hideUnless((await lockCampaign(tx, [campaignId], campaignId)) !== null)
    await checkMember(tx, input)
    await insertMember(tx, campaignId, input)
    const member = await foundMember(tx, campaignId, input.userId)
    await insertAuditEntry(tx, {
      actor,
      action: 'member.add',
      entity: 'member',
      entityId: input.userId,
      campaignId,
      after: { displayName: member.displayName, role: input.role },
    })
    return member
  })
}

export async function changeMember(
  actor: Actor,
  campaignId: string,
  userId: string,
  role: CampaignRole,
): Promise<Member> {
  authoriseIn(actor, campaignId, can.manageMembers(actor, campaignId), 'Members are managed by leads and admins.')
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    hideUnless((await lockCampaign(tx, [campaignId], campaignId)) !== null)
    const before = await foundMember(tx, campaignId, userId)
    await checkMember(tx, { userId, role })
    if (before.role === 'lead') await keepALead(tx, campaignId, userId, role)
    await updateMember(tx, [campaignId], campaignId, { userId, role })
    const after = await foundMember(tx, campaignId, userId)
    await insertAuditEntry(tx, {
      actor,
      action: 'member.change',
      entity: 'member',
      entityId: userId,
      campaignId,
      ...changedFields(before, after),
    })
    return after
  })
}

/** Ends somebody's part in the campaign; what they did in it stays. */
export async function removeMember(actor: Actor, campaignId: string, userId: string): Promise<void> {
  authoriseIn(actor, campaignId, can.manageMembers(actor, campaignId), 'Members are managed by leads and admins.')
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    hideUnless((await lockCampaign(tx, [campaignId], campaignId)) !== null)
    const role = await selectMemberRole(tx, [campaignId], campaignId, userId)
    hideUnless(role !== null)
    const member = await foundMember(tx, campaignId, userId)
    if (role === 'lead') await keepALead(tx, campaignId, userId, null)
    await deleteMember(tx, [campaignId], campaignId, userId)
    await insertAuditEntry(tx, {
      actor,
      action: 'member.remove',
      entity: 'member',
      entityId: userId,
      campaignId,
      before: { displayName: member.displayName, role },
    })
  })
}

/** Every version, newest first. */
export async function listMethods(actor: Actor, campaignId: string, page: Page<number> = wholeList): Promise<Method[]> {
  await hideUnlessReadable(actor, campaignId)
  return selectMethods(await getDatabase(), readableCampaigns(actor), campaignId, page)
}

export async function getMethod(actor: Actor, campaignId: string, number: number): Promise<Method> {
  hideUnless(can.readCampaign(actor, campaignId))
  const method = await selectMethod(await getDatabase(), readableCampaigns(actor), campaignId, number)
  hideUnless(method !== null)
  return method
}

export async function getCurrentMethod(actor: Actor, campaignId: string): Promise<Method> {
  hideUnless(can.readCampaign(actor, campaignId))
  const method = await selectCurrentMethod(await getDatabase(), readableCampaigns(actor), campaignId)
  hideUnless(method !== null)
  return method
}

/**
 * Keeps these settings as the next version; earlier ones stay as they were, and results follow the new one. With `basedOn`, the number
 * of the version the editor had before them, another one saved meanwhile refuses it.
 */
export async function saveMethod(
  actor: Actor,
  campaignId: string,
  input: NewMethod,
  basedOn?: number,
): Promise<Method> {
  authoriseIn(actor, campaignId, can.saveMethod(actor, campaignId), LEADS_ONLY)
  const { settings } = input
  if (settings.graveCarbonBalanceWindow < settings.carbonBalanceWindow)
    refuseField(
      'settings.graveCarbonBalanceWindow',
      'The grave limit of the carbon balance cannot be inside the first one.',
    )
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    const current = await selectCurrentMethod(tx, [campaignId], campaignId)
    const number = current?.number ?? 0
    if (basedOn !== undefined && current !== null && basedOn !== number) refuseStale({ ...current, version: number })
    await insertMethod(tx, {
      id: randomUUID(),
      campaignId,
      number: number + 1,
      settings,
      reason: input.reason,
      createdBy: actor.userId,
    })
    const method = await selectCurrentMethod(tx, [campaignId], campaignId)
    hideUnless(method !== null)
    await insertAuditEntry(tx, {
      actor,
      action: 'method.save',
      entity: 'method',
      entityId: method.id,
      campaignId,
      reason: input.reason,
      ...changedFields({ number, ...(current?.settings ?? {}) }, { number: method.number, ...method.settings }),
    })
    return method
  })
}

/** Samples of the campaign by code, with what people wrote beside them. */
export async function listCampaignSamples(
  actor: Actor,
  campaignId: string,
  page: Page<string> = wholeList,
): Promise<CampaignSample[]> {
  await hideUnlessReadable(actor, campaignId)
  return selectCampaignSamples(await getDatabase(), readableCampaigns(actor), campaignId, page)
}

export async function getCampaignSample(actor: Actor, campaignId: string, sampleId: string): Promise<CampaignSample> {
  hideUnless(can.readCampaign(actor, campaignId))
  const sample = await selectCampaignSample(await getDatabase(), readableCampaigns(actor), campaignId, sampleId)
  hideUnless(sample !== null)
  return sample
}

async function foundCampaignSample(db: Executor, campaignId: string, sampleId: string): Promise<CampaignSample> {
  const sample = await selectCampaignSample(db, [campaignId], campaignId, sampleId)
  hideUnless(sample !== null)
  return sample
}

/** Puts a sample the actor knows into the campaign. */
export async function addSampleToCampaign(actor: Actor, campaignId: string, sampleId: string): Promise<CampaignSample> {
  authoriseIn(actor, campaignId, can.addSampleToCampaign(actor, campaignId))
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    if ((await selectSample(tx, touchableSamples(actor), sampleId)) === null) refuseField('sampleId', NO_SUCH_SAMPLE)
    return putSampleInto(tx, actor, campaignId, sampleId)
  })
}

/** The step that both a sample new in the campaign and a new sample take. The campaign is held, the right asked for. */
export async function putSampleInto(
  tx: Transaction,
  actor: Actor,
  campaignId: string,
  sampleId: string,
): Promise<CampaignSample> {
  await insertCampaignSample(tx, campaignId, sampleId)
  const sample = await foundCampaignSample(tx, campaignId, sampleId)
  await insertAuditEntry(tx, {
    actor,
    action: 'campaign-sample.add',
    entity: 'campaign-sample',
    entityId: sampleId,
    campaignId,
    after: { sampleCode: sample.sampleCode, sampleName: sample.sampleName },
  })
  return sample
}

/** Writes the cells of the ranking that people may write: the remark a researcher, shortlist and priority a lead. */
export async function changeCampaignSample(
  actor: Actor,
  campaignId: string,
  sampleId: string,
  change: CampaignSampleChange,
): Promise<CampaignSample> {
  const { version, ...fields } = change
  if (fields.remark !== undefined)
    authoriseIn(actor, campaignId, can.remark(actor, campaignId), 'Remarks are written by researchers and leads.')
  if (fields.isShortlisted !== undefined)
    authoriseIn(actor, campaignId, can.shortlist(actor, campaignId), 'The shortlist is for a lead of the campaign.')
  if (fields.priority !== undefined)
    authoriseIn(actor, campaignId, can.setPriority(actor, campaignId), 'The priority is for a lead of the campaign.')
  hideUnless(can.readCampaign(actor, campaignId) || can.remark(actor, campaignId))
  refuseEmpty(fields)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await holdOpenCampaign(tx, campaignId)
    const before = await foundCampaignSample(tx, campaignId, sampleId)
    if (!(await updateCampaignSample(tx, [campaignId], { campaignId, sampleId, version }, fields)))
      refuseStale(await foundCampaignSample(tx, campaignId, sampleId))
    const after = await foundCampaignSample(tx, campaignId, sampleId)
    await insertAuditEntry(tx, {
      actor,
      action: 'campaign-sample.change',
      entity: 'campaign-sample',
      entityId: sampleId,
      campaignId,
      ...changedFields(before, after),
    })
    return after
  })
}
