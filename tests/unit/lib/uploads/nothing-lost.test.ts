import { strToU8 } from 'fflate'
import { describe, expect, test } from 'vitest'
import { type ColumnMapSpecification } from '@/lib/domain/column-map'
import { answerQuestions } from '@/lib/uploads/column-map/answer-question'
import { detectFile, readFile } from '@/lib/uploads/read-file'
import { packWorkbook, type PackedCell } from '@/tests/support/pack-workbook'

/* What is not read of a file is said, with its line; nothing is left out in silence. */

const CONTEXT = { rigTimeZone: 'UTC', barometerPa: 101_325, species: ['CO2', 'H2', 'CH4'] }
const bytesOf = (...lines: readonly string[]) => strToU8(`${lines.join('\n')}\n`)

async function read(bytes: Uint8Array, change: Partial<ColumnMapSpecification> = {}) {
  const found = await detectFile(bytes, CONTEXT)
  const detection = found.detections[0]
  if (detection === undefined) throw new Error(found.problems[0]?.sentence)
  const reading = await readFile(bytes, { ...detection.proposal, ...change }, CONTEXT)
  return {
    headers: detection.headers,
    seen: detection.rowCount,
    rowCount: reading.rowCount,
    problems: reading.problems.map(({ code, line }) => [code, line]),
    detected: found.problems.map(({ code, found: text }) => [code, text]),
    sentences: reading.problems.map(({ sentence }) => sentence),
    values: (name: string) => [...(reading.channels.find((one) => one.name === name)?.values ?? [])],
  }
}

describe('rows of a log', () => {
  const HEAD = 'time;T bed [°C];T wall [°C]'
  const row = (minute: number, bed = '451.5') => `2026-03-02 07:${String(minute).padStart(2, '0')}:00;${bed};460`
  const good = Array.from({ length: 12 }, (_, index) => row(index + 20))

  test.each([
    ['its temperature', [row(10, 'ERR7')], [['not-a-number', 2]], 13],
    ['its time', ['x;451.5;460'], [['bad-date', 2]], 12],
    ['two cells', ['x;y;460', row(11)], [['bad-date', 2]], 13],
    [
      'the same in two rows',
      [row(10, 'ERR7'), row(11, 'ERR8')],
      [
        ['not-a-number', 2],
        ['not-a-number', 3],
      ],
      14,
    ],
  ])(
    'a first row that is faulty in %s is a row, and the header stays the header',
    async (_name, first, problems, count) => {
      const { headers, ...reading } = await read(bytesOf(HEAD, ...first, ...good))
      expect(headers).toEqual(['time', 'T bed [°C]', 'T wall [°C]'])
      expect([reading.problems, reading.rowCount]).toEqual([problems, count])
    },
  )

  test('a faulty first row under a row of units', async () => {
    const { headers, problems, rowCount } = await read(
      bytesOf('time;T bed;T wall', 'hh:mm:ss;°C;°C', row(10, 'ERR7'), ...good),
    )
    expect(headers).toEqual(['time [hh:mm:ss]', 'T bed [°C]', 'T wall [°C]'])
    expect([problems, rowCount]).toEqual([[['not-a-number', 3]], 13])
  })

  test('a preamble with numbers is no row', async () => {
    const { problems, rowCount } = await read(bytesOf('Rig;B;2', 'Tube;8;mm', HEAD, ...good))
    expect([problems, rowCount]).toEqual([[], 12])
  })

  test('a row that begins with the error of a spreadsheet cell is no comment', async () => {
    const { problems, rowCount } = await read(bytesOf(HEAD, ...good, '#N/A;450.1;459', row(50)))
    expect([problems, rowCount]).toEqual([[['bad-date', 14]], 13])
  })

  test('a row that somebody marked as a comment is passed over and said; a comment of words is not', async () => {
    const { problems, rowCount } = await read(bytesOf(HEAD, ...good, `# ${row(49)}`, '# gas changed here', row(50)))
    expect([problems, rowCount]).toEqual([[['footer', 14]], 13])
  })
})

