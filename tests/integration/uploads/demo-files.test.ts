import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { auditEntries, columnMaps, readings, readingSets, uploads } from '@/db/schema'
import { addFiles, confirmUpload, correctUpload, previewUpload, type AddedFile } from '@/lib/access/uploads'
import { type Actor } from '@/lib/domain/role'
import { actorOf } from '@/tests/support/actors'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeRun } from '@/tests/support/make-run'

/* The files go to a store of this test's own. */
const dataDir = await vi.hoisted(async () => {
  const { mkdtempSync } = await import('node:fs')
  const { tmpdir } = await import('node:os')
  process.env.DATA_DIR = mkdtempSync(`${tmpdir()}/ik-demo-files-`)
  return process.env.DATA_DIR
})

const DEMO = path.join(process.cwd(), 'db/demo/files')
const names = readdirSync(DEMO).filter((name) => name.startsWith('R-'))

/** Rows or injections in each file, counted in the file itself: 50 injections a run, a log row each ten seconds. */
const LOG_ROWS: Readonly<Record<string, number>> = { 'R-0006-rig.csv': 3_595 }
const expectedRows = (name: string) => (name.includes('analysis') ? 50 : (LOG_ROWS[name] ?? 3_577))

/** Where a file proposes nothing, what the laboratory's people know of their rigs. */
const KNOWN: Readonly<Record<string, string>> = {
  'flow-reference': '273.15/101325',
  'pressure-kind': 'gauge',
  basis: 'dry',
}

let opened: OpenDatabase
let actor: Actor
let runId: string
beforeAll(async () => {
  opened = await freshDatabase()
  const run = await makeRun(await getDatabase(), 'intake')
  runId = run.runId
  actor = actorOf('technician', { userId: run.userId, memberships: { [run.campaignId]: 'technician' } })
})
afterAll(async () => {
  await opened.close()
  rmSync(dataDir, { recursive: true, force: true })
})

async function add(name: string, content: Uint8Array | string): Promise<AddedFile> {
  const form = new FormData()
  const part = typeof content === 'string' ? content : new Uint8Array(content)
  form.append('file', new File([part], name, { type: 'application/octet-stream' }))
  const [added] = await addFiles(actor, runId, new Request('http://localhost/', { method: 'POST', body: form }))
  if (added === undefined) throw new Error(`${name} was not added`)
  return added
}

async function countOf(): Promise<Record<string, number>> {
  const db = await getDatabase()
  return {
    sets: (await db.select().from(readingSets)).length,
    chunks: (await db.select({ id: readings.readingSetId }).from(readings)).length,
    maps: (await db.select().from(columnMaps)).length,
    confirmations: (await db.select().from(auditEntries)).filter((entry) => entry.action === 'upload.confirm').length,
  }
}

describe('every file of the demo is read, answered and confirmed', () => {
  test.each(names)('%s', async (name) => {
    let { upload } = await add(name, readFileSync(path.join(DEMO, name)))
    expect(upload.failure).toBeNull()
    const questions = upload.detection?.questions ?? []
    if (questions.length > 0) {
      const answers = Object.fromEntries(questions.map(({ key, proposal }) => [key, proposal ?? KNOWN[key] ?? '']))
      upload = await correctUpload(actor, upload.id, { answers }, upload.version)
    }
    expect(upload.state).toBe('ready')
    const preview = await previewUpload(actor, upload.id)
    expect(preview.questions).toEqual([])
    expect(preview.rowCount).toBe(expectedRows(name))
    const confirmed = await confirmUpload(actor, upload.id, upload.version)
    expect(confirmed.state).toBe('confirmed')
    const sets = (await (await getDatabase()).select().from(readingSets)).filter((set) => set.uploadId === upload.id)
    expect(sets.map((set) => [set.rowCount, set.supersededAt])).toEqual([[expectedRows(name), null]])
  })

  test('the second file of an instrument is known by its columns and asks nothing', async () => {
    const { upload } = await add(
      'next-day.csv',
      readFileSync(path.join(DEMO, 'R-0005-rig.csv'), 'utf8').replace('03/06/2026', '03/07/2026'),
    )
    expect(upload.detection?.columnMapId).not.toBeNull()
    expect(upload.detection?.questions).toEqual([])
    expect(upload.state).toBe('ready')
  })
})

describe('a damaged file leaves nothing half-stored', () => {
  const workbook = () => readFileSync(path.join(DEMO, 'R-0002-analysis.xlsx'))

  test.each([
    ['a workbook cut off in the middle', 'cut.xlsx', () => workbook().subarray(0, Math.floor(workbook().length / 2))],
    ['bytes that are no text', 'photo.csv', () => Uint8Array.from({ length: 4_000 }, (_, i) => (i * 7_919) % 256)],
    ['an empty file', 'empty.csv', () => new Uint8Array()],
    ['prose without a table', 'notes.txt', () => Buffer.from('The bed looked grey.\nNothing else to say.\n')],
  ])('%s is kept, says why it was not read, and gives no reading', async (_name, fileName, content) => {
    const before = await countOf()
    const added = await add(fileName, content()).catch((error: unknown) => {
      if (!(error instanceof Error)) throw error
      return error.message
    })
    if (typeof added === 'string') {
      // refused at the door: no record of it either
      expect(added).not.toBe('')
      const rows = await (await getDatabase()).select().from(uploads)
      expect(rows.some((row) => row.fileName === fileName)).toBe(false)
    } else {
      const { upload } = added
      expect(upload.state).toBe('failed')
      expect(upload.failure).toMatch(/kept/)
      expect(upload.problems.length).toBeGreaterThan(0)
      await expect(confirmUpload(actor, upload.id, upload.version)).rejects.toMatchObject({ code: 'unprocessable' })
      await expect(previewUpload(actor, upload.id)).rejects.toMatchObject({ code: 'unprocessable' })
    }
    expect(await countOf()).toEqual(before)
  })

  test('a log whose rows break off keeps what is whole and lists the row that is not', async () => {
    const text =
      'time;T bed [C]\n2026-03-02 07:30:00;25,1\n2026-03-02 07:30:10;25,x\n2026-03-02 07:30:20;25,3\n2026-03-'
    const { upload } = await add('broken-off.csv', text)
    const preview = await previewUpload(actor, upload.id)
    expect(preview.rowCount).toBe(3)
    expect(preview.problems.map(({ line, column }) => [line, column])).toEqual(
      expect.arrayContaining([[3, 'T bed [C]']]),
    )
    expect(preview.problems.some(({ line }) => line === 5)).toBe(true)
  })

  test('a store that fails while readings are written leaves the file as it was', async () => {
    const { upload } = await add('whole.csv', 'time;T bed [C]\n2026-03-04 07:30:00;25,1\n2026-03-04 07:30:10;25,3\n')
    const before = await countOf()
    // somebody else confirmed a later version while this one was being read
    await expect(confirmUpload(actor, upload.id, upload.version + 1)).rejects.toMatchObject({ code: 'stale' })
    const file = path.join(dataDir, 'files', upload.sha256.slice(0, 2), upload.sha256)
    expect(existsSync(path.dirname(file))).toBe(true)
    rmSync(file, { force: true })
    mkdirSync(file)
    await expect(confirmUpload(actor, upload.id, upload.version)).rejects.toThrow()
    expect(await countOf()).toEqual(before)
    const row = (await (await getDatabase()).select().from(uploads)).find((one) => one.id === upload.id)
    expect(row).toMatchObject({ state: 'ready', version: upload.version, confirmedAt: null })
  })
})
