// Audited changes and small questions a second, one after the other and from many at once.
//   npx tsx --conditions=react-server tests/bench/changes.mts
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { eq } from 'drizzle-orm'
import { openFolderDatabase, openServerDatabase } from '@/db/client'
import { insertAuditEntry } from '@/db/mutations/audit'
import { samples } from '@/db/schema/samples'
import { actorOf } from '../support/actors'
import { makeRun } from '../support/make-run'

const folder = mkdtempSync(path.join(tmpdir(), 'bench-'))
const opened = process.env.TEST_DATABASE_URL
  ? await openServerDatabase(process.env.TEST_DATABASE_URL)
  : await openFolderDatabase(path.join(folder, 'database'))
const database = opened.database
const COUNT = 1_000
try {
  const prefix = `bench${Date.now()}`
  const { sampleId, userId } = await makeRun(database, prefix)
  const rate = async (what: string, count: number, work: () => Promise<unknown>) => {
    const started = performance.now()
    await work()
    console.log(`${what.padEnd(44)} ${Math.round((1000 * count) / (performance.now() - started))} a second`)
  }
  const question = () => database.select({ name: samples.name }).from(samples).where(eq(samples.id, sampleId))
  const change = (n: number) =>
    database.transaction(async (tx) => {
      await tx.insert(samples).values({ id: `${prefix}-${n}`, code: `${prefix}-${n}`, name: 'x', createdBy: userId })
      await insertAuditEntry(tx, {
        actor: actorOf('lead'),
        action: 'add',
        entity: 'sample',
        entityId: `${prefix}-${n}`,
      })
    })
  await rate('questions, one after the other', COUNT, async () => {
    for (let n = 0; n < COUNT; n++) await question()
  })
  await rate('questions, all at once', COUNT, () => Promise.all(Array.from({ length: COUNT }, question)))
  await rate('audited changes, one after the other', COUNT, async () => {
    for (let n = 0; n < COUNT; n++) await change(n)
  })
  await rate('audited changes, all at once', COUNT, () =>
    Promise.all(Array.from({ length: COUNT }, (_, n) => change(COUNT + n))),
  )
} finally {
  await opened.close()
  rmSync(folder, { recursive: true, force: true })
}
