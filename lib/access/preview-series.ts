import { type ReadingChannel } from '../domain/intake'
import { type PreviewChannel } from '../domain/upload-preview'

const BUCKETS = 120
/** Channels that say where a value stands, not what was measured. */
const PLACES = new Set(['time', 'sourceRow', 'lastSourceRow', 'number'])

/** Each measured channel as a small picture needs it: of each stretch of rows its least and greatest value. */
export function previewSeries(channels: readonly ReadingChannel[]): PreviewChannel[] {
  const time = channels.find((channel) => channel.name === 'time')?.values ?? new Float64Array()
  return channels
    .filter((channel) => !PLACES.has(channel.name) && !channel.name.startsWith('isCensored.'))
    .map(({ name, unit, values }) => {
      let minimum = Number.POSITIVE_INFINITY
      let maximum = Number.NEGATIVE_INFINITY
      let missingCount = 0
      for (const value of values) {
        if (Number.isNaN(value)) missingCount++
        else {
          if (value < minimum) minimum = value
          if (value > maximum) maximum = value
        }
      }
      const rows: number[] = []
      const buckets = Math.min(BUCKETS, values.length)
      for (let bucket = 0; bucket < buckets; bucket++) {
        const from = Math.floor((bucket * values.length) / buckets)
        const to = Math.floor(((bucket + 1) * values.length) / buckets)
        let low = from
        let high = from
        for (let row = from; row < to; row++) {
          if ((values[row] ?? Number.NaN) < (values[low] ?? Number.NaN)) low = row
          if ((values[row] ?? Number.NaN) > (values[high] ?? Number.NaN)) high = row
        }
        rows.push(Math.min(low, high))
        if (low !== high) rows.push(Math.max(low, high))
      }
      return {
        name,
        unit,
        timeS: rows.map((row) => time[row] ?? 0),
        values: rows.map((row) => {
          const value = values[row]
          return value === undefined || Number.isNaN(value) ? null : value
        }),
        minimum: Number.isFinite(minimum) ? minimum : null,
        maximum: Number.isFinite(maximum) ? maximum : null,
        missingCount,
      }
    })
}
