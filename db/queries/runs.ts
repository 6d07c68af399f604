import { and, asc, desc, eq, gt, lt, ne, or, sql, type SQL } from 'drizzle-orm'
import { type Page } from '@/lib/domain/page'
import {
  decisionSchema,
  exclusionSchema,
  newRunSchema,
  runStates,
  type FeedEntry,
  type Run,
  type RunDecision,
  type RunDecisionRecord,
  type RunExclusion,
  type RunHoldEdit,
  type RunRemark,
  type RunState,
  type RunSummary,
} from '@/lib/domain/run'
import { z } from 'zod'
import { type Executor, type Transaction } from '../executor'
import { instantOf, instantOrNull } from '../instant'
import {
  campaigns,
  decisions,
  exclusions,
  feeds,
  holdEdits,
  loadings,
  lots,
  remarks,
  rigs,
  runs,
  samples,
  uploads,
  users,
} from '../schema'
import { inScope, type Scope } from '../scope'
import { loadingColumns } from './samples'

const stateSchema = z.enum(runStates)

const summaryColumns = (db: Executor) => ({
  id: runs.id,
  code: runs.code,
  campaignId: runs.campaignId,
  campaignCode: campaigns.code,
  sampleId: loadings.sampleId,
  sampleCode: samples.code,
  sampleName: samples.name,
  rigId: runs.rigId,
  rigCode: rigs.code,
  channel: loadings.channel,
  loadingId: runs.loadingId,
  loadingCode: loadings.code,
  kind: runs.kind,
  state: runs.state,
  decision: runs.decision,
  startedAt: runs.startedAt,
  createdBy: runs.createdBy,
  createdByName: users.displayName,
  version: runs.version,
  isFrozen: sql<boolean>`run_is_frozen(${runs.id})`,
  fileCount: db.$count(uploads, and(eq(uploads.runId, runs.id), ne(uploads.state, 'set-aside'))),
})

interface SummaryRow extends Omit<RunSummary, 'kind' | 'state' | 'decision' | 'startedAt'> {
  readonly kind: string
  readonly state: string
  readonly decision: string | null
  readonly startedAt: Date
}

const toSummary = (row: SummaryRow): RunSummary => ({
  ...row,
  kind: newRunSchema.shape.kind.parse(row.kind),
  state: stateSchema.parse(row.state),
  decision: decisionSchema.shape.decision.nullable().parse(row.decision),
  startedAt: instantOf(row.startedAt),
})

export interface RunFilter {
  readonly campaignId?: string | undefined
  readonly sampleId?: string | undefined
  readonly rigId?: string | undefined
  readonly loadingId?: string | undefined
  readonly createdBy?: string | undefined
  readonly state?: RunState | undefined
  readonly decision?: RunDecision | undefined
}

export interface RunKey {
  readonly startedAt: string
  readonly id: string
}

const isIf = (column: Parameters<typeof eq>[0], value: string | undefined): SQL | undefined =>
  value === undefined ? undefined : eq(column, value)

/** Latest start first. */
export async function selectRunSummaries(
  db: Executor,
  scope: Scope,
  filter: RunFilter,
  page: Page<RunKey>,
): Promise<RunSummary[]> {
  const after = page.after
  const rows = await db
    .select(summaryColumns(db))
    .from(runs)
    .innerJoin(campaigns, eq(campaigns.id, runs.campaignId))
    .innerJoin(loadings, eq(loadings.id, runs.loadingId))
    .innerJoin(samples, eq(samples.id, loadings.sampleId))
    .innerJoin(rigs, eq(rigs.id, runs.rigId))
    .innerJoin(users, eq(users.id, runs.createdBy))
    .where(
      and(
        isIf(runs.campaignId, filter.campaignId),
        isIf(loadings.sampleId, filter.sampleId),
        isIf(runs.rigId, filter.rigId),
        isIf(runs.loadingId, filter.loadingId),
        isIf(runs.createdBy, filter.createdBy),
        isIf(runs.state, filter.state),
        isIf(runs.decision, filter.decision),
        inScope(runs.campaignId, scope),
        after === null
          ? undefined
          : or(
              lt(runs.startedAt, new Date(after.startedAt)),
              and(eq(runs.startedAt, new Date(after.startedAt)), gt(runs.id, after.id)),
            ),
      ),
    )
    .orderBy(desc(runs.startedAt), asc(runs.id))
    .limit(page.limit)
  return rows.map(toSummary)
}

