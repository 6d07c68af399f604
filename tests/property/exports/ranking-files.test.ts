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
