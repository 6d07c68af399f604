import 'server-only'
import { createHash } from 'node:crypto'
import { promisify } from 'node:util'
import { deflate } from 'node:zlib'
import type { ReadingChannel } from '@/lib/domain/intake'

const deflateAsync = promisify(deflate)

/** Values of one channel in a row of the table. Another number would make old and new rows unlike; reading does not depend on it. */
export const VALUES_PER_CHUNK = 10_000

export interface PreparedChunk {
  readonly channel: string
  readonly chunk: number
  readonly valueCount: number
  /** null when every value is missing */
  readonly minimum: number | null
  readonly maximum: number | null
  readonly content: Uint8Array
}

/** Readings compressed and hashed, ready to be stored. */
export interface PreparedReadings {
  readonly rowCount: number
  /** over the names, units and values, whatever the order of the channels */
  readonly contentSha256: string
  readonly channels: readonly {
    readonly channel: string
    readonly meaning: string
    readonly unit: string
    readonly species?: string
  }[]
  readonly chunks: readonly PreparedChunk[]
  /** range of the `time` channel, in seconds since 1970 */
  readonly firstTimeS: number | null
  readonly lastTimeS: number | null
}

interface Range {
  minimum: number
  maximum: number
}

/** Copies values as little-endian doubles with one bit pattern for all that is missing, so that equal readings have equal hashes. */
function toBytes(values: Float64Array): { bytes: Uint8Array; range: Range } {
  const bytes = new Uint8Array(values.length * 8)
  const view = new DataView(bytes.buffer)
  const range = { minimum: Infinity, maximum: -Infinity }
  for (let index = 0; index < values.length; index++) {
    const value = values[index] ?? NaN
    view.setFloat64(index * 8, Number.isNaN(value) ? NaN : value, true)
    if (value < range.minimum) range.minimum = value
    if (value > range.maximum) range.maximum = value
  }
  return { bytes, range }
}

function describeChannel({ name, unit }: ReadingChannel) {
  const dot = name.indexOf('.')
  if (dot < 0) return { channel: name, meaning: name, unit }
  return { channel: name, meaning: name.slice(0, dot), unit, species: name.slice(dot + 1) }
}

function checkChannels(channels: readonly ReadingChannel[]): number {
  const names = new Set(channels.map((channel) => channel.name))
  if (names.size !== channels.length) throw new Error('two channels of these readings have the same name')
  const rowCount = channels[0]?.values.length ?? 0
  const odd = channels.find((channel) => channel.values.length !== rowCount)
  if (odd) throw new Error(`channel ${odd.name} has ${odd.values.length} values, the first one has ${rowCount}`)
  return rowCount
}

async function prepareChannel({ name, unit, values }: ReadingChannel) {
  const hash = createHash('sha256')
  const pending: Promise<PreparedChunk>[] = []
  const whole: Range = { minimum: Infinity, maximum: -Infinity }
  for (let start = 0; start < values.length; start += VALUES_PER_CHUNK) {
    const { bytes, range } = toBytes(values.subarray(start, start + VALUES_PER_CHUNK))
    hash.update(bytes)
    whole.minimum = Math.min(whole.minimum, range.minimum)
    whole.maximum = Math.max(whole.maximum, range.maximum)
    const isEmpty = range.minimum > range.maximum
    pending.push(
      deflateAsync(bytes, { level: 1 }).then((content) => ({
        channel: name,
        chunk: start / VALUES_PER_CHUNK,
        valueCount: bytes.length / 8,
        minimum: isEmpty ? null : range.minimum,
        maximum: isEmpty ? null : range.maximum,
        content,
      })),
    )
    // compression runs beside this thread; waiting for the one before the last keeps both busy and the server answering
    await pending.at(-3)
  }
  const line = JSON.stringify([name, unit, values.length, hash.digest('hex')])
  return { line, chunks: await Promise.all(pending), range: whole.minimum > whole.maximum ? null : whole }
}

/** Compresses and hashes readings. Done before a transaction is opened: it is most of the work, and needs no database. */
export async function prepareReadings(channels: readonly ReadingChannel[]): Promise<PreparedReadings> {
  const rowCount = checkChannels(channels)
  const lines: string[] = []
  const chunks: PreparedChunk[] = []
  let time: Range | null = null
  for (const channel of channels) {
    const prepared = await prepareChannel(channel)
    lines.push(prepared.line)
    chunks.push(...prepared.chunks)
    if (channel.name === 'time') time = prepared.range
  }
  return {
    rowCount,
    contentSha256: createHash('sha256').update(lines.sort().join('\n')).digest('hex'),
    channels: channels.map(describeChannel),
    chunks,
    firstTimeS: time?.minimum ?? null,
    lastTimeS: time?.maximum ?? null,
  }
}