export async function selectFeed(db: Executor, scope: Scope, runId: string): Promise<FeedEntry[]> {
  const rows = await db
    .select({
      species: feeds.species,
      flowText: feeds.flowText,
      flowMolPerS: feeds.flowMolPerS,
      referenceTemperatureK: feeds.referenceTemperatureK,
      referencePressurePa: feeds.referencePressurePa,
      isInternalStandard: feeds.isInternalStandard,
    })
    .from(feeds)
    .innerJoin(runs, eq(runs.id, feeds.runId))
    .where(and(inScope(runs.campaignId, scope), eq(feeds.runId, runId)))
    .orderBy(asc(feeds.position))
  return rows.map((row) => ({ ...row, isInternalStandard: row.isInternalStandard === 1 }))
}

export async function selectRun(db: Executor, scope: Scope, id: string): Promise<Run | null> {
  const [row] = await db
    .select({
      summary: summaryColumns(db),
      loading: loadingColumns,
      pressurePa: runs.pressurePa,
      pressureKind: runs.pressureKind,
      barometerPa: runs.barometerPa,
      pressureText: runs.pressureText,
      pretreatment: runs.pretreatment,
      notes: runs.notes,
      clockOffsetS: runs.clockOffsetS,
    })
    .from(runs)
    .innerJoin(campaigns, eq(campaigns.id, runs.campaignId))
    .innerJoin(loadings, eq(loadings.id, runs.loadingId))
    .innerJoin(samples, eq(samples.id, loadings.sampleId))
    .leftJoin(lots, eq(lots.id, loadings.lotId))
    .innerJoin(rigs, eq(rigs.id, runs.rigId))
    .innerJoin(users, eq(users.id, runs.createdBy))
    .where(and(inScope(runs.campaignId, scope), eq(runs.id, id)))
  if (row === undefined) return null
  const { summary, loading, ...more } = row
  const [latest] = summary.decision === null ? [] : await selectDecisions(db, scope, id)
  return {
    ...toSummary(summary),
    ...more,
    pressureKind: newRunSchema.shape.pressureKind.parse(more.pressureKind),
    loading: { ...loading, packedAt: instantOrNull(loading.packedAt) },
    feed: await selectFeed(db, scope, id),
    decisionReason: latest?.reason ?? null,
  }
}

/** The campaign of a run in scope, or null. */
export async function selectRunCampaign(db: Executor, scope: Scope, id: string): Promise<string | null> {
  const [row] = await db
    .select({ campaignId: runs.campaignId })
    .from(runs)
    .where(and(inScope(runs.campaignId, scope), eq(runs.id, id)))
  return row?.campaignId ?? null
}

/** The run that started last on a rig, of those in scope. */
export async function selectLastRunIdOnRig(
  db: Executor,
  scope: Scope,
  rigId: string,
  channel: string | null,
): Promise<string | null> {
  const [row] = await db
    .select({ id: runs.id })
    .from(runs)
    .innerJoin(loadings, eq(loadings.id, runs.loadingId))
    .where(
      and(
        inScope(runs.campaignId, scope),
        eq(runs.rigId, rigId),
        channel === null ? undefined : eq(loadings.channel, channel),
      ),
    )
    .orderBy(desc(runs.startedAt), desc(runs.createdAt))
    .limit(1)
  return row?.id ?? null
}

/** Largest number given out in `R-0001`, … of the campaign; 0 where there is none. The caller holds the campaign. */
export async function selectLargestRunNumber(tx: Transaction, scope: Scope, campaignId: string): Promise<number> {
  const [row] = await tx
    .select({ largest: sql<number | null>`max(substring(code from '^R-([0-9]{1,9})$')::int)` })
    .from(runs)
    .where(and(inScope(runs.campaignId, scope), eq(runs.campaignId, campaignId)))
  return row?.largest ?? 0
}

