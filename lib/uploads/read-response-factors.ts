import { parseNumber, type DecimalMark } from '../analysis/units/parse-number'
import { type CalibrationEntry } from '../domain/calibration'
import { type Problem } from '../domain/intake'
import { speciesSchema } from '../domain/text'
import { SpeciesWords } from './column-map/species-words'
import { isUnitsRow, withoutMark } from './find-layout'
import { absenceOf, MISSING_NUMBER } from './missing-words'
import { HAS_MARK, numberShape, WITH_COMMA, WITH_POINT } from './number-text'
import { openFile } from './read-file'
import { fits } from './read-rows'
import { type Cell, type RawTable, type Row } from './table'

export type ResponseConvention = 'factor' | 'sensitivity'

export interface ResponseFactorTable {
  readonly entries: readonly CalibrationEntry[]
  /** null when the header does not say whether a number is an amount per area or an area per amount: then a person must */
  readonly convention: ResponseConvention | null
  readonly header: string
}

/** The whole table, or the sentence that says why nothing of it is taken. */
export type ResponseFactorReading =
  { readonly table: ResponseFactorTable; readonly refusal: null } | { readonly table: null; readonly refusal: string }

/** One row a species: a longer table is something else, and is not collected to its end. */
const MOST_ROWS = 1_000
/** A relative standard uncertainty above it is a per cent that was not written as one. Source: the record holds no larger one. */
const LARGEST_RELATIVE = 2
const LONGEST_UNIT = 60

