import 'server-only'
import { sql } from 'drizzle-orm'
import type { Executor } from '../executor'

export interface AuditChainFault {
  readonly seq: number
  /** altered: its own hash does not fit; broken: it does not follow the entry before it */
  readonly kind: 'altered' | 'broken'
}

export interface AuditHead {
  readonly seq: number
  readonly hash: string
}

/** Where the trail was tampered with, first fault first; empty when every entry is as written and follows the one before it. */
export async function selectAuditChainFaults(db: Executor): Promise<AuditChainFault[]> {
  const found = await db.execute<{ seq: number; altered: boolean; broken: boolean }>(sql`
    select seq::float8 as seq, altered, broken from (
      select seq,
        hash <> audit_entry_hash(e, previous_hash) as altered,
        previous_hash <> coalesce(lag(hash) over (order by seq), '') or seq <> coalesce(lag(seq) over (order by seq), 0) + 1 as broken
      from audit_entries e
    ) checked where altered or broken order by seq`)
  return found.rows.map((row) => ({ seq: row.seq, kind: row.altered ? 'altered' : 'broken' }))
}

/** The last entry. A cut tail shows only against a head kept elsewhere. */
export async function selectAuditHead(db: Executor): Promise<AuditHead | null> {
  const found = await db.execute<{ seq: number; hash: string }>(
    sql`select seq::float8 as seq, hash from audit_entries order by audit_entries.seq desc limit 1`,
  )
  return found.rows[0] ?? null
}
