import type { ExtractTablesWithRelations } from 'drizzle-orm'
import type { PgDatabase, PgQueryResultHKT, PgTransaction } from 'drizzle-orm/pg-core'
import type * as schema from './schema'

/** What a raw statement gives on both back ends. Ask for changed rows with `returning`. */
interface RowsHKT extends PgQueryResultHKT {
  type: Rows<this['row']>
}
interface Rows<T> {
  rows: T[]
}

type Schema = typeof schema
type Relations = ExtractTablesWithRelations<Schema>

/** The database in its thread, or a PostgreSQL server: one type. */
export type Database = PgDatabase<RowsHKT, Schema, Relations>
export type Transaction = PgTransaction<RowsHKT, Schema, Relations>

/** Whatever can run a statement: queries take it, mutations take a `Transaction`. */
export type Executor = Database | Transaction
