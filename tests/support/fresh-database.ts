import { randomBytes } from 'node:crypto'
import { existsSync } from 'node:fs'
import path from 'node:path'
import { Client } from 'pg'
import { openMemoryDatabase, openServerDatabase, setDatabase, type OpenDatabase } from '@/db/client'

/** Written once by the global set-up. */
export const templateFile = path.join(process.cwd(), 'tests/.cache/migrated.tar')

/** The database on the test server that each test file's own is copied from. */
export const TEMPLATE_DATABASE = 'migrated_template'

export const onServer = (database: string): string => {
  const url = new URL(process.env.TEST_DATABASE_URL ?? '')
  url.pathname = `/${database}`
  return url.href
}

/** Runs statements that no transaction may hold, such as `create database`. */
export async function administer(...statements: string[]): Promise<void> {
  const client = new Client({ connectionString: process.env.TEST_DATABASE_URL })
  await client.connect()
  try {
    for (const statement of statements) await client.query(statement)
  } finally {
    await client.end()
  }
}

async function freshServerDatabase(): Promise<OpenDatabase> {
  const name = `test_${randomBytes(6).toString('hex')}`
  await administer(`create database ${name} template ${TEMPLATE_DATABASE}`)
  const opened = await openServerDatabase(onServer(name))
  const close = async () => {
    await opened.close()
    await administer(`drop database if exists ${name} with (force)`)
  }
  return { ...opened, close }
}

/**
 * An empty, migrated database for one test file, which `getDatabase()` gives from now on: in the product's own thread, in memory; or on the
 * PostgreSQL server that TEST_DATABASE_URL names. Close it in `afterAll`.
 */
export async function freshDatabase(): Promise<OpenDatabase> {
  const opened = process.env.TEST_DATABASE_URL
    ? await freshServerDatabase()
    : await openMemoryDatabase(existsSync(templateFile) ? templateFile : undefined)
  setDatabase(opened)
  return opened
}
