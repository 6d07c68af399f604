import { type Actor } from '../../lib/domain/role'
import { type Transaction } from '../executor'
import { auditEntries } from '../schema'

export interface NewAuditEntry {
  readonly actor: Actor
  readonly action: string
  readonly entity: string
  readonly entityId: string
  readonly campaignId?: string
  readonly before?: unknown
  readonly after?: unknown
  readonly reason?: string
}

/** Who did what to which record, in the transaction of the change itself: neither is there without the other. */
export async function insertAuditEntry(tx: Transaction, entry: NewAuditEntry): Promise<void> {
  await tx.insert(auditEntries).values({
    actorId: entry.actor.userId,
    sessionRef: entry.actor.sessionRef,
    action: entry.action,
    entity: entry.entity,
    entityId: entry.entityId,
    campaignId: entry.campaignId ?? null,
    before: entry.before ?? null,
    after: entry.after ?? null,
    reason: entry.reason ?? '',
  })
}
