import { type ColumnMapSpecification } from '../../domain/column-map'
import { type FileFacts, type Question } from '../../domain/intake'
import { FLOW_REFERENCES } from '../../analysis/units/flow-reference'
import { unitFromAlias } from '../../analysis/units/unit-from-alias'
import { type ReadingContext } from '../reading-context'

export type QuestionKey = Question['key']

/** Questions that must be answered before the file can be read as the specification says: what the file settles is not asked, and what it does not is never guessed. */
export function findQuestions(
  specification: ColumnMapSpecification,
  facts: FileFacts,
  context: ReadingContext,
): Question[] {
  const questions: Question[] = []
  if (facts.isKindOpen) questions.push(KIND)
  if (specification.kind === 'attachment') return questions
  const flows = specification.columns.filter(
    (column) =>
      column.meaning === 'flow' &&
      unitFromAlias(column.unit, 'volume-flow') !== null &&
      column.referenceTemperatureK === null,
  )
  const pressures = specification.columns.filter(
    (column) => column.meaning === 'inlet-pressure' || column.meaning === 'outlet-pressure',
  )
  if (facts.isDecimalMarkOpen) questions.push(decimalMark(facts))
  if (facts.isDateOrderOpen && specification.dateOrder === null) questions.push(dateOrder(facts))
  if (specification.timeZone === '' && !facts.hasOffsets) questions.push(TIME_ZONE)
  if (facts.needsStart && specification.elapsedStart === null) questions.push(ELAPSED_START)
  if (flows.length > 0) questions.push(flowReference(flows[0]?.unit ?? '', context))
  const bare = pressures.filter(
    (column) => column.pressureKind === null && unitFromAlias(column.unit, 'pressure') !== null,
  )
  if (bare.length > 0) questions.push(pressureKind(bare[0]?.header ?? ''))
  if (specification.barometerPa === null && pressures.some((column) => column.pressureKind === 'gauge'))
    questions.push(BAROMETER)
  if (specification.basis === null && specification.columns.some((column) => column.meaning === 'mole-fraction'))
    questions.push(BASIS)
  if (facts.hasAmbiguousHour && specification.ambiguousHour === null) questions.push(AMBIGUOUS_HOUR)
  return questions
}

const KIND: Question = {
  key: 'kind',
  sentence:
    'The columns do not tell what this file is. A log of the rig, results of the analyser, or a file to keep beside the run without reading it?',
  choices: [
    { value: 'rig-log', label: 'Log of the rig: temperatures, pressures, flows against time' },
    { value: 'analyser', label: 'Results of the analyser: peaks or composition, one row an injection or a peak' },
    { value: 'attachment', label: 'Neither: keep it with the run, do not read it' },
  ],
  proposal: null,
}

const TIME_ZONE: Question = {
  key: 'time-zone',
  sentence: 'The times in the file say no zone and the rig has none on record. Which zone is the clock set to?',
  choices: [
    { value: 'UTC', label: 'UTC' },
    { value: 'Europe/London', label: 'United Kingdom' },
    { value: 'Europe/Berlin', label: 'Central Europe' },
    { value: 'America/New_York', label: 'US east' },
    { value: 'America/Chicago', label: 'US central' },
    { value: 'America/Los_Angeles', label: 'US west' },
    { value: 'Asia/Shanghai', label: 'China' },
    { value: 'Asia/Tokyo', label: 'Japan' },
    { value: 'Asia/Kolkata', label: 'India' },
  ],
  proposal: null,
}

const ELAPSED_START: Question = {
  key: 'elapsed-start',
  sentence: 'The file counts time from its start and does not say when that was. Date and time of the first row?',
  choices: [],
  proposal: null,
}

const BAROMETER: Question = {
  key: 'barometer',
  sentence: 'Gauge pressures need the pressure of the room, and the rig has none on record.',
  choices: [{ value: '101325', label: 'Standard atmosphere, 101.325 kPa, uncertain by 2 kPa' }],
  proposal: '101325',
}

const BASIS: Question = {
  key: 'basis',
  sentence: 'Was water removed before the analyser, so that the fractions are of the dry gas?',
  choices: [
    { value: 'dry', label: 'Dry: water condensed or trapped before the analyser' },
    { value: 'wet', label: 'Wet: heated lines, water counts in the fractions' },
  ],
  proposal: null,
}

const AMBIGUOUS_HOUR: Question = {
  key: 'ambiguous-hour',
  sentence:
    'The file has times in the hour that the clock shows twice when summer time ends, and the order of the rows does not tell which of the two it is.',
  choices: [
    { value: 'earlier', label: 'The first time through: still summer time' },
    { value: 'later', label: 'The second time through: back on standard time' },
  ],
  proposal: null,
}

function decimalMark(facts: FileFacts): Question {
  return {
    key: 'decimal-mark',
    sentence: `Numbers such as those in “${facts.decimalExample.slice(0, 100)}” can be read with a decimal point or with a decimal comma.`,
    choices: [
      { value: '.', label: 'Decimal point: 1.234 is a little more than one, 1,234 a thousand and more' },
      { value: ',', label: 'Decimal comma: 1,234 is a little more than one, 1.234 a thousand and more' },
    ],
    proposal: null,
  }
}

function dateOrder(facts: FileFacts): Question {
  const example = facts.dateExample === '' ? '' : ` (“${facts.dateExample.slice(0, 60)}”)`
  return {
    key: 'date-order',
    sentence: `No date in the file${example} has a number above 12, so day and month cannot be told apart. ${facts.dateOrderReason}`,
    choices:
      facts.dateOrderProposal === 'day-first'
        ? [
            { value: 'day-first', label: 'Day first: 02.03. is 2 March' },
            { value: 'month-first', label: 'Month first: 02.03. is 3 February' },
          ]
        : [
            { value: 'month-first', label: 'Month first: 02/03 is 3 February' },
            { value: 'day-first', label: 'Day first: 02/03 is 2 March' },
          ],
    proposal: facts.dateOrderProposal,
  }
}

/** Value of a choice of reference state: kelvin and pascal with a stroke between. */
export function referenceValue(reference: { readonly temperatureK: number; readonly pressurePa: number }): string {
  return `${String(reference.temperatureK)}/${String(reference.pressurePa)}`
}

function flowReference(unit: string, context: ReadingContext): Question {
  const own = context.flowReference ?? null
  const proposal = own === null ? null : referenceValue(own)
  const listed = FLOW_REFERENCES.map((reference) => ({
    value: referenceValue(reference),
    label: `${reference.label}: ${reference.usedBy}`,
  }))
  const choices =
    proposal === null
      ? listed
      : [
          listed.find(({ value }) => value === proposal) ?? {
            value: proposal,
            label: `${String(own?.temperatureK)} K, ${String(own?.pressurePa)} Pa: this rig's flow controllers`,
          },
          ...listed.filter(({ value }) => value !== proposal),
        ]
  return {
    key: 'flow-reference',
    sentence:
      `“${unit}” does not say at which temperature and pressure the volume is counted; between the usual ones lie up to 10 % in amount.` +
      (proposal === null ? '' : ' The rig’s record has the first one.'),
    choices,
    proposal,
  }
}

function pressureKind(header: string): Question {
  return {
    key: 'pressure-kind',
    sentence: `“${header.slice(0, 100)}” does not say whether the pressure is absolute or above that of the room.`,
    choices: [
      { value: 'absolute', label: 'Absolute: reads about 1 bar when the rig is open' },
      { value: 'gauge', label: 'Gauge: reads zero when the rig is open' },
    ],
    proposal: null,
  }
}
