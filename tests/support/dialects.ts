import { strToU8, zipSync } from 'fflate'
import { type Problem } from '@/lib/domain/intake'

/**
 * One file in one dialect, with what a reader must find in it. Rows and faults come from the same plain table that the file is written from, in SI by
 * hand-written factors; nothing of the reader is used.
 */
export interface Dialect {
  readonly name: string
  readonly bytes: Uint8Array
  /** what must be asked, in order, and what a person answers */
  readonly asked: Readonly<Record<string, string>>
  readonly rigTimeZone: string
  readonly kind: 'rig-log' | 'injections'
  /** seconds since the epoch */
  readonly times: readonly number[]
  readonly channels: Readonly<Record<string, readonly number[]>>
  readonly problems: readonly { readonly code: Problem['code']; readonly line?: number }[]
}

interface LogRow {
  /** seconds after the start */
  readonly s: number
  readonly set: number
  readonly bed: number
  readonly bar: number
  readonly co2: number
  readonly isBypass: boolean
}

const START = '2026-03-02T07:30:00+01:00'
const START_S = Date.parse(START) / 1_000
const BERLIN = 'Europe/Berlin'

export const LOG: readonly LogRow[] = Array.from({ length: 24 }, (_, i) => ({
  s: i * 60,
  set: i < 12 ? 215 : 225,
  bed: round((i < 12 ? 215 : 225) - 0.2 + (i % 5) * 0.13, 2),
  bar: round(1.3 + 0.002 * (i % 3), 3),
  co2: round(7.2 + 0.01 * (i % 4), 2),
  isBypass: i < 4,
}))

function round(value: number, places: number): number {
  return Number(value.toFixed(places))
}

/** 273.15 K and 101325 Pa (IUPAC's older standard state, DIN 1343); R of CODATA 2018. */
const MOL_PER_ML = 101_325e-6 / (8.314_462_618_153_24 * 273.15)
const expectedLog = (rows: readonly LogRow[] = LOG) => ({
  times: rows.map(({ s }) => START_S + s),
  channels: {
    bedTemperatureK: rows.map(({ bed }) => bed + 273.15),
    setTemperatureK: rows.map(({ set }) => set + 273.15),
    inletPressurePa: rows.map(({ bar }) => bar * 1e5),
    'flowMolPerS.CO2': rows.map(({ co2 }) => (co2 / 60) * MOL_PER_ML),
    isBypass: rows.map(({ isBypass }) => (isBypass ? 1 : 0)),
  },
})

interface Look {
  readonly delimiter?: string
  readonly mark?: '.' | ','
  readonly eol?: string
  readonly header?: readonly string[]
  readonly above?: readonly string[]
  /** a row under the header */
  readonly units?: readonly string[]
  /** cells of the time, one or two */
  readonly when?: (at: Date, row: LogRow, index: number) => readonly string[]
  readonly number?: (text: string, column: 'set' | 'bed' | 'bar' | 'co2', index: number) => string
  readonly valve?: (isBypass: boolean) => string
  readonly rows?: readonly LogRow[]
  /** the finished lines of data, to be spoilt */
  readonly lines?: (lines: string[], look: { readonly header: string }) => string[]
  readonly endsWithBreak?: boolean
}

const HEADER = ['time', 'T set [°C]', 'T bed [°C]', 'p in [bar(a)]', 'CO2 flow [NmL/min]', 'valve']
const pad = (value: number, length = 2) => String(value).padStart(length, '0')
/** The wall clock in Berlin in winter, an hour before Greenwich. */
const wall = (at: Date) => {
  const local = new Date(at.getTime() + 3_600_000)
  return {
    y: local.getUTCFullYear(),
    mo: local.getUTCMonth() + 1,
    d: local.getUTCDate(),
    h: local.getUTCHours(),
    mi: local.getUTCMinutes(),
    s: local.getUTCSeconds(),
  }
}
const clock = (at: Date) => {
  const { h, mi, s } = wall(at)
  return `${pad(h)}:${pad(mi)}:${pad(s)}`
}
const isoDay = (at: Date) => {
  const { y, mo, d } = wall(at)
  return `${y}-${pad(mo)}-${pad(d)}`
}
const iso = (at: Date) => [`${isoDay(at)} ${clock(at)}`]

