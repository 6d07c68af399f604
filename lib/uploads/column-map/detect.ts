import { type ColumnMapSpecification, type ColumnMeaning, type MappedColumn } from '../../domain/column-map'
import { unitFromAlias } from '../../analysis/units/unit-from-alias'
import { type Layout } from '../find-layout'
import { type ReadingContext } from '../reading-context'
import { type ColumnStatistics } from './column-statistics'
import { type FileFacts } from '../../domain/intake'
import { findStart } from './find-start'
import { BYPASS_WORDS, speaksOf } from './header-words'
import { SpeciesWords } from './species-words'
import { labelWords, splitHeader } from './split-header'

export interface ColumnProposal {
  readonly specification: ColumnMapSpecification
  readonly facts: FileFacts
  /** how sure it is that this table is the one with the readings; the best of a workbook is taken */
  readonly weight: number
}

interface Candidate {
  readonly index: number
  readonly header: string
  readonly label: string
  readonly unit: string
  readonly words: readonly string[]
  readonly species: string | null
  readonly statistics: ColumnStatistics
}

/** Proposes what each column means from its header, its unit and its values. What cannot be told is left open and asked. */
export function detectColumns(
  layout: Layout,
  statistics: readonly ColumnStatistics[],
  sheet: string,
  context: ReadingContext,
): ColumnProposal {
  const species = new SpeciesWords(context.species)
  const candidates = layout.headers.map((header, index): Candidate => {
    const { label, unit } = splitHeader(header)
    const found = species.within(label)
    const words = labelWords(found === null ? label : found.rest)
    const own = statistics[index]
    if (own === undefined) throw new RangeError('a column without statistics')
    return { index, header, label, unit, words, species: found?.species ?? null, statistics: own }
  })
  const meanings = candidates.map((candidate) => meaningOf(candidate, species))
  settleTimes(candidates, meanings)
  settleSpecies(candidates, meanings)
  settleOnce(candidates, meanings)
  settleTemperatures(candidates, meanings)
  settlePressures(candidates, meanings)

  const has = (meaning: ColumnMeaning) => meanings.includes(meaning)
  const isAnalyser = has('area') || has('mole-fraction')
  const isLog = has('bed-temperature') || has('set-temperature') || has('flow') || has('inlet-pressure')
  const shape =
    has('species-name') && meanings.filter((m) => m === 'area' || m === 'mole-fraction').length <= 2 ? 'long' : 'wide'
  const valve = candidates.find((_candidate, index) => meanings[index] === 'valve')
  const bypassWords =
    valve === undefined
      ? []
      : [...valve.statistics.texts.keys()].filter((text) => isBypassWord(text)).map((text) => text.slice(0, 40))

  const start = has('elapsed-time') || (has('time-of-day') && !has('date')) ? findStart(layout.preamble) : null
  const dateOrder = orderOfDates(candidates, meanings, start)
  const marks = marksOf(candidates, meanings)
  const columns = candidates.map((candidate, index): MappedColumn => {
    const meaning = meanings[index] ?? 'ignore'
    const flow = meaning === 'flow' ? unitFromAlias(candidate.unit, 'volume-flow') : null
    const pressure =
      meaning === 'inlet-pressure' || meaning === 'outlet-pressure' ? unitFromAlias(candidate.unit, 'pressure') : null
    return {
      header: candidate.header.slice(0, 300),
      index,
      meaning,
      unit: unitFor(meaning, candidate).slice(0, 60),
      species: takesSpecies(meaning) && !(shape === 'long' && meaning !== 'flow') ? candidate.species : null,
      referenceTemperatureK: flow?.flowReference?.temperatureK ?? null,
      referencePressurePa: flow?.flowReference?.pressurePa ?? null,
      pressureKind:
        pressure?.pressureKind === 'absolute' || pressure?.pressureKind === 'gauge' ? pressure.pressureKind : null,
      channel: null,
    }
  })
  const hasTime = has('time') || has('date') || has('elapsed-time') || has('time-of-day')
  // results without a time belong to no run: a table of response factors, a summary
  const kind = isAnalyser && !isLog && hasTime ? 'analyser' : isLog && !isAnalyser && hasTime ? 'rig-log' : 'attachment'
  return {
    specification: {
      kind,
      shape,
      sheet: sheet.slice(0, 100),
      columns,
      decimalMark: marks.decimalMark,
      dateOrder: dateOrder.order,
      timeZone: context.rigTimeZone,
      elapsedStart: null,
      bypassWords: bypassWords.length === 0 ? ['bypass'] : bypassWords.slice(0, 20),
      basis: null,
      barometerPa: context.barometerPa,
      ambiguousHour: null,
    },
    facts: {
      isKindOpen: kind === 'attachment',
      isDateOrderOpen: dateOrder.isOpen,
      dateOrderProposal: dateOrder.proposal,
      dateOrderReason: dateOrder.reason,
      dateExample: dateOrder.example,
      isDecimalMarkOpen: marks.isOpen,
      decimalExample: marks.example,
      statedStart: start?.text ?? null,
      needsStart: (has('elapsed-time') || (has('time-of-day') && !has('date'))) && !has('time') && start === null,
      hasOffsets:
        candidates.every(
          (candidate, index) =>
            meanings[index] !== 'time' || candidate.statistics.timesWithOffset === candidate.statistics.datesWithTime,
        ) &&
        has('time') &&
        candidates.some((candidate, index) => meanings[index] === 'time' && candidate.statistics.timesWithOffset > 0),
      hasAmbiguousHour: false,
    },
    weight:
      (isAnalyser || isLog ? 10 : 0) +
      (hasTime ? 3 : 0) +
      meanings.filter((m) => m !== 'ignore' && m !== 'text').length / 10,
  }
}

