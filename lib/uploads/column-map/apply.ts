import { type ColumnMapSpecification, type MappedColumn } from '../../domain/column-map'
import { type Problem, type ReadingChannel } from '../../domain/intake'
import { absolutePressure } from '../../analysis/units/absolute-pressure'
import { molarFlowFromVolumeFlow } from '../../analysis/units/molar-flow-from-volume-flow'
import { unitFromAlias } from '../../analysis/units/unit-from-alias'
import { type Layout } from '../find-layout'
import { absenceOf, MISSING_NUMBER } from '../missing-words'
import { NumberColumn } from '../number-column'
import { readNumberText } from '../number-text'
import { type ProblemInput, ProblemList } from '../problem-list'
import { readRows } from '../read-rows'
import { type OpenedFile, type RawTable } from '../table'
import { readLongInjections } from './read-long-injections'
import { type AppliedReading, emptyReading, notNumber, notNumbered, nothingRead, overRange } from './applied-reading'
import { RowClock } from './row-clock'
import { orderByTime } from './order-by-time'

/** Reads all rows of a table as the specification says. Rows that cannot be read are listed and left out; values that cannot are missing. */
export async function applyColumnMap(
  file: OpenedFile,
  table: RawTable,
  layout: Layout,
  specification: ColumnMapSpecification,
): Promise<AppliedReading> {
  if (specification.kind === 'analyser' && specification.shape === 'long')
    return readLongInjections(file, table, layout, specification)
  return readWide(file, table, layout, specification)
}

interface NumberReader {
  readonly column: MappedColumn
  readonly name: string
  readonly unit: string
  readonly values: NumberColumn
  readonly censored: NumberColumn | null
  readonly toSi: (value: number) => number
  readonly minimumSi: number
  readonly maximumSi: number
}

async function readWide(
  file: OpenedFile,
  table: RawTable,
  layout: Layout,
  specification: ColumnMapSpecification,
): Promise<AppliedReading> {
  const problems = new ProblemList()
  const clock = new RowClock(specification, layout.preamble)
  const isLog = specification.kind === 'rig-log'
  const readers = specification.columns.flatMap((column) => numberReader(column, specification))
  const valve = isLog ? specification.columns.find((column) => column.meaning === 'valve') : undefined
  const numberColumn = isLog ? undefined : specification.columns.find((column) => column.meaning === 'injection-number')
  const bypass = new NumberColumn()
  const number = new NumberColumn()
  const sourceRow = new NumberColumn()
  const bypassWords = new Set(specification.bypassWords.map((word) => word.trim().toLowerCase()))
  const mark = specification.decimalMark
  if (clock.startFault !== null) return emptyReading(specification, [...add(problems, clock.startFault)])

  const { rowCount, problems: rowProblems } = await readRows(file, table, layout, (cells, line) => {
    const fault = clock.add(cells, line)
    if (fault !== null) return fault
    sourceRow.push(line)
    for (const reader of readers) {
      const cell = cells[reader.column.index] ?? ''
      const value = typeof cell === 'number' ? cell : readNumberText(cell, mark)
      if (value === null || value === MISSING_NUMBER) {
        const text = String(cell)
        const absence = absenceOf(text)
        reader.values.push(Number.NaN)
        reader.censored?.push(absence === 'censored' || text.trim() === '' ? 1 : 0)
        if (absence === null) problems.add(notNumber(line, reader.column, text, mark))
        else if (absence === 'over-range') problems.add(overRange(line, reader.column, text))
        continue
      }
      const si = reader.toSi(value)
      if (si >= reader.minimumSi && si <= reader.maximumSi) reader.values.push(si)
      else {
        reader.values.push(Number.NaN)
        problems.add(outOfRange(line, reader.column, String(cell), reader))
      }
      reader.censored?.push(0)
    }
    if (valve !== undefined) {
      const text = String(cells[valve.index] ?? '')
        .trim()
        .toLowerCase()
      // a word for a missing value says nothing of the valve, unless the map has it as one of its words
      const isBypass = bypassWords.has(text)
      bypass.push(isBypass ? 1 : absenceOf(text) === null ? 0 : Number.NaN)
    }
    if (!isLog) {
      const cell = numberColumn === undefined ? '' : (cells[numberColumn.index] ?? '')
      const read = typeof cell === 'number' ? cell : readNumberText(cell, mark)
      const value = read === MISSING_NUMBER ? null : read
      if (value === null && numberColumn !== undefined)
        problems.add(notNumbered(line, numberColumn, String(cell), sourceRow.length))
      number.push(value ?? sourceRow.length)
    }
    return 'good'
  })
  clock.settle()
  const all = [...problems.list(), ...rowProblems]
  const channels: ReadingChannel[] = [
    { name: 'time', unit: 's', values: clock.instants.toArray() },
    ...(isLog ? [] : [{ name: 'number', unit: '1', values: number.toArray() }]),
    { name: 'sourceRow', unit: '1', values: sourceRow.toArray() },
    ...(isLog ? [] : [{ name: 'lastSourceRow', unit: '1', values: sourceRow.toArray() }]),
    ...readers.map((reader) => ({ name: reader.name, unit: reader.unit, values: reader.values.toArray() })),
    ...readers.flatMap((reader) =>
      reader.censored === null || reader.column.species === null
        ? []
        : [{ name: `isCensored.${reader.column.species}`, unit: '1', values: reader.censored.toArray() }],
    ),
    ...(valve === undefined ? [] : [{ name: 'isBypass', unit: '1', values: bypass.toArray() }]),
  ]
  const ordered = orderByTime(channels, isLog ? 'row' : 'injection')
  return {
    kind: isLog ? 'rig-log' : 'injections',
    rowCount,
    channels: ordered.channels,
    problems: [...all, ...ordered.problems, ...nothingRead(rowCount)],
    specification,
    hasUnsettledHour: clock.hasUnsettledHour,
  }
}

