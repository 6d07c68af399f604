const formats = new Map<string, Intl.DateTimeFormat>()

function formatOf(timeZone: string, hasTime: boolean): Intl.DateTimeFormat {
  const key = `${timeZone} ${String(hasTime)}`
  const known = formats.get(key)
  if (known !== undefined) return known
  const made = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    ...(hasTime ? { hour: '2-digit', minute: '2-digit', hour12: false } : {}),
  })
  formats.set(key, made)
  return made
}

/** An instant in a zone, as people write it there: `9 Mar 2026 07:30`. */
export function formatInstant(instant: string | Date, timeZone: string): string {
  const date = typeof instant === 'string' ? new Date(instant) : instant
  if (Number.isNaN(date.getTime())) return 'not known'
  return formatOf(timeZone, true).format(date).replace(',', '').replace('Sept', 'Sep')
}

/** The day only: `9 Mar 2026`. */
export function formatDay(instant: string | Date, timeZone: string): string {
  const date = typeof instant === 'string' ? new Date(instant) : instant
  if (Number.isNaN(date.getTime())) return 'not known'
  return formatOf(timeZone, false).format(date).replace('Sept', 'Sep')
}
