import { type RunTrace } from './run-result'

const orNull = (value: number | undefined) => (value === undefined || Number.isNaN(value) ? null : value)

/**
 * A long log as a picture needs it: of each of `buckets` equal stretches of rows, the coldest and the hottest row stay, in order of time.
 * Peaks survive; a log that is short enough stays whole.
 */
export function thinTrace(
  timeS: Float64Array,
  bedTemperatureK: Float64Array,
  setTemperatureK: Float64Array | null,
  buckets = 1_000,
): RunTrace {
  const rows: number[] = []
  if (timeS.length <= 2 * buckets) for (let row = 0; row < timeS.length; row++) rows.push(row)
  else
    for (let bucket = 0; bucket < buckets; bucket++) {
      const from = Math.floor((bucket * timeS.length) / buckets)
      const to = Math.floor(((bucket + 1) * timeS.length) / buckets)
      let coldest = from
      let hottest = from
      for (let row = from; row < to; row++) {
        const value = bedTemperatureK[row] ?? Number.NaN
        if (value < (bedTemperatureK[coldest] ?? Number.NaN)) coldest = row
        if (value > (bedTemperatureK[hottest] ?? Number.NaN)) hottest = row
      }
      rows.push(Math.min(coldest, hottest))
      if (coldest !== hottest) rows.push(Math.max(coldest, hottest))
    }
  return {
    timeS: rows.map((row) => timeS[row] ?? 0),
    bedTemperatureK: rows.map((row) => orNull(bedTemperatureK[row])),
    setTemperatureK: setTemperatureK === null ? null : rows.map((row) => orNull(setTemperatureK[row])),
  }
}