function add(problems: ProblemList, input: ProblemInput): readonly Problem[] {
  problems.add(input)
  return problems.list()
}

function numberReader(column: MappedColumn, specification: ColumnMapSpecification): readonly NumberReader[] {
  const isLog = specification.kind === 'rig-log'
  const make = (
    name: string,
    unit: string,
    toSi: (value: number) => number,
    range: readonly [number, number],
    isCensorable = false,
  ): readonly NumberReader[] => [
    {
      column,
      name: column.channel === null ? name : `${name}@${column.channel}`,
      unit,
      values: new NumberColumn(),
      censored: isCensorable ? new NumberColumn() : null,
      toSi,
      minimumSi: range[0],
      maximumSi: range[1],
    },
  ]
  switch (column.meaning) {
    case 'bed-temperature':
    case 'set-temperature':
    case 'wall-temperature': {
      const unit = unitFromAlias(column.unit, 'temperature')
      const name = {
        'bed-temperature': 'bedTemperatureK',
        'set-temperature': 'setTemperatureK',
        'wall-temperature': 'wallTemperatureK',
      }[column.meaning]
      return unit === null || !isLog ? [] : make(name, 'K', unit.toSi, [0, 4_000])
    }
    case 'inlet-pressure':
    case 'outlet-pressure': {
      const unit = unitFromAlias(column.unit, 'pressure')
      const name = column.meaning === 'inlet-pressure' ? 'inletPressurePa' : 'outletPressurePa'
      const barometerPa = specification.barometerPa
      if (unit === null || !isLog || column.pressureKind === null) return []
      if (column.pressureKind === 'absolute') return make(name, 'Pa', unit.toSi, [0, 2e9])
      // a gauge without its barometer is asked for before this is reached
      if (barometerPa === null) return []
      return make(name, 'Pa', (value) => absolutePressure(unit.toSi(value), barometerPa), [0, 2e9])
    }
    case 'flow': {
      if (!isLog || column.species === null) return []
      const name = `flowMolPerS.${column.species}`
      const molar = unitFromAlias(column.unit, 'molar-flow')
      if (molar !== null) return make(name, 'mol/s', molar.toSi, [-1e6, 1e6])
      const volume = unitFromAlias(column.unit, 'volume-flow')
      const temperatureK = column.referenceTemperatureK
      const pressurePa = column.referencePressurePa
      if (volume === null || temperatureK === null || pressurePa === null) return []
      return make(
        name,
        'mol/s',
        (value) => molarFlowFromVolumeFlow(volume.toSi(value), { temperatureK, pressurePa }),
        [-1e6, 1e6],
      )
    }
    case 'area':
      return isLog || column.species === null
        ? []
        : make(`area.${column.species}`, 'count', (value) => value, [-1e300, 1e300], true)
    case 'mole-fraction': {
      const unit = unitFromAlias(column.unit, 'fraction')
      if (isLog || column.species === null || unit === null) return []
      return make(`moleFraction.${column.species}`, '1', unit.toSi, [-0.5, 1.5], true)
    }
    default:
      return []
  }
}

function outOfRange(line: number, column: MappedColumn, found: string, reader: NumberReader): ProblemInput {
  return {
    code: 'out-of-range',
    severity: 'problem',
    line,
    column: column.header,
    found,
    expected: `between ${String(reader.minimumSi)} and ${String(reader.maximumSi)} ${reader.unit}`,
    sentence: `Line ${String(line)}, “${column.header}”: ${found.slice(0, 40)} ${column.unit} cannot be. Is the unit right, or did the sensor fail? The value is taken as missing.`,
  }
}
