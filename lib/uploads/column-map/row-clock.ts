import { type ColumnMapSpecification, type MappedColumn } from '../../domain/column-map'
import { unitFromAlias } from '../../analysis/units/unit-from-alias'
import { LocalClock, isTimeZone } from '../dates/local-clock'
import { localMidnightS, scanDateTime } from '../dates/scan-date-time'
import { absenceOf } from '../missing-words'
import { NumberColumn } from '../number-column'
import { readNumberText } from '../number-text'
import { type ProblemInput } from '../problem-list'
import { type Cell } from '../table'
import { findStart } from './find-start'

type Preamble = readonly { readonly key: string; readonly value: string }[]

/**
 * Instants of the rows [s since the epoch]. Wall-clock times go through the zone's own rules; where the clock shows an hour twice, the jump back
 * between rows tells which is which, and where there is none the answer of a person does.
 */
export class RowClock {
  readonly instants = new NumberColumn()
  /** indices of instants that nobody has settled */
  readonly #ambiguous: number[] = []
  readonly #local = new NumberColumn()
  readonly #clock: LocalClock | null
  readonly #date: MappedColumn | undefined
  readonly #time: MappedColumn | undefined
  readonly #elapsed: MappedColumn | undefined
  readonly #elapsedToS: ((value: number) => number) | null
  readonly #startS: number | null
  readonly startFault: ProblemInput | null
  #days = 0
  #previousSecond = -1
  #midnightText = ''
  #midnightS = 0
  hasUnsettledHour = false

  constructor(
    readonly specification: ColumnMapSpecification,
    preamble: Preamble,
  ) {
    const columns = specification.columns
    const byMeaning = (meaning: MappedColumn['meaning']) => columns.find((column) => column.meaning === meaning)
    this.#clock = isTimeZone(specification.timeZone) ? new LocalClock(specification.timeZone) : null
    this.#date = byMeaning('time') ?? byMeaning('date')
    this.#time = this.#date?.meaning === 'time' ? undefined : byMeaning('time-of-day')
    this.#elapsed = this.#date === undefined ? byMeaning('elapsed-time') : undefined
    this.#elapsedToS =
      this.#elapsed === undefined || this.#elapsed.unit === ''
        ? null
        : (unitFromAlias(this.#elapsed.unit, 'time')?.toSi ?? null)
    const needsStart = this.#date === undefined && (this.#elapsed !== undefined || this.#time !== undefined)
    const start = needsStart ? this.#start(preamble) : null
    this.#startS = typeof start === 'number' ? start : null
    this.startFault = needsStart && typeof start !== 'number' ? start : null
  }

  #start(preamble: Preamble): number | ProblemInput {
    const stated = this.specification.elapsedStart ?? findStart(preamble)?.text ?? null
    if (stated === null)
      return {
        code: 'bad-date',
        severity: 'fatal',
        expected: 'a start with date and time, in the preamble or given by a person',
        sentence:
          'The file counts time from its start and does not say when that was. Give the start and read it again.',
      }
    // a time of day runs on its own; elapsed time runs from the instant
    const seconds = this.#elapsed === undefined ? this.#localMidnight(stated) : this.#instant(stated)
    if (seconds === null)
      return {
        code: 'bad-date',
        severity: 'fatal',
        found: stated,
        expected: 'date and time in the order chosen, in a zone that is known',
        sentence: `The start “${stated.slice(0, 60)}” cannot be read as date and time with the order of day and month that was chosen.`,
      }
    return seconds
  }

  #localMidnight(text: string): number | null {
    const scan = scanDateTime(text)
    return scan === null ? null : localMidnightS(scan, this.specification.dateOrder)
  }

