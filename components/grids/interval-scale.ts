import { roundTicks } from '@/components/charts/arrhenius-chart-option'

/** One scale for a whole column of intervals, in pixels of the cell's drawing. */
export interface IntervalScale {
  readonly width: number
  readonly ticks: readonly number[]
  readonly toX: (value: number) => number
}

const INSET = 5

/** Scale that holds every interval; null when there is none to show. */
export function intervalScale(
  intervals: readonly (readonly [number, number] | null)[],
  width: number,
): IntervalScale | null {
  const ends = intervals.flatMap((interval) => interval ?? []).filter((value) => Number.isFinite(value))
  if (ends.length === 0) return null
  const lowest = Math.min(...ends)
  const highest = Math.max(...ends)
  const margin = Math.max((highest - lowest) * 0.05, Math.abs(highest) * 0.01, 1e-9)
  const low = lowest - margin
  const high = highest + margin
  return {
    width,
    ticks: roundTicks(low, high, 4),
    toX: (value) => INSET + ((width - 2 * INSET) * (value - low)) / (high - low),
  }
}
