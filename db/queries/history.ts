import { and, desc, eq, inArray, isNull, lt, or } from 'drizzle-orm'
import { type HistoryEntry } from '@/lib/domain/history'
import { type Page } from '@/lib/domain/page'
import { type Executor } from '../executor'
import { instantOf } from '../instant'
import { auditEntries, campaignSamples, users } from '../schema'
import { inScope, type Scope } from '../scope'

/** What happened in a campaign, and to the samples it holds, latest first. */
export async function selectHistory(
  db: Executor,
  scope: Scope,
  campaignId: string,
  page: Page<number>,
): Promise<HistoryEntry[]> {
  const held = db
    .select({ id: campaignSamples.sampleId })
    .from(campaignSamples)
    .where(and(inScope(campaignSamples.campaignId, scope), eq(campaignSamples.campaignId, campaignId)))
  const rows = await db
    .select({
      seq: auditEntries.seq,
      at: auditEntries.at,
      actorId: auditEntries.actorId,
      actorName: users.displayName,
      action: auditEntries.action,
      entity: auditEntries.entity,
      entityId: auditEntries.entityId,
      before: auditEntries.before,
      after: auditEntries.after,
      reason: auditEntries.reason,
    })
    .from(auditEntries)
    .leftJoin(users, eq(users.id, auditEntries.actorId))
    .where(
      and(
        or(
          and(inScope(auditEntries.campaignId, scope), eq(auditEntries.campaignId, campaignId)),
          and(isNull(auditEntries.campaignId), eq(auditEntries.entity, 'sample'), inArray(auditEntries.entityId, held)),
        ),
        page.after === null ? undefined : lt(auditEntries.seq, page.after),
      ),
    )
    .orderBy(desc(auditEntries.seq))
    .limit(page.limit)
  return rows.map((row) => ({ ...row, at: instantOf(row.at), actorName: row.actorName ?? row.actorId }))
}