function logText(look: Look): string {
  const delimiter = look.delimiter ?? ','
  const mark = look.mark ?? '.'
  const eol = look.eol ?? '\n'
  const when = look.when ?? iso
  const valve = look.valve ?? ((isBypass) => (isBypass ? 'bypass' : 'reactor'))
  const header = (look.header ?? HEADER).join(delimiter)
  const write = (value: number, places: number, column: 'set' | 'bed' | 'bar' | 'co2', index: number) => {
    const text = value.toFixed(places).replace('.', mark)
    return look.number === undefined ? text : look.number(text, column, index)
  }
  const lines = (look.rows ?? LOG).map((row, index) =>
    [
      ...when(new Date((START_S + row.s) * 1_000), row, index),
      write(row.set, 1, 'set', index),
      write(row.bed, 2, 'bed', index),
      write(row.bar, 3, 'bar', index),
      write(row.co2, 2, 'co2', index),
      valve(row.isBypass),
    ].join(delimiter),
  )
  const spoilt = look.lines === undefined ? lines : look.lines([...lines], { header })
  return (
    [
      ...(look.above ?? []),
      ...(look.header?.length === 0 ? [] : [header]),
      ...(look.units === undefined ? [] : [look.units.join(delimiter)]),
      ...spoilt,
    ].join(eol) + (look.endsWithBreak === false ? '' : eol)
  )
}

const utf16 = (text: string, isBig: boolean, hasMark: boolean) => {
  const little = Buffer.from((hasMark ? '\ufeff' : '') + text, 'utf16le')
  return new Uint8Array(isBig ? little.swap16() : little)
}
const latin1 = (text: string) => new Uint8Array(Buffer.from(text, 'latin1'))
const utf8 = (text: string) => strToU8(text)

type Change = Partial<Pick<Dialect, 'asked' | 'rigTimeZone' | 'kind' | 'times' | 'channels' | 'problems'>>

const log = (name: string, look: Look, change: Change = {}, encode = utf8): Dialect => ({
  name,
  bytes: encode(logText(look)),
  asked: {},
  rigTimeZone: BERLIN,
  kind: 'rig-log',
  problems: [],
  ...expectedLog(look.rows),
  ...change,
})

const COMMA_LOOK = { delimiter: ';', mark: ',' } as const
const without = (...dropped: number[]) => expectedLog(LOG.filter((_row, index) => !dropped.includes(index)))
/** expected channels with one value missing */
const missing = (channel: 'bedTemperatureK' | 'inletPressurePa' | 'flowMolPerS.CO2', ...indices: number[]) => {
  const expected = expectedLog()
  return {
    ...expected.channels,
    [channel]: expected.channels[channel].map((value, index) => (indices.includes(index) ? Number.NaN : value)),
  }
}
const replaceCell = (lines: string[], index: number, column: number, text: string, delimiter = ',') => {
  const cells = (lines[index] ?? '').split(delimiter)
  cells[column] = text
  lines[index] = cells.join(delimiter)
  return lines
}

const encodings: Dialect[] = [
  log('UTF-8, comma, point', {}),
  log('UTF-8 with byte-order mark', {}, {}, (text) => utf8(`\ufeff${text}`)),
  log('UTF-16, little end first, with mark', { delimiter: '\t' }, {}, (text) => utf16(text, false, true)),
  log('UTF-16, big end first, with mark', { delimiter: '\t' }, {}, (text) => utf16(text, true, true)),
  log('UTF-16, little end first, without mark', { delimiter: '\t' }, {}, (text) => utf16(text, false, false)),
  log('UTF-16, big end first, without mark', { delimiter: '\t' }, {}, (text) => utf16(text, true, false)),
  log('Windows-1252 with a degree sign', COMMA_LOOK, {}, latin1),
]

