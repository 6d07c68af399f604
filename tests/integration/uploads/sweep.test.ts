import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, rmSync, utimesSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, expect, test, vi } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { insertUpload } from '@/db/mutations/uploads'
import { selectUploads } from '@/db/queries/uploads'
import { sweepStoredFiles } from '@/lib/access/sweep-files'
import { resumeReadings } from '@/lib/access/uploads'
import { pathOf } from '@/lib/storage/file-store'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeRun } from '@/tests/support/make-run'

const dataDir = await vi.hoisted(async () => {
  const { mkdtempSync } = await import('node:fs')
  const { tmpdir } = await import('node:os')
  process.env.DATA_DIR = mkdtempSync(`${tmpdir()}/ik-sweep-`)
  return process.env.DATA_DIR
})

let opened: OpenDatabase
beforeAll(async () => {
  opened = await freshDatabase()
})
afterAll(async () => {
  await opened.close()
  rmSync(dataDir, { recursive: true, force: true })
})

const hashOf = (text: string) => createHash('sha256').update(text).digest('hex')

function store(text: string, ageS: number): string {
  const sha256 = hashOf(text)
  const file = pathOf(sha256)
  mkdirSync(path.dirname(file), { recursive: true })
  writeFileSync(file, text)
  const then = Date.now() / 1000 - ageS
  utimesSync(file, then, then)
  return sha256
}

test('what no record names goes, what one names stays, and a record without its file is told', async () => {
  const run = await makeRun(await getDatabase(), 'sweep')
  const [named, orphan, young, gone] = [
    store('named', 7_200),
    store('orphan', 7_200),
    store('young', 60),
    hashOf('gone'),
  ]
  const interrupted = path.join(dataDir, 'files/incoming/in-interrupted')
  mkdirSync(interrupted, { recursive: true })
  writeFileSync(path.join(interrupted, 'half'), 'a file that never')
  const db = await getDatabase()
  for (const sha256 of [named, gone])
    await db.transaction((tx) =>
      insertUpload(tx, {
        id: sha256.slice(0, 8),
        campaignId: run.campaignId,
        runId: run.runId,
        sha256,
        byteCount: 5,
        fileName: 'a.csv',
        createdBy: run.userId,
      }),
    )
  const said = vi.spyOn(console, 'error').mockImplementation(() => undefined)
  const swept = await sweepStoredFiles()
  said.mockRestore()
  expect(swept).toMatchObject({ removedFolders: 1, removedOrphans: 1 })
  expect(swept.lost).toContain(gone)
  expect(swept.lost).not.toContain(named)
  expect([named, orphan, young].map((sha256) => existsSync(pathOf(sha256)))).toEqual([true, false, true])
  expect(existsSync(interrupted)).toBe(false)
})

test('what was stored and not looked at when the process ended is looked at by the next one, or failed with its reason', async () => {
  const run = await makeRun(await getDatabase(), 'resume')
  const log = 'time;T bed [°C]\n2026-03-02 07:30:00;25,1\n2026-03-02 07:30:10;25,3\n2026-03-02 07:30:20;25,4\n'
  const [readable, unreadable] = [store(log, 60), store('%PDF-1.7 not a table', 60)]
  const db = await getDatabase()
  for (const [id, sha256] of [
    ['waits', readable],
    ['is-a-pdf', unreadable],
    ['has-no-bytes', hashOf('never stored')],
  ] as const)
    await db.transaction((tx) =>
      insertUpload(tx, {
        id,
        campaignId: run.campaignId,
        runId: run.runId,
        sha256,
        byteCount: 5,
        fileName: `${id}.csv`,
        createdBy: run.userId,
      }),
    )
  const later = new Date(Date.now() + 60_000)
  expect(await resumeReadings(new Date(Date.now() - 60_000))).toBe(0)
  expect(await resumeReadings(later)).toBeGreaterThanOrEqual(3)
  const states = new Map((await selectUploads(db, [run.campaignId], run.runId)).map((upload) => [upload.id, upload]))
  expect(states.get('waits')).toMatchObject({ state: 'ready', kind: 'rig-log' })
  expect(states.get('is-a-pdf')).toMatchObject({ state: 'failed' })
  expect(states.get('has-no-bytes')?.failure).toMatch(/bytes are not in the store/)
  expect(await resumeReadings(later)).toBe(0)
})
