import { unitFromAlias } from '../analysis/units/unit-from-alias'
import { absenceOf } from './missing-words'
import { scanDateTime } from './dates/scan-date-time'
import { numberShape } from './number-text'
import { type Cell, type RawTable, type Row } from './table'

export type CellKind = 'empty' | 'number' | 'date' | 'time' | 'absent' | 'text'

/** What one cell is by itself, before its column is known. */
export function cellKind(cell: Cell): CellKind {
  if (typeof cell === 'number') return 'number'
  const text = cell.trim()
  if (text === '') return 'empty'
  if (numberShape(text) !== 0) return 'number'
  if (absenceOf(text) !== null) return 'absent'
  const scan = scanDateTime(text)
  if (scan !== null) return scan.fields === null ? 'time' : 'date'
  return 'text'
}

export interface Layout {
  /** header cells, with the unit from a units row in square brackets */
  readonly headers: readonly string[]
  /** header cells as they stand, for telling a repeated header row */
  readonly headerCells: readonly string[]
  readonly headerLine: number | null
  readonly unitsLine: number | null
  readonly firstDataLine: number
  readonly preamble: readonly { readonly key: string; readonly value: string }[]
}

/**
 * Where the table stands among preamble, header, units row and data. Types of the columns are taken from the later half of the sample, where
 * there is data and nothing else; the data begin with the first row that agrees with them and goes on so.
 */
export function findLayout(table: RawTable): Layout | null {
  const rows = table.sample
  const width = tableWidth(table)
  if (width < 2) return null
  const kinds = rows.map((row) => (row.comment === null ? padded(row, width, table.isPadded).map(cellKind) : []))
  const majority = majorityKinds(kinds, width)
  if (!majority.some((kind) => kind === 'number' || kind === 'date' || kind === 'time')) return null
  const isData = kinds.map((row) => row.length >= width && agrees(row, majority))
  let first = -1
  for (let i = 0; i < rows.length; i++) {
    if (isData[i] !== true) continue
    const next = rows.flatMap((row, j) =>
      j > i && row.cells.length > 0 && row.comment === null ? [isData[j] === true] : [],
    )
    if (next.slice(0, 3).filter(Boolean).length >= Math.min(2, next.length)) {
      first = i
      break
    }
  }
  if (first < 0) return null
  first = firstOfFaulty(rows, kinds, majority, first)
  const above = rows.slice(0, first)
  const filled = above.filter((row) => row.cells.length > 0 && row.comment === null)
  let units: Row | null = null
  let header: Row | null = filled.at(-1) ?? null
  if (header !== null && filled.length > 1 && isUnitsRow(header)) {
    units = header
    header = filled.at(-2) ?? null
  }
  if (header !== null && !isHeaderRow(header, width)) header = null
  // `# time  T_bed  p_in`: a header that is marked as a comment
  if (header === null) {
    const comment = above.filter((row) => row.comment !== null).at(-1)
    if (comment !== undefined) {
      const stripped = withoutMark(comment, width)
      if (stripped !== null && isHeaderRow(stripped, width)) header = stripped
    }
  }
  const headerCells = header === null ? [] : header.cells.map(String)
  const count = header === null ? width : Math.max(lastFilled(header.cells), width === 2 ? 2 : 1)
  const headers: string[] = []
  for (let i = 0; i < count; i++) {
    const label = (headerCells[i] ?? '').replace(/\s+/g, ' ').trim() || `Column ${String(i + 1)}`
    const unit = units === null ? '' : unitOf(String(units.cells[i] ?? ''))
    const full = unit === '' ? label : `${label} [${unit}]`
    const same = headers.filter((one) => one === full || one.startsWith(`${full} (`)).length
    headers.push((same === 0 ? full : `${full} (${String(same + 1)})`).slice(0, 300))
  }
  return {
    headers,
    headerCells,
    headerLine: header?.line ?? null,
    unitsLine: units?.line ?? null,
    firstDataLine: rows[first]?.line ?? 1,
    preamble: readPreamble(above.filter((row) => row !== header && row !== units)),
  }
}

/**
 * The data begin before the first good row where rows stand between it and the header that have a reading in some column and a fault in another:
 * taken for part of the header they would be lost without a word.
 */
function firstOfFaulty(
  rows: readonly Row[],
  kinds: readonly (readonly CellKind[])[],
  majority: readonly (CellKind | null)[],
  first: number,
): number {
  const isTyped = (kind: CellKind | undefined) => kind === 'number' || kind === 'date' || kind === 'time'
  let earliest = first
  for (let i = first - 1; i >= 0; i--) {
    const row = rows[i]
    const found = kinds[i] ?? []
    if (row === undefined || row.comment !== null || row.cells.length === 0) continue
    const hasReading = majority.some((wanted, column) => isTyped(found[column]) && found[column] === wanted)
    if (found.length >= majority.length && hasReading && !isUnitsRow(row)) earliest = i
    // a header of words above them, or nothing: a preamble of numbers is not told from them otherwise
    else return isUnitsRow(row) || (isHeaderRow(row, majority.length) && !found.some(isTyped)) ? earliest : first
  }
  return majority.length > 2 ? earliest : first
}