const separators: Dialect[] = [
  log('semicolon, decimal comma', COMMA_LOOK),
  log('semicolon, decimal point', { delimiter: ';' }),
  log('tab, decimal point', { delimiter: '\t' }),
  log('tab, decimal comma', { delimiter: '\t', mark: ',' }),
  log('upright bar', { delimiter: '|' }),
  log('upright bar, decimal comma', { delimiter: '|', mark: ',' }),
  log('columns set apart by blanks', {
    delimiter: '   ',
    header: ['time', 'T_set[°C]', 'T_bed[°C]', 'p_in[bar(a)]', 'CO2_flow[NmL/min]', 'valve'],
    when: (at) => [`${isoDay(at)}T${clock(at)}`],
  }),
  log('carriage return and line feed', { eol: '\r\n' }),
  log('carriage returns alone', { eol: '\r' }),
  log('no line end at the end', { endsWithBreak: false }),
  log('a delimiter at the end of every line', {
    header: [...HEADER, ''],
    lines: (lines) => lines.map((line) => `${line},`),
  }),
  log('every cell in quotes', {
    header: HEADER.map((cell) => `"${cell}"`),
    lines: (lines) =>
      lines.map((line) =>
        line
          .split(',')
          .map((cell) => `"${cell}"`)
          .join(','),
      ),
  }),
  log('decimal commas in quotes between commas', {
    header: HEADER.map((cell) => `"${cell}"`),
    lines: (lines) =>
      lines.map((line) =>
        line
          .split(',')
          .map((cell) => `"${/^\d+\.\d+$/.test(cell) ? cell.replace('.', ',') : cell}"`)
          .join(','),
      ),
  }),
  log('a line break inside a quoted header', {
    header: HEADER.map((cell) => `"${cell.replace(' [', '\n[')}"`),
  }),
  log('blank lines between the rows', {
    lines: (lines) => lines.flatMap((line, index) => (index % 6 === 5 ? [line, ''] : [line])),
  }),
  log('cells filled up with blanks', {
    lines: (lines) =>
      lines.map((line) =>
        line
          .split(',')
          .map((cell) => ` ${cell} `)
          .join(','),
      ),
  }),
]

const times: Dialect[] = [
  log(
    'ISO 8601 with T and an offset',
    { when: (at) => [`${isoDay(at)}T${clock(at)}+01:00`] },
    { rigTimeZone: 'America/Chicago' },
  ),
  log('ISO 8601 in UTC', { when: (at) => [at.toISOString()] }, { rigTimeZone: 'America/Chicago' }),
  log(
    'day, month, year with points, which day or month?',
    {
      ...COMMA_LOOK,
      when: (at) => {
        const { d, mo, y } = wall(at)
        return [`${pad(d)}.${pad(mo)}.${y} ${clock(at)}`]
      },
    },
    { asked: { 'date-order': 'day-first' } },
  ),
  log(
    'month, day, year with strokes and AM, PM',
    {
      when: (at) => {
        const { d, mo, y, h, mi, s } = wall(at)
        return [`${mo}/${d}/${y} ${h % 12 === 0 ? 12 : h % 12}:${pad(mi)}:${pad(s)} ${h < 12 ? 'AM' : 'PM'}`]
      },
    },
    { asked: { 'date-order': 'month-first' } },
  ),
  log(
    'a year of two digits',
    {
      ...COMMA_LOOK,
      when: (at) => {
        const { d, mo, y } = wall(at)
        return [`${pad(d)}.${pad(mo)}.${pad(y % 100)} ${clock(at)}`]
      },
    },
    { asked: { 'date-order': 'day-first' } },
  ),
  log('month by its English name', {
    when: (at) => {
      const { d, y } = wall(at)
      return [`${pad(d)}-Mar-${y} ${clock(at)}`]
    },
  }),
  log('month by its German name', {
    ...COMMA_LOOK,
    when: (at) => {
      const { d, y } = wall(at)
      return [`${d}. März ${y} ${clock(at)}`]
    },
  }),
  log('digits run together', {
    when: (at) => [`${isoDay(at).replaceAll('-', '')}${clock(at).replaceAll(':', '')}`],
  }),
  log('date and time in two columns', {
    ...COMMA_LOOK,
    header: ['Datum', 'Uhrzeit', ...HEADER.slice(1)],
    when: (at) => [isoDay(at), clock(at)],
  }),
  log('tenths of a second', { when: (at) => [`${isoDay(at)} ${clock(at)}.0`] }),
  log('no seconds', { when: (at) => [`${isoDay(at)} ${clock(at).slice(0, 5)}`] }),
  log('elapsed seconds after a start in the preamble', {
    above: [`Start: 2026-03-02 07:30:00`, 'Rig: B'],
    header: ['elapsed [s]', ...HEADER.slice(1)],
    when: (_at, row) => [String(row.s)],
  }),
  log('elapsed minutes after a start in the preamble', {
    above: [`# Start: 2026-03-02 07:30:00`],
    header: ['elapsed [min]', ...HEADER.slice(1)],
    when: (_at, row) => [(row.s / 60).toFixed(2)],
  }),
  log(
    'elapsed hours, minutes and seconds; the start is asked',
    {
      header: ['elapsed', ...HEADER.slice(1)],
      when: (_at, row) => [
        `${pad(30 + Math.floor(row.s / 3_600))}:${pad(Math.floor(row.s / 60) % 60)}:${pad(row.s % 60)}`,
      ],
    },
    {
      asked: { 'elapsed-start': '2026-03-01T01:30:00+01:00' },
    },
  ),
  log(
    'time of day over midnight, with the date above',
    {
      above: ['Date: 2026-03-01'],
      header: ['time of day', ...HEADER.slice(1)],
      when: (at) => [new Date(at.getTime() + 3_600_000 - 7.6 * 3_600_000).toISOString().slice(11, 19)],
    },
    { times: LOG.map(({ s }) => START_S - 7.6 * 3_600 + s) },
  ),
  log(
    'the hour that comes twice in autumn: the jump back tells',
    {
      when: (_at, row) => {
        // from 00:50 UTC on 25 October 2026 in steps of a minute; Berlin shows 02:50 and then, from 01:00 UTC, 02:00 again
        const minute = 50 + row.s / 60
        return [`2026-10-25 02:${pad(minute % 60)}:00`]
      },
    },
    { times: LOG.map(({ s }) => Date.UTC(2026, 9, 25, 0, 50) / 1_000 + s), problems: [] },
  ),
  log(
    'the hour that comes twice in autumn: nothing tells, so it is asked',
    { when: (_at, row) => [`2026-10-25 02:${pad(10 + row.s / 60)}:00`] },
    {
      asked: { 'ambiguous-hour': 'later' },
      times: LOG.map(({ s }) => Date.UTC(2026, 9, 25, 1, 10) / 1_000 + s),
    },
  ),
  log(
    'the hour that is left out in spring: rows in it are listed',
    {
      when: (_at, row) => [
        `2026-03-29 ${row.s < 600 ? '01:5' + String(row.s / 60) : row.s < 720 ? `02:0${String(row.s / 60 - 10)}` : `03:${pad(row.s / 60 - 12)}`}:00`,
      ],
    },
    {
      ...(() => {
        const rows = LOG.filter((_row, index) => index !== 10 && index !== 11)
        return {
          channels: expectedLog(rows).channels,
          times: rows.map(({ s }) => Date.UTC(2026, 2, 29, 0, 50) / 1_000 + (s < 600 ? s : s - 720 + 600)),
        }
      })(),
      problems: [
        { code: 'bad-date', line: 12 },
        { code: 'bad-date', line: 13 },
      ],
    },
  ),
]

