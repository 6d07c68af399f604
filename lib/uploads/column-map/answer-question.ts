import { type ColumnMapSpecification } from '../../domain/column-map'
import { unitFromAlias } from '../../analysis/units/unit-from-alias'
import { isTimeZone } from '../dates/local-clock'
import { type FileFacts } from '../../domain/intake'
import { type QuestionKey } from './questions'

/** Characters of the longest start that a map holds. */
const LONGEST_START = 40

export type Answers = Readonly<Partial<Record<QuestionKey, string>>>

/** Puts answers into the specification, where they are kept for the instrument's next file. An answer that is none is passed over: its question stays open. */
export function answerQuestions(
  specification: ColumnMapSpecification,
  facts: FileFacts,
  answers: Answers,
): { readonly specification: ColumnMapSpecification; readonly facts: FileFacts } {
  let next = specification
  let open = facts
  const kind = answers['kind']
  if (kind === 'rig-log' || kind === 'analyser' || kind === 'attachment') {
    next = { ...next, kind }
    open = { ...open, isKindOpen: false }
  }
  const mark = answers['decimal-mark']
  if (mark === '.' || mark === ',') {
    next = { ...next, decimalMark: mark }
    open = { ...open, isDecimalMarkOpen: false }
  }
  const order = answers['date-order']
  if (order === 'day-first' || order === 'month-first' || order === 'year-first') next = { ...next, dateOrder: order }
  const zone = answers['time-zone']
  if (zone !== undefined && isTimeZone(zone)) next = { ...next, timeZone: zone }
  const start = (answers['elapsed-start'] ?? '').trim()
  // one that is longer is no date, and cut to its first part it could be another: the offset stands at the end
  if (start !== '' && start.length <= LONGEST_START) next = { ...next, elapsedStart: start }
  const reference = referenceOf(answers['flow-reference'])
  if (reference !== null)
    next = {
      ...next,
      columns: next.columns.map((column) =>
        column.meaning === 'flow' &&
        column.referenceTemperatureK === null &&
        unitFromAlias(column.unit, 'volume-flow') !== null
          ? { ...column, referenceTemperatureK: reference.temperatureK, referencePressurePa: reference.pressurePa }
          : column,
      ),
    }
  const pressure = answers['pressure-kind']
  if (pressure === 'absolute' || pressure === 'gauge')
    next = {
      ...next,
      columns: next.columns.map((column) =>
        (column.meaning === 'inlet-pressure' || column.meaning === 'outlet-pressure') && column.pressureKind === null
          ? { ...column, pressureKind: pressure }
          : column,
      ),
    }
  const barometer = Number(answers['barometer'] ?? Number.NaN)
  if (barometer >= 50_000 && barometer <= 120_000) next = { ...next, barometerPa: barometer }
  const basis = answers['basis']
  if (basis === 'dry' || basis === 'wet') next = { ...next, basis }
  const hour = answers['ambiguous-hour']
  if (hour === 'earlier' || hour === 'later') next = { ...next, ambiguousHour: hour }
  return { specification: next, facts: open }
}

function referenceOf(answer: string | undefined): { temperatureK: number; pressurePa: number } | null {
  if (answer === undefined) return null
  const [temperature, pressure] = answer.split('/').map(Number)
  if (temperature === undefined || pressure === undefined) return null
  return temperature > 200 && temperature < 400 && pressure > 50_000 && pressure < 200_000
    ? { temperatureK: temperature, pressurePa: pressure }
    : null
}
