import { type Problem, type ReadingChannel } from '../../domain/intake'
import { ProblemList } from '../problem-list'

/** Rows in time order. Where the file's own order differs, that is said with the line, and rows keep their place in the file as `sourceRow`. */
export function orderByTime(
  channels: readonly ReadingChannel[],
  rowWord: 'row' | 'injection',
): { readonly channels: readonly ReadingChannel[]; readonly problems: readonly Problem[] } {
  const problems = new ProblemList()
  const time = channels.find((channel) => channel.name === 'time')?.values
  const source = channels.find((channel) => channel.name === 'sourceRow')?.values
  if (time === undefined || source === undefined) return { channels, problems: [] }
  let isOrdered = true
  for (let i = 1; i < time.length; i++) {
    const now = time[i] ?? 0
    const before = time[i - 1] ?? 0
    if (now > before) continue
    const line = source[i] ?? null
    if (now < before) {
      isOrdered = false
      problems.add({
        code: 'time-goes-back',
        severity: 'problem',
        line,
        found: `${String(Math.round((before - now) * 1_000) / 1_000)} s back`,
        expected: `a time after that of the ${rowWord} before`,
        sentence: `Line ${String(line)}: the time goes back by ${String(Math.round((before - now) * 1_000) / 1_000)} s. The ${rowWord}s are put in order of time.`,
      })
    } else
      problems.add({
        code: 'duplicate-time',
        severity: 'note',
        line,
        expected: `one ${rowWord} for each time`,
        sentence: `Line ${String(line)} has the same time as the ${rowWord} before it. Both are kept.`,
      })
  }
  if (isOrdered) return { channels, problems: problems.list() }
  const order = Array.from(time, (_value, index) => index).sort((a, b) => (time[a] ?? 0) - (time[b] ?? 0) || a - b)
  return {
    channels: channels.map((channel) => ({
      ...channel,
      values: Float64Array.from(order, (index) => channel.values[index] ?? Number.NaN),
    })),
    problems: problems.list(),
  }
}