const numbers: Dialect[] = [
  log('exponents with E', { number: (text) => Number(text).toExponential(6).replace('e', 'E') }),
  log('exponents with a comma and E', {
    ...COMMA_LOOK,
    number: (text) => Number(text.replace(',', '.')).toExponential(6).replace('e', 'E').replace('.', ','),
  }),
  log('exponents with D', { number: (text) => Number(text).toExponential(6).replace('e', 'D') }),
  log('a plus before every number', { number: (text) => `+${text}` }),
  log('the long minus sign', {
    ...COMMA_LOOK,
    header: ['time', 'T set [°C]', 'T bed [°C]', 'p in [bar(a)]', 'CO2 flow [NmL/min]', 'valve'],
    rows: LOG.map((row) => ({ ...row, bed: -round(row.bed / 10, 2) })),
    number: (text) => text.replace('-', '\u2212'),
  }),
  ...[
    ['a blank', ' '],
    ['a hard space', '\u00a0'],
    ['a narrow hard space', '\u202f'],
    ['an apostrophe', "'"],
  ].map(([said, mark]) =>
    log(`thousands set apart by ${String(said)}`, {
      ...COMMA_LOOK,
      header: ['time', 'T set [°C]', 'T bed [°C]', 'p in [mbar(a)]', 'CO2 flow [NmL/min]', 'valve'],
      number: (text, column) =>
        column === 'bar'
          ? `${String(Math.round(Number(text.replace(',', '.')) * 1_000))},0`.replace(
              /^(\d)(\d{3})/,
              `$1${String(mark)}$2`,
            )
          : text,
    }),
  ),
  log('thousands set apart by points', {
    ...COMMA_LOOK,
    header: ['time', 'T set [°C]', 'T bed [°C]', 'p in [mbar(a)]', 'CO2 flow [NmL/min]', 'valve'],
    number: (text, column) =>
      column === 'bar'
        ? `${String(Math.round(Number(text.replace(',', '.')) * 1_000))},0`.replace(/^(\d)(\d{3})/, '$1.$2')
        : text,
  }),
  ...['', 'NaN', '----', '#N/A', '-9999', 'n/a', '#DIV/0!'].map((word) =>
    log(
      `a missing value written ${word === '' ? 'as nothing' : word}`,
      { lines: (lines) => replaceCell(lines, 7, 2, word) },
      { channels: missing('bedTemperatureK', 7) },
    ),
  ),
  log('a minus sign alone in a comment column', {
    header: [...HEADER, 'remark'],
    lines: (lines) => lines.map((line, index) => `${line},${index % 2 === 0 ? '-' : 'steady'}`),
  }),
  log(
    'a sensor out of its range',
    { lines: (lines) => replaceCell(lines, 7, 2, 'OVER') },
    { channels: missing('bedTemperatureK', 7), problems: [{ code: 'out-of-range', line: 9 }] },
  ),
  log(
    'a word where a number belongs',
    { lines: (lines) => replaceCell(lines, 7, 2, 'see logbook') },
    { channels: missing('bedTemperatureK', 7), problems: [{ code: 'not-a-number', line: 9 }] },
  ),
  log(
    'a temperature below absolute zero',
    { lines: (lines) => replaceCell(lines, 7, 2, '-300.0') },
    { channels: missing('bedTemperatureK', 7), problems: [{ code: 'out-of-range', line: 9 }] },
  ),
]

