import 'server-only'
import type { Actor } from '@/lib/domain/role'
import type { Transaction } from '../executor'
import { noteChange } from '../keyed-request'
import { auditEntries } from '../schema'

export interface AuditEntryInput {
  readonly actor: Actor
  /** what was done: `run.hand-in`, `method.save`, … */
  readonly action: string
  /** the table's name in the singular, and the row */
  readonly entity: string
  readonly entityId: string
  readonly campaignId?: string | null
  readonly before?: unknown
  readonly after?: unknown
  readonly reason?: string
}

/** Writes who did what, in the transaction of the change itself. Number, time and hashes are the database's own. */
export async function insertAuditEntry(tx: Transaction, input: AuditEntryInput): Promise<void> {
  noteChange()
  await tx.insert(auditEntries).values({
    actorId: input.actor.userId,
    sessionRef: input.actor.sessionRef,
    action: input.action,
    entity: input.entity,
    entityId: input.entityId,
    campaignId: input.campaignId ?? null,
    before: input.before ?? null,
    after: input.after ?? null,
    reason: input.reason ?? '',
  })
}
