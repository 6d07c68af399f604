import { inArray, sql, type SQL } from 'drizzle-orm'
import { type PgColumn } from 'drizzle-orm/pg-core'

/** The campaigns a statement may touch: every one, or those of a list that may be empty. */
export type Scope = 'all' | readonly string[]

/** True for rows of the campaigns in scope; of none where the list is empty. */
export function inScope(campaignId: PgColumn, scope: Scope): SQL {
  if (scope === 'all') return sql`true`
  return scope.length === 0 ? sql`false` : inArray(campaignId, [...scope])
}