function meaningOf(candidate: Candidate, species: SpeciesWords): ColumnMeaning {
  const { words, unit, statistics } = candidate
  const majority = statistics.majority
  if (majority === null)
    return speaksOf(words, 'area') || candidate.species !== null ? censoredOnly(candidate) : 'ignore'
  if (majority === 'date') return statistics.datesWithTime * 2 >= statistics.counts.date ? 'time' : 'date'
  if (majority === 'time')
    return statistics.largestSecond >= 86_400 || (speaksOf(words, 'elapsed') && words.some((w) => ELAPSED_ONLY.has(w)))
      ? 'elapsed-time'
      : 'time-of-day'
  if (majority === 'text') {
    const texts = [...statistics.texts.keys()]
    const named = texts.filter((text) => species.named(text) !== null).length
    if (named > 0 && named * 5 >= texts.length * 4 && (speaksOf(words, 'component') || named > 1)) return 'species-name'
    if (texts.some(isBypassWord)) return 'valve'
    if (speaksOf(words, 'component') && named > 0) return 'species-name'
    if (speaksOf(words, 'valve') && texts.length >= 2 && texts.length <= 12) return 'valve'
    return 'text'
  }
  return numericMeaning(candidate, unit)
}

const ELAPSED_ONLY = new Set([
  'elapsed',
  'laufzeit',
  'runtime',
  'duration',
  'dauer',
  'verstrichen',
  'ecoule',
  'transcurrido',
  'tos',
])

function numericMeaning(candidate: Candidate, unit: string): ColumnMeaning {
  const { words, statistics, species } = candidate
  if (statistics.compactDates > 0 && statistics.compactDates === statistics.counts.number && speaksOf(words, 'time'))
    return 'date'
  // 20260302073000
  if (statistics.minimum >= 1.9e13 && statistics.maximum < 2.11e13 && speaksOf(words, 'time')) return 'time'
  if (speaksOf(words, 'retention') && words.length <= 4) return 'retention-time'
  if (speaksOf(words, 'height')) return 'height'
  if (speaksOf(words, 'area') && !isDimension(unit, 'area')) return 'area'
  if (unit !== '') {
    if (unitFromAlias(unit, 'temperature') !== null && !(unit === 'C' && species !== null)) return 'bed-temperature'
    if (unitFromAlias(unit, 'pressure') !== null) return species === null ? 'inlet-pressure' : 'ignore'
    if (unitFromAlias(unit, 'volume-flow') !== null || unitFromAlias(unit, 'molar-flow') !== null)
      return species === null ? 'ignore' : 'flow'
    if (unitFromAlias(unit, 'fraction') !== null) return species === null ? 'ignore' : 'mole-fraction'
    if (unitFromAlias(unit, 'time') !== null) return speaksOf(words, 'retention') ? 'retention-time' : 'elapsed-time'
    return 'ignore'
  }
  if (statistics.integers === statistics.counts.number && speaksOf(words, 'number') && species === null)
    return 'injection-number'
  if (species !== null) {
    if (speaksOf(words, 'flow')) return 'flow'
    if (speaksOf(words, 'composition')) return 'mole-fraction'
    if (words.length === 0) return statistics.maximum > 1_000 ? 'area' : 'mole-fraction'
    return 'ignore'
  }
  if (speaksOf(words, 'temperature')) return 'bed-temperature'
  if (speaksOf(words, 'pressure')) return 'inlet-pressure'
  if (speaksOf(words, 'set') || (speaksOf(words, 'bed') && words.length > 1)) return 'ignore'
  if (words.some((word) => ELAPSED_ONLY.has(word)) || (candidate.index === 0 && speaksOf(words, 'time')))
    return 'elapsed-time'
  return 'ignore'
}

function isDimension(unit: string, dimension: 'area'): boolean {
  return dimension === 'area' && unit !== '' && unitFromAlias(unit, 'length') !== null
}

