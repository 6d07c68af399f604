import { unzipSync, strFromU8 } from 'fflate'
import fc from 'fast-check'
import { parse } from 'csv-parse/sync'
import { expect, test } from 'vitest'
import { methodSettingsSchema } from '@/lib/domain/method'
import { type Ranking } from '@/lib/domain/ranking'
import { defuseFormula } from '@/lib/exports/defuse-formula'
import { rankingCsv } from '@/lib/exports/ranking-csv'
import { rankingColumns } from '@/lib/exports/ranking-table'
import { rankingWorkbook } from '@/lib/exports/ranking-workbook'
import { exampleRanking as makeExample } from '@/tests/support/example-ranking'

const SEED = 20_261_201
const exampleRanking = makeExample()
const STARTS = ['=', '+', '-', '@', '\t', '\r', '\n', '＝', '＋', '－', '＠', ' =', '\u00a0=', '']
const hostile = fc
  .tuple(fc.constantFrom(...STARTS), fc.string({ unit: 'grapheme', maxLength: 30 }))
  .map(([start, rest]) => start + rest)

/** The example ranking with other words and numbers in it. */
const withText = (text: string): Ranking => ({
  ...exampleRanking,
  campaignName: text,
  rows: exampleRanking.rows.map((row) => ({ ...row, sampleName: text, remark: text })),
})

// what a spreadsheet program takes for a formula: one of these first, after nothing or after blanks
const wouldRun = (cell: string) => /^[\s\u00a0\u3000]*[=+\-@＝＋－＠]/.test(cell) || /^[\t\r\n]/.test(cell)

test('no text cell of 5,000 is left that a spreadsheet would take for a formula', () => {
  fc.assert(
    fc.property(hostile, (text) => {
      expect(wouldRun(defuseFormula(text.replace(/[\r\n]+/g, ' ')))).toBe(false)
    }),
    { seed: SEED, numRuns: 5_000 },
  )
})

test('the text file reads back: words as they were but for the defusing mark, numbers to the last bit', () => {
  fc.assert(
    fc.property(hostile, (text) => {
      const ranking = withText(text)
      const rows = parse(rankingCsv(ranking), { bom: true, relax_column_count: false }) as string[][]
      const columns = rankingColumns(ranking)
      expect(rows).toHaveLength(ranking.rows.length + 1)
      ranking.rows.forEach((row, i) =>
        columns.forEach((column, j) => {
          const value = column.value(row)
          const cell = rows[i + 1]?.[j] ?? ''
          if (typeof value === 'number') expect(Number(cell)).toBe(value)
          else if (value === null) expect(cell).toBe('')
          else {
            expect(wouldRun(cell)).toBe(false)
            expect(cell.replace(/^'/, '')).toBe(value.replace(/[\r\n]+/g, ' ').replace(/^'/, ''))
          }
        }),
      )
    }),
    { seed: SEED, numRuns: 100 },
  )
})

test('the workbook holds no formula cell, and its numbers are numbers', async () => {
  await fc.assert(
    fc.asyncProperty(hostile, async (text) => {
      const files = unzipSync(new Uint8Array(await rankingWorkbook(withText(text), methodSettingsSchema.parse({}))))
      const sheets = Object.keys(files).filter((name) => /^xl\/worksheets\/sheet\d+\.xml$/.test(name))
      expect(sheets).toHaveLength(2)
      for (const name of sheets) expect(strFromU8(files[name] ?? new Uint8Array())).not.toMatch(/<f[\s>]/)
    }),
    { seed: SEED, numRuns: 40 },
  )
  const files = unzipSync(new Uint8Array(await rankingWorkbook(exampleRanking, methodSettingsSchema.parse({}))))
  const sheet = strFromU8(files['xl/worksheets/sheet1.xml'] ?? new Uint8Array())
  const energy = exampleRanking.rows[0]?.activationEnergyJPerMol?.value ?? Number.NaN
  const values = [...sheet.matchAll(/<v>([^<]+)<\/v>/g)].map((found) => Number(found[1]))
  expect(values).toContain(energy * 1e-3)
})

test('every computed column of the file has its standard uncertainty and both ends of its interval beside it, with units', () => {
  const columns = rankingColumns({ ...exampleRanking, targetConversion: 0.02 })
  const row = exampleRanking.rows[0]
  if (row === undefined) throw new Error('the example has rows')
  const value = (header: string) => columns.find((column) => column.header === header)?.value(row)
  for (const [name, unit, difference] of [
    ['Turnover frequency at 250 °C, feed composition', 's⁻¹', 's⁻¹'],
    ['Rate at 250 °C, feed composition', 'µmol g⁻¹ s⁻¹', 'µmol g⁻¹ s⁻¹'],
    ['Apparent activation energy', 'kJ mol⁻¹', 'kJ mol⁻¹'],
    ['ln A of the rate', 'A in mol kg⁻¹ s⁻¹', 'A in mol kg⁻¹ s⁻¹'],
    ['Temperature for a conversion of 2 %', '°C', 'K'],
    ['Carbon selectivity to CH4 at a conversion of 2 %', 'C-mol %', 'C-mol %'],
    ['Carbon out over carbon in', 'mol mol⁻¹', 'mol mol⁻¹'],
    ['Loss of activity on stream', '% h⁻¹', '% h⁻¹'],
  ] as const) {
    const [low, middle, high] = [`, 95 % interval, low [${unit}]`, ` [${unit}]`, `, 95 % interval, high [${unit}]`].map(
      (end) => Number(value(`${name}${end}`)),
    )
    expect(low, name).toBeLessThan(middle ?? NaN)
    expect(middle, name).toBeLessThan(high ?? NaN)
    expect(Number(value(`${name}, standard uncertainty [${difference}]`)), name).toBeGreaterThan(0)
  }
  // 530.2 K, from 528.2 to 532.2; own part 0.6 K and thermocouple 0.5 K
  expect(value('Temperature for a conversion of 2 % [°C]')).toBeCloseTo(257.05, 9)
  expect(value('Temperature for a conversion of 2 %, 95 % interval, low [°C]')).toBeCloseTo(255.05, 9)
  expect(value('Temperature for a conversion of 2 %, standard uncertainty [K]')).toBeCloseTo(Math.sqrt(0.61), 12)
})
