export type DateOrder = 'year-first' | 'day-first' | 'month-first'

/** A date, a time, or both, as they stand in the text; nothing is decided that the text does not say. */
export interface DateTimeScan {
  /** three numbers in the order of the text; year, month, day where the order is certain */
  readonly fields: readonly [number, number, number] | null
  /** `certain`: year first or month by name; `year-last`: day or month first; `short`: two-digit year somewhere */
  readonly form: 'certain' | 'year-last' | 'short' | null
  /** seconds since midnight, or an elapsed time where it goes past 24 h; null without a time */
  readonly secondOfDay: number | null
  readonly hasSeconds: boolean
  readonly hasHalfDay: boolean
  /** minutes east of Greenwich where the text carries an offset */
  readonly offsetMinutes: number | null
}

const MONTHS: readonly (readonly string[])[] = [
  ['jan', 'january', 'januar', 'jänner', 'janvier', 'janv', 'enero', 'ene', 'gennaio', 'gen', 'januari', 'janeiro'],
  ['feb', 'february', 'februar', 'février', 'févr', 'fevrier', 'febrero', 'febbraio', 'februari', 'fevereiro'],
  ['mar', 'march', 'märz', 'mär', 'mrz', 'maerz', 'mars', 'marzo', 'maart', 'março'],
  ['apr', 'april', 'avril', 'avr', 'abril', 'abr', 'aprile'],
  ['may', 'mai', 'mayo', 'maggio', 'mag', 'mei', 'maio'],
  ['jun', 'june', 'juni', 'juin', 'junio', 'giugno', 'giu', 'junho'],
  ['jul', 'july', 'juli', 'juillet', 'juil', 'julio', 'luglio', 'lug', 'julho'],
  ['aug', 'august', 'août', 'aout', 'agosto', 'ago', 'augustus'],
  ['sep', 'sept', 'september', 'septembre', 'septiembre', 'settembre', 'set', 'setembro'],
  ['oct', 'october', 'okt', 'oktober', 'octobre', 'octubre', 'ottobre', 'ott', 'outubro'],
  ['nov', 'november', 'novembre', 'noviembre', 'novembro'],
  ['dec', 'december', 'dez', 'dezember', 'décembre', 'déc', 'diciembre', 'dic', 'dicembre', 'dezembro'],
]
const MONTH_BY_NAME = new Map(MONTHS.flatMap((names, index) => names.map((name) => [name, index + 1] as const)))

const YEAR_FIRST = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})(?=$|[T ,;_])/
const YEAR_LAST = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4}|\d{2})(?=$|[T ,;_])/
const DAY_NAME_MONTH = /^(\d{1,2})\.?[ -]?(\p{L}{3,10})\.?,?[ -]?(\d{4}|\d{2})(?=$|[T ,;_])/u
const MONTH_NAME_DAY = /^(\p{L}{3,10})\.? (\d{1,2}),? (\d{4})(?=$|[T ,;_])/u
const COMPACT = /^(\d{4})(\d{2})(\d{2})(?:[T _-]?(\d{2})(\d{2})(\d{2}))?(?=$|[Z+-])/
const WEEKDAY = /^\p{L}{2,10}\.?,? (?=\d|\p{L})/u
const TIME =
  /^(\d{1,4}):(\d{2})(?::(\d{2})(?:[.,](\d{1,9}))?)?(?: ?(am|pm|a\.m\.|p\.m\.|uhr|h))?(?: ?(z|utc|gmt|[+-]\d{2}:?\d{2}))?$/i

const NO_TIME = { secondOfDay: null, hasSeconds: false, hasHalfDay: false, offsetMinutes: null }

/**
 * Date and time in a text, or null where it is neither. `compact` also takes dates without separators (20260302), which are numbers unless
 * the column says otherwise.
 */
export function scanDateTime(text: string, compact = false): DateTimeScan | null {
  if (text.length < 4 || text.length > 48) return null
  const trimmed = text.trim()
  const first = trimmed.charCodeAt(0)
  // nearly every cell of a log is a number without separators: leave at once
  if (first < 48 && first !== 0x2b) return null
  const date = scanDate(trimmed, compact)
  if (date === null) {
    if (first > 57) return null
    const time = scanTime(trimmed)
    return time === null ? null : { fields: null, form: null, ...time }
  }
  const rest = trimmed.slice(date.length).replace(/^[T ,;_]+/, '')
  if (rest === '') return { fields: date.fields, form: date.form, ...(date.time ?? NO_TIME) }
  const time = date.time === null ? scanTime(rest) : scanOffset(rest, date.time)
  return time === null ? null : { fields: date.fields, form: date.form, ...time }
}

type Fields = readonly [number, number, number]
type TimeScan = Omit<DateTimeScan, 'fields' | 'form'>
interface DateScan {
  readonly fields: Fields
  readonly form: 'certain' | 'year-last' | 'short'
  readonly length: number
  readonly time: TimeScan | null
}