describe('what is counted or told apart', () => {
  const at = (minute: number) => `2026-03-02 07:${minute}:00`

  test('an injection without a readable number is counted by its place, and that is said', async () => {
    const wide = await read(
      bytesOf(
        'Injection No.;time;Area CO2;Area H2',
        `1;${at(10)};100;200`,
        `no. 2;${at(20)};101;201`,
        `-9999;${at(30)};102;202`,
        `4;${at(40)};103;203`,
      ),
    )
    expect(wide.values('number')).toEqual([1, 2, 3, 4])
    expect(wide.problems).toEqual([
      ['not-a-number', 3],
      ['not-a-number', 4],
    ])
    expect(wide.sentences[0]).toBe(
      'Line 3, “Injection No.”: “no. 2” is not the number of an injection. It is counted by its place, as 2.',
    )
    const peak = (number: string, minute: number, species: string, area: number) =>
      `${number};${at(minute)};${species};${area}`
    const long = await read(
      bytesOf(
        'Injection No.;time;Component;Area',
        ...[
          peak('1', 10, 'CO2', 100),
          peak('1', 10, 'H2', 200),
          peak('x', 20, 'CO2', 101),
          peak('x', 20, 'H2', 201),
          peak('3', 30, 'CO2', 102),
          peak('3', 30, 'H2', 202),
        ],
      ),
    )
    expect(long.values('number')).toEqual([1, 2, 3])
    // once for the injection, in the line of its first peak
    expect(long.problems).toEqual([['not-a-number', 4]])
  })

  test('a table without a column of injection numbers is counted by place without a word', async () => {
    const { values, problems } = await read(bytesOf('time;Area CO2;Area H2', `${at(10)};100;200`, `${at(20)};101;201`))
    expect([values('number'), problems]).toEqual([[1, 2], []])
  })

  test('a valve that says nothing is not in the reactor’s position', async () => {
    const { values } = await read(
      bytesOf(
        'time;T bed [°C];valve',
        `${at(10)};450;bypass`,
        `${at(20)};450;reactor`,
        `${at(30)};450;n/a`,
        `${at(40)};450;`,
        `${at(50)};450;reactor`,
      ),
    )
    expect(values('isBypass')).toEqual([1, 0, Number.NaN, Number.NaN, 0])
  })

  test('a start too long for a date is no answer; cut, it would lose its offset', async () => {
    const { detections } = await detectFile(bytesOf('elapsed [s];T bed [°C]', '0;450', '10;451', '20;452'), CONTEXT)
    const detection = detections[0]
    if (detection === undefined) throw new Error('no table')
    const started = (start: string) =>
      answerQuestions(detection.proposal, detection.facts, { 'elapsed-start': start }).specification.elapsedStart
    expect(started(' 2026-03-02T07:30:00+01:00 ')).toBe('2026-03-02T07:30:00+01:00')
    expect(started('2026-03-02 07:30:00.000000000000000000000 +01:00')).toBeNull()
  })
})

describe('sheets of a workbook', () => {
  const head = ['time', 'T bed [°C]', 'T wall [°C]']
  const rows = (day: number) => Array.from({ length: 8 }, (_, index) => [`2026-03-0${day} 07:0${index}:00`, 451.5, 460])

  test('a second table is not read and that is said, at the look and at the reading', async () => {
    const { rowCount, detected, sentences } = await read(
      packWorkbook([
        ['log', [head, ...rows(2)]],
        ['log (2)', [head, ...rows(3)]],
        ['notes', [['by A. B.']]],
      ]),
    )
    expect(rowCount).toBe(8)
    expect(detected).toEqual([['footer', 'a table on sheet “log (2)”']])
    expect(sentences).toEqual([
      'Sheet “log (2)” holds a table too and was not read; “log” was. To have it read as well, save that sheet as a file of its own and add it.',
    ])
  })

  const refusal = async (bytes: Uint8Array) => (await detectFile(bytes, CONTEXT)).problems[0]?.sentence

  test('a cell that names a text which is not there is a damaged file, not an empty cell', async () => {
    const shared = (number: number) => ({ raw: `t="s"><v>${number}</v>` })
    const book = (number: number) =>
      packWorkbook([['log', [head, ...rows(2), [shared(0), 451.5, shared(number)]]]], ['2026-03-02 07:30:00', '461'])
    expect((await read(book(1))).values('wallTemperatureK').at(-1)).toBeCloseTo(461 + 273.15, 9)
    const { sentences } = await read(book(2))
    expect(sentences).toEqual([
      'Sheet “log”, cell C10 names a text that the workbook does not hold: the file is damaged. Open it in the spreadsheet program, save it and add it again.',
    ])
  })

  test('a sheet that is listed and not there, and more sheets than are read, are refused', async () => {
    expect(
      await refusal(
        packWorkbook([
          ['log', [head, ...rows(2)]],
          ['gone', []],
        ]),
      ),
    ).toContain('The workbook lists the sheet “gone” and does not hold it')
    const many = Array.from({ length: 65 }, (_, index) => [`s${index}`, [head, ...rows(2)]] as const)
    expect(await refusal(packWorkbook(many))).toContain('The workbook has more than 64 sheets.')
    expect((await detectFile(packWorkbook(many.slice(1)), CONTEXT)).detections).toHaveLength(64)
  })

  test('a text that is cut is said, inline and shared', async () => {
    const long = 'x'.repeat(4_097)
    const withNote = (note: PackedCell) =>
      packWorkbook([['log', [[...head, 'note'], ...rows(2), ['2026-03-02 07:30:00', 452, 461, note]]]], [long])
    for (const note of [long, { raw: 't="s"><v>0</v>' }]) {
      const { rowCount, problems, sentences } = await read(withNote(note))
      expect([rowCount, problems]).toEqual([9, [['limit-reached', 10]]])
      expect(sentences[0]).toContain('cell D10 holds more than 4,096 characters')
    }
    expect((await read(withNote('x'.repeat(4_096)))).problems).toEqual([])
  })
})