const AMOUNT = /\b(mole?s?|amount|fraction|concentration|ppm|%|vol|stoffmenge)/i
const AREA = /\b(area|areas|count|counts|fl(ä|ae?)che|peak)/i
const FACTOR = /(factor|faktor|response|sensitiv|empfindlich|\br\.?f\.?(?=\W|$))/i
const UNCERTAINTY = /(uncert|unsicher|\bstd\b|standard dev|\bs\.?d\.?(?=\W|$)|rsd|±|\bu_?(r|rel)?(?=[\s(]|$))/i
const RELATIVE = /(\brel|rsd|%|\bu_?r(el)?(?=[\s(]|$))/i
const EXPANDED = /(expanded|erweitert|\bk\s*=\s*[^1\s]|\b9\d(\.\d+)?\s*%)/i
/** Formulas of gases and vapours that no list of names has, with the prefix that tells isomers apart. */
const FORMULA = /^(?:(?:n|i|iso|neo|cis|trans)-)?(?:(?:Cl|Br|He|Ne|Ar|Kr|Xe|Si|[CHNOFPS])\d{0,3}|[()]\d{0,2})+$/

/** Thrown inside this file only: what keeps a table from being taken. */
class Refusal extends Error {}

/** `mole fraction per area count` is a factor, `area per mole fraction` a sensitivity; anything else says nothing. */
export function conventionOf(header: string): ResponseConvention | null {
  const parts = header.split(/\s+per\s+|\s+pro\s+|\//i)
  const [above, below] = [parts[0] ?? '', parts.slice(1).join(' ')]
  if (below === '') return null
  if (AMOUNT.test(above) && AREA.test(below)) return 'factor'
  if (AREA.test(above) && AMOUNT.test(below)) return 'sensitivity'
  return null
}

/**
 * A table of response factors: a column of species, a column of numbers above zero, and perhaps one of their standard uncertainties, relative
 * or in the unit of the factor. Every row is read, or nothing is taken and the refusal names the row as an editor or a spreadsheet counts it.
 */
export async function readResponseFactors(input: string | Uint8Array): Promise<ResponseFactorReading> {
  const file = await openFile(input)
  try {
    refuseFaults(file.problems)
    const tables: SpeciesTable[] = []
    for (const raw of file.tables) {
      const table = await speciesTable(raw)
      if (table !== null) tables.push(table)
    }
    return { table: readTable(chosenTable(tables)), refusal: null }
  } catch (error) {
    if (error instanceof Refusal) return { table: null, refusal: error.message }
    throw error
  }
}

interface SpeciesTable {
  readonly name: string
  readonly headers: readonly string[]
  readonly rows: readonly Row[]
  readonly speciesColumn: number
}

const words = new SpeciesWords([])
const textOf = (row: Row, column: number): string => String(row.cells[column] ?? '').trim()
/** The species a cell names by word or formula; null where it names none. */
function speciesIn(text: string): string | null {
  const named = words.named(text)
  if (named !== null) return named
  return FORMULA.test(text) && speciesSchema.safeParse(text).success ? text : null
}
const isNumber = (cell: Cell): boolean => typeof cell === 'number' || numberShape(cell) !== 0
const isFilled = (row: Row): boolean => row.cells.some((cell) => String(cell).trim() !== '')

function refuseFaults(problems: readonly Problem[]): void {
  const fault = problems.find((problem) => problem.severity !== 'note')
  if (fault !== undefined) throw new Refusal(fault.sentence)
}

/** The rows from the first species on under their header; null where no row names a species beside something else. */
async function speciesTable(raw: RawTable): Promise<SpeciesTable | null> {
  const all: Row[] = []
  const faults = await raw.forEachRow((row) => {
    if (row.comment !== null || isFilled(row)) all.push(row)
    return all.length <= MOST_ROWS
  })
  refuseFaults(faults)
  const filled = all.filter((row) => row.comment === null)
  const speciesColumn = columnOfSpecies(filled)
  if (speciesColumn === null) return null
  const where = raw.name === '' ? '' : `Sheet “${raw.name}”: `
  if (all.length > MOST_ROWS)
    throw new Refusal(
      `${where}the table goes on past ${MOST_ROWS} rows. A table of response factors has one row a species.`,
    )
  let first = filled.findIndex((row) => speciesIn(textOf(row, speciesColumn)) !== null)
  // a row with numbers right above the first species is no header: it is read, and refused for its species
  while (filled[first - 1]?.cells.some((cell, column) => column !== speciesColumn && isNumber(cell)) === true) first--
  const rows = filled.slice(first)
  const width = Math.max(...rows.map((row) => row.cells.length))
  const headers = headersAbove(rows[0], all, width)
  const headed = headers.length === 0 ? (rows[0]?.cells.length ?? 0) : headers.length
  const stray = rows.find((row) => !fits(row.cells, headed, raw.isPadded))
  if (stray !== undefined)
    throw new Refusal(
      `${where}row ${stray.line} has ${stray.cells.length} cells where ${headers.length === 0 ? 'the first row' : 'the header'} has ${headed}. Where the delimiter is a comma, no number can have a decimal comma.`,
    )
  return { name: raw.name, headers, rows, speciesColumn }
}

/** The column with the most species in it, the leftmost of several. */
function columnOfSpecies(rows: readonly Row[]): number | null {
  const counts = new Map<number, number>()
  for (const row of rows)
    for (const [column, cell] of row.cells.entries())
      if (words.named(String(cell)) !== null) counts.set(column, (counts.get(column) ?? 0) + 1)
  let best: number | null = null
  for (const [column, count] of [...counts].sort(([a], [b]) => a - b))
    if (best === null || count > (counts.get(best) ?? 0)) best = column
  return best
}

/** The row above the first species, with the units of a row between them; a header may be marked as a comment. */
function headersAbove(first: Row | undefined, all: readonly Row[], width: number): readonly string[] {
  const above = all.filter((row) => first !== undefined && row.line < first.line)
  const filled = above.filter((row) => row.comment === null)
  const last = filled.at(-1)
  const over = filled.at(-2)
  if (last !== undefined && over !== undefined && isUnitsRow(last))
    return over.cells.map((_cell, column) => {
      const unit = textOf(last, column)
      return `${textOf(over, column)}${unit === '' ? '' : ` [${unit}]`}`.replace(/\s+/g, ' ')
    })
  const comment = above.filter((row) => row.comment !== null).at(-1)
  const header = last ?? (comment === undefined ? null : withoutMark(comment, width))
  return header === null ? [] : header.cells.map((cell) => String(cell).replace(/\s+/g, ' ').trim())
}

/** The one table of the file whose header speaks of an amount and an area; with no such header the one that names species. */
function chosenTable(tables: readonly SpeciesTable[]): SpeciesTable {
  const said = tables.filter((table) => table.headers.some((header) => conventionOf(header) !== null))
  const possible = said.length > 0 ? said : tables
  const [table, ...others] = possible
  if (table === undefined)
    throw new Refusal(
      'No column holds species. Expected one row a species, its formula in one column (CO2, CH4, …) and its response factor in another.',
    )
  if (others.length > 0)
    throw new Refusal(
      `More than one sheet can be the table of response factors: ${possible.map(({ name }) => `“${name}”`).join(', ')}. Keep one of them in the file.`,
    )
  return table
}

function readTable(table: SpeciesTable): ResponseFactorTable {
  const { headers, rows, speciesColumn } = table
  const columnCount = Math.max(headers.length, ...rows.map((row) => row.cells.length))
  const others = Array.from({ length: columnCount }, (_, column) => column).filter((column) => column !== speciesColumn)
  const uncertainColumns = others.filter((column) => UNCERTAINTY.test(headers[column] ?? ''))
  const valueColumn = columnOfValues(
    table,
    others.filter((column) => !uncertainColumns.includes(column)),
  )
  if (uncertainColumns.length > 1)
    throw new Refusal(
      `More than one column speaks of an uncertainty: ${uncertainColumns.map((column) => nameOf(table, column)).join(', ')}. Keep the one that is one standard uncertainty of the factor.`,
    )
  const uncertainty = uncertainColumns[0] === undefined ? null : uncertaintyColumn(table, uncertainColumns[0])
  const columns = [valueColumn, ...uncertainColumns]
  const mark = markOf(rows.flatMap((row) => columns.map((column) => row.cells[column] ?? '')))
  const header = headers[valueColumn] ?? ''
  const seen = new Map<string, number>()
  const entries = rows.map((row): CalibrationEntry => {
    const species = speciesOf(table, row)
    const earlier = seen.get(species)
    if (earlier !== undefined)
      throw new Refusal(
        `Row ${row.line}: ${species} stands in row ${earlier} already. Expected one row a species; a second detector has a table of its own.`,
      )
    seen.set(species, row.line)
    const value = numberIn(table, row, species, valueColumn, mark, 'a response factor above zero, such as 8.1e-7')
    const stated = uncertainty === null ? null : statedUncertainty(table, row, species, uncertainty, mark)
    return {
      species,
      value,
      unit: header.length <= LONGEST_UNIT ? header : `${header.slice(0, LONGEST_UNIT - 1)}…`,
      relativeStandardUncertainty: uncertainty?.isRelative === true ? stated : null,
      absoluteStandardUncertainty: uncertainty?.isRelative === false ? stated : null,
    }
  })
  return { entries, convention: conventionOf(header), header }
}

const nameOf = (table: SpeciesTable, column: number): string => {
  const header = table.headers[column] ?? ''
  return header === '' ? `column ${column + 1}` : `column “${header}”`
}

function columnOfValues(table: SpeciesTable, candidates: readonly number[]): number {
  const headed = (test: (header: string) => boolean) => candidates.filter((column) => test(table.headers[column] ?? ''))
  const numeric = candidates.filter((column) => table.rows.some((row) => isNumber(row.cells[column] ?? '')))
  const byConvention = headed((header) => conventionOf(header) !== null)
  const byWord = headed((header) => FACTOR.test(header))
  const possible = [byConvention, byWord, numeric].find((columns) => columns.length > 0) ?? []
  const [column, ...others] = possible
  if (column === undefined) throw new Refusal('No column of numbers stands beside the species.')
  if (others.length > 0)
    throw new Refusal(
      `More than one column can be the response factors: ${possible.map((one) => nameOf(table, one)).join(', ')}. Keep one of them, or head it “mole fraction per area count” or “area count per mole fraction”.`,
    )
  return column
}

interface UncertaintyColumn {
  readonly column: number
  readonly isRelative: boolean
  readonly isPercent: boolean
}

function uncertaintyColumn(table: SpeciesTable, column: number): UncertaintyColumn {
  const header = table.headers[column] ?? ''
  if (EXPANDED.test(header))
    throw new Refusal(
      `The column “${header}” holds expanded uncertainties. Expected one standard uncertainty: divide by the coverage factor and say so in the header.`,
    )
  const isRelative = RELATIVE.test(header)
  if (!isRelative && conventionOf(header) === null && !/\babs/i.test(header))
    throw new Refusal(
      `The column “${header}” does not say whether its uncertainties are relative or in the unit of the factor. Head it “relative standard uncertainty”, or “… [%]”, or “absolute standard uncertainty”.`,
    )
  return { column, isRelative, isPercent: /%/.test(header) }
}

/** The decimal mark where the cells agree on one; null where each has to say it itself. */
function markOf(cells: readonly Cell[]): DecimalMark {
  const shapes = cells.flatMap((cell) => (typeof cell === 'number' ? [] : [numberShape(cell)]))
  const only = (wanted: number, other: number) =>
    shapes.some((shape) => (shape & HAS_MARK) !== 0 && (shape & wanted) !== 0 && (shape & other) === 0)
  const [point, comma] = [only(WITH_POINT, WITH_COMMA), only(WITH_COMMA, WITH_POINT)]
  return point === comma ? null : point ? '.' : ','
}

function speciesOf(table: SpeciesTable, row: Row): string {
  const text = textOf(row, table.speciesColumn)
  const species = speciesIn(text)
  if (species !== null) return species
  throw new Refusal(
    `Row ${row.line}, ${nameOf(table, table.speciesColumn)}: ${text === '' ? 'the cell is empty' : `“${text}” is no species`}. Expected a formula such as CO2 or C5H12; take out rows that are no species.`,
  )
}

function numberIn(
  table: SpeciesTable,
  row: Row,
  species: string,
  column: number,
  mark: DecimalMark,
  expected: string,
): number {
  const cell = row.cells[column] ?? ''
  const read = typeof cell === 'number' ? ({ ok: true, value: cell } as const) : parseNumber(cell, mark)
  if (read.ok && read.value > 0) return read.value
  const place = `Row ${row.line}, ${species}, ${nameOf(table, column)}`
  const text = textOf(row, column)
  if (text === '') throw new Refusal(`${place}: the cell is empty. Expected ${expected}.`)
  throw new Refusal(
    `${place}: ${read.ok ? `“${text}” is not above zero` : read.sentence.replace(/(; write it like .*)?\.?$/, '')}. Expected ${expected}.`,
  )
}

/** One standard uncertainty; null where the cell is empty or has one of the words for a missing value. */
function statedUncertainty(
  table: SpeciesTable,
  row: Row,
  species: string,
  { column, isRelative, isPercent }: UncertaintyColumn,
  mark: DecimalMark,
): number | null {
  const text = textOf(row, column)
  if (Number(text) === MISSING_NUMBER || (absenceOf(text) !== null && !/^[<≤]/.test(text))) return null
  const expected = `a standard uncertainty above zero, such as ${isPercent ? '2' : isRelative ? '0.02' : '1.6e-8'}, or an empty cell where none is stated`
  const value = numberIn(table, row, species, column, mark, expected) / (isPercent ? 100 : 1)
  if (isRelative && value > LARGEST_RELATIVE)
    throw new Refusal(
      `Row ${row.line}, ${species}, ${nameOf(table, column)}: “${text}” would be more than 200 % of the factor. Expected ${expected}; write % in the header where per cent are meant.`,
    )
  return value
}
