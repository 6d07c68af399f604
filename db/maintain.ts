import 'server-only'
import { sql } from 'drizzle-orm'
import { withDatabaseLimits } from './database-limits'
import type { Executor } from './executor'

/** Values are only ever added to `readings`, by far the largest table: nothing to take away there. */
const statementFor = (name: string) =>
  name === 'readings' ? sql`analyze readings` : sql`vacuum (analyze) ${sql.identifier(name)}`

/**
 * Takes away what old row versions cost and renews what the planner knows, table by table so that nobody waits long. A server does this by
 * itself; the database in its thread has nobody else to do it.
 */
export async function maintainDatabase(db: Executor): Promise<void> {
  const tables = await db.execute<{ name: string }>(
    sql`select relname::text as name from pg_class where relkind = 'r' and relnamespace = 'public'::regnamespace order by relname`,
  )
  for (const { name } of tables.rows) await withDatabaseLimits({ callMs: 60_000 }, () => db.execute(statementFor(name)))
}
