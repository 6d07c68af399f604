import { rmSync } from 'node:fs'
import { afterAll, beforeAll, expect, test, vi } from 'vitest'
import { type OpenDatabase } from '@/db/client'
import type * as rigMutations from '@/db/mutations/rigs'
import { addCalibrationFiles } from '@/lib/access/calibration-files'
import { listCalibrations } from '@/lib/access/calibrations'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'
import { refusalOf, trail } from '@/tests/support/trail'

const dataDir = await vi.hoisted(async () => {
  const { mkdtempSync } = await import('node:fs')
  const { tmpdir } = await import('node:os')
  process.env.DATA_DIR = mkdtempSync(`${tmpdir()}/ik-calibrations-`)
  return process.env.DATA_DIR
})
/** The database gives way at this calibration. */
const fault = vi.hoisted(() => ({ atName: '' }))
vi.mock('@/db/mutations/rigs', async (original) => {
  const real = await original<typeof rigMutations>()
  return {
    ...real,
    insertCalibration: (...given: Parameters<typeof real.insertCalibration>) => {
      if (given[1].name === fault.atName) throw new Error('the disk is gone')
      return real.insertCalibration(...given)
    },
  }
})

let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
})
afterAll(async () => {
  await opened.close()
  rmSync(dataDir, { recursive: true, force: true })
})

const GOOD = 'species,mole fraction per area count\nCO2,8.1e-7\nCH4,7.6e-7\n'
const request = (files: Readonly<Record<string, string>>) => {
  const form = new FormData()
  for (const [name, text] of Object.entries(files))
    form.append('file', new File([text], name, { type: 'application/octet-stream' }))
  return new Request('http://localhost:3000/api/v1/calibrations/files', { method: 'POST', body: form })
}
const add = (files: Readonly<Record<string, string>>) =>
  addCalibrationFiles(lab.own.actor('technician'), request(files), {
    convention: null,
    validFrom: '2026-01-01T00:00:00Z',
    validTo: null,
    rigId: lab.rig.id,
    instrument: 'GC',
    relativeStandardUncertainty: 0.01,
  })
const names = async () => (await listCalibrations(lab.own.lead)).map(({ name }) => name).sort()

test('two tables in one request become two calibrations, each with its entry in the history', async () => {
  const before = (await trail()).length
  const made = await add({ 'spring.csv': GOOD, 'autumn.csv': GOOD.replace('8.1', '8.3') })
  expect(made.map(({ name, entries }) => [name, entries.length])).toEqual([
    ['spring', 2],
    ['autumn', 2],
  ])
  expect((await trail()).length - before).toBe(2)
})

test.each([
  ['the second table has a fault', { 'first.csv': GOOD, 'second.csv': GOOD.replace('7.6e-7', 'none') }],
  ['the first table has a fault', { 'first.csv': GOOD.replace('7.6e-7', 'none'), 'second.csv': GOOD }],
  [
    'the second does not say what its numbers are',
    { 'first.csv': GOOD, 'second.csv': 'species,value\nCO2,8.1e-7\nAr,1e-6\n' },
  ],
] as const)('%s: neither is kept', async (_name, files) => {
  const before = [await names(), (await trail()).length]
  expect(await refusalOf(add(files))).toMatchObject({ code: 'unprocessable' })
  expect([await names(), (await trail()).length]).toEqual(before)
})

test('the database gives way in the second: neither is kept', async () => {
  fault.atName = 'second'
  const before = [await names(), (await trail()).length]
  await expect(add({ 'first.csv': GOOD, 'second.csv': GOOD.replace('8.1', '8.2') })).rejects.toThrow('the disk is gone')
  expect([await names(), (await trail()).length]).toEqual(before)
})
