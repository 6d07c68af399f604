/** What a small picture of a channel draws from. */
export interface ChannelSeries {
  readonly timeS: readonly number[]
  readonly values: readonly (number | null)[]
  readonly minimum: number | null
  readonly maximum: number | null
}

const decimal = (value: number) => String(Math.round(value * 10) / 10)

/**
 * Path of a channel in a box of this size, time to the right. Where a value is missing the line is broken; a value that stands alone is a dot.
 * A channel that never changes is a line through the middle.
 */
export function channelPath(series: ChannelSeries, width: number, height: number): string {
  const { timeS, values, minimum, maximum } = series
  if (minimum === null || maximum === null) return ''
  const first = timeS[0] ?? 0
  const span = (timeS.at(-1) ?? first) - first
  const range = maximum - minimum
  const x = (at: number) => (span > 0 ? ((at - first) / span) * width : width / 2)
  const y = (value: number) => (range > 0 ? height - ((value - minimum) / range) * height : height / 2)
  const parts: string[] = []
  let length = 0
  const endStretch = () => {
    // a stroke of no length, which round ends make a dot
    if (length === 1) parts.push('h0')
    length = 0
  }
  values.forEach((value, index) => {
    if (value === null) return endStretch()
    parts.push(`${length === 0 ? 'M' : 'L'}${decimal(x(timeS[index] ?? first))} ${decimal(y(value))}`)
    length++
  })
  endStretch()
  return parts.join('')
}
