/** What a number format makes of a number. */
export type NumberFormatKind = 'number' | 'date' | 'time' | 'elapsed'

/** Kind of a built-in format. Source: ISO/IEC 29500-1:2016, 18.8.30. */
export function builtInFormatKind(id: number): NumberFormatKind {
  if (id === 46) return 'elapsed'
  if ((id >= 18 && id <= 21) || id === 45 || id === 47) return 'time'
  if ((id >= 14 && id <= 17) || id === 22 || (id >= 27 && id <= 36) || (id >= 50 && id <= 58)) return 'date'
  return 'number'
}

/** Kind of a format code: letters of dates and times outside quotes, escapes and brackets; `[h]` counts on past a day. */
export function formatCodeKind(code: string): NumberFormatKind {
  let hasDay = false
  let hasTime = false
  for (let i = 0; i < code.length && i < 300; i++) {
    const letter = code.charAt(i).toLowerCase()
    if (letter === ';') break
    if (letter === '"') {
      const end = code.indexOf('"', i + 1)
      if (end < 0) break
      i = end
    } else if (letter === '\\' || letter === '_' || letter === '*') i++
    else if (letter === '[') {
      const end = code.indexOf(']', i + 1)
      if (end < 0) break
      const inside = code.slice(i + 1, end).toLowerCase()
      if (inside !== '' && /^(h+|m+|s+)$/.test(inside)) return 'elapsed'
      i = end
    } else if (letter === 'y' || letter === 'd') hasDay = true
    else if (letter === 'h' || letter === 's') hasTime = true
    else if (letter === 'g' || letter === 'e' || letter === '0' || letter === '#' || letter === '?') {
      // `General`, `0.00E+00`: digits make it a number unless date letters came first
      if (!hasDay && !hasTime) return 'number'
    }
  }
  return hasDay ? 'date' : hasTime ? 'time' : 'number'
}

/**
 * Text of a date or time behind a serial number, to the millisecond; null where no date belongs to it.
 * Day 60 of the 1900 system is a 29 February that never was; days before it are counted from one day later. Source: ISO/IEC 29500-1:2016, 18.17.4.1.
 */
export function serialText(serial: number, kind: Exclude<NumberFormatKind, 'number'>, is1904: boolean): string | null {
  if (!Number.isFinite(serial) || serial < 0 || serial > 2_958_466) return null
  const milliseconds = Math.round(serial * 86_400_000)
  if (kind === 'elapsed' || (kind === 'time' && serial < 1)) return clock(milliseconds)
  const day = Math.floor(milliseconds / 86_400_000)
  const rest = milliseconds - day * 86_400_000
  if (!is1904 && day === 60) return null
  // 1899-12-30 and 1904-01-01
  const epoch = is1904 ? Date.UTC(1904, 0, 1) : Date.UTC(1899, 11, day < 60 ? 31 : 30)
  const date = new Date(epoch + day * 86_400_000).toISOString().slice(0, 10)
  return `${date}T${clock(rest)}`
}

function clock(milliseconds: number): string {
  const seconds = Math.floor(milliseconds / 1_000)
  const fraction = milliseconds - seconds * 1_000
  const two = (value: number) => String(value).padStart(2, '0')
  const text = `${two(Math.floor(seconds / 3_600))}:${two(Math.floor(seconds / 60) % 60)}:${two(seconds % 60)}`
  return fraction === 0 ? text : `${text}.${String(fraction).padStart(3, '0')}`
}
