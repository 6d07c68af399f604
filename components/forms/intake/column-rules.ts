import { type Dimension } from '@/lib/analysis/units/dimension'
import { unitFromAlias } from '@/lib/analysis/units/unit-from-alias'
import { type ColumnMapSpecification, type ColumnMeaning, type MappedColumn } from '@/lib/domain/column-map'
import { dimensionsOf } from '@/lib/domain/column-dimensions'
import { speciesSchema } from '@/lib/domain/text'

export const meaningLabels: Readonly<Record<ColumnMeaning, string>> = {
  ignore: 'not read',
  time: 'date and time',
  date: 'date',
  'time-of-day': 'time of day',
  'elapsed-time': 'time since start',
  'set-temperature': 'set temperature',
  'bed-temperature': 'bed temperature',
  'wall-temperature': 'wall temperature',
  'inlet-pressure': 'pressure before bed',
  'outlet-pressure': 'pressure after bed',
  flow: 'flow of a gas',
  valve: 'valve: reactor or bypass',
  'injection-number': 'injection number',
  'species-name': 'name of the species',
  area: 'peak area',
  'mole-fraction': 'mole fraction',
  'retention-time': 'retention time',
  height: 'peak height',
  text: 'remark',
}

const LOG: readonly ColumnMeaning[] = [
  'set-temperature',
  'bed-temperature',
  'wall-temperature',
  'inlet-pressure',
  'outlet-pressure',
  'flow',
  'valve',
]
const ANALYSER: readonly ColumnMeaning[] = [
  'injection-number',
  'species-name',
  'area',
  'mole-fraction',
  'retention-time',
  'height',
]
const CLOCK: readonly ColumnMeaning[] = ['time', 'date', 'time-of-day', 'elapsed-time']

/** Meanings a column of such a file can have, those that are read first; the one it has now stays in the list. */
export function meaningsFor(kind: ColumnMapSpecification['kind'], current: ColumnMeaning): readonly ColumnMeaning[] {
  const own = kind === 'rig-log' ? LOG : kind === 'analyser' ? ANALYSER : [...LOG, ...ANALYSER]
  const listed: ColumnMeaning[] = [...CLOCK, ...own, 'text', 'ignore']
  return listed.includes(current) ? listed : [...listed, current]
}

/** The more that is asked of a column, by what it means. */
export interface ColumnNeeds {
  readonly unit: boolean
  readonly species: boolean
  /** the unit is one of a volume, so the state it is counted at belongs to it */
  readonly flowReference: boolean
  readonly pressureKind: boolean
}

export function columnNeeds(column: MappedColumn, shape: ColumnMapSpecification['shape']): ColumnNeeds {
  const { meaning } = column
  return {
    unit: dimensionsOf(meaning).length > 0,
    species: meaning === 'flow' || (shape === 'wide' && ['area', 'mole-fraction', 'height'].includes(meaning)),
    flowReference: meaning === 'flow' && unitFromAlias(column.unit, 'volume-flow') !== null,
    pressureKind: meaning === 'inlet-pressure' || meaning === 'outlet-pressure',
  }
}

export interface UnitReading {
  readonly ok: boolean
  /** what the unit was understood as, or what is wrong with it */
  readonly sentence: string
}

const KIND_WORDS: Readonly<Partial<Record<Dimension, string>>> = {
  temperature: 'a temperature, such as °C or K',
  pressure: 'a pressure, such as bar or kPa',
  'volume-flow': 'a flow, such as mL/min or mmol/h',
  fraction: 'a fraction, such as % or ppm',
  time: 'a time, such as s, min or h',
}

/** What a typed unit was understood as. */
export function readUnit(column: MappedColumn): UnitReading {
  const kinds = dimensionsOf(column.meaning)
  const wanted = KIND_WORDS[kinds[0] ?? 'fraction'] ?? ''
  // a clock text such as 12:30:05 is its own unit
  if (column.unit.trim() === '' && column.meaning === 'elapsed-time')
    return { ok: true, sentence: 'for numbers: s, min or h' }
  for (const kind of kinds) {
    const unit = unitFromAlias(column.unit, kind)
    if (unit === null) continue
    const label = unit.label === '' ? 'parts of one' : unit.label
    return { ok: true, sentence: unit.remark === '' ? `read as ${label}` : unit.remark }
  }
  return {
    ok: false,
    sentence:
      column.unit.trim() === '' ? `Not stated. Write ${wanted}.` : `“${column.unit}” is not known. Write ${wanted}.`,
  }
}

/** The column with another meaning: what only belonged to the old one is taken off, what the unit itself says is put in. */
export function withMeaning(column: MappedColumn, meaning: ColumnMeaning): MappedColumn {
  const keepsSpecies = ['flow', 'area', 'mole-fraction', 'height']
  return withUnit(
    { ...column, meaning, species: keepsSpecies.includes(meaning) ? column.species : null, pressureKind: null },
    column.unit,
  )
}

/** The column with another unit; a reference state or a kind of pressure that the unit states comes with it. */
export function withUnit(column: MappedColumn, unit: string): MappedColumn {
  const text = unit.slice(0, 60)
  const flow = column.meaning === 'flow' ? unitFromAlias(text, 'volume-flow') : null
  const isPressure = column.meaning === 'inlet-pressure' || column.meaning === 'outlet-pressure'
  const pressure = isPressure ? unitFromAlias(text, 'pressure') : null
  const stated = pressure?.pressureKind
  return {
    ...column,
    unit: text,
    referenceTemperatureK: flow === null ? null : (flow.flowReference?.temperatureK ?? column.referenceTemperatureK),
    referencePressurePa: flow === null ? null : (flow.flowReference?.pressurePa ?? column.referencePressurePa),
    pressureKind: !isPressure ? null : stated === 'absolute' || stated === 'gauge' ? stated : column.pressureKind,
  }
}

/** Whether a species can be kept as it is typed; an empty one is asked for by the reading itself. */
export function isSpecies(text: string): boolean {
  return speciesSchema.safeParse(text).success
}