  #instant(text: string): number | null {
    const scan = scanDateTime(text)
    if (scan === null) return null
    const midnightS = localMidnightS(scan, this.specification.dateOrder)
    if (midnightS === null || scan.secondOfDay === null || scan.secondOfDay >= 86_400) return null
    const localS = midnightS + scan.secondOfDay
    if (scan.offsetMinutes !== null) return localS - scan.offsetMinutes * 60
    const instants = this.#clock?.instants(localS) ?? []
    if (instants.length > 1 && this.specification.ambiguousHour === null) this.hasUnsettledHour = true
    return instants[this.specification.ambiguousHour === 'later' ? instants.length - 1 : 0] ?? null
  }

  /** Takes the time of the next row; a fault where it has none that can be read. */
  add(cells: readonly Cell[], line: number): ProblemInput | null {
    if (this.#date !== undefined) return this.#addDate(cells, line, this.#date)
    if (this.#elapsed !== undefined) return this.#addElapsed(cells, line, this.#elapsed)
    if (this.#time !== undefined) return this.#addTimeOfDay(cells, line, this.#time)
    return { code: 'missing-column', severity: 'fatal', sentence: 'No column is marked as the time.' }
  }

  /** Takes the last row back, when the rest of it turned out to be no reading. */
  undo(): void {
    if (this.#ambiguous.at(-1) === this.instants.length - 1) this.#ambiguous.pop()
    this.instants.pop()
    this.#local.pop()
  }

  #addDate(cells: readonly Cell[], line: number, column: MappedColumn): ProblemInput | null {
    const cell = cells[column.index] ?? ''
    const text = typeof cell === 'number' ? String(cell) : cell
    const scan = scanDateTime(text, true)
    if (scan === null || scan.fields === null) return badTime(line, column, text, 'a date')
    let midnightS: number | null
    // the date repeats from row to row, with the time apart or behind it
    const dateText = scan.secondOfDay === null ? text : text.slice(0, 10)
    if (dateText === this.#midnightText && scan.secondOfDay === null) midnightS = this.#midnightS
    else {
      midnightS = localMidnightS(scan, this.specification.dateOrder)
      if (midnightS !== null) {
        this.#midnightText = dateText
        this.#midnightS = midnightS
      }
    }
    if (midnightS === null)
      return badTime(
        line,
        column,
        text,
        this.specification.dateOrder === null
          ? 'a date whose order of day and month is known'
          : `a date with the ${said(this.specification.dateOrder)}`,
      )
    let seconds = scan.secondOfDay
    let offsetMinutes = scan.offsetMinutes
    if (this.#time !== undefined && column.meaning === 'date') {
      const timeCell = cells[this.#time.index] ?? ''
      const timeScan = scanDateTime(String(timeCell))
      if (timeScan === null || timeScan.secondOfDay === null || timeScan.secondOfDay >= 86_401)
        return badTime(line, this.#time, String(timeCell), 'a time of day')
      seconds = timeScan.secondOfDay
      offsetMinutes = timeScan.offsetMinutes
    }
    if (seconds !== null && seconds >= 86_401) return badTime(line, column, text, 'a time of day below 24 h')
    return this.#push(midnightS + (seconds ?? 0), offsetMinutes, line, column, text)
  }

  #addElapsed(cells: readonly Cell[], line: number, column: MappedColumn): ProblemInput | null {
    const cell = cells[column.index] ?? ''
    if (this.#startS === null) return this.startFault
    let seconds: number | null = null
    if (typeof cell === 'number' || this.#elapsedToS !== null) {
      const value = typeof cell === 'number' ? cell : readNumberText(cell, this.specification.decimalMark)
      if (value !== null && this.#elapsedToS === null)
        return {
          code: 'unknown-unit',
          severity: 'problem',
          line,
          column: column.header,
          found: String(cell),
          expected: 'a unit of time for the column',
          sentence: `“${column.header}” counts time in numbers without a unit. Choose one in the table of columns.`,
        }
      if (value !== null && this.#elapsedToS !== null) seconds = this.#elapsedToS(value)
    }
    if (seconds === null && typeof cell === 'string') {
      const scan = scanDateTime(cell.length < 4 ? `0${cell}` : cell)
      if (scan !== null && scan.fields === null && (scan.hasSeconds || column.unit !== '')) seconds = scan.secondOfDay
    }
    if (seconds === null)
      return badTime(
        line,
        column,
        String(cell),
        this.#elapsedToS === null ? 'an elapsed time as hours:minutes:seconds' : `a number of ${column.unit}`,
      )
    this.instants.push(this.#startS + seconds)
    this.#local.push(Number.NaN)
    return null
  }

  #addTimeOfDay(cells: readonly Cell[], line: number, column: MappedColumn): ProblemInput | null {
    if (this.#startS === null) return this.startFault
    const text = String(cells[column.index] ?? '')
    const scan = scanDateTime(text)
    if (scan === null || scan.secondOfDay === null || scan.fields !== null || scan.secondOfDay >= 86_401)
      return badTime(line, column, text, 'a time of day')
    // past midnight the clock starts again; an hour back in autumn is not a day
    if (this.#previousSecond >= 0 && scan.secondOfDay < this.#previousSecond - 43_200) this.#days++
    this.#previousSecond = scan.secondOfDay
    return this.#push(this.#startS + this.#days * 86_400 + scan.secondOfDay, scan.offsetMinutes, line, column, text)
  }

  #push(
    localS: number,
    offsetMinutes: number | null,
    line: number,
    column: MappedColumn,
    text: string,
  ): ProblemInput | null {
    if (offsetMinutes !== null) {
      this.instants.push(localS - offsetMinutes * 60)
      this.#local.push(Number.NaN)
      return null
    }
    if (this.#clock === null)
      return {
        code: 'bad-date',
        severity: 'fatal',
        line,
        found: this.specification.timeZone,
        expected: 'a time zone such as Europe/Berlin',
        sentence: 'The zone of the file’s clock is not known. Choose it and read the file again.',
      }
    const candidates = this.#clock.instants(localS)
    const first = candidates[0]
    if (first === undefined)
      return {
        code: 'bad-date',
        severity: 'problem',
        line,
        column: column.header,
        found: text,
        expected: `a time that the clocks in ${this.specification.timeZone} show`,
        sentence: `Line ${String(line)}: ${text.slice(0, 40)} does not exist in ${this.specification.timeZone}, where the clocks went forward over it. If the rig’s clock stays on standard time, choose a zone without summer time.`,
      }
    if (candidates.length > 1) this.#ambiguous.push(this.instants.length)
    this.instants.push(first)
    this.#local.push(localS)
    return null
  }

  /** Settles the hour that came twice, once all rows are in. */
  settle(): void {
    let i = 0
    while (i < this.#ambiguous.length) {
      let j = i
      while (j + 1 < this.#ambiguous.length && this.#ambiguous[j + 1] === (this.#ambiguous[j] ?? 0) + 1) j++
      const from = this.#ambiguous[i] ?? 0
      const to = this.#ambiguous[j] ?? 0
      // the clock jumps back between two rows of the stretch: the first time through before it, the second after it
      let jump = -1
      for (let k = from + 1; k <= to; k++) if (this.#local.at(k) < this.#local.at(k - 1) - 900) jump = k
      const answer = this.specification.ambiguousHour
      if (jump >= 0) for (let k = jump; k <= to; k++) this.#later(k)
      else if (answer === 'later') for (let k = from; k <= to; k++) this.#later(k)
      else if (answer === null) this.hasUnsettledHour = true
      i = j + 1
    }
  }

  #later(index: number): void {
    const candidates = this.#clock?.instants(this.#local.at(index)) ?? []
    this.instants.set(index, candidates.at(-1) ?? this.instants.at(index))
  }
}

function said(order: 'year-first' | 'day-first' | 'month-first'): string {
  return order === 'year-first' ? 'year first' : order === 'day-first' ? 'day first' : 'month first'
}

function badTime(line: number, column: MappedColumn, found: string, expected: string): ProblemInput {
  const isMissing = absenceOf(found) !== null
  return {
    code: 'bad-date',
    severity: 'problem',
    line,
    column: column.header,
    found,
    expected,
    sentence: isMissing
      ? `Line ${String(line)} has no time in “${column.header}”. The row was not read.`
      : `Line ${String(line)}, “${column.header}”: “${found.slice(0, 60)}” is not ${expected}. The row was not read.`,
  }
}
