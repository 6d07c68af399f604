import 'server-only'
import { randomUUID } from 'node:crypto'
import { and, eq, inArray, isNull, lt } from 'drizzle-orm'
import type { ReadingChannel } from '@/lib/domain/intake'
import { copyBinaryInto, encodeCopyRow } from '../copy-binary'
import type { Database, Transaction } from '../executor'
import { readings, readingSets } from '../schema'
import { prepareReadings, type PreparedChunk, type PreparedReadings } from './prepare-readings'

export interface NewReadingSet {
  readonly id?: string
  readonly uploadId: string
  readonly runId: string
  readonly kind: 'rig-log' | 'injections'
  readonly columnMapId: string | null
  readonly parserVersion: string
}

export interface InsertedReadingSet {
  readonly id: string
  readonly contentSha256: string
  readonly rowCount: number
}

/** Bytes in one statement: about 20 ms in the database's thread, in which nobody else is answered. */
const BYTES_PER_SLICE = 2_000_000

/** Stands in `superseded_at` of a set that is still being written, so that no reader takes it for a current one. */
const STAGED_AT = new Date(0)

const isPrepared = (given: readonly ReadingChannel[] | PreparedReadings): given is PreparedReadings => 'chunks' in given

const instant = (seconds: number | null) => (seconds === null ? null : new Date(Math.round(seconds * 1000)))

const encodeChunk = (readingSetId: string) => (chunk: PreparedChunk) =>
  encodeCopyRow([
    readingSetId,
    chunk.channel,
    { int4: chunk.chunk },
    { int4: chunk.valueCount },
    chunk.minimum === null ? null : { float8: chunk.minimum },
    chunk.maximum === null ? null : { float8: chunk.maximum },
    chunk.content,
  ])

function* slicesOf(readingSetId: string, chunks: readonly PreparedChunk[]): Generator<Uint8Array[]> {
  let slice: Uint8Array[] = []
  let bytes = 0
  for (const row of chunks.map(encodeChunk(readingSetId))) {
    if (bytes > 0 && bytes + row.length > BYTES_PER_SLICE) {
      yield slice
      slice = []
      bytes = 0
    }
    slice.push(row)
    bytes += row.length
  }
  if (slice.length > 0) yield slice
}

const copySlice = (tx: Transaction, slice: readonly Uint8Array[]) =>
  copyBinaryInto(tx, 'readings (reading_set_id, channel, chunk, value_count, minimum, maximum, content)', slice)

async function insertRow(
  tx: Transaction,
  id: string,
  set: NewReadingSet,
  prepared: PreparedReadings,
  supersededAt: Date | null,
) {
  await tx.insert(readingSets).values({
    id,
    uploadId: set.uploadId,
    runId: set.runId,
    kind: set.kind,
    columnMapId: set.columnMapId,
    contentSha256: prepared.contentSha256,
    rowCount: prepared.rowCount,
    firstAt: instant(prepared.firstTimeS),
    lastAt: instant(prepared.lastTimeS),
    channels: prepared.channels,
    parserVersion: set.parserVersion,
    supersededAt,
  })
}

/**
 * Stores readings in one transaction. Good for some ten thousand rows; others wait until that transaction ends, so a long log is staged
 * instead. Channels are better prepared (`prepareReadings`) before the transaction is opened.
 */
export async function insertReadingSet(
  tx: Transaction,
  set: NewReadingSet,
  channels: readonly ReadingChannel[] | PreparedReadings,
): Promise<InsertedReadingSet> {
  const prepared = isPrepared(channels) ? channels : await prepareReadings(channels)
  const id = set.id ?? randomUUID()
  await insertRow(tx, id, set, prepared, null)
  for (const slice of slicesOf(id, prepared.chunks)) await copySlice(tx, slice)
  return { id, contentSha256: prepared.contentSha256, rowCount: prepared.rowCount }
}

/**
 * Stores readings slice by slice, each in a transaction of its own, so that others are answered in between. Nobody sees the set before
 * `publishReadingSet`; one that is never published is removed by `deleteStagedReadingSets`.
 */
export async function stageReadingSet(
  db: Database,
  set: NewReadingSet,
  channels: readonly ReadingChannel[] | PreparedReadings,
): Promise<InsertedReadingSet> {
  const prepared = isPrepared(channels) ? channels : await prepareReadings(channels)
  const id = set.id ?? randomUUID()
  await db.transaction((tx) => insertRow(tx, id, set, prepared, STAGED_AT))
  for (const slice of slicesOf(id, prepared.chunks)) await db.transaction((tx) => copySlice(tx, slice))
  return { id, contentSha256: prepared.contentSha256, rowCount: prepared.rowCount }
}

/** Makes a staged set the current one of its file; a set read from that file before stays in history. */
export async function publishReadingSet(tx: Transaction, id: string, at: Date): Promise<void> {
  const [staged] = await tx
    .select({ uploadId: readingSets.uploadId })
    .from(readingSets)
    .where(and(eq(readingSets.id, id), eq(readingSets.supersededAt, STAGED_AT)))
  if (!staged) throw new Error(`reading set ${id} is not staged`)
  await supersedeReadingSets(tx, staged.uploadId, at)
  await tx.update(readingSets).set({ supersededAt: null }).where(eq(readingSets.id, id))
}

/** Puts what was read from a file so far into history. */
export async function supersedeReadingSets(tx: Transaction, uploadId: string, at: Date): Promise<void> {
  await tx
    .update(readingSets)
    .set({ supersededAt: at })
    .where(and(eq(readingSets.uploadId, uploadId), isNull(readingSets.supersededAt)))
}

/** Removes what was staged before an instant and never published: the remains of a process that was killed. */
export async function deleteStagedReadingSets(tx: Transaction, before: Date): Promise<number> {
  const left = await tx
    .select({ id: readingSets.id })
    .from(readingSets)
    .where(and(eq(readingSets.supersededAt, STAGED_AT), lt(readingSets.createdAt, before)))
  const ids = left.map((row) => row.id)
  if (ids.length === 0) return 0
  await tx.delete(readings).where(inArray(readings.readingSetId, ids))
  await tx.delete(readingSets).where(inArray(readingSets.id, ids))
  return ids.length
}
