import { readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, test } from 'vitest'
import { conventionOf, readResponseFactors } from '@/lib/uploads/read-response-factors'
import { book, inline } from '@/tests/support/dialects'

const bytes = (...lines: readonly string[]) => new TextEncoder().encode(`${lines.join('\n')}\n`)
const HEAD = 'species;mole fraction per area count;relative standard uncertainty'

async function read(...lines: readonly string[]) {
  const { table, refusal } = await readResponseFactors(bytes(...lines))
  if (table === null) throw new Error(refusal)
  return table
}
async function refusal(...lines: readonly string[]): Promise<string | null> {
  return (await readResponseFactors(bytes(...lines))).refusal
}

const SPECIES =
  `H2 N2 Ar He Ne O2 CO CO2 H2O CH4 C2H2 C2H4 C2H6 C3H6 C3H8 C4H10 CH3OH C2H5OH CH3OCH3 HCHO HCOOH NH3 C6H6 C5H12`.split(
    ' ',
  )

describe('every row of a table is read', () => {
  test('24 species as text', async () => {
    const { entries, convention } = await read(
      'species,mole fraction per area count',
      ...SPECIES.map((species, index) => `${species},${index + 1}e-7`),
    )
    expect(convention).toBe('factor')
    expect(entries.map(({ species }) => species)).toEqual(SPECIES)
    expect(entries.map(({ value }) => value)).toEqual(SPECIES.map((_species, index) => Number(`${index + 1}e-7`)))
  })

  test('24 species in a workbook, whose numbers are stored as numbers', async () => {
    const { table } = await readResponseFactors(
      book({
        rows: [
          [inline('Calibration of May')],
          [inline('species'), inline('area count per mole fraction'), inline('RSD [%]')],
          ...SPECIES.map((species, index) => [inline(species), `><v>${index + 1}000000</v>`, '><v>1.5</v>']),
        ],
      }),
    )
    expect(table?.convention).toBe('sensitivity')
    expect(table?.entries.map(({ species, value }) => [species, value])).toEqual(
      SPECIES.map((species, index) => [species, (index + 1) * 1e6]),
    )
    expect(new Set(table?.entries.map((entry) => entry.relativeStandardUncertainty))).toEqual(new Set([0.015]))
  })

  test('the table of the demo campaign', async () => {
    const { table } = await readResponseFactors(
      new Uint8Array(readFileSync(path.join(process.cwd(), 'db/demo/files/response-factors.csv'))),
    )
    expect(table?.entries.map(({ species, value }) => [species, value])).toEqual([
      ['H2', 2.4e-7],
      ['Ar', 1.05e-6],
      ['N2', 9.8e-7],
      ['CO', 9.6e-7],
      ['CH4', 7.6e-7],
      ['CO2', 8.1e-7],
    ])
  })

  test('decimal commas, names for formulas, a preamble, a comment, a formula no list has', async () => {
    const { entries } = await read(
      'Instrument;GC 2',
      '',
      HEAD,
      'Kohlendioxid;8,1E-07;0,02',
      '# the next one by another cylinder',
      'n-C5H12;1,050;0,015',
    )
    expect(entries).toEqual([
      {
        species: 'CO2',
        value: 8.1e-7,
        unit: 'mole fraction per area count',
        relativeStandardUncertainty: 0.02,
        absoluteStandardUncertainty: null,
      },
      {
        species: 'n-C5H12',
        value: 1.05,
        unit: 'mole fraction per area count',
        relativeStandardUncertainty: 0.015,
        absoluteStandardUncertainty: null,
      },
    ])
  })

  test('the column of factors is told from other numbers by its header', async () => {
    const { entries } = await read(
      'species;retention time (min);mole fraction per area count',
      'H2;1.20;2.4e-7',
      'Ar;3.1;1e-6',
    )
    expect(entries.map(({ value }) => value)).toEqual([2.4e-7, 1e-6])
  })
})