/** A column without a single number: every peak below the limit of detection. */
function censoredOnly(candidate: Candidate): ColumnMeaning {
  return candidate.species !== null && speaksOf(candidate.words, 'area') ? 'area' : 'ignore'
}

function isBypassWord(text: string): boolean {
  return labelWords(text).some((word) => BYPASS_WORDS.has(word)) || /by-?pass/i.test(text)
}

type Meanings = (ColumnMeaning | undefined)[]

/** One clock a table: date and time together, date beside time of day, or elapsed time, in this order. */
function settleTimes(candidates: readonly Candidate[], meanings: Meanings): void {
  const first = (meaning: ColumnMeaning) => meanings.indexOf(meaning)
  const only = (meaning: ColumnMeaning, keep: number) =>
    meanings.forEach((one, index) => {
      if (one === meaning && index !== keep) meanings[index] = 'ignore'
    })
  for (const meaning of ['time', 'date', 'time-of-day', 'elapsed-time'] as const) only(meaning, first(meaning))
  if (first('time') >= 0) {
    for (const meaning of ['date', 'time-of-day', 'elapsed-time'] as const) only(meaning, -1)
  } else if (first('date') >= 0) {
    if (first('time-of-day') < 0) {
      // a date with the elapsed time of that day would be rare; a date alone is no clock
      if (first('elapsed-time') >= 0) only('date', -1)
    } else only('elapsed-time', -1)
  } else if (first('elapsed-time') >= 0) only('time-of-day', -1)
  // `Lauf` counts injections, but `Zeit` in minutes first in a chromatogram's table is a retention time
  if (meanings.includes('species-name'))
    candidates.forEach((candidate, index) => {
      if (meanings[index] === 'elapsed-time' && (first('time') >= 0 || candidate.statistics.maximum < 120))
        meanings[index] = 'retention-time'
    })
}

/** Bare species columns are areas or fractions together, not one by one. */
function settleSpecies(candidates: readonly Candidate[], meanings: Meanings): void {
  const bare = candidates.filter(
    (candidate, index) =>
      candidate.species !== null &&
      candidate.unit === '' &&
      candidate.words.length === 0 &&
      (meanings[index] === 'area' || meanings[index] === 'mole-fraction'),
  )
  const largest = Math.max(0, ...bare.map((candidate) => candidate.statistics.maximum))
  for (const candidate of bare) meanings[candidate.index] = largest > 100.5 ? 'area' : 'mole-fraction'
  if (meanings.includes('species-name') && !meanings.includes('area') && !meanings.includes('mole-fraction')) {
    const value = candidates.find(
      (candidate, index) =>
        meanings[index] === 'ignore' &&
        candidate.statistics.majority === 'number' &&
        (candidate.unit !== '' || speaksOf(candidate.words, 'composition')),
    )
    if (value !== undefined && unitFromAlias(value.unit, 'fraction') !== null) meanings[value.index] = 'mole-fraction'
  }
}

/** Meanings that a table has once; the first column that has it keeps it. The same species twice for one quantity is not guessed either. */
function settleOnce(candidates: readonly Candidate[], meanings: Meanings): void {
  const seen = new Set<string>()
  const isLong = meanings.includes('species-name')
  candidates.forEach((candidate, index) => {
    const meaning = meanings[index]
    if (meaning === undefined || meaning === 'ignore' || meaning === 'text') return
    if (meaning === 'bed-temperature' || meaning === 'inlet-pressure') return
    const key = takesSpecies(meaning) && !isLong ? `${meaning} ${candidate.species ?? ''}` : meaning
    if (seen.has(key) || (takesSpecies(meaning) && !isLong && candidate.species === null)) meanings[index] = 'ignore'
    seen.add(key)
  })
}

function settleTemperatures(candidates: readonly Candidate[], meanings: Meanings): void {
  const found = candidates.filter((_candidate, index) => meanings[index] === 'bed-temperature')
  for (const candidate of found) meanings[candidate.index] = 'ignore'
  const take = (
    meaning: 'set-temperature' | 'wall-temperature' | 'bed-temperature',
    test: (candidate: Candidate) => boolean,
  ): void => {
    if (meanings.includes(meaning)) return
    const chosen = found.find((candidate) => meanings[candidate.index] === 'ignore' && test(candidate))
    if (chosen !== undefined) meanings[chosen.index] = meaning
  }
  take('set-temperature', (candidate) => speaksOf(candidate.words, 'set'))
  take(
    'bed-temperature',
    (candidate) =>
      speaksOf(candidate.words, 'bed') && !speaksOf(candidate.words, 'set') && !speaksOf(candidate.words, 'wall'),
  )
  take('wall-temperature', (candidate) => speaksOf(candidate.words, 'wall') && !speaksOf(candidate.words, 'set'))
  // one temperature left over and none for the bed: that is the bed's
  const left = found.filter((candidate) => meanings[candidate.index] === 'ignore')
  if (left.length === 1) take('bed-temperature', (candidate) => !speaksOf(candidate.words, 'set'))
}

