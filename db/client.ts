import 'server-only'
import { chmodSync, existsSync, mkdirSync, rmSync } from 'node:fs'
import path from 'node:path'
import { sql } from 'drizzle-orm'
import { drizzle as drizzleThread, type PgliteDatabase } from 'drizzle-orm/pglite'
import { drizzle as drizzlePool } from 'drizzle-orm/node-postgres'
import { environment } from '@/lib/environment'
import { databaseLimits, INTERACTIVE_LIMITS } from './database-limits'
import { insideTransaction } from './inside-transaction'
import { rememberKeyedChanges } from './keyed-request'
import { mapDatabaseError } from './map-database-error'
import { migrateDatabase } from './migrate'
import { acquireDataFolderLock } from './pglite/data-folder-lock'
import { PGliteThread, type ThreadCounters } from './pglite/thread-client'
import { openPool } from './postgres/open-pool'
import * as schema from './schema'
import type { Database } from './executor'

export type { Database, Executor, Transaction } from './executor'

/** An open database and the one way to close it. */
export interface OpenDatabase {
  readonly database: Database
  readonly backEnd: 'thread' | 'server'
  /** null on a server */
  readonly counters: ThreadCounters | null
  close(): Promise<void>
}

/** Sees to it that what leaves a transaction is an `AppError` where the cause is a named constraint, a deadlock or a deadline. */
function mapTransactionErrors(database: Database): Database {
  const transaction = database.transaction.bind(database)
  database.transaction = async (work, config) => {
    try {
      return await transaction(work, config)
    } catch (error) {
      throw mapDatabaseError(error) ?? error
    }
  }
  return database
}

/** The thread speaks just the part of the driver's interface that the query builder uses. */
export function databaseOnThread(thread: PGliteThread): Database {
  const client = thread as unknown as Parameters<typeof drizzleThread>[0]
  const built = drizzleThread({ client, schema } as { client: never; schema: typeof schema })
  return rememberKeyedChanges(mapTransactionErrors(built as PgliteDatabase<typeof schema> as unknown as Database))
}

export async function openServerDatabase(url: string): Promise<OpenDatabase> {
  const pool = openPool(url)
  const database = drizzlePool({ client: pool, schema }) as unknown as Database
  const transaction = database.transaction.bind(database)
  database.transaction = (work, config) => {
    insideTransaction.refuseOuter(pool)
    const scope = { isOpen: true }
    const { callMs } = databaseLimits()
    return transaction(async (tx) => {
      if (callMs !== INTERACTIVE_LIMITS.callMs)
        await tx.execute(sql`select set_config('statement_timeout', ${String(Math.ceil(callMs))}, true)`)
      const result = await insideTransaction.run(pool, scope, () => work(tx))
      // a swallowed error leaves the transaction dead, and `commit` would then roll back without a word
      await tx.execute('select 1')
      return result
    }, config).finally(() => (scope.isOpen = false))
  }
  rememberKeyedChanges(mapTransactionErrors(database))
  try {
    await migrateDatabase(database)
  } catch (error) {
    await pool.end()
    throw error
  }
  return { database, backEnd: 'server', counters: null, close: () => pool.end() }
}

/** A disk that refuses a sync may have lost any of the pages since the last one: only a new start, from the log, is safe. */
function endProcess(message: string) {
  console.error(
    `The disk refused to keep a change (${message}). The server stops; see to the disk, then start it again.`,
  )
  process.exit(70)
}

/** Takes the lock, makes the folder if there is none, opens it in its thread and migrates it. */
export async function openFolderDatabase(
  folder: string,
  options: { onSyncFailure?: (message: string) => void; failSyncAfter?: number } = {},
): Promise<OpenDatabase> {
  mkdirSync(path.dirname(folder), { recursive: true, mode: 0o700 })
  const lock = acquireDataFolderLock(folder)
  try {
    rmSync(`${folder}.tmp`, { recursive: true, force: true })
    if (!existsSync(folder)) await PGliteThread.create(folder)
    // the engine makes its files readable for all; the folder is what protects them
    chmodSync(folder, 0o700)
    const { failSyncAfter } = options
    const thread = await PGliteThread.open({
      dataDir: folder,
      onSyncFailure: options.onSyncFailure ?? endProcess,
      ...(failSyncAfter === undefined ? {} : { failSyncAfter }),
    })
    const close = async () => {
      await thread.close()
      lock.release()
    }
    const database = databaseOnThread(thread)
    try {
      await migrateDatabase(database)
    } catch (error) {
      await close()
      throw error
    }
    return { database, backEnd: 'thread', counters: thread.counters, close }
  } catch (error) {
    lock.release()
    throw error
  }
}

/** A database in memory, for tests. */
export async function openMemoryDatabase(template?: string): Promise<OpenDatabase & { readonly thread: PGliteThread }> {
  const thread = await PGliteThread.open({
    dataDir: null,
    onSyncFailure: () => {},
    ...(template === undefined ? {} : { template }),
  })
  const database = databaseOnThread(thread)
  if (template === undefined) await migrateDatabase(database)
  return { database, backEnd: 'thread', counters: thread.counters, thread, close: () => thread.close() }
}

const slot = Symbol.for('inverse-kelvin.database')
const shared = globalThis as typeof globalThis & { [slot]?: Promise<OpenDatabase> | undefined }

function open(): Promise<OpenDatabase> {
  if (environment.NEXT_PHASE === 'phase-production-build')
    throw new Error('The database is not opened during a build. A page that reads it must be rendered on request.')
  const url = environment.DATABASE_URL
  return url === undefined ? openFolderDatabase(path.join(environment.DATA_DIR, 'database')) : openServerDatabase(url)
}

/** Open since when first asked for, once per process: the server holds several copies of this module, so the handle is kept by name. */
export async function getOpenDatabase(): Promise<OpenDatabase> {
  const opened = (shared[slot] ??= open())
  try {
    return await opened
  } catch (error) {
    if (shared[slot] === opened) shared[slot] = undefined
    throw error
  }
}

export const getDatabase = async (): Promise<Database> => (await getOpenDatabase()).database

/** Puts an open database in place of the one the environment names; for tests and tools. */
export function setDatabase(opened: OpenDatabase): void {
  shared[slot] = Promise.resolve(opened)
}

export async function closeDatabase(): Promise<void> {
  const opened = shared[slot]
  shared[slot] = undefined
  if (opened) await (await opened).close()
}
