import { createHash } from 'node:crypto'
import { eq, isNull, sql } from 'drizzle-orm'
import { afterAll, beforeAll, expect, test } from 'vitest'
import type { OpenDatabase } from '@/db/client'
import { prepareReadings } from '@/db/mutations/prepare-readings'
import {
  deleteStagedReadingSets,
  insertReadingSet,
  publishReadingSet,
  stageReadingSet,
  type NewReadingSet,
} from '@/db/mutations/readings'
import { selectReadingChannels, selectReadingRanges } from '@/db/queries/readings'
import { readings, readingSets } from '@/db/schema'
import type { ReadingChannel } from '@/lib/domain/intake'
import { freshDatabase } from '../../support/fresh-database'
import { makeRun } from '../../support/make-run'

let opened: OpenDatabase
let set: NewReadingSet
beforeAll(async () => {
  opened = await freshDatabase()
  const { uploadId, runId } = await makeRun(opened.database)
  set = { uploadId, runId, kind: 'rig-log', columnMapId: null, parserVersion: '1' }
})
afterAll(() => opened.close())

/** The generator of Park and Miller (1988): the same values everywhere. */
function values(count: number, seed: number): Float64Array {
  let state = seed
  return Float64Array.from({ length: count }, (_, index) => {
    state = (state * 48271) % 2147483647
    return index % 97 === 0 ? NaN : state / 1000
  })
}

const channelsOf = (count: number): ReadingChannel[] => [
  { name: 'time', unit: 's', values: Float64Array.from({ length: count }, (_, index) => 1_772_352_000 + index) },
  { name: 'bedTemperatureK', unit: 'K', values: values(count, 7) },
  { name: 'flowMolPerS.CO2', unit: 'mol/s', values: values(count, 11) },
]

const bits = (array: Float64Array | undefined) =>
  Buffer.from(array ? new Uint8Array(array.buffer, array.byteOffset, array.byteLength) : [])

test('gives back every bit, over several chunks, with missing, infinite and negative-zero values', async () => {
  const channels = channelsOf(25_001)
  const bed = channels[1]?.values
  if (bed) bed.set([-0, Infinity, -Infinity, 5e-324], 20_000)
  const { id, rowCount } = await opened.database.transaction((tx) => insertReadingSet(tx, set, channels))
  expect(rowCount).toBe(25_001)
  const read = await selectReadingChannels(opened.database, id)
  expect([...read.keys()]).toEqual(['bedTemperatureK', 'flowMolPerS.CO2', 'time'])
  for (const channel of channels) expect(bits(read.get(channel.name)).equals(bits(channel.values))).toBe(true)
  expect([...(await selectReadingChannels(opened.database, id, ['time', 'absent'])).keys()]).toEqual(['time'])
  const [row] = await opened.database.select().from(readingSets).where(eq(readingSets.id, id))
  expect(row?.firstAt?.toISOString()).toBe('2026-03-01T08:00:00.000Z')
  expect(row?.lastAt?.toISOString()).toBe('2026-03-01T14:56:40.000Z')
  expect(row?.channels).toEqual([
    { channel: 'time', meaning: 'time', unit: 's' },
    { channel: 'bedTemperatureK', meaning: 'bedTemperatureK', unit: 'K' },
    { channel: 'flowMolPerS.CO2', meaning: 'flowMolPerS', unit: 'mol/s', species: 'CO2' },
  ])
  const ranges = await selectReadingRanges(opened.database, id, ['time'])
  expect(ranges.map((range) => [range.chunk, range.valueCount, range.minimum, range.maximum])).toEqual([
    [0, 10_000, 1_772_352_000, 1_772_361_999],
    [1, 10_000, 1_772_362_000, 1_772_371_999],
    [2, 5_001, 1_772_372_000, 1_772_377_000],
  ])
})

test('content is stored as it comes, not compressed a second time', async () => {
  const found = await opened.database.execute<{ attstorage: string }>(
    sql`select attstorage from pg_attribute where attrelid = 'readings'::regclass and attname = 'content'`,
  )
  expect(found.rows).toEqual([{ attstorage: 'e' }])
})

test('a chunk with no value at all has no range', async () => {
  const channels = [{ name: 'outletPressurePa', unit: 'Pa', values: new Float64Array(3).fill(NaN) }]
  const { id } = await opened.database.transaction((tx) => insertReadingSet(tx, set, channels))
  const [range] = await selectReadingRanges(opened.database, id, ['outletPressurePa'])
  expect(range).toMatchObject({ valueCount: 3, minimum: null, maximum: null })
  expect(bits((await selectReadingChannels(opened.database, id)).get('outletPressurePa'))).toEqual(
    bits(channels[0]?.values),
  )
})

test('the hash is of names, units and values: not of their order, nor of how "missing" is written', async () => {
  const channels = channelsOf(10)
  const { contentSha256 } = await prepareReadings(channels)
  const sha256 = (text: string | Uint8Array) => createHash('sha256').update(text).digest('hex')
  const lines = channels.map((channel) =>
    JSON.stringify([channel.name, channel.unit, 10, sha256(bits(channel.values))]),
  )
  expect(contentSha256).toBe(sha256(lines.sort().join('\n')))
  expect((await prepareReadings([...channels].reverse())).contentSha256).toBe(contentSha256)
  const otherNaN = new Float64Array(new Uint8Array([1, 0, 0, 0, 0, 0, 0xf8, 0xff]).buffer)
  const one = (array: Float64Array) => prepareReadings([{ name: 'x', unit: 'K', values: array }])
  expect((await one(otherNaN)).contentSha256).toBe((await one(new Float64Array([NaN]))).contentSha256)
  expect((await one(new Float64Array([1]))).contentSha256).not.toBe((await one(new Float64Array([2]))).contentSha256)
})

test('refuses channels of unequal length or equal name', async () => {
  const short = { name: 'y', unit: 'K', values: new Float64Array(2) }
  const long = { name: 'x', unit: 'K', values: new Float64Array(3) }
  await expect(prepareReadings([long, short])).rejects.toThrow('channel y has 2 values, the first one has 3')
  await expect(prepareReadings([long, long])).rejects.toThrow('same name')
})

test('a staged set is current only once published, and then the one before it is history', async () => {
  const current = () =>
    opened.database.select({ id: readingSets.id }).from(readingSets).where(isNull(readingSets.supersededAt))
  const before = await current()
  const staged = await stageReadingSet(opened.database, set, channelsOf(20))
  expect(await current()).toEqual(before)
  const at = new Date('2026-03-02T00:00:00Z')
  await opened.database.transaction((tx) => publishReadingSet(tx, staged.id, at))
  expect(await current()).toEqual([{ id: staged.id }])
  await expect(opened.database.transaction((tx) => publishReadingSet(tx, staged.id, at))).rejects.toThrow('not staged')
})

test('what was staged and never published goes, and nothing else', async () => {
  const sets = () => opened.database.$count(readingSets)
  const before = await sets()
  const staged = await stageReadingSet(opened.database, set, channelsOf(20))
  const remove = (at: Date) => opened.database.transaction((tx) => deleteStagedReadingSets(tx, at))
  expect(await remove(new Date('2020-01-01'))).toBe(0)
  expect(await remove(new Date(Date.now() + 60_000))).toBe(1)
  expect(await sets()).toBe(before)
  expect(await opened.database.$count(readings, eq(readings.readingSetId, staged.id))).toBe(0)
})