function scanDate(text: string, compact: boolean): DateScan | null {
  let match = YEAR_FIRST.exec(text)
  if (match)
    return {
      fields: [num(match[1]), num(match[3]), num(match[4])],
      form: 'certain',
      length: match[0].length,
      time: null,
    }
  match = YEAR_LAST.exec(text)
  if (match) {
    const year = match[4] ?? ''
    const fields: Fields = [num(match[1]), num(match[3]), num(year)]
    return { fields, form: year.length === 4 ? 'year-last' : 'short', length: match[0].length, time: null }
  }
  if (compact) {
    match = COMPACT.exec(text)
    if (match && num(match[2]) <= 12 && num(match[3]) <= 31) {
      const time: TimeScan | null =
        match[4] === undefined
          ? null
          : { ...NO_TIME, secondOfDay: num(match[4]) * 3_600 + num(match[5]) * 60 + num(match[6]), hasSeconds: true }
      return { fields: [num(match[1]), num(match[2]), num(match[3])], form: 'certain', length: match[0].length, time }
    }
  }
  return scanNamed(text, 0) ?? scanAfterWeekday(text)
}

function scanNamed(text: string, skipped: number): DateScan | null {
  let match = DAY_NAME_MONTH.exec(text)
  if (match) {
    const month = MONTH_BY_NAME.get((match[2] ?? '').toLowerCase())
    if (month === undefined) return null
    const fields: Fields = [fullYear(match[3] ?? ''), month, num(match[1])]
    return { fields, form: 'certain', length: skipped + match[0].length, time: null }
  }
  match = MONTH_NAME_DAY.exec(text)
  if (match) {
    const month = MONTH_BY_NAME.get((match[1] ?? '').toLowerCase())
    if (month === undefined) return null
    return {
      fields: [num(match[3]), month, num(match[2])],
      form: 'certain',
      length: skipped + match[0].length,
      time: null,
    }
  }
  return null
}

function scanAfterWeekday(text: string): DateScan | null {
  if (text.charCodeAt(0) <= 57) return null
  const match = WEEKDAY.exec(text)
  if (match === null) return null
  const rest = text.slice(match[0].length)
  const date = scanDate(rest.slice(0, 40), false)
  return date === null ? null : { ...date, length: date.length + match[0].length }
}

function scanTime(text: string): TimeScan | null {
  const match = TIME.exec(text)
  if (match === null) return null
  let hours = num(match[1])
  const minutes = num(match[2])
  const seconds = match[3] === undefined ? 0 : num(match[3])
  if (minutes > 59 || seconds > 60) return null
  const half = (match[5] ?? '').toLowerCase()
  const hasHalfDay = half.startsWith('a') || half.startsWith('p')
  if (hasHalfDay) {
    if (hours < 1 || hours > 12) return null
    hours = (hours % 12) + (half.startsWith('p') ? 12 : 0)
  }
  const fraction = match[4] === undefined ? 0 : Number(`0.${match[4]}`)
  return {
    secondOfDay: hours * 3_600 + minutes * 60 + seconds + fraction,
    hasSeconds: match[3] !== undefined,
    hasHalfDay,
    offsetMinutes: match[6] === undefined ? null : offsetOf(match[6]),
  }
}

function scanOffset(rest: string, time: TimeScan): TimeScan | null {
  return /^(z|utc|gmt|[+-]\d{2}:?\d{2})$/i.test(rest) ? { ...time, offsetMinutes: offsetOf(rest) } : null
}

function offsetOf(text: string): number {
  const sign = text.charAt(0)
  if (sign !== '+' && sign !== '-') return 0
  const digits = text.slice(1).replace(':', '')
  const minutes = num(digits.slice(0, 2)) * 60 + num(digits.slice(2))
  return sign === '-' ? -minutes : minutes
}

function num(text: string | undefined): number {
  return Number(text ?? '')
}

/** Two digits stand for 1980 to 2079. */
function fullYear(text: string): number {
  const year = Number(text)
  return text.length > 2 ? year : year < 80 ? 2_000 + year : 1_900 + year
}

/**
 * Seconds since the epoch of the date's midnight on a clock without a zone, or null where the order is needed and not known, or the day does
 * not exist.
 */
export function localMidnightS(scan: DateTimeScan, order: DateOrder | null): number | null {
  if (scan.fields === null) return null
  const [a, b, c] = scan.fields
  if (scan.form === 'certain') return midnight(a, b, c)
  if (order === 'day-first') return midnight(scan.form === 'short' ? fullYear(String(c).padStart(2, '0')) : c, b, a)
  if (order === 'month-first') return midnight(scan.form === 'short' ? fullYear(String(c).padStart(2, '0')) : c, a, b)
  if (order === 'year-first' && scan.form === 'short') return midnight(fullYear(String(a).padStart(2, '0')), b, c)
  return null
}

function midnight(year: number, month: number, day: number): number | null {
  if (year < 1_900 || year > 2_199 || month < 1 || month > 12 || day < 1) return null
  const ms = Date.UTC(year, month - 1, day)
  const back = new Date(ms)
  return back.getUTCDate() === day && back.getUTCMonth() === month - 1 ? ms / 1_000 : null
}
