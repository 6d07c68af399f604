import { and, asc, desc, eq, gt, isNotNull, isNull, lt, max, ne, sql } from 'drizzle-orm'
import { type CampaignSample, type CampaignSummary, type Member } from '@/lib/domain/campaign'
import { methodSettingsSchema, type Method } from '@/lib/domain/method'
import { type Page } from '@/lib/domain/page'
import { campaignRoleSchema, type CampaignRole } from '@/lib/domain/role'
import { type Executor, type Transaction } from '../executor'
import { instantOf, instantOrNull } from '../instant'
import { campaigns, campaignSamples, members, methods, loadings, runs, samples, users } from '../schema'
import { inScope, type Scope } from '../scope'

export type CampaignRow = Omit<CampaignSummary, 'myRole'>

export interface CampaignFilter {
  readonly isClosed?: boolean | undefined
}

const campaignColumns = (db: Executor) => ({
  id: campaigns.id,
  code: campaigns.code,
  name: campaigns.name,
  laboratory: campaigns.laboratory,
  description: campaigns.description,
  reactionId: campaigns.reactionId,
  referenceSampleId: campaigns.referenceSampleId,
  closedAt: campaigns.closedAt,
  version: campaigns.version,
  sampleCount: db.$count(campaignSamples, eq(campaignSamples.campaignId, campaigns.id)),
  runCount: db.$count(runs, eq(runs.campaignId, campaigns.id)),
  waitingCount: db.$count(runs, and(eq(runs.campaignId, campaigns.id), ne(runs.state, 'decided'))),
  methodNumber: sql<number | null>`(${db
    .select({ number: max(methods.number) })
    .from(methods)
    .where(eq(methods.campaignId, campaigns.id))})`,
})

export async function selectCampaigns(
  db: Executor,
  scope: Scope,
  filter: CampaignFilter,
  page: Page<string>,
): Promise<CampaignRow[]> {
  const rows = await db
    .select(campaignColumns(db))
    .from(campaigns)
    .where(
      and(
        inScope(campaigns.id, scope),
        filter.isClosed === undefined
          ? undefined
          : filter.isClosed
            ? isNotNull(campaigns.closedAt)
            : isNull(campaigns.closedAt),
        page.after === null ? undefined : gt(campaigns.code, page.after),
      ),
    )
    .orderBy(asc(campaigns.code))
    .limit(page.limit)
  return rows.map((row) => ({ ...row, closedAt: instantOrNull(row.closedAt) }))
}

export async function selectCampaign(db: Executor, scope: Scope, id: string): Promise<CampaignRow | null> {
  const [row] = await db
    .select(campaignColumns(db))
    .from(campaigns)
    .where(and(inScope(campaigns.id, scope), eq(campaigns.id, id)))
  return row === undefined ? null : { ...row, closedAt: instantOrNull(row.closedAt) }
}

export async function hasCampaign(db: Executor, scope: Scope, id: string): Promise<boolean> {
  const rows = await db
    .select({ id: campaigns.id })
    .from(campaigns)
    .where(and(inScope(campaigns.id, scope), eq(campaigns.id, id)))
  return rows.length > 0
}

/** Holds the campaign until the transaction ends, so that numbers are given out one at a time. Null where there is none. */
export async function lockCampaign(
  tx: Transaction,
  scope: Scope,
  id: string,
): Promise<{ readonly closedAt: Date | null } | null> {
  const [row] = await tx
    .select({ closedAt: campaigns.closedAt })
    .from(campaigns)
    .where(and(inScope(campaigns.id, scope), eq(campaigns.id, id)))
    .for('update')
  return row ?? null
}

export async function selectMembers(db: Executor, scope: Scope, campaignId: string): Promise<Member[]> {
  const rows = await db
    .select({
      campaignId: members.campaignId,
      userId: members.userId,
      displayName: users.displayName,
      email: users.email,
      role: members.role,
      disabledAt: users.disabledAt,
      createdAt: members.createdAt,
    })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(and(inScope(members.campaignId, scope), eq(members.campaignId, campaignId)))
    .orderBy(asc(users.displayName), asc(members.userId))
  return rows.map(({ disabledAt, ...row }) => ({
    ...row,
    role: campaignRoleSchema.parse(row.role),
    isDisabled: disabledAt !== null,
    createdAt: instantOf(row.createdAt),
  }))
}