const layouts: Dialect[] = [
  log('units in a row of their own', {
    ...COMMA_LOOK,
    header: ['time', 'T set', 'T bed', 'p in', 'CO2 flow', 'valve'],
    units: ['', '°C', '°C', 'bar(a)', 'NmL/min', ''],
  }),
  log('units in round brackets, a row of their own', {
    header: ['time', 'T set', 'T bed', 'p in', 'CO2 flow', 'valve'],
    units: ['', '(°C)', '(°C)', '(bar(a))', '(NmL/min)', ''],
  }),
  log('a preamble of keys and values', {
    above: ['Rig: B', 'Operator: T. Brandt', 'Recipe: 215 to 275', ''],
  }),
  log('a preamble of comments', { above: ['# rig B', '# logged by the rig computer'] }),
  log('a preamble cut into cells', { delimiter: ';', above: ['Rig;B', 'Operator;T. Brandt', ';'] }),
  log(
    'the logger restarted: its header comes again',
    { lines: (lines, { header }) => [...lines.slice(0, 10), header, ...lines.slice(10)] },
    { problems: [{ code: 'repeated-header', line: 12 }] },
  ),
  log(
    'statistics under the last row',
    { lines: (lines) => [...lines, 'Mean,220.0,220.06,1.302,7.215,', 'End of file'] },
    {
      problems: [
        { code: 'footer', line: 26 },
        { code: 'footer', line: 27 },
      ],
    },
  ),
  log(
    'a row with a cell too few',
    { lines: (lines) => lines.map((line, index) => (index === 5 ? line.split(',').slice(0, 4).join(',') : line)) },
    { ...without(5), problems: [{ code: 'ragged-row', line: 7 }] },
  ),
  log(
    'a row with a cell too many',
    { lines: (lines) => lines.map((line, index) => (index === 5 ? `${line},7` : line)) },
    { ...without(5), problems: [{ code: 'ragged-row', line: 7 }] },
  ),
  log(
    'cut off in the middle of the last row',
    {
      lines: (lines) => lines.map((line, index) => (index === 23 ? line.split(',').slice(0, 3).join(',') : line)),
      endsWithBreak: false,
    },
    { ...without(23), problems: [{ code: 'truncated', line: 25 }] },
  ),
  log(
    'a row without its time',
    { lines: (lines) => replaceCell(lines, 6, 0, '') },
    { ...without(6), problems: [{ code: 'bad-date', line: 8 }] },
  ),
  log(
    'two rows with one time',
    { rows: LOG.map((row, index) => (index === 9 ? { ...row, s: 480 } : row)) },
    { problems: [{ code: 'duplicate-time', line: 11 }] },
  ),
  log(
    'rows out of order',
    { lines: (lines) => [...lines.slice(0, 8), ...lines.slice(9, 10), ...lines.slice(8, 9), ...lines.slice(10)] },
    { problems: [{ code: 'time-goes-back', line: 11 }] },
  ),
  log('a column of no use with the name of another', {
    header: [...HEADER.slice(0, 5), 'T bed [°C]', 'valve'],
    lines: (lines) => lines.map((line) => line.replace(/,(bypass|reactor)$/, ',20.0,$1')),
  }),
]

