import { type ColumnMapSpecification } from '../../domain/column-map'
import { unitFromAlias } from '../../analysis/units/unit-from-alias'
import { type Layout } from '../find-layout'
import { absenceOf, MISSING_NUMBER } from '../missing-words'
import { NumberColumn } from '../number-column'
import { readNumberText } from '../number-text'
import { ProblemList } from '../problem-list'
import { readRows } from '../read-rows'
import { type OpenedFile, type RawTable } from '../table'
import { type AppliedReading, emptyReading, notNumber, notNumbered, nothingRead, overRange } from './applied-reading'
import { orderByTime } from './order-by-time'
import { RowClock } from './row-clock'
import { SpeciesWords } from './species-words'

interface Injection {
  readonly number: number
  readonly firstRow: number
  lastRow: number
  readonly clockIndex: number
  readonly values: Map<string, { readonly value: number; readonly isCensored: boolean }>
}

/** Analyser table with one row a peak: rows of the same number and time are one injection. */
export async function readLongInjections(
  file: OpenedFile,
  table: RawTable,
  layout: Layout,
  specification: ColumnMapSpecification,
): Promise<AppliedReading> {
  const problems = new ProblemList()
  const clock = new RowClock(specification, layout.preamble)
  if (clock.startFault !== null) {
    problems.add(clock.startFault)
    return emptyReading(specification, problems.list())
  }
  const column = (meaning: string) => specification.columns.find((one) => one.meaning === meaning)
  const nameColumn = column('species-name')
  const valueColumn = column('area') ?? column('mole-fraction')
  const numberColumn = column('injection-number')
  if (nameColumn === undefined || valueColumn === undefined) return emptyReading(specification, nothingRead(0))
  const isArea = valueColumn.meaning === 'area'
  const toSi = isArea ? (value: number) => value : (unitFromAlias(valueColumn.unit, 'fraction')?.toSi ?? null)
  if (toSi === null) return emptyReading(specification, nothingRead(0))
  const known = new SpeciesWords([])
  const mark = specification.decimalMark
  const species: string[] = []
  const unknown = new Set<string>()
  const injections: Injection[] = []
  const seen = new Map<string, Injection>()

  const { problems: rowProblems } = await readRows(file, table, layout, (cells, line) => {
    const fault = clock.add(cells, line)
    if (fault !== null) return fault
    const index = clock.instants.length - 1
    const name = String(cells[nameColumn.index] ?? '').trim()
    if (name === '') {
      // a peak without a name: nothing says what it is
      clock.undo()
      return {
        code: 'unknown-species',
        severity: 'problem',
        line,
        column: nameColumn.header,
        expected: 'the name of a species',
        sentence: `Line ${String(line)} has a peak without a name in “${nameColumn.header}”. The row was not read.`,
      }
    }
    const formula = known.named(name) ?? (/^[A-Za-z][A-Za-z0-9()+-]{0,19}$/.test(name) ? name : null)
    if (formula === null) {
      clock.undo()
      if (unknown.has(name)) return 'good'
      unknown.add(name)
      problems.add({
        code: 'unknown-species',
        severity: 'note',
        line,
        column: nameColumn.header,
        found: name,
        expected: 'a species by formula or name',
        sentence: `“${name.slice(0, 60)}” (first in line ${String(line)}) is no species that is known here. Its peaks are passed over.`,
      })
      return 'good'
    }
    if (!species.includes(formula)) species.push(formula)
    const numberCell = numberColumn === undefined ? '' : (cells[numberColumn.index] ?? '')
    const readNumber = typeof numberCell === 'number' ? numberCell : readNumberText(numberCell, mark)
    const stated = readNumber === MISSING_NUMBER ? null : readNumber
    const instant = clock.instants.last()
    const key = `${stated === null ? '' : String(stated)} ${String(instant)}`
    let injection = injections.at(-1)
    if (injection === undefined || seen.get(key) !== injection) {
      const earlier = seen.get(key)
      if (earlier !== undefined) injection = earlier
      else {
        if (stated === null && numberColumn !== undefined)
          problems.add(notNumbered(line, numberColumn, String(numberCell), injections.length + 1))
        injection = {
          number: stated ?? injections.length + 1,
          firstRow: line,
          lastRow: line,
          clockIndex: index,
          values: new Map(),
        }
        injections.push(injection)
        seen.set(key, injection)
      }
    }
    injection.lastRow = Math.max(injection.lastRow, line)
    const cell = cells[valueColumn.index] ?? ''
    const number = typeof cell === 'number' ? cell : readNumberText(cell, mark)
    const value = number === MISSING_NUMBER ? null : number
    const text = String(cell)
    const absence = value === null ? absenceOf(text) : null
    if (value === null && absence === null) problems.add(notNumber(line, valueColumn, text, mark))
    if (absence === 'over-range') problems.add(overRange(line, valueColumn, text))
    if (injection.values.has(formula)) {
      problems.add({
        code: 'duplicate-injection',
        severity: 'problem',
        line,
        column: nameColumn.header,
        found: name,
        expected: 'each species once in an injection',
        sentence: `Line ${String(line)}: injection ${String(injection.number)} has ${name.slice(0, 40)} a second time. The first one is kept.`,
      })
      return 'good'
    }
    injection.values.set(formula, {
      value: value === null ? Number.NaN : toSi(value),
      isCensored: value === null && (absence === 'censored' || text.trim() === ''),
    })
    return 'good'
  })
  clock.settle()
  const byNumber = new Map<number, Injection>()
  for (const injection of injections) {
    const other = byNumber.get(injection.number)
    if (other !== undefined && numberColumn !== undefined)
      problems.add({
        code: 'duplicate-injection',
        severity: 'problem',
        line: injection.firstRow,
        column: numberColumn.header,
        found: String(injection.number),
        expected: 'each injection number once',
        sentence: `Line ${String(injection.firstRow)}: injection ${String(injection.number)} comes again with another time (first in line ${String(other.firstRow)}). Both are kept.`,
      })
    else byNumber.set(injection.number, injection)
  }
  const numbers = (pick: (injection: Injection) => number): Float64Array => {
    const values = new NumberColumn()
    for (const injection of injections) values.push(pick(injection))
    return values.toArray()
  }
  const quantity = isArea ? 'area' : 'moleFraction'
  const ordered = orderByTime(
    [
      { name: 'time', unit: 's', values: numbers((injection) => clock.instants.at(injection.clockIndex)) },
      { name: 'number', unit: '1', values: numbers((injection) => injection.number) },
      { name: 'sourceRow', unit: '1', values: numbers((injection) => injection.firstRow) },
      { name: 'lastSourceRow', unit: '1', values: numbers((injection) => injection.lastRow) },
      ...species.map((formula) => ({
        name: `${quantity}.${formula}`,
        unit: isArea ? 'count' : '1',
        values: numbers((injection) => injection.values.get(formula)?.value ?? Number.NaN),
      })),
      // a species that an injection does not list was not found in it
      ...species.map((formula) => ({
        name: `isCensored.${formula}`,
        unit: '1',
        values: numbers((injection) => (injection.values.get(formula)?.isCensored === false ? 0 : 1)),
      })),
    ],
    'injection',
  )
  return {
    kind: 'injections',
    rowCount: injections.length,
    channels: ordered.channels,
    problems: [...problems.list(), ...rowProblems, ...ordered.problems, ...nothingRead(injections.length)],
    specification,
    hasUnsettledHour: clock.hasUnsettledHour,
  }
}