describe('an uncertainty', () => {
  test.each(['', 'n.d.', 'NaN', '----', '-9999', 'n/a'])('is not stated where the cell is “%s”', async (cell) => {
    const { entries } = await read(HEAD, 'H2;2.4e-7;0.01', `CO2;8.1e-7;${cell}`)
    expect(entries.map((entry) => entry.relativeStandardUncertainty)).toEqual([0.01, null])
  })

  test('in the unit of the factor is absolute', async () => {
    const { entries } = await read('species;factor;absolute standard uncertainty', 'H2;2.4e-7;3e-9')
    expect(entries[0]).toMatchObject({ relativeStandardUncertainty: null, absoluteStandardUncertainty: 3e-9 })
  })

  test('that is unreadable is refused with row, species, column, text and what was expected', async () => {
    // the preamble and the empty line count: the bad cell stands in the sixth line of the file
    expect(await refusal('Instrument;GC 2;', '', HEAD, 'H2;2.4e-7;0.01', '', 'CO2;8.1e-7;about two')).toBe(
      'Row 6, CO2, column “relative standard uncertainty”: “about two” is not a number. Expected a standard uncertainty above zero, such as 0.02, or an empty cell where none is stated.',
    )
  })

  test.each(['-0.01', '0', '−0.02'])('of %s is refused', async (cell) => {
    expect(await refusal(HEAD, 'H2;2.4e-7;0.01', `CO2;8.1e-7;${cell}`)).toContain(
      `Row 3, CO2, column “relative standard uncertainty”: “${cell}” is not above zero. Expected`,
    )
  })

  test('of less than a limit, of more than 200 %, expanded, or of no said kind is refused', async () => {
    expect(await refusal(HEAD, 'CO2;8.1e-7;<0.01')).toContain(
      'Row 2, CO2, column “relative standard uncertainty”: “<0.01” is not',
    )
    expect(await refusal(HEAD, 'CO2;8.1e-7;2.5')).toContain('“2.5” would be more than 200 % of the factor')
    expect(await refusal('species;factor;expanded uncertainty (k = 2)', 'CO2;8.1e-7;0.04')).toContain('coverage factor')
    expect(await refusal('species;factor;std. uncertainty', 'CO2;8.1e-7;0.04')).toContain('does not say whether')
    expect(await refusal('species;factor;RSD;u_r', 'CO2;8.1e-7;0.04;0.02')).toContain('More than one column')
  })
})

describe('a table is refused whole', () => {
  test.each([
    ['abc', '“abc” is not a number'],
    ['', 'the cell is empty'],
    ['0', '“0” is not above zero'],
    ['-2e-7', '“-2e-7” is not above zero'],
    ['1,234', '“1,234” can mean 1.234 or 1234; write one of these'],
  ])('for the factor “%s”, also in its first row', async (cell, said) => {
    const head = 'species;mole fraction per area count'
    const sentence = (row: number) =>
      `Row ${row}, CO2, column “mole fraction per area count”: ${said}. Expected a response factor above zero, such as 8.1e-7.`
    expect(await refusal(head, `CO2;${cell}`, 'H2;2', 'Ar;1')).toBe(sentence(2))
    expect(await refusal(head, 'H2;2', 'Ar;1', `CO2;${cell}`)).toBe(sentence(4))
  })

  test('for a species that stands twice, by whatever name', async () => {
    expect(await refusal(HEAD, 'CO2;8.1e-7;', 'H2;2.4e-7;', 'carbon dioxide;8.2e-7;')).toBe(
      'Row 4: CO2 stands in row 2 already. Expected one row a species; a second detector has a table of its own.',
    )
  })

  test.each([
    [['CO2;8.1e-7;', 'Tally;3;', 'H2;2.4e-7;'], 3, 'Tally'],
    [['Tally;3;', 'CO2;8.1e-7;', 'H2;2.4e-7;'], 2, 'Tally'],
    [['CO2;8.1e-7;', 'H2;2.4e-7;', 'Measured by A. B.;;'], 4, 'Measured by A. B.'],
  ])('for a row that is no species: %j', async (lines, row, text) => {
    expect(await refusal(HEAD, ...lines)).toBe(
      `Row ${row}, column “species”: “${text}” is no species. Expected a formula such as CO2 or C5H12; take out rows that are no species.`,
    )
  })

  test('for a row that a decimal comma has cut in two, and for one with too few cells', async () => {
    expect(await refusal('species,factor', 'H2,2.4', 'CO2,8,1', 'Ar,1.5')).toContain(
      'row 3 has 3 cells where the header has 2',
    )
    expect(await refusal(HEAD, 'H2;2.4e-7;0.01', 'Ar;1e-6;0.01', 'CO2;8.1e-7')).toContain(
      'row 4 has 2 cells where the header has 3',
    )
  })

  test('for two columns that could both be the factors', async () => {
    expect(await refusal('species;retention;area', 'H2;1.2;3', 'Ar;3.1;4')).toContain(
      'More than one column can be the response factors: column “retention”, column “area”.',
    )
  })

  test('for being no table of species, no text, or empty', async () => {
    expect(await refusal('time;temperature', '1;2', '2;3')).toContain('No column holds species.')
    expect((await readResponseFactors(new Uint8Array([0x25, 0x50, 0x44, 0x46, 0x2d]))).refusal).toContain('a PDF')
    expect((await readResponseFactors(new Uint8Array())).refusal).toBe('The file has no bytes.')
  })
})

test.each([
  ['mole fraction per area count', 'factor'],
  ['area count per mole fraction', 'sensitivity'],
  ['response factor', null],
] as const)('“%s” is %s', (header, convention) => expect(conventionOf(header)).toBe(convention))
