import { type Problem } from '../domain/intake'
import { cellKind, type Layout } from './find-layout'
import { type ProblemInput, ProblemList } from './problem-list'
import { type Cell, type OpenedFile, type RawTable, type Row } from './table'

/** What the caller made of a row: `good`, or the fault that keeps it from being one. */
export type RowVerdict = 'good' | ProblemInput

/**
 * Visits the data rows under the header. Blank rows, comments and repeated headers are passed over (the latter noted); rows with another number
 * of cells are reported with their line. Rows at the very end that are no data (mean, minimum, end of file) are a footer, not faults.
 */
export async function readRows(
  file: OpenedFile,
  table: RawTable,
  layout: Layout,
  visit: (cells: readonly Cell[], line: number) => RowVerdict,
): Promise<{ readonly rowCount: number; readonly problems: readonly Problem[] }> {
  const problems = new ProblemList()
  const width = layout.headers.length
  const header = layout.headerCells
  const firstHeader = (header[0] ?? '').trim()
  let rowCount = 0
  let pending: { readonly row: Row; readonly fault: ProblemInput }[] = []
  let isRepeating = false

  const flush = (): void => {
    for (const { fault } of pending) problems.add(fault)
    pending = []
  }
  const faulty = (row: Row, fault: ProblemInput): void => {
    pending.push({ row, fault })
    // a footer is short; a long stretch of faults is not one
    if (pending.length > 60) flush()
  }

  const found = await table.forEachRow((row) => {
    if (row.line < layout.firstDataLine || row.cells.length === 0) return true
    if (row.comment !== null) {
      if (looksLikeRow(row, width))
        problems.add({
          code: 'footer',
          severity: 'note',
          line: row.line,
          found: row.comment,
          sentence: `Line ${String(row.line)} is marked as a comment and was passed over, though it has the cells of a row.`,
        })
      return true
    }
    const cells = row.cells
    if (layout.headerLine !== null && String(cells[0]).trim() === firstHeader && repeats(cells, header)) {
      flush()
      problems.add({
        code: 'repeated-header',
        severity: 'note',
        line: row.line,
        sentence: `Line ${String(row.line)} repeats the header: the logger was restarted there. The rows go on after it.`,
      })
      isRepeating = layout.unitsLine !== null
      return true
    }
    if (isRepeating) {
      // the units row that comes with a repeated header
      isRepeating = false
      return true
    }
    if (!fits(cells, width, table.isPadded)) {
      faulty(row, ragged(row, width))
      return true
    }
    const verdict = visit(cells, row.line)
    if (verdict === 'good') {
      if (pending.length > 0) flush()
      rowCount++
    } else faulty(row, verdict)
    return true
  })
  closeWith(pending, file, problems, width)
  problems.addAll(found)
  return { rowCount, problems: problems.list() }
}

/** A row that somebody took out of the data by a mark before it. */
function looksLikeRow(row: Row, width: number): boolean {
  const kinds = row.cells.map((cell) => cellKind(typeof cell === 'number' ? cell : cell.replace(/^[#%/\s]+/, '')))
  return row.cells.length === width && kinds.filter((kind) => kind !== 'text' && kind !== 'empty').length * 2 > width
}

function repeats(cells: readonly Cell[], header: readonly string[]): boolean {
  for (let i = 0; i < header.length; i++) if (String(cells[i] ?? '').trim() !== (header[i] ?? '').trim()) return false
  return true
}

/** Whether a row has the cells that the header has; empty ones past it do not count. */
export function fits(cells: readonly Cell[], width: number, isPadded: boolean): boolean {
  if (cells.length === width) return true
  if (cells.length < width) return isPadded
  for (let i = width; i < cells.length; i++) if (String(cells[i]).trim() !== '') return false
  return true
}

function ragged(row: Row, width: number): ProblemInput {
  return {
    code: 'ragged-row',
    severity: 'problem',
    line: row.line,
    found: `${String(row.cells.length)} cells: ${row.cells.slice(0, 6).join(' | ')}`,
    expected: `${String(width)} cells`,
    sentence: `Line ${String(row.line)} has ${String(row.cells.length)} cells where the header has ${String(width)}. The row was not read.`,
  }
}

/** What stood at the end without a good row after it. */
function closeWith(
  pending: readonly { readonly row: Row; readonly fault: ProblemInput }[],
  file: OpenedFile,
  problems: ProblemList,
  width: number,
): void {
  pending.forEach(({ row, fault }, index) => {
    const isLast = index === pending.length - 1
    const first = String(row.cells[0] ?? '').trim()
    const startsLikeData = first !== '' && first.charCodeAt(0) >= 48 && first.charCodeAt(0) <= 57
    if (isLast && fault.code === 'ragged-row' && !file.endsWithLineBreak && startsLikeData && row.cells.length <= width)
      problems.add({
        ...fault,
        code: 'truncated',
        sentence: `The file stops in the middle of line ${String(row.line)}: it was cut off while it was written or copied. That row was not read.`,
      })
    else if (startsLikeData) problems.add(fault)
    else
      problems.add({
        code: 'footer',
        severity: 'note',
        line: row.line,
        found: row.cells.slice(0, 6).join(' | '),
        sentence: `Line ${String(row.line)} after the last reading is no reading and was passed over.`,
      })
  })
}
