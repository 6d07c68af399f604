import { scanDateTime, type DateTimeScan } from '../dates/scan-date-time'
import { labelWords } from './split-header'
import { HEADER_WORDS } from './header-words'

export interface StatedStart {
  readonly text: string
  readonly scan: DateTimeScan
}

/** Start of the log as its preamble states it: one entry with date and time, or a date and a time in two entries. */
export function findStart(preamble: readonly { readonly key: string; readonly value: string }[]): StatedStart | null {
  let date: StatedStart | null = null
  let time: StatedStart | null = null
  let full: StatedStart | null = null
  for (const { key, value } of preamble) {
    const words = labelWords(key)
    const isStart = words.some((word) => HEADER_WORDS.start.has(word))
    const isDate = words.some((word) => HEADER_WORDS.date.has(word))
    const isTime = words.some((word) => HEADER_WORDS.clockTime.has(word))
    if (!isStart && !isDate && !isTime) continue
    const text = value.replace(/^(at|am|um|on|le)\s+/i, '').trim()
    const scan = scanDateTime(text)
    if (scan === null) continue
    if (scan.fields !== null && scan.secondOfDay !== null) {
      if (full === null || isStart) full = { text, scan }
    } else if (scan.fields !== null) date ??= { text, scan }
    else time ??= { text, scan }
  }
  if (full !== null) return full
  if (date === null) return null
  if (time === null) return date
  const text = `${date.text} ${time.text}`
  const scan = scanDateTime(text)
  return scan === null ? date : { text, scan }
}