function tableWidth(table: RawTable): number {
  if (table.isPadded) return Math.max(0, ...table.sample.map((row) => lastFilled(row.cells)))
  const counts = new Map<number, number>()
  for (const row of table.sample)
    if (row.comment === null && row.cells.length > 1)
      counts.set(row.cells.length, (counts.get(row.cells.length) ?? 0) + 1)
  let width = 0
  let times = 0
  for (const [count, n] of counts)
    if (n > times || (n === times && count > width)) {
      width = count
      times = n
    }
  return width
}

function padded(row: Row, width: number, isPadded: boolean): readonly Cell[] {
  if (!isPadded || row.cells.length >= width || row.cells.length === 0) return row.cells
  return [...row.cells, ...new Array<Cell>(width - row.cells.length).fill('')]
}

function majorityKinds(kinds: readonly (readonly CellKind[])[], width: number): (CellKind | null)[] {
  const full = kinds.filter((row) => row.length >= width)
  const used = full.slice(Math.floor(full.length / 2))
  const majority: (CellKind | null)[] = []
  for (let i = 0; i < width; i++) {
    const counts = new Map<CellKind, number>()
    for (const row of used) {
      const kind = row[i]
      if (kind !== undefined && kind !== 'empty' && kind !== 'absent') counts.set(kind, (counts.get(kind) ?? 0) + 1)
    }
    let best: CellKind | null = null
    for (const [kind, n] of counts) if (best === null || n > (counts.get(best) ?? 0)) best = kind
    majority.push(best)
  }
  return majority
}

function agrees(row: readonly CellKind[], majority: readonly (CellKind | null)[]): boolean {
  let matches = 0
  for (let i = 0; i < majority.length; i++) {
    const wanted = majority[i] ?? null
    const kind = row[i] ?? 'empty'
    if (kind === 'empty' || kind === 'absent' || wanted === null || wanted === 'text') continue
    if (kind !== wanted) return false
    matches++
  }
  return matches > 0
}

function lastFilled(cells: readonly Cell[]): number {
  let last = cells.length
  while (last > 0 && String(cells[last - 1]).trim() === '') last--
  return last
}

function isHeaderRow(row: Row, width: number): boolean {
  const filled = row.cells.filter((cell) => String(cell).trim() !== '')
  if (filled.length < Math.max(2, Math.ceil(width / 2)) && !(width === 2 && filled.length === 2)) return false
  const words = filled.filter((cell) => cellKind(cell) === 'text').length
  return words * 2 > filled.length
}

/** A row of nothing but units under the header. */
export function isUnitsRow(row: Row): boolean {
  const filled = row.cells.map((cell) => unitOf(String(cell))).filter((text) => text !== '')
  if (filled.length === 0) return false
  const known = filled.filter(isUnit).length
  return known > 0 && known * 3 >= filled.length * 2
}

function unitOf(cell: string): string {
  const text = cell.trim()
  const inner = /^[[(](.*)[\])]$/.exec(text)?.[1]
  return (inner ?? text).trim()
}

/** Whether a text is one of the units that columns are stated in. */
export function isUnit(text: string): boolean {
  if (text === '' || text.length > 60) return false
  const dimensions = [
    'temperature',
    'pressure',
    'volume-flow',
    'molar-flow',
    'time',
    'fraction',
    'mass',
    'volume',
    'length',
  ] as const
  return (
    dimensions.some((dimension) => unitFromAlias(text, dimension) !== null) ||
    /^(-|hh:mm:ss|counts?|a\.?u\.?|mV|µV|pA|V|A|W|rpm)$/.test(text)
  )
}

/** The row of a comment line without its mark, where it has as many cells as the table. */
export function withoutMark(row: Row, width: number): Row | null {
  const cells = row.cells.map(String)
  const first = (cells[0] ?? '').replace(/^[#%/\s]+/, '')
  const stripped = first === '' ? cells.slice(1) : [first, ...cells.slice(1)]
  return stripped.length === width || stripped.length === width + 1 ? { ...row, cells: stripped } : null
}

/** `key: value`, `key;value`, `# key value` lines above the table. */
function readPreamble(rows: readonly Row[]): { key: string; value: string }[] {
  const entries: { key: string; value: string }[] = []
  for (const row of rows) {
    if (entries.length >= 200) break
    const cells = row.cells.map((cell) => String(cell).trim()).filter((text) => text !== '')
    const line = row.comment === null ? null : row.comment.replace(/^[#%/\s]+/, '').trim()
    if (line === '' || (line === null && cells.length === 0)) continue
    if (line === null && cells.length > 1) {
      entries.push(entry((cells[0] ?? '').replace(/[:=]$/, ''), cells.slice(1).join(' ')))
      continue
    }
    const text = line ?? cells[0] ?? ''
    const parted = /^([^:=\d][^:=]{0,80}?)\s*[:=]\s*(.*)$/.exec(text)
    const spaced = /^(\S{1,60})\s+(.*)$/.exec(text)
    if (parted !== null && !/\d$/.test(parted[1] ?? '')) entries.push(entry(parted[1] ?? '', parted[2] ?? ''))
    else if (spaced !== null) entries.push(entry(spaced[1] ?? '', spaced[2] ?? ''))
    else entries.push(entry(text, ''))
  }
  return entries
}

function entry(key: string, value: string): { key: string; value: string } {
  return { key: key.trim().slice(0, 200), value: value.trim().slice(0, 500) }
}
