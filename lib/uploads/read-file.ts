import { closeSync, openSync, readSync } from 'node:fs'
import { type ColumnMapSpecification } from '../domain/column-map'
import { type Detection, type Problem, type Question } from '../domain/intake'
import { applyColumnMap } from './column-map/apply'
import { type AppliedReading, emptyReading } from './column-map/applied-reading'
import { ColumnStatistics } from './column-map/column-statistics'
import { detectColumns } from './column-map/detect'
import { fingerprint } from './column-map/fingerprint'
import { findQuestions } from './column-map/questions'
import { specificationFaults } from './column-map/specification-faults'
import { findLayout, type Layout } from './find-layout'
import { openChromatogramFile } from './formats/chromatogram/open-chromatograms'
import { openDelimitedText } from './formats/delimited-text/open-delimited-text'
import { openPackedFile } from './formats/open-packed-file'
import { LIMITS } from './limits'
import { problem, ProblemList } from './problem-list'
import { type ReadingContext } from './reading-context'
import { readRows } from './read-rows'
import { type OpenedFile, type RawTable } from './table'

/** What a file seems to be: one detection for each table in it, the likeliest first. */
export async function detectFile(
  input: string | Uint8Array,
  context: ReadingContext,
): Promise<{ readonly detections: Detection[]; readonly problems: Problem[] }> {
  const file = await openFile(input)
  const found: { readonly detection: Detection; readonly weight: number; readonly problems: readonly Problem[] }[] = []
  for (const table of file.tables) {
    const layout = findLayout(table)
    if (layout === null) continue
    const statistics = layout.headers.map(() => new ColumnStatistics())
    const { rowCount, problems } = await readRows(file, table, layout, (cells) => {
      statistics.forEach((column, index) => column.add(cells[index] ?? ''))
      return 'good'
    })
    const proposal = detectColumns(layout, statistics, table.name, context)
    found.push({
      weight: proposal.weight,
      problems,
      detection: {
        format: file.format,
        dialect: dialectOf(file, table, layout, proposal.specification, statistics).slice(0, 300),
        encoding: file.encoding.slice(0, 40),
        preamble: layout.preamble.map(({ key, value }) => ({ key, value })).slice(0, LIMITS.preambleEntries),
        tableName: table.name.slice(0, 100),
        headers: [...layout.headers],
        rowCount,
        firstRows: firstRows(table, layout),
        fingerprint: fingerprint(layout.headers),
        proposal: proposal.specification,
        columnMapId: null,
        questions: findQuestions(proposal.specification, proposal.facts, context),
        facts: proposal.facts,
      },
    })
  }
  found.sort((a, b) => b.weight - a.weight)
  const problems = [...file.problems]
  if (found.length === 0 && !problems.some((one) => one.severity === 'fatal')) problems.push(noTable())
  return {
    detections: found.map(({ detection }) => detection),
    problems: [
      ...problems,
      ...notRead(
        found.slice(1).map(({ detection }) => detection.tableName),
        found[0]?.detection.tableName,
      ),
      ...(found[0]?.problems ?? []),
    ],
  }
}

/** Reads all rows of the file as the specification says, with every problem met. Nothing is guessed: what is still open is listed as a question and no value that hangs on it is given. */
export async function readFile(
  input: string | Uint8Array,
  specification: ColumnMapSpecification,
  context: ReadingContext,
): Promise<AppliedReading & { readonly questions: readonly Question[] }> {
  const file = await openFile(input)
  const table =
    file.tables.find((one) => one.name === specification.sheet) ??
    (specification.sheet === '' ? file.tables[0] : undefined)
  const layout = table === undefined ? null : findLayout(table)
  if (table === undefined || layout === null) {
    const problems = [...file.problems]
    if (!problems.some((one) => one.severity === 'fatal')) problems.push(noTable(specification.sheet))
    return { ...emptyReading(specification, problems), questions: [] }
  }
  const faults = specificationFaults(specification)
  const moved = placeColumns(specification, layout)
  const blocking = [...faults, ...moved.problems]
  if (blocking.length > 0 || specification.kind === 'attachment')
    return { ...emptyReading(specification, [...file.problems, ...blocking]), questions: [] }
  const reading = await applyColumnMap(file, table, layout, moved.specification)
  const questions = findQuestions(
    moved.specification,
    { ...NOTHING_OPEN, hasAmbiguousHour: reading.hasUnsettledHour },
    context,
  )
  return {
    ...reading,
    specification: moved.specification,
    problems: [
      ...file.problems,
      ...notRead(
        file.tables.filter((one) => one !== table && findLayout(one) !== null).map((one) => one.name),
        table.name,
      ),
      ...reading.problems,
    ],
    questions,
  }
}

const NOTHING_OPEN = {
  isKindOpen: false,
  isDateOrderOpen: false,
  dateOrderProposal: 'day-first',
  dateOrderReason: '',
  dateExample: '',
  isDecimalMarkOpen: false,
  decimalExample: '',
  statedStart: null,
  needsStart: false,
  hasOffsets: true,
  hasAmbiguousHour: false,
} as const

