import { readFileSync } from 'node:fs'
import path from 'node:path'
import { zipSync, strToU8, type Zippable } from 'fflate'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { problemSchema } from '@/lib/domain/intake'
import { cleanFileName } from '@/lib/uploads/clean-file-name'
import { detectFile, readFile } from '@/lib/uploads/read-file'

// Damaged files of every family: each is answered with problems or rows, never with a throw, and none keeps the reader busy.

const FILES = path.resolve(import.meta.dirname, '../../../db/demo/files')
const chromatogram = (name: string) =>
  new Uint8Array(readFileSync(path.resolve(import.meta.dirname, '../../fixtures/chromatograms', name)))
const CONTEXT = { rigTimeZone: 'UTC', barometerPa: 101_325, species: ['CO2', 'H2', 'CH4', 'CO', 'Ar', 'N2'] }
const LONGEST_MS = 5_000

const seedFiles = {
  'delimited text': [
    'R-0001-rig.csv',
    'R-0005-rig.csv',
    'R-0002-rig.txt',
    'R-0005-analysis.csv',
    'R-0001-analysis.csv',
  ].map((name) => new Uint8Array(readFileSync(path.join(FILES, name))).slice(0, 24_000)),
  workbook: ['R-0002-analysis.xlsx', 'R-0008-analysis.xlsx'].map(
    (name) => new Uint8Array(readFileSync(path.join(FILES, name))),
  ),
  chromatogram: [chromatogram('R-0001_001.cdf'), chromatogram('R-0001_012.cdf')],
  'set of chromatograms': [
    zipSync({ 'a.cdf': chromatogram('R-0001_001.cdf'), 'b.cdf': chromatogram('R-0001_012.cdf') }, { level: 0 }),
  ],
} as const

/** Bytes flipped, cut off, doubled, zeroed or replaced by marks that mean something to a reader. */
const damage = fc.array(
  fc.record({
    kind: fc.constantFrom('flip', 'cut', 'repeat', 'zero', 'mark'),
    at: fc.double({ min: 0, max: 1, noNaN: true }),
    count: fc.integer({ min: 1, max: 400 }),
    value: fc.integer({ min: 0, max: 255 }),
  }),
  { minLength: 1, maxLength: 6 },
)
const MARKS = [
  '"',
  ';',
  ',',
  '\t',
  '\n',
  '\r',
  '\0',
  '=',
  '\u2212',
  ';;;;',
  '""',
  '#',
  '1e999',
  'NaN',
  '__proto__',
].map((mark) => strToU8(mark))

function damaged(
  bytes: Uint8Array,
  changes: readonly { kind: string; at: number; count: number; value: number }[],
): Uint8Array {
  let result = bytes
  for (const { kind, at, count, value } of changes) {
    const place = Math.floor(at * result.length)
    if (kind === 'cut') result = result.slice(0, place)
    else if (kind === 'repeat')
      result = new Uint8Array([
        ...result.slice(0, place),
        ...result.slice(Math.max(0, place - count), place),
        ...result.slice(place),
      ])
    else if (kind === 'mark')
      result = new Uint8Array([
        ...result.slice(0, place),
        ...(MARKS[value % MARKS.length] ?? []),
        ...result.slice(place),
      ])
    else {
      result = result.slice()
      for (let i = place; i < Math.min(result.length, place + (kind === 'zero' ? count : 1)); i++)
        result[i] = kind === 'zero' ? 0 : value
    }
  }
  return result
}

async function answerOf(bytes: Uint8Array): Promise<void> {
  const from = performance.now()
  const { detections, problems } = await detectFile(bytes, CONTEXT)
  problemSchema.array().parse(problems)
  if (detections.length === 0) expect(problems.length).toBeGreaterThan(0)
  const first = detections[0]
  if (first !== undefined) {
    const reading = await readFile(bytes, first.proposal, CONTEXT)
    problemSchema.array().parse(reading.problems)
    for (const channel of reading.channels) expect(channel.values).toHaveLength(reading.rowCount)
  }
  expect(performance.now() - from).toBeLessThan(LONGEST_MS)
  expect(Object.keys(Object.prototype)).toEqual([])
}

describe('a damaged file is answered, never thrown at', () => {
  test.each(Object.keys(seedFiles) as (keyof typeof seedFiles)[])(
    '%s, 200 files',
    { timeout: 300_000 },
    async (family) => {
      await fc.assert(
        fc.asyncProperty(fc.constantFrom(...seedFiles[family]), damage, async (bytes, changes) =>
          answerOf(damaged(bytes, changes)),
        ),
        { numRuns: Number(process.env['FUZZ_RUNS'] ?? 200) },
      )
    },
  )

  test('noise', { timeout: 120_000 }, async () => {
    await fc.assert(fc.asyncProperty(fc.uint8Array({ minLength: 1, maxLength: 4_000 }), answerOf), { numRuns: 200 })
  })
})

describe('a bomb is refused early', () => {
  const zip = (files: Zippable) => zipSync(files, { level: 9 })
  const workbook = (sheet: Uint8Array, more: Zippable = {}) =>
    zip({
      '[Content_Types].xml': strToU8('<Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types"/>'),
      'xl/workbook.xml': strToU8(
        '<workbook xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main" xmlns:r="http://schemas.openxmlformats.org/officeDocument/2006/relationships"><sheets><sheet name="a" sheetId="1" r:id="r1"/></sheets></workbook>',
      ),
      'xl/_rels/workbook.xml.rels': strToU8(
        '<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship Id="r1" Type="http://schemas.openxmlformats.org/officeDocument/2006/relationships/worksheet" Target="worksheets/sheet1.xml"/></Relationships>',
      ),
      'xl/worksheets/sheet1.xml': sheet,
      ...more,
    })
  const refused = async (bytes: Uint8Array) => {
    const from = performance.now()
    const { detections, problems } = await detectFile(bytes, CONTEXT)
    expect(detections).toEqual([])
    expect(problems.some((one) => one.severity === 'fatal')).toBe(true)
    expect(performance.now() - from).toBeLessThan(LONGEST_MS)
  }

  test('a sheet that swells a thousandfold', async () => refused(workbook(new Uint8Array(200_000_000))))
  test('more entries than any workbook has', async () =>
    refused(
      workbook(
        strToU8('<worksheet/>'),
        Object.fromEntries(Array.from({ length: 5_000 }, (_, i) => [`xl/media/${i}.txt`, strToU8('x')])),
      ),
    ))
  test('entities that multiply', async () =>
    refused(
      workbook(
        strToU8(
          `<?xml version="1.0"?><!DOCTYPE w [<!ENTITY a "aaaaaaaaaa">${Array.from({ length: 9 }, (_, i) => `<!ENTITY ${'bcdefghij'[i]} "${`&${'abcdefghi'[i]};`.repeat(10)}">`).join('')}]><worksheet>&j;</worksheet>`,
        ),
      ),
    ))
})

test('1,000 hostile file names are names only', () => {
  const hostile = fc.tuple(
    fc.constantFrom('../', '..\\', '/etc/', 'C:\\', '\0', '\u202e', '.', '..', '__proto__', 'CON', '%2e%2e/', ''),
    fc.string({ unit: 'binary', maxLength: 300 }),
  )
  fc.assert(
    fc.property(hostile, ([start, rest]) => {
      const name = cleanFileName(start + rest)
      expect(name).not.toMatch(/[/\\\0\u202a-\u202e]/)
      expect(['', '.', '..']).not.toContain(name)
      expect(Buffer.byteLength(name)).toBeLessThanOrEqual(200)
    }),
    { numRuns: 1_000 },
  )
})
