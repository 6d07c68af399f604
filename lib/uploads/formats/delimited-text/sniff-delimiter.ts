import { absenceOf } from '../../missing-words'
import { scanDateTime } from '../../dates/scan-date-time'
import { numberShape } from '../../number-text'
import { type Delimiter, splitRecord } from './split-record'

const CANDIDATES: readonly Delimiter[] = ['\t', ';', ',', '|', ' ']

export interface DelimiterChoice {
  readonly delimiter: Delimiter
  readonly columnCount: number
}

/**
 * The delimiter under which most lines have the same number of cells and most cells are one thing each: a number, a date, a word. A decimal
 * comma splits `25,0;31,5` just as regularly as the semicolon does, but into pieces that still hold semicolons.
 */
export function sniffDelimiter(lines: readonly string[]): DelimiterChoice | null {
  let best: (DelimiterChoice & { readonly score: number }) | null = null
  const used = lines.filter((line) => line.trim() !== '' && !isComment(line)).slice(-200)
  for (const delimiter of CANDIDATES) {
    const rows = used.map((line) => splitRecord(line, delimiter) ?? [])
    const counts = new Map<number, number>()
    for (const row of rows) counts.set(row.length, (counts.get(row.length) ?? 0) + 1)
    let columnCount = 0
    let rowCount = 0
    for (const [count, times] of counts)
      if (count > 1 && (times > rowCount || (times === rowCount && count > columnCount))) {
        columnCount = count
        rowCount = times
      }
    if (columnCount < 2) continue
    let cells = 0
    let clean = 0
    for (const row of rows) {
      if (row.length !== columnCount) continue
      for (const cell of row) {
        cells++
        if (isClean(cell, delimiter)) clean++
      }
    }
    const share = rowCount / rows.length
    const purity = clean / cells
    const score = share * purity * purity
    if (best === null || score > best.score + 1e-9) best = { delimiter, columnCount, score }
  }
  return best === null || best.score < 0.05 ? null : { delimiter: best.delimiter, columnCount: best.columnCount }
}

/** What a spreadsheet writes into a cell that it could not work out: a row that begins with it is a row. */
const CELL_ERROR = /^#(n\/a|na\b|div\/0!|value!|wert!|ref!|bezug!|num!|zahl!|name\?|null!)/i

/** Lines that instruments mark as no data. */
export function isComment(line: string): boolean {
  const first = line.charCodeAt(0)
  if (first === 0x23 && CELL_ERROR.test(line)) return false
  return first === 0x23 || first === 0x25 || (first === 0x2f && line.charCodeAt(1) === 0x2f)
}

function isClean(cell: string, delimiter: Delimiter): boolean {
  const text = cell.trim()
  if (text === '') return true
  if (numberShape(text) !== 0) return true
  if (absenceOf(text) !== null || scanDateTime(text) !== null) return true
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i)
    if (code === 9 || code === 0x3b || code === 0x7c) return false
    // words may hold a comma where the comma does not part the cells
    if (code === 0x2c && delimiter === ' ') return false
  }
  return true
}