function settlePressures(candidates: readonly Candidate[], meanings: Meanings): void {
  const found = candidates.filter((_candidate, index) => meanings[index] === 'inlet-pressure')
  for (const candidate of found) meanings[candidate.index] = 'ignore'
  const outlet = found.find((candidate) => speaksOf(candidate.words, 'outlet') && !speaksOf(candidate.words, 'set'))
  const inlet =
    found.find((candidate) => candidate !== outlet && speaksOf(candidate.words, 'inlet')) ??
    (found.length === 1 && outlet === undefined && !speaksOf(found[0]?.words ?? [], 'set') ? found[0] : undefined)
  if (outlet !== undefined) meanings[outlet.index] = 'outlet-pressure'
  if (inlet !== undefined) meanings[inlet.index] = 'inlet-pressure'
}

function takesSpecies(meaning: ColumnMeaning): boolean {
  return meaning === 'flow' || meaning === 'area' || meaning === 'mole-fraction' || meaning === 'height'
}

function unitFor(meaning: ColumnMeaning, candidate: Candidate): string {
  if (candidate.unit !== '') return candidate.unit
  return ''
}

/** Order of day and month over all dates of the file and its preamble. */
function orderOfDates(
  candidates: readonly Candidate[],
  meanings: Meanings,
  start: ReturnType<typeof findStart>,
): {
  readonly order: ColumnMapSpecification['dateOrder']
  readonly isOpen: boolean
  readonly proposal: 'day-first' | 'month-first'
  readonly reason: string
  readonly example: string
} {
  const columns = candidates.filter((_candidate, index) => meanings[index] === 'time' || meanings[index] === 'date')
  let first = 0
  let second = 0
  let undecided = 0
  let certain = 0
  let halfDays = 0
  let shortYearFirst = false
  let example = ''
  for (const { statistics } of columns) {
    first = Math.max(first, statistics.firstField)
    second = Math.max(second, statistics.secondField)
    undecided += statistics.undecidedDates
    certain += statistics.certainDates + statistics.compactDates
    halfDays += statistics.halfDays
    if (statistics.shortDates > 0 && statistics.firstField > 31) shortYearFirst = true
  }
  const scan = start?.scan
  if (scan?.fields !== undefined && scan.fields !== null) {
    if (scan.form === 'certain') certain++
    else {
      undecided++
      first = Math.max(first, scan.fields[0])
      second = Math.max(second, scan.fields[1])
      if (scan.hasHalfDay) halfDays++
      example = start?.text ?? ''
    }
  }
  const proposal = halfDays > 0 ? 'month-first' : 'day-first'
  const reason =
    halfDays > 0
      ? 'The clock with AM and PM goes with the month first in most places.'
      : 'The day first is usual where dates are written with points or strokes and a 24-hour clock.'
  const settled = (order: ColumnMapSpecification['dateOrder']) =>
    ({ order, isOpen: false, proposal, reason, example }) as const
  if (undecided === 0) return settled(certain > 0 ? 'year-first' : null)
  if (shortYearFirst) return settled('year-first')
  if (first > 12 && second <= 12) return settled('day-first')
  if (second > 12 && first <= 12) return settled('month-first')
  return { order: null, isOpen: true, proposal, reason, example }
}

/** Decimal mark over all rows of the columns that hold numbers. */
function marksOf(
  candidates: readonly Candidate[],
  meanings: Meanings,
): { readonly decimalMark: '.' | ','; readonly isOpen: boolean; readonly example: string } {
  let point = 0
  let comma = 0
  let either = 0
  let example = ''
  candidates.forEach((candidate, index) => {
    const { statistics } = candidate
    if (statistics.majority !== 'number' || meanings[index] === 'text') return
    point += statistics.onlyPoint
    comma += statistics.onlyComma
    either += statistics.eitherMark
    if (statistics.eitherMark > 0 && example === '') example = candidate.header
  })
  if (point > 0 && comma === 0) return { decimalMark: '.', isOpen: false, example }
  if (comma > 0 && point === 0) return { decimalMark: ',', isOpen: false, example }
  // a few cells against thousands are faults of those cells, and are listed as such
  if (point > 100 * comma && point > 0) return { decimalMark: '.', isOpen: false, example }
  if (comma > 100 * point && comma > 0) return { decimalMark: ',', isOpen: false, example }
  if (point === 0 && comma === 0 && either === 0) return { decimalMark: '.', isOpen: false, example }
  return { decimalMark: comma > point ? ',' : '.', isOpen: true, example }
}
