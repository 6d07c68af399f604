import { type Problem } from '../../../domain/intake'
import { LIMITS } from '../../limits'
import { problem, ProblemList } from '../../problem-list'
import { type OpenedFile, type RawTable, type Row } from '../../table'
import { openByteSource, type ByteSource } from './byte-source'
import { readLines } from './read-lines'
import { isComment, sniffDelimiter } from './sniff-delimiter'
import { sniffEncoding, type Encoding } from './sniff-encoding'
import { type Delimiter, splitRecord } from './split-record'

const SAID: Record<Delimiter, string> = {
  '\t': 'tab-separated',
  ';': 'semicolon-separated',
  ',': 'comma-separated',
  '|': 'bar-separated',
  ' ': 'separated by spaces',
}

/** A text file as one table of raw cells. What is no text is refused with what it seems to be. */
export function openDelimitedText(input: string | Uint8Array): OpenedFile {
  const source = openByteSource(input)
  try {
    if (source.size === 0) return failed('empty-file', 'The file has no bytes.', 'a table with a header row')
    const encoding = sniffEncoding(source)
    if (encoding === null)
      return failed(
        'unsupported-format',
        'The file is not text and no other format that is read here.',
        'delimited text or an .xlsx workbook',
      )
    const lines: string[] = []
    const end = readLines(
      { ...source, size: Math.min(source.size, LIMITS.sniffBytes) },
      encoding,
      LIMITS.recordLength,
      (line) => {
        lines.push(line)
        return lines.length < LIMITS.sampleRows
      },
    )
    if (end.reason === 'line-too-long')
      return failed(
        'limit-reached',
        lineTooLong(end.line),
        `lines of at most ${String(LIMITS.recordLength)} characters`,
      )
    // the last line of the sample may be cut in two
    if (end.reason === 'end' && source.size > LIMITS.sniffBytes) lines.pop()
    const choice = sniffDelimiter(lines)
    if (choice === null)
      return failed(
        lines.some((line) => line.trim() !== '') ? 'missing-column' : 'empty-file',
        'No line of the file divides into two columns or more by tab, semicolon, comma, bar or spaces.',
        'a table with a header row',
      )
    if (choice.columnCount > LIMITS.columnCount)
      return failed(
        'limit-reached',
        `The table has ${String(choice.columnCount)} columns.`,
        `at most ${String(LIMITS.columnCount)} columns`,
      )
    const sample: Row[] = []
    const sampleSource = new TextEncoder().encode(lines.join('\n'))
    readRows(memorySource(sampleSource), PLAIN, choice.delimiter, (row) => sample.push(row) < LIMITS.sampleRows)
    const last = source.read(source.size - 2, 2)
    const table: RawTable = {
      name: '',
      sample,
      isPadded: false,
      forEachRow: (visit) => {
        const rows = openByteSource(input)
        try {
          return Promise.resolve(readRows(rows, encoding, choice.delimiter, visit))
        } finally {
          rows.close()
        }
      },
    }
    return {
      format: 'delimited-text',
      dialect: [SAID[choice.delimiter], encoding.said],
      encoding: encoding.said,
      tables: [table],
      problems: [],
      endsWithLineBreak: last.includes(10) || last.includes(13),
    }
  } finally {
    source.close()
  }
}

const PLAIN: Encoding = { label: 'utf-8', said: 'UTF-8', markLength: 0 }

function memorySource(bytes: Uint8Array): ByteSource {
  return openByteSource(bytes)
}

function readRows(
  source: ByteSource,
  encoding: Encoding,
  delimiter: Delimiter,
  visit: (row: Row) => boolean,
): readonly Problem[] {
  const problems = new ProblemList()
  let open = ''
  let openLine = 0
  let rowCount = 0
  const end = readLines(source, encoding, LIMITS.recordLength, (line, number) => {
    if (open === '' && isComment(line))
      return visit({ cells: splitRecord(line, delimiter) ?? [line], line: number, comment: line })
    const record = open === '' ? line : `${open}\n${line}`
    if (record.length > LIMITS.recordLength) {
      problems.add(openQuote(openLine))
      open = ''
      return false
    }
    const cells = splitRecord(record, delimiter)
    if (cells === null) {
      if (open === '') openLine = number
      open = record
      return true
    }
    const first = open === '' ? number : openLine
    open = ''
    if (cells.length > LIMITS.columnCount) {
      problems.add({
        code: 'limit-reached',
        severity: 'fatal',
        line: first,
        found: `${String(cells.length)} columns`,
        expected: `at most ${String(LIMITS.columnCount)}`,
        sentence: `Line ${String(first)} has ${String(cells.length)} columns; at most ${String(LIMITS.columnCount)} are read.`,
      })
      return false
    }
    rowCount++
    if (rowCount > LIMITS.rowCount) {
      problems.add({
        code: 'limit-reached',
        severity: 'fatal',
        line: first,
        expected: `at most ${String(LIMITS.rowCount)} rows`,
        sentence: `The file has more than ${LIMITS.rowCount.toLocaleString('en-GB')} rows; nothing of it was taken in. Divide it and add the parts.`,
      })
      return false
    }
    return visit({ cells: cells.length === 1 && cells[0]?.trim() === '' ? [] : cells, line: first, comment: null })
  })
  if (end.reason === 'line-too-long')
    problems.add({
      code: 'limit-reached',
      severity: 'fatal',
      line: end.line,
      expected: `at most ${String(LIMITS.recordLength)} characters in a line`,
      sentence: lineTooLong(end.line),
    })
  if (open !== '') problems.add(openQuote(openLine))
  return problems.list()
}

function openQuote(line: number) {
  return {
    code: 'unreadable',
    severity: 'fatal',
    line,
    found: 'a quotation mark that is never closed',
    expected: 'a closing quotation mark in the same cell',
    sentence: `The quotation mark opened in line ${String(line)} is never closed, so the rows after it cannot be told apart.`,
  } as const
}

function lineTooLong(line: number): string {
  return `Line ${String(line)} is longer than ${LIMITS.recordLength.toLocaleString('en-GB')} characters: this is no table of readings.`
}

function failed(code: Problem['code'], sentence: string, expected: string): OpenedFile {
  return {
    format: 'delimited-text',
    dialect: [],
    encoding: '',
    tables: [],
    problems: [problem({ code, severity: 'fatal', expected, sentence })],
    endsWithLineBreak: true,
  }
}
