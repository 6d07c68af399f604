import { type Problem } from '../../../domain/intake'
import { LIMITS } from '../../limits'
import { ProblemList } from '../../problem-list'
import { type Cell, type Row } from '../../table'
import { type Archive } from '../open-archive'
import { parseXml } from './parse-xml'
import { type Sheet, type WorkbookParts } from './read-workbook-parts'
import { serialText } from './serial-date'

/** Rows of one sheet in order, streamed; rows that hold nothing are left out. Formulas are not worked out: the value the program saved is taken. */
export async function readSheet(
  archive: Archive,
  sheet: Sheet,
  parts: WorkbookParts,
  visit: (row: Row) => boolean,
): Promise<readonly Problem[]> {
  const problems = new ProblemList()
  let isDone = false
  let line = 0
  let column = -1
  let cells: Cell[] = []
  let hasContent = false
  let type = ''
  let style = 0
  let value = ''
  let isValue = false
  let hasFormula = false
  let hasValue = false
  let rowCount = 0

  const put = (cell: Cell): void => {
    if (column >= LIMITS.columnCount) {
      problems.add({
        code: 'limit-reached',
        severity: 'fatal',
        line,
        column: columnLetters(column),
        expected: `at most ${String(LIMITS.columnCount)} columns`,
        sentence: `Sheet “${sheet.name}”, row ${String(line)} has a value in column ${columnLetters(column)}; at most ${String(LIMITS.columnCount)} columns are read.`,
      })
      isDone = true
      return
    }
    while (cells.length < column) cells.push('')
    const isCut = typeof cell === 'string' && cell.length > LIMITS.cellLength
    if (isCut)
      problems.add({
        code: 'limit-reached',
        severity: 'problem',
        line,
        column: columnLetters(column),
        expected: `at most ${String(LIMITS.cellLength)} characters in a cell`,
        sentence: `Sheet “${sheet.name}”, cell ${columnLetters(column)}${String(line)} holds more than ${LIMITS.cellLength.toLocaleString('en-GB')} characters; what comes after them was not read.`,
      })
    cells[column] = isCut ? cell.slice(0, LIMITS.cellLength) : cell
    if (cell !== '') hasContent = true
  }

  const endCell = (): void => {
    if (!hasValue) {
      if (hasFormula)
        problems.add({
          code: 'missing-cached-value',
          severity: 'problem',
          line,
          column: columnLetters(column),
          found: 'a formula without its saved value',
          expected: 'a value',
          sentence: `Sheet “${sheet.name}”, cell ${columnLetters(column)}${String(line)} holds a formula whose result was not saved. Open the workbook in the spreadsheet program, save it and add it again.`,
        })
      return
    }
    if (type === 's') {
      const text = parts.sharedStrings[Number(value)]
      if (text === undefined)
        problems.add({
          code: 'unreadable',
          severity: 'fatal',
          line,
          column: columnLetters(column),
          found: `text number ${value}`,
          expected: `one of the ${String(parts.sharedStrings.length)} texts of the workbook`,
          sentence: `Sheet “${sheet.name}”, cell ${columnLetters(column)}${String(line)} names a text that the workbook does not hold: the file is damaged. Open it in the spreadsheet program, save it and add it again.`,
        })
      else put(text)
    } else if (type === 'b') put(value === '1' ? 'TRUE' : 'FALSE')
    else if (type === 'str' || type === 'inlineStr' || type === 'e' || type === 'd') put(value)
    else {
      const number = value.trim() === '' ? Number.NaN : Number(value)
      const kind = parts.styles[style] ?? 'number'
      if (Number.isNaN(number)) put(value)
      else if (kind === 'number') put(number)
      else put(serialText(number, kind, parts.is1904) ?? number)
    }
  }

  await parseXml(await archive.open(sheet.part), {
    open: (name, attributes) => {
      if (isDone) return
      if (name === 'row') {
        const stated = Number(attributes['r'])
        line = Number.isInteger(stated) && stated > line ? stated : line + 1
        column = -1
        cells = []
        hasContent = false
      } else if (name === 'c') {
        const stated = columnIndex(attributes['r'] ?? '')
        column = stated >= 0 ? stated : column + 1
        type = attributes['t'] ?? 'n'
        style = Number(attributes['s'] ?? '0')
        value = ''
        hasFormula = false
        hasValue = false
      } else if (name === 'v' || name === 't') {
        isValue = true
        hasValue = true
      } else if (name === 'f') hasFormula = true
    },
    text: (text) => {
      if (isValue && value.length <= LIMITS.cellLength) value += text
    },
    close: (name) => {
      if (isDone) return
      if (name === 'v' || name === 't') isValue = false
      else if (name === 'c') endCell()
      else if (name === 'row' && hasContent) {
        rowCount++
        if (rowCount > LIMITS.rowCount) {
          problems.add({
            code: 'limit-reached',
            severity: 'fatal',
            line,
            expected: `at most ${String(LIMITS.rowCount)} rows`,
            sentence: `Sheet “${sheet.name}” has more than ${LIMITS.rowCount.toLocaleString('en-GB')} rows; nothing of it was taken in. Divide it and add the parts.`,
          })
          isDone = true
        } else if (!visit({ cells, line, comment: null })) isDone = true
      }
    },
    isDone: () => isDone,
  })
  return problems.list()
}

/** Index of the column in a reference such as `AB12`; -1 where there is none. */
function columnIndex(reference: string): number {
  let index = 0
  let i = 0
  for (; i < reference.length && i < 4; i++) {
    const letter = reference.charCodeAt(i)
    if (letter < 65 || letter > 90) break
    index = index * 26 + letter - 64
  }
  return i === 0 ? -1 : index - 1
}

export function columnLetters(index: number): string {
  let letters = ''
  for (let rest = index + 1; rest > 0; rest = Math.floor((rest - 1) / 26))
    letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters
  return letters
}