/** Format by content, whatever the file is called. */
export async function openFile(input: string | Uint8Array): Promise<OpenedFile> {
  const head = firstBytes(input)
  if (head[0] === 0x50 && head[1] === 0x4b) return openPackedFile(input)
  if (head[0] === 0x43 && head[1] === 0x44 && head[2] === 0x46 && (head[3] === 1 || head[3] === 2))
    return openChromatogramFile(input)
  const foreign = foreignFormat(head)
  if (foreign !== null)
    return {
      format: 'delimited-text',
      dialect: [],
      encoding: '',
      tables: [],
      endsWithLineBreak: true,
      problems: [
        problem({
          code: 'unsupported-format',
          severity: 'fatal',
          found: foreign,
          expected: 'delimited text, an .xlsx workbook or a chromatogram (netCDF, ASTM E1947)',
          sentence: `The file is ${foreign}. Export the readings as delimited text or as an .xlsx workbook and add that.`,
        }),
      ],
    }
  return openDelimitedText(input)
}

function firstBytes(input: string | Uint8Array): Uint8Array {
  if (typeof input !== 'string') return input.subarray(0, 16)
  const file = openSync(input, 'r')
  try {
    const bytes = new Uint8Array(16)
    return bytes.subarray(0, readSync(file, bytes, 0, 16, 0))
  } finally {
    closeSync(file)
  }
}

function foreignFormat(head: Uint8Array): string | null {
  const starts = (...bytes: readonly number[]) => bytes.every((byte, index) => head[index] === byte)
  if (starts(0xd0, 0xcf, 0x11, 0xe0)) return 'an old binary workbook (.xls) or another compound document'
  if (starts(0x25, 0x50, 0x44, 0x46)) return 'a PDF'
  if (starts(0x89, 0x48, 0x44, 0x46)) return 'an HDF5 file'
  if (starts(0x89, 0x50, 0x4e, 0x47)) return 'a PNG image'
  if (starts(0xff, 0xd8, 0xff)) return 'a JPEG image'
  if (starts(0x1f, 0x8b)) return 'a gzip archive'
  if (starts(0x37, 0x7a, 0xbc, 0xaf)) return 'a 7z archive'
  if (starts(0x52, 0x61, 0x72, 0x21)) return 'a RAR archive'
  if (starts(0x7f, 0x45, 0x4c, 0x46) || starts(0x4d, 0x5a)) return 'a program'
  return null
}

/** Tables of a workbook beside the one that is read: whoever has a log on two sheets must know that half of it is not here. */
function notRead(names: readonly string[], read = ''): Problem[] {
  return names.map((name) =>
    problem({
      code: 'footer',
      severity: 'note',
      found: `a table on sheet “${name}”`,
      expected: 'one table in a file',
      sentence: `Sheet “${name}” holds a table too and was not read; “${read}” was. To have it read as well, save that sheet as a file of its own and add it.`,
    }),
  )
}

function noTable(sheet = ''): Problem {
  return problem({
    code: 'missing-column',
    severity: 'fatal',
    expected: 'a table: a header row with rows of numbers under it',
    sentence:
      sheet === ''
        ? 'No table was found: no header row with rows of numbers under it.'
        : `The workbook has no sheet “${sheet}” with a table in it.`,
  })
}

/** Columns by their header where the file has them in another order than the map; a header that is gone is said. */
function placeColumns(
  specification: ColumnMapSpecification,
  layout: Layout,
): { readonly specification: ColumnMapSpecification; readonly problems: readonly Problem[] } {
  const problems = new ProblemList()
  const normal = (header: string) => header.replace(/\s+/g, ' ').trim().toLowerCase()
  const columns = specification.columns.flatMap((column) => {
    const here = layout.headers[column.index]
    if (here !== undefined && normal(here) === normal(column.header)) return [column]
    if (column.meaning === 'ignore' || column.meaning === 'text') return []
    const index = layout.headers.findIndex((header) => normal(header) === normal(column.header))
    if (index >= 0) return [{ ...column, index }]
    problems.add({
      code: 'missing-column',
      severity: 'problem',
      column: column.header,
      found: here ?? 'no column there',
      expected: `a column “${column.header}”`,
      sentence: `The file has no column “${column.header}”, which its column map reads. Its columns are: ${layout.headers.slice(0, 12).join(', ')}.`,
    })
    return []
  })
  return { specification: { ...specification, columns }, problems: problems.list() }
}

function firstRows(table: RawTable, layout: Layout): string[][] {
  return table.sample
    .filter((row) => row.line >= layout.firstDataLine && row.comment === null && row.cells.length > 0)
    .slice(0, LIMITS.firstRows)
    .map((row) => layout.headers.map((_header, index) => String(row.cells[index] ?? '').slice(0, 200)))
}

function dialectOf(
  file: OpenedFile,
  table: RawTable,
  layout: Layout,
  specification: ColumnMapSpecification,
  statistics: readonly ColumnStatistics[],
): string {
  const rowWord = file.format === 'workbook' ? 'row' : 'line'
  const hasMarks = statistics.some((column) => column.onlyComma + column.onlyPoint + column.eitherMark > 0)
  return [
    ...file.dialect,
    ...(table.name === '' ? [] : [`sheet “${table.name}”`]),
    ...(hasMarks ? [specification.decimalMark === ',' ? 'decimal comma' : 'decimal point'] : []),
    layout.headerLine === null ? 'no header' : `header in ${rowWord} ${String(layout.headerLine)}`,
    ...(layout.unitsLine === null ? [] : [`units in ${rowWord} ${String(layout.unitsLine)}`]),
  ].join(', ')
}