const units: Dialect[] = [
  log('kelvin and kilopascals', {
    header: ['time', 'T set [K]', 'T bed [K]', 'p in [kPa abs]', 'CO2 flow [NmL/min]', 'valve'],
    number: (text, column) =>
      column === 'set' || column === 'bed'
        ? (Number(text) + 273.15).toFixed(2)
        : column === 'bar'
          ? (Number(text) * 100).toFixed(1)
          : text,
  }),
  log(
    'bar without a word on the room: asked',
    { header: ['time', 'T set [°C]', 'T bed [°C]', 'p in [bar]', 'CO2 flow [NmL/min]', 'valve'] },
    { asked: { 'pressure-kind': 'absolute' } },
  ),
  log(
    'gauge pressure on top of the room on record',
    { header: ['time', 'T set [°C]', 'T bed [°C]', 'p in [bar(g)]', 'CO2 flow [NmL/min]', 'valve'] },
    {
      channels: {
        ...expectedLog().channels,
        inletPressurePa: LOG.map(({ bar }) => bar * 1e5 + 101_325),
      },
    },
  ),
  log(
    'millilitres a minute without their state: asked',
    { header: ['time', 'T set [°C]', 'T bed [°C]', 'p in [bar(a)]', 'CO2 flow [mL/min]', 'valve'] },
    { asked: { 'flow-reference': '273.15/101325' } },
  ),
  log('degrees Fahrenheit', {
    header: ['time', 'T set [°F]', 'T bed [°F]', 'p in [bar(a)]', 'CO2 flow [NmL/min]', 'valve'],
    number: (text, column) => (column === 'set' || column === 'bed' ? ((Number(text) * 9) / 5 + 32).toFixed(3) : text),
  }),
]

// ---- analyser tables

const SPECIES = ['H2', 'Ar', 'CO', 'CH4', 'CO2'] as const
const INJECTIONS = Array.from({ length: 8 }, (_, i) => ({
  number: i + 1,
  s: i * 720,
  area: {
    H2: 2_500_000 + 1_000 * i,
    Ar: 76_000 + i,
    CO: i < 2 ? null : 20 + i,
    CH4: i < 2 ? null : 700.5 + i,
    CO2: 146_000.25 - 10 * i,
  } as Readonly<Record<(typeof SPECIES)[number], number | null>>,
}))
const injectionChannels = {
  number: INJECTIONS.map(({ number }) => number),
  ...Object.fromEntries(
    SPECIES.flatMap((species) => [
      [`area.${species}`, INJECTIONS.map(({ area }) => area[species] ?? Number.NaN)],
      [`isCensored.${species}`, INJECTIONS.map(({ area }) => (area[species] === null ? 1 : 0))],
    ]),
  ),
}
const injectionTimes = INJECTIONS.map(({ s }) => START_S + s)
const results = (name: string, text: string, change: Change = {}, encode = utf8): Dialect => ({
  name,
  bytes: encode(text),
  asked: {},
  rigTimeZone: BERLIN,
  kind: 'injections',
  problems: [],
  times: injectionTimes,
  channels: injectionChannels,
  ...change,
})
const at = (s: number) => new Date((START_S + s) * 1_000)
const wide = (delimiter: string, mark: string, absent: string, header: (species: string) => string) =>
  [
    ['Injection', 'Injected at', ...SPECIES.map(header)].join(delimiter),
    ...INJECTIONS.map(({ number, s, area }) =>
      [
        number,
        iso(at(s))[0],
        ...SPECIES.map((species) => (area[species] === null ? absent : String(area[species]).replace('.', mark))),
      ].join(delimiter),
    ),
  ].join('\n') + '\n'
const long = (
  delimiter: string,
  mark: string,
  absent: string | null,
  species: (name: string) => string = (name) => name,
) =>
  [
    ['Injection', 'Injected at', 'Component', 'Ret. time [min]', 'Area', 'Height'].join(delimiter),
    ...INJECTIONS.flatMap(({ number, s, area }) =>
      SPECIES.flatMap((name, index) => {
        const value = area[name]
        if (value === null && absent === null) return []
        return [
          [
            number,
            iso(at(s))[0],
            species(name),
            `1${mark}${String(index)}`,
            value === null ? absent : String(value).replace('.', mark),
            value === null ? '' : `${String(index)}${mark}5`,
          ].join(delimiter),
        ]
      }),
    ),
  ].join('\n') + '\n'

