import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { openMemoryDatabase, openServerDatabase } from '@/db/client'
import { startPostgresServer } from './postgres-server.mjs'
import { administer, onServer, TEMPLATE_DATABASE, templateFile } from './fresh-database'

/** Changes with the migrations and with the engine. */
function fingerprint(): string {
  const hash = createHash('sha256')
  for (const name of readdirSync('drizzle')
    .filter((entry) => entry.endsWith('.sql'))
    .sort())
    hash.update(name).update(readFileSync(path.join('drizzle', name)))
  hash.update(readFileSync('node_modules/@electric-sql/pglite/package.json'))
  return hash.digest('hex')
}

async function makeServerTemplate() {
  await administer(`drop database if exists ${TEMPLATE_DATABASE}`, `create database ${TEMPLATE_DATABASE}`)
  const opened = await openServerDatabase(onServer(TEMPLATE_DATABASE))
  await opened.close()
}

/** Migrates once; every test file starts from a copy of that. TEST_BACKEND=postgres starts a PostgreSQL server for the run. */
export default async function setup() {
  if (process.env.TEST_BACKEND === 'postgres' && !process.env.TEST_DATABASE_URL) {
    const server = await startPostgresServer()
    if ('skipped' in server) throw new Error(`Not run on a PostgreSQL server: ${server.skipped}`)
    console.log(`on ${server.version}`)
    process.env.TEST_DATABASE_URL = server.url
    await makeServerTemplate()
    return server.stop
  }
  if (process.env.TEST_DATABASE_URL) return makeServerTemplate()
  const stamp = `${templateFile}.sha256`
  const current = fingerprint()
  if (existsSync(templateFile) && existsSync(stamp) && readFileSync(stamp, 'utf8') === current) return
  mkdirSync(path.dirname(templateFile), { recursive: true })
  const opened = await openMemoryDatabase()
  const archive = await opened.thread.dump()
  await opened.close()
  writeFileSync(`${templateFile}.${process.pid}`, archive)
  renameSync(`${templateFile}.${process.pid}`, templateFile)
  writeFileSync(stamp, current)
}