export async function selectMemberRole(
  db: Executor,
  scope: Scope,
  campaignId: string,
  userId: string,
): Promise<CampaignRole | null> {
  const [row] = await db
    .select({ role: members.role })
    .from(members)
    .where(and(inScope(members.campaignId, scope), eq(members.campaignId, campaignId), eq(members.userId, userId)))
  return row === undefined ? null : campaignRoleSchema.parse(row.role)
}

const methodColumns = {
  id: methods.id,
  campaignId: methods.campaignId,
  number: methods.number,
  settings: methods.settings,
  reason: methods.reason,
  createdBy: methods.createdBy,
  createdByName: users.displayName,
  createdAt: methods.createdAt,
}

const toMethod = <Row extends { settings: unknown; createdAt: Date }>(row: Row) => ({
  ...row,
  settings: methodSettingsSchema.parse(row.settings),
  createdAt: instantOf(row.createdAt),
})

/** Newest first. */
export async function selectMethods(
  db: Executor,
  scope: Scope,
  campaignId: string,
  page: Page<number>,
): Promise<Method[]> {
  const rows = await db
    .select(methodColumns)
    .from(methods)
    .innerJoin(users, eq(users.id, methods.createdBy))
    .where(
      and(
        inScope(methods.campaignId, scope),
        eq(methods.campaignId, campaignId),
        page.after === null ? undefined : lt(methods.number, page.after),
      ),
    )
    .orderBy(desc(methods.number))
    .limit(page.limit)
  return rows.map(toMethod)
}

/** One version by its number. */
export async function selectMethod(
  db: Executor,
  scope: Scope,
  campaignId: string,
  number: number,
): Promise<Method | null> {
  const [row] = await db
    .select(methodColumns)
    .from(methods)
    .innerJoin(users, eq(users.id, methods.createdBy))
    .where(and(inScope(methods.campaignId, scope), eq(methods.campaignId, campaignId), eq(methods.number, number)))
  return row === undefined ? null : toMethod(row)
}

export async function selectCurrentMethod(db: Executor, scope: Scope, campaignId: string): Promise<Method | null> {
  const [newest] = await selectMethods(db, scope, campaignId, { limit: 1, after: null })
  return newest ?? null
}

const campaignSampleColumns = (db: Executor) => ({
  campaignId: campaignSamples.campaignId,
  sampleId: campaignSamples.sampleId,
  sampleCode: samples.code,
  sampleName: samples.name,
  composition: samples.composition,
  activeMetal: samples.activeMetal,
  runCount: sql<number>`(${db
    .select({ n: sql`count(*)::int` })
    .from(runs)
    .innerJoin(loadings, eq(loadings.id, runs.loadingId))
    .where(and(eq(runs.campaignId, campaignSamples.campaignId), eq(loadings.sampleId, campaignSamples.sampleId)))})`,
  isShortlisted: campaignSamples.isShortlisted,
  priority: campaignSamples.priority,
  remark: campaignSamples.remark,
  version: campaignSamples.version,
})

const toCampaignSample = <Row extends { isShortlisted: number }>(row: Row) => ({
  ...row,
  isShortlisted: row.isShortlisted === 1,
})

export async function selectCampaignSamples(
  db: Executor,
  scope: Scope,
  campaignId: string,
  page: Page<string>,
): Promise<CampaignSample[]> {
  const rows = await db
    .select(campaignSampleColumns(db))
    .from(campaignSamples)
    .innerJoin(samples, eq(samples.id, campaignSamples.sampleId))
    .where(
      and(
        inScope(campaignSamples.campaignId, scope),
        eq(campaignSamples.campaignId, campaignId),
        page.after === null ? undefined : gt(samples.code, page.after),
      ),
    )
    .orderBy(asc(samples.code))
    .limit(page.limit)
  return rows.map(toCampaignSample)
}

export async function selectCampaignSample(
  db: Executor,
  scope: Scope,
  campaignId: string,
  sampleId: string,
): Promise<CampaignSample | null> {
  const [row] = await db
    .select(campaignSampleColumns(db))
    .from(campaignSamples)
    .innerJoin(samples, eq(samples.id, campaignSamples.sampleId))
    .where(
      and(
        inScope(campaignSamples.campaignId, scope),
        eq(campaignSamples.campaignId, campaignId),
        eq(campaignSamples.sampleId, sampleId),
      ),
    )
  return row === undefined ? null : toCampaignSample(row)
}
