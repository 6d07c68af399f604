/** A time as read off a clock on the wall, `2026-03-09T07:30`, placed in a zone. */
export type LocalInstant =
  | {
      readonly ok: true
      /** with the zone's offset: `2026-03-09T07:30:00+01:00` */
      readonly instant: string
      /** the hour happens twice that day; the first is taken and said */
      readonly isAmbiguous: boolean
    }
  | { readonly ok: false; readonly sentence: string }

const LOCAL = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})(?::(\d{2}))?$/

/** Minutes east of Greenwich in a zone at an instant. */
export function offsetMinutes(at: Date, timeZone: string): number {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  }).formatToParts(at)
  const part = (type: string) => Number(parts.find((piece) => piece.type === type)?.value ?? '0')
  const wall = Date.UTC(part('year'), part('month') - 1, part('day'), part('hour'), part('minute'), part('second'))
  return Math.round((wall - Math.floor(at.getTime() / 1000) * 1000) / 60_000)
}

/** Whether the engine knows the zone, for example `Europe/Berlin`. */
export function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: name })
    return true
  } catch (error) {
    if (error instanceof RangeError) return false
    throw error
  }
}

/** Instant with offset behind a wall-clock time in a zone. An hour that the change to summer time leaves out is refused. */
export function instantFromLocal(local: string, timeZone: string): LocalInstant {
  const match = LOCAL.exec(local)
  if (match === null) return { ok: false, sentence: 'Give a day and a time, for example 9 Mar 2026 07:30.' }
  const [year = 0, month = 0, day = 0, hour = 0, minute = 0, second = 0] = match
    .slice(1)
    .map((text) => Number(text ?? 0))
  const wall = Date.UTC(year, month - 1, day, hour, minute, second)
  const read = new Date(wall)
  if (read.getUTCMonth() !== month - 1 || read.getUTCDate() !== day || hour > 23 || minute > 59)
    return { ok: false, sentence: `There is no such day or time as ${local.replace('T', ' ')}.` }
  // the offset before and after any change of clocks on that day
  const candidates = [
    ...new Set([
      offsetMinutes(new Date(wall - 86_400_000), timeZone),
      offsetMinutes(new Date(wall + 86_400_000), timeZone),
    ]),
  ]
  const fitting = candidates.filter((offset) => offsetMinutes(new Date(wall - offset * 60_000), timeZone) === offset)
  const offset = fitting.length > 1 ? Math.max(...fitting) : fitting[0]
  if (offset === undefined)
    return {
      ok: false,
      sentence: `The clocks in ${timeZone} go forward over ${local.replace('T', ' ')}; that time does not exist.`,
    }
  return {
    ok: true,
    instant: `${local.slice(0, 16)}:${pad(second)}${offsetText(offset)}`,
    isAmbiguous: fitting.length > 1,
  }
}

/** Wall-clock time in a zone for a date-and-time field: `2026-03-09T07:30`. */
export function localFromInstant(instant: string | Date, timeZone: string): string {
  const at = typeof instant === 'string' ? new Date(instant) : instant
  return new Date(at.getTime() + offsetMinutes(at, timeZone) * 60_000).toISOString().slice(0, 16)
}

function offsetText(minutes: number): string {
  const size = Math.abs(minutes)
  return `${minutes < 0 ? '-' : '+'}${pad(Math.floor(size / 60))}:${pad(size % 60)}`
}

function pad(value: number): string {
  return String(value).padStart(2, '0')
}