const NAMES: Readonly<Record<string, string>> = {
  H2: 'Hydrogen',
  Ar: 'Argon',
  CO: 'Carbon monoxide',
  CH4: 'Methane',
  CO2: 'Carbon dioxide',
}

const analysers: Dialect[] = [
  results(
    'one row an injection, comma',
    wide(',', '.', '', (name) => `${name} area`),
  ),
  results(
    'one row an injection, semicolon and decimal comma',
    wide(';', ',', 'n.d.', (name) => `${name} area`),
  ),
  results(
    'one row an injection, absent peaks below a limit',
    wide('\t', '.', '< 5', (name) => `Area ${name}`),
  ),
  results('one row a peak, absent peaks left out', long(',', '.', null)),
  results('one row a peak, below the limit of detection', long(';', ',', '< LOD')),
  results(
    'one row a peak, species by their English names',
    long(',', '.', 'n.d.', (name) => NAMES[name] ?? name),
  ),
  results(
    'one row a peak, a peak that nobody knows',
    long(',', '.', null).replace(
      '2,2026-03-02 07:42:00,Ar',
      '2,2026-03-02 07:42:00,unknown peak 3,0.5,99,1\n2,2026-03-02 07:42:00,Ar',
    ),
    { problems: [{ code: 'unknown-species', line: 6 }] },
  ),
  results(
    'one row a peak, one peak twice',
    long(',', '.', null).replace(
      '2,2026-03-02 07:42:00,Ar',
      '2,2026-03-02 07:42:00,H2,0.5,99,1\n2,2026-03-02 07:42:00,Ar',
    ),
    { problems: [{ code: 'duplicate-injection', line: 6 }] },
  ),
  results(
    'composition in per cent: wet or dry is asked',
    [
      'Injection,Injected at,CO2 [%],CH4 [%],Ar [%]',
      ...INJECTIONS.map(
        ({ number, s }) =>
          `${number},${String(iso(at(s))[0])},${(12 - number / 10).toFixed(2)},${(number / 10).toFixed(2)},8.00`,
      ),
    ].join('\n') + '\n',
    {
      asked: { basis: 'dry' },
      channels: {
        'moleFraction.CO2': INJECTIONS.map(({ number }) => (12 - number / 10) / 100),
        'moleFraction.CH4': INJECTIONS.map(({ number }) => number / 1_000),
        'moleFraction.Ar': INJECTIONS.map(() => 0.08),
      },
    },
  ),
]

// ---- workbooks, written part by part so that each oddity is where it is said to be

const SHEET_NS = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main'
const OFFICE = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships'
const column = (index: number) => String.fromCharCode(65 + index)

interface Book {
  readonly rows: readonly (readonly string[])[]
  readonly is1904?: boolean
  readonly hidden?: boolean
}
export const inline = (text: string) =>
  `t="inlineStr"><is><t>${text.replace(/&/g, '&amp;').replace(/</g, '&lt;')}</t></is>`

/** Rows of cells, each given as the attributes and content after the reference. */
export function book({ rows, is1904 = false, hidden = false }: Book): Uint8Array {
  const sheet = (content: readonly (readonly string[])[]) =>
    `<?xml version="1.0" encoding="UTF-8"?><worksheet xmlns="${SHEET_NS}"><sheetData>${content
      .map(
        (cells, r) =>
          `<row r="${r + 1}">${cells.map((cell, c) => (cell === '' ? '' : `<c r="${column(c)}${r + 1}" ${cell}</c>`)).join('')}</row>`,
      )
      .join('')}</sheetData></worksheet>`
  return zipSync(
    {
      '[Content_Types].xml': strToU8(
        '<?xml version="1.0"?><Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types"><Default Extension="xml" ContentType="application/xml"/></Types>',
      ),
      'xl/workbook.xml': strToU8(
        `<?xml version="1.0"?><workbook xmlns="${SHEET_NS}" xmlns:r="${OFFICE}">${is1904 ? '<workbookPr date1904="1"/>' : ''}<sheets>${hidden ? '<sheet name="old" sheetId="2" state="hidden" r:id="r2"/>' : ''}<sheet name="log" sheetId="1" r:id="r1"/></sheets></workbook>`,
      ),
      'xl/_rels/workbook.xml.rels': strToU8(
        `<?xml version="1.0"?><Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship Id="r1" Type="${OFFICE}/worksheet" Target="worksheets/sheet1.xml"/>${hidden ? `<Relationship Id="r2" Type="${OFFICE}/worksheet" Target="worksheets/sheet2.xml"/>` : ''}<Relationship Id="r3" Type="${OFFICE}/styles" Target="styles.xml"/></Relationships>`,
      ),
      'xl/styles.xml': strToU8(
        `<?xml version="1.0"?><styleSheet xmlns="${SHEET_NS}"><numFmts count="1"><numFmt numFmtId="164" formatCode="yyyy\\-mm\\-dd\\ hh:mm:ss"/></numFmts><cellXfs count="2"><xf numFmtId="0"/><xf numFmtId="164" applyNumberFormat="1"/></cellXfs></styleSheet>`,
      ),
      'xl/worksheets/sheet1.xml': strToU8(sheet(rows)),
      ...(hidden ? { 'xl/worksheets/sheet2.xml': strToU8(sheet([[inline('kept'), inline('out')]])) } : {}),
    },
    { level: 6 },
  )
}