/** Holds a run until the transaction ends. */
export async function lockRun(tx: Transaction, scope: Scope, id: string): Promise<boolean> {
  const rows = await tx
    .select({ id: runs.id })
    .from(runs)
    .where(and(inScope(runs.campaignId, scope), eq(runs.id, id)))
    .for('update')
  return rows.length > 0
}

/** Latest first. */
export async function selectDecisions(db: Executor, scope: Scope, runId: string): Promise<RunDecisionRecord[]> {
  const rows = await db
    .select({
      id: decisions.id,
      runId: decisions.runId,
      decision: decisions.decision,
      reason: decisions.reason,
      createdBy: decisions.createdBy,
      createdByName: users.displayName,
      createdAt: decisions.createdAt,
    })
    .from(decisions)
    .innerJoin(runs, eq(runs.id, decisions.runId))
    .innerJoin(users, eq(users.id, decisions.createdBy))
    .where(and(inScope(runs.campaignId, scope), eq(decisions.runId, runId)))
    .orderBy(desc(decisions.createdAt), desc(decisions.id))
  return rows.map((row) => ({
    ...row,
    decision: decisionSchema.shape.decision.parse(row.decision),
    createdAt: instantOf(row.createdAt),
  }))
}

/** Those put back too; in time order of what was left out. */
export async function selectExclusions(db: Executor, scope: Scope, runId: string): Promise<RunExclusion[]> {
  const rows = await db
    .select({
      id: exclusions.id,
      runId: exclusions.runId,
      kind: exclusions.kind,
      atS: exclusions.atS,
      reason: exclusions.reason,
      createdBy: exclusions.createdBy,
      createdByName: users.displayName,
      createdAt: exclusions.createdAt,
      withdrawnAt: exclusions.withdrawnAt,
    })
    .from(exclusions)
    .innerJoin(runs, eq(runs.id, exclusions.runId))
    .innerJoin(users, eq(users.id, exclusions.createdBy))
    .where(and(inScope(runs.campaignId, scope), eq(exclusions.runId, runId)))
    .orderBy(asc(exclusions.atS), asc(exclusions.createdAt), asc(exclusions.id))
  return rows.map((row) => ({
    ...row,
    kind: exclusionSchema.shape.kind.parse(row.kind),
    createdAt: instantOf(row.createdAt),
    withdrawnAt: instantOrNull(row.withdrawnAt),
  }))
}

/** Withdrawn ones too; in time order of the holds. */
export async function selectHoldEdits(db: Executor, scope: Scope, runId: string): Promise<RunHoldEdit[]> {
  const rows = await db
    .select({
      id: holdEdits.id,
      runId: holdEdits.runId,
      foundStartS: holdEdits.foundStartS,
      startS: holdEdits.startS,
      endS: holdEdits.endS,
      reason: holdEdits.reason,
      createdBy: holdEdits.createdBy,
      createdByName: users.displayName,
      createdAt: holdEdits.createdAt,
      withdrawnAt: holdEdits.withdrawnAt,
    })
    .from(holdEdits)
    .innerJoin(runs, eq(runs.id, holdEdits.runId))
    .innerJoin(users, eq(users.id, holdEdits.createdBy))
    .where(and(inScope(runs.campaignId, scope), eq(holdEdits.runId, runId)))
    .orderBy(asc(holdEdits.foundStartS), asc(holdEdits.createdAt), asc(holdEdits.id))
  return rows.map((row) => ({
    ...row,
    createdAt: instantOf(row.createdAt),
    withdrawnAt: instantOrNull(row.withdrawnAt),
  }))
}

/** Oldest first, as one reads them. */
export async function selectRemarks(db: Executor, scope: Scope, runId: string): Promise<RunRemark[]> {
  const rows = await db
    .select({
      id: remarks.id,
      runId: remarks.runId,
      body: remarks.body,
      createdBy: remarks.createdBy,
      createdByName: users.displayName,
      createdAt: remarks.createdAt,
    })
    .from(remarks)
    .innerJoin(runs, eq(runs.id, remarks.runId))
    .innerJoin(users, eq(users.id, remarks.createdBy))
    .where(and(inScope(runs.campaignId, scope), eq(remarks.runId, runId)))
    .orderBy(asc(remarks.createdAt), asc(remarks.id))
  return rows.map((row) => ({ ...row, createdAt: instantOf(row.createdAt) }))
}
