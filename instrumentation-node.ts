import type { Server } from 'node:http'
import { closeDatabase, getOpenDatabase } from './db/client'
import { maintainDatabase } from './db/maintain'
import { deleteStagedReadingSets } from './db/mutations/readings'
import { ensureSetUpCode } from './lib/access/set-up'
import { sweepStoredFiles } from './lib/access/sweep-files'
import { resumeReadings } from './lib/access/uploads'
import { stampCallerAddress } from './lib/auth/stamp-caller-address'
import { environment } from './lib/environment'

const DAY_MS = 86_400_000

/** How long requests under way may take when the server is asked to stop. */
const GRACE_MS = 20_000

/** Put there by scripts/start.mjs, which also takes the framework's own signal handling away. */
const started = globalThis as typeof globalThis & { [key: symbol]: unknown }
const httpServer = (): Server | undefined => started[Symbol.for('inverse-kelvin.http-server')] as Server | undefined

/** What a killed process left half-stored: in the folder nobody else can be writing, on a server another process might be. */
async function sweep(): Promise<void> {
  const { database, backEnd } = await getOpenDatabase()
  const before = new Date(Date.now() - (backEnd === 'thread' ? 0 : DAY_MS))
  await database.transaction((tx) => deleteStagedReadingSets(tx, before))
  // with a server behind it, another process may be taking a file in just now
  if (backEnd === 'thread') await sweepStoredFiles()
}

/** Files that were stored when the process before this one ended and were not looked at yet. Beside the requests, like the upkeep. */
async function finishReadings(): Promise<void> {
  const { backEnd } = await getOpenDatabase()
  // with a server behind it, another process may be looking at a file just now
  const before = new Date(Date.now() - (backEnd === 'thread' ? 0 : DAY_MS / 24))
  void resumeReadings(before).catch((error: unknown) =>
    console.error('Files that were waiting to be read could not all be read.', error),
  )
}

/** Now and four times a day. Beside the requests: nobody waits for it, and a fault in it is no fault of theirs. */
async function keepInShape(): Promise<void> {
  const { database, backEnd } = await getOpenDatabase()
  if (backEnd !== 'thread') return
  const maintain = () =>
    void maintainDatabase(database).catch((error: unknown) =>
      console.error('Maintenance of the database failed.', error),
    )
  maintain()
  setInterval(maintain, DAY_MS / 4).unref()
}

/** Reads them, or makes them at the first start: damaged ones are met now and not by the first person who signs in. */
function checkSecrets(): void {
  if (environment.SESSION_KEY === environment.PEPPER) throw new Error('SESSION_KEY and PEPPER must not be the same.')
}

async function printSetUpCode(): Promise<void> {
  const setUp = await ensureSetUpCode()
  if (!setUp) return
  console.log(
    [
      '',
      'There is no admin yet. Whoever has this code becomes the first one; it works once, until it runs out or the server starts again.',
      `  Set-up code: ${setUp.code}`,
      `  Use it here: ${environment.APP_ORIGIN}/set-up#${setUp.code}`,
      '',
    ].join('\n'),
  )
}

/** Opens and migrates the database, or ends the process: a server that answers 500 to everything is worse than none. */
export async function startServer(): Promise<void> {
  if (environment.NEXT_PHASE === 'phase-production-build') return
  try {
    process.umask(0o077)
    stampCallerAddress()
    await getOpenDatabase()
    closeOnSignals()
    await sweep()
    checkSecrets()
    if (httpServer()) console.log(`\nInverse Kelvin: ${environment.APP_ORIGIN}\n`)
    await printSetUpCode()
    await keepInShape()
    await finishReadings()
  } catch (error) {
    console.error(`The server did not start. ${error instanceof Error ? error.message : String(error)}`)
    if (error instanceof Error && error.cause !== undefined) console.error(error.cause)
    process.exit(1)
  }
}

/** No new connections; the requests under way are finished, then whoever is still there is cut off. */
async function finishRequests(server: Server): Promise<void> {
  const cutOff = setTimeout(() => server.closeAllConnections(), GRACE_MS)
  await new Promise((resolve) => server.close(resolve))
  clearTimeout(cutOff)
}

function closeOnSignals(): void {
  let isClosing = false
  const close = async () => {
    if (isClosing) return
    isClosing = true
    const server = httpServer()
    try {
      if (server) await finishRequests(server)
      await closeDatabase()
    } catch (error) {
      console.error('The database was not closed cleanly; what was acknowledged is on disk.', error)
      if (server) process.exit(1)
    }
    if (server) process.exit(0)
  }
  process.on('SIGTERM', () => void close())
  process.on('SIGINT', () => void close())
}
