import 'server-only'
import { and, asc, desc, eq, gt, isNull, max, or, sql } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import { type EditionSummary } from '@/lib/domain/edition'
import { type Executor } from '../executor'
import { instantOf, instantOrNull } from '../instant'
import { auditEntries, campaigns, decisions, editionRuns, editions, methods, users } from '../schema'
import { inScope, type Scope } from '../scope'

const publisher = alias(users, 'publisher')
const withdrawer = alias(users, 'withdrawer')

const summaryColumns = (db: Executor) => ({
  id: editions.id,
  campaignId: editions.campaignId,
  number: editions.number,
  methodNumber: methods.number,
  engineId: editions.engineId,
  contentSha256: editions.contentSha256,
  statement: editions.statement,
  publishedByName: publisher.displayName,
  publishedAt: editions.publishedAt,
  withdrawnAt: editions.withdrawnAt,
  withdrawnByName: withdrawer.displayName,
  withdrawnReason: editions.withdrawnReason,
  runCount: db.$count(editionRuns, eq(editionRuns.editionId, editions.id)),
})

type Row = Omit<EditionSummary, 'publishedAt' | 'withdrawnAt'> & {
  readonly publishedAt: Date
  readonly withdrawnAt: Date | null
}
const summaryOf = (row: Row): EditionSummary => ({
  ...row,
  publishedAt: instantOf(row.publishedAt),
  withdrawnAt: instantOrNull(row.withdrawnAt),
})

/** Editions of the campaigns in scope, of one campaign or of all, newest first. */
export async function selectEditions(
  db: Executor,
  scope: Scope,
  campaignId: string | null,
): Promise<(EditionSummary & { readonly campaignCode: string; readonly campaignName: string })[]> {
  const rows = await db
    .select({ summary: summaryColumns(db), campaignCode: campaigns.code, campaignName: campaigns.name })
    .from(editions)
    .innerJoin(campaigns, eq(campaigns.id, editions.campaignId))
    .innerJoin(methods, eq(methods.id, editions.methodId))
    .innerJoin(publisher, eq(publisher.id, editions.publishedBy))
    .leftJoin(withdrawer, eq(withdrawer.id, editions.withdrawnBy))
    .where(
      and(inScope(editions.campaignId, scope), campaignId === null ? undefined : eq(editions.campaignId, campaignId)),
    )
    .orderBy(desc(editions.publishedAt), desc(editions.number))
  return rows.map(({ summary, ...campaign }) => ({ ...summaryOf(summary), ...campaign }))
}

export async function selectEdition(
  db: Executor,
  scope: Scope,
  campaignId: string,
  number: number,
): Promise<{ readonly summary: EditionSummary; readonly content: unknown } | null> {
  const [row] = await db
    .select({ summary: summaryColumns(db), content: editions.content })
    .from(editions)
    .innerJoin(methods, eq(methods.id, editions.methodId))
    .innerJoin(publisher, eq(publisher.id, editions.publishedBy))
    .leftJoin(withdrawer, eq(withdrawer.id, editions.withdrawnBy))
    .where(and(inScope(editions.campaignId, scope), eq(editions.campaignId, campaignId), eq(editions.number, number)))
  return row === undefined ? null : { summary: summaryOf(row.summary), content: row.content }
}

export async function selectLastEditionNumber(db: Executor, campaignId: string): Promise<number> {
  const [row] = await db
    .select({ number: max(editions.number) })
    .from(editions)
    .where(eq(editions.campaignId, campaignId))
  return row?.number ?? 0
}

/** Number of the last entry of the history, whoever made it. */
export async function selectHistoryHead(db: Executor): Promise<number> {
  const [row] = await db.select({ seq: max(auditEntries.seq) }).from(auditEntries)
  return row?.seq ?? 0
}

/** Whether anything was changed since that entry in the campaign, or in what campaigns share. */
export async function hasChangedSince(db: Executor, campaignId: string, seq: number): Promise<boolean> {
  const [row] = await db
    .select({ one: sql<number>`1` })
    .from(auditEntries)
    .where(and(gt(auditEntries.seq, seq), or(eq(auditEntries.campaignId, campaignId), isNull(auditEntries.campaignId))))
    .limit(1)
  return row !== undefined
}

/** The reason of the decision in force, by run. */
export async function selectDecisionReasons(db: Executor, runIds: readonly string[]): Promise<Map<string, string>> {
  const reasons = new Map<string, string>()
  for (const runId of runIds) {
    const rows = await db
      .select({ reason: decisions.reason })
      .from(decisions)
      .where(eq(decisions.runId, runId))
      .orderBy(asc(decisions.createdAt), asc(decisions.id))
    reasons.set(runId, rows.at(-1)?.reason ?? '')
  }
  return reasons
}
