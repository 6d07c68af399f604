// How long 600,000 rows of 12 channels take to store and to read, what they cost on disk, and how long the database's thread is held.
//   npx tsx --conditions=react-server tests/bench/readings.mts [rows]
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { sql } from 'drizzle-orm'
import { openFolderDatabase, openServerDatabase } from '@/db/client'
import { prepareReadings } from '@/db/mutations/prepare-readings'
import { publishReadingSet, stageReadingSet } from '@/db/mutations/readings'
import { selectReadingChannels } from '@/db/queries/readings'
import { makeRun } from '../support/make-run'

const rows = Number(process.argv[2] ?? 600_000)
const CHANNELS = 12

/** Slow waves with noise, rounded to 0.001 as a logger writes them. */
function wave(channel: number): Float64Array {
  let state = channel + 1
  return Float64Array.from({ length: rows }, (_, index) => {
    state = (state * 48271) % 2147483647
    return Math.round((500 + 80 * Math.sin(index / 4000 + channel) + state / 2147483647) * 1000) / 1000
  })
}

const channels = Array.from({ length: CHANNELS }, (_, channel) => ({
  name: channel === 0 ? 'time' : `flowMolPerS.${channel}`,
  unit: channel === 0 ? 's' : 'mol/s',
  values: channel === 0 ? Float64Array.from({ length: rows }, (_, index) => 1_772_352_000 + index) : wave(channel),
}))

const folder = mkdtempSync(path.join(tmpdir(), 'bench-'))
const opened = process.env.TEST_DATABASE_URL
  ? await openServerDatabase(process.env.TEST_DATABASE_URL)
  : await openFolderDatabase(path.join(folder, 'database'))
const database = opened.database
try {
  const { uploadId, runId } = await makeRun(database, `bench${Date.now()}`)
  const timed = async <T,>(what: string, work: () => Promise<T>): Promise<T> => {
    const started = performance.now()
    const result = await work()
    console.log(`${what.padEnd(46)} ${((performance.now() - started) / 1000).toFixed(2)} s`)
    return result
  }

  // another person's small question, asked again and again while the log is stored
  const waits: number[] = []
  let isStoring = true
  const other = (async () => {
    while (isStoring) {
      const started = performance.now()
      await database.execute(sql`select count(*)::int from runs`)
      waits.push(performance.now() - started)
      await new Promise((resolve) => setTimeout(resolve, 5))
    }
  })()
  const started = performance.now()
  const prepared = await timed(`${rows} x ${CHANNELS}: compress and hash`, () => prepareReadings(channels))
  const { id } = await timed('store', () =>
    stageReadingSet(database, { uploadId, runId, kind: 'rig-log', columnMapId: null, parserVersion: '1' }, prepared),
  )
  await timed('publish', () => database.transaction((tx) => publishReadingSet(tx, id, new Date())))
  isStoring = false
  await other
  console.log(`${'all'.padEnd(46)} ${((performance.now() - started) / 1000).toFixed(2)} s`)
  waits.sort((a, b) => a - b)
  const quantile = (share: number) =>
    (waits[Math.min(waits.length - 1, Math.floor(waits.length * share))] ?? 0).toFixed(0)
  console.log(
    `another's question meanwhile (${waits.length}): median ${quantile(0.5)} ms, 95 % ${quantile(0.95)} ms, worst ${quantile(1)} ms`,
  )

  const size = await database.execute<{ bytes: number }>(
    sql`select pg_total_relation_size('readings')::float8 as bytes`,
  )
  const bytes = size.rows[0]?.bytes ?? 0
  console.log(`on disk ${(bytes / 1e6).toFixed(1)} MB, ${(bytes / rows / CHANNELS).toFixed(2)} bytes a value`)
  await timed('read one channel', () => selectReadingChannels(database, id, ['flowMolPerS.3']))
  const all = await timed('read all channels', () => selectReadingChannels(database, id))
  const isSame = channels.every((channel) => {
    const read = all.get(channel.name)
    return read !== undefined && Buffer.from(read.buffer).equals(Buffer.from(channel.values.buffer))
  })
  console.log(isSame ? 'every bit is the same' : 'THE VALUES DIFFER')
  if (!isSame) process.exitCode = 1
} finally {
  await opened.close()
  rmSync(folder, { recursive: true, force: true })
}