/** Days since 1899-12-30 of the wall clock; the 1904 system counts 1462 fewer. */
const serial = (s: number) => (START_S + 3_600 + s) / 86_400 + 25_569
const cellsOf = (row: LogRow, when: string, index: number): string[] => [
  when,
  `><v>${row.set}</v>`,
  `><v>${row.bed}</v>`,
  `><v>${row.bar}</v>`,
  `><v>${row.co2}</v>`,
  row.isBypass || index >= 0 ? inline(row.isBypass ? 'bypass' : 'reactor') : '',
]
const headCells = HEADER.map(inline)
const workbook = (
  name: string,
  make: (row: LogRow, index: number) => string[],
  change: Change = {},
  more: Omit<Book, 'rows'> = {},
  head: readonly (readonly string[])[] = [headCells],
): Dialect => ({
  name,
  bytes: book({ rows: [...head, ...LOG.map(make)], ...more }),
  asked: {},
  rigTimeZone: BERLIN,
  kind: 'rig-log',
  problems: [],
  ...expectedLog(),
  ...change,
})
const dated = (row: LogRow) => `s="1"><v>${serial(row.s)}</v>`

const workbooks: Dialect[] = [
  workbook('workbook, dates as serial numbers', (row, index) => cellsOf(row, dated(row), index)),
  workbook(
    'workbook, dates counted from 1904',
    (row, index) => cellsOf(row, `s="1"><v>${serial(row.s) - 1_462}</v>`, index),
    {},
    { is1904: true },
  ),
  workbook('workbook, ISO dates as the strict form stores them', (row, index) =>
    cellsOf(row, `t="d" s="1"><v>${isoDay(at(row.s))}T${clock(at(row.s))}</v>`, index),
  ),
  workbook('workbook, numbers kept as text with a decimal comma', (row) => [
    inline(String(iso(at(row.s))[0])),
    inline(row.set.toFixed(1).replace('.', ',')),
    inline(row.bed.toFixed(2).replace('.', ',')),
    inline(row.bar.toFixed(3).replace('.', ',')),
    inline(row.co2.toFixed(2).replace('.', ',')),
    inline(row.isBypass ? 'bypass' : 'reactor'),
  ]),
  workbook('workbook, formulas with their last values', (row, index) =>
    cellsOf(row, dated(row), index).map((cell, c) => (c === 2 ? `><f>B${index + 2}+0.1</f><v>${row.bed}</v>` : cell)),
  ),
  workbook(
    'workbook, a formula without its value',
    (row, index) =>
      cellsOf(row, dated(row), index).map((cell, c) => (c === 2 && index === 7 ? `><f>B9+0.1</f>` : cell)),
    { channels: missing('bedTemperatureK', 7), problems: [{ code: 'missing-cached-value', line: 9 }] },
  ),
  workbook(
    'workbook, an error in a cell',
    (row, index) =>
      cellsOf(row, dated(row), index).map((cell, c) => (c === 2 && index === 7 ? `t="e"><v>#DIV/0!</v>` : cell)),
    { channels: missing('bedTemperatureK', 7) },
  ),
  workbook(
    'workbook with a hidden sheet',
    (row, index) => cellsOf(row, dated(row), index),
    { problems: [{ code: 'footer' }] },
    { hidden: true },
  ),
  workbook(
    'workbook, a title and an empty row above the table',
    (row, index) => cellsOf(row, dated(row), index),
    {},
    {},
    [[inline('Rig B, March')], [], headCells],
  ),
]

export const dialects: readonly Dialect[] = [
  ...encodings,
  ...separators,
  ...times,
  ...numbers,
  ...layouts,
  ...units,
  ...analysers,
  ...workbooks,
]
