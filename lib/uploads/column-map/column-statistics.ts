import { cellKind, type CellKind } from '../find-layout'
import { HAS_MARK, numberShape, WITH_COMMA, WITH_POINT } from '../number-text'
import { scanDateTime } from '../dates/scan-date-time'
import { type Cell } from '../table'

/** What the values of one column say over all rows. */
export class ColumnStatistics {
  readonly counts: Record<CellKind, number> = { empty: 0, number: 0, date: 0, time: 0, absent: 0, text: 0 }
  /** numbers that only a point, only a comma, or either can make */
  onlyPoint = 0
  onlyComma = 0
  eitherMark = 0
  /** numbers stored as numbers by a workbook */
  typed = 0
  /** largest first and second number of dates without a fixed order */
  firstField = 0
  secondField = 0
  thirdField = 0
  undecidedDates = 0
  shortDates = 0
  certainDates = 0
  datesWithTime = 0
  timesWithOffset = 0
  halfDays = 0
  largestSecond = 0
  integers = 0
  /** range of the numbers that read the same under either mark */
  minimum = Number.POSITIVE_INFINITY
  maximum = Number.NEGATIVE_INFINITY
  /** eight-digit numbers that make a date */
  compactDates = 0
  readonly texts = new Map<string, number>()

  add(cell: Cell): void {
    if (typeof cell === 'number') {
      this.counts.number++
      this.typed++
      this.#range(cell)
      return
    }
    const shape = numberShape(cell)
    if (shape !== 0) {
      this.counts.number++
      if ((shape & HAS_MARK) !== 0) {
        const point = (shape & WITH_POINT) !== 0
        const comma = (shape & WITH_COMMA) !== 0
        if (point && comma) this.eitherMark++
        else if (point) this.onlyPoint++
        else this.onlyComma++
        const value = Number(cell.replace(',', '.'))
        if (!Number.isNaN(value)) this.#range(value)
      } else {
        const value = Number(cell)
        if (!Number.isNaN(value)) this.#range(value)
        if (value >= 19_000_101 && value <= 21_001_231 && scanDateTime(cell, true) !== null) this.compactDates++
      }
      return
    }
    const kind = cellKind(cell)
    this.counts[kind]++
    if (kind === 'text') {
      const text = cell.trim()
      if (this.texts.size < 64 || this.texts.has(text)) this.texts.set(text, (this.texts.get(text) ?? 0) + 1)
    } else if (kind === 'date' || kind === 'time') this.#date(cell)
  }

  #range(value: number): void {
    if (Number.isInteger(value)) this.integers++
    if (value < this.minimum) this.minimum = value
    if (value > this.maximum) this.maximum = value
  }

  #date(cell: string): void {
    const scan = scanDateTime(cell)
    if (scan === null) return
    if (scan.fields !== null) {
      if (scan.form === 'certain') this.certainDates++
      else {
        this.undecidedDates++
        if (scan.form === 'short') this.shortDates++
        this.firstField = Math.max(this.firstField, scan.fields[0])
        this.secondField = Math.max(this.secondField, scan.fields[1])
        this.thirdField = Math.max(this.thirdField, scan.fields[2])
      }
      if (scan.secondOfDay !== null) this.datesWithTime++
    }
    if (scan.secondOfDay !== null && scan.secondOfDay > this.largestSecond) this.largestSecond = scan.secondOfDay
    if (scan.offsetMinutes !== null) this.timesWithOffset++
    if (scan.hasHalfDay) this.halfDays++
  }

  /** the kind most of its cells are of; null for a column without content */
  get majority(): CellKind | null {
    let best: CellKind | null = null
    for (const kind of ['number', 'date', 'time', 'text'] as const)
      if (this.counts[kind] > 0 && (best === null || this.counts[kind] > this.counts[best])) best = kind
    return best
  }

  get censoredOrMissing(): number {
    return this.counts.absent + this.counts.empty
  }
}
