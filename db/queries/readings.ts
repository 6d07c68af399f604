import 'server-only'
import { promisify } from 'node:util'
import { inflate } from 'node:zlib'
import { and, asc, eq, gte, inArray, lt } from 'drizzle-orm'
import type { Executor } from '../executor'
import { readings } from '../schema'

const inflateAsync = promisify(inflate)

/** Chunks in one statement: some two megabytes, about 20 ms in the database's thread. */
const CHUNKS_PER_SLICE = 48

async function decodeInto(values: Float64Array, offset: number, content: Uint8Array): Promise<void> {
  const bytes = await inflateAsync(content)
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  for (let index = 0; index * 8 < bytes.byteLength; index++) values[offset + index] = view.getFloat64(index * 8, true)
}

async function selectChannel(db: Executor, readingSetId: string, channel: string, counts: readonly number[]) {
  const offsets: number[] = []
  let length = 0
  for (const count of counts) {
    offsets.push(length)
    length += count
  }
  const values = new Float64Array(length)
  for (let start = 0; start < counts.length; start += CHUNKS_PER_SLICE) {
    const slice = await db
      .select({ chunk: readings.chunk, content: readings.content })
      .from(readings)
      .where(
        and(
          eq(readings.readingSetId, readingSetId),
          eq(readings.channel, channel),
          gte(readings.chunk, start),
          lt(readings.chunk, start + CHUNKS_PER_SLICE),
        ),
      )
    await Promise.all(slice.map((row) => decodeInto(values, offsets[row.chunk] ?? 0, row.content)))
  }
  return values
}

/** Values by channel, bit for bit as stored; all channels, or those named that are there. Missing values are NaN. */
export async function selectReadingChannels(
  db: Executor,
  readingSetId: string,
  names?: readonly string[],
): Promise<Map<string, Float64Array>> {
  const found = await db
    .select({ channel: readings.channel, chunk: readings.chunk, valueCount: readings.valueCount })
    .from(readings)
    .where(
      and(
        eq(readings.readingSetId, readingSetId),
        names === undefined ? undefined : inArray(readings.channel, [...names]),
      ),
    )
    .orderBy(asc(readings.channel), asc(readings.chunk))
  const counts = new Map<string, number[]>()
  for (const row of found) {
    const known = counts.get(row.channel)
    if (known) known.push(row.valueCount)
    else counts.set(row.channel, [row.valueCount])
  }
  const channels = new Map<string, Float64Array>()
  for (const [channel, valueCounts] of counts)
    channels.set(channel, await selectChannel(db, readingSetId, channel, valueCounts))
  return channels
}

export interface ReadingRange {
  readonly channel: string
  readonly chunk: number
  readonly valueCount: number
  readonly minimum: number | null
  readonly maximum: number | null
}

/** Least and greatest value of each chunk, for a picture of a long trace without its values. */
export async function selectReadingRanges(
  db: Executor,
  readingSetId: string,
  names: readonly string[],
): Promise<ReadingRange[]> {
  return db
    .select({
      channel: readings.channel,
      chunk: readings.chunk,
      valueCount: readings.valueCount,
      minimum: readings.minimum,
      maximum: readings.maximum,
    })
    .from(readings)
    .where(and(eq(readings.readingSetId, readingSetId), inArray(readings.channel, [...names])))
    .orderBy(asc(readings.channel), asc(readings.chunk))
}
