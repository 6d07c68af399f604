/** Half of an interval's width, the number behind ±; null without an interval. */
export function halfWidth(interval: readonly [number, number] | null): number | null {
  return interval ? (interval[1] - interval[0]) / 2 : null
}
