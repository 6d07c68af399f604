import 'server-only'
import path from 'node:path'
import { sql } from 'drizzle-orm'
import { readMigrationFiles } from 'drizzle-orm/migrator'
import { withDatabaseLimits } from './database-limits'
import type { Database } from './executor'

const migrationsFolder = () => path.join(/* turbopackIgnore: true */ process.cwd(), 'drizzle')

/** Any number, the same for every process of this product. */
const MIGRATION_LOCK = 7_291_001

/** Brings the database to the newest schema, in one transaction: all of it, or nothing. Two servers starting at once take turns. */
export async function migrateDatabase(database: Database): Promise<void> {
  const migrations = readMigrationFiles({ migrationsFolder: migrationsFolder() })
  const unlimited = { callMs: 2_147_483_647, transactionMs: 2_147_483_647 }
  await withDatabaseLimits(unlimited, () =>
    database.transaction(async (tx) => {
      await tx.execute(sql`set local statement_timeout = 0`)
      await tx.execute(sql`set local lock_timeout = 0`)
      await tx.execute(sql`select pg_advisory_xact_lock(${MIGRATION_LOCK})`)
      await tx.execute(sql`create table if not exists schema_migrations (
        folder_millis bigint primary key, hash text not null, applied_at timestamptz not null default now())`)
      const applied = await tx.execute<{ folder_millis: number; hash: string }>(
        sql`select folder_millis::float8 as folder_millis, hash from schema_migrations`,
      )
      const known = new Map(applied.rows.map((row) => [Number(row.folder_millis), row.hash]))
      const newest = Math.max(0, ...migrations.map((migration) => migration.folderMillis))
      if ([...known.keys()].some((millis) => millis > newest))
        throw new Error(
          'This database was written by a newer release. Start that release, or put back a backup made with this one.',
        )
      for (const migration of migrations) {
        const hash = known.get(migration.folderMillis)
        if (hash === migration.hash) continue
        if (hash !== undefined)
          throw new Error('A migration that this database has applied was edited since. Put the released files back.')
        for (const statement of migration.sql) await tx.execute(sql.raw(statement))
        await tx.execute(
          sql`insert into schema_migrations (folder_millis, hash) values (${migration.folderMillis}, ${migration.hash})`,
        )
      }
    }),
  )
}
