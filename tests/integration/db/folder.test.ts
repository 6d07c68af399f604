import { mkdtempSync, readdirSync, rmSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { sql } from 'drizzle-orm'
import { afterAll, expect, test } from 'vitest'
import { openFolderDatabase } from '@/db/client'
import { maintainDatabase } from '@/db/maintain'

const parent = mkdtempSync(path.join(tmpdir(), 'folder-'))
const folder = path.join(parent, 'data', 'database')
afterAll(() => rmSync(parent, { recursive: true, force: true }))

test('makes the folder whole, for its owner only, and opens it again with what was written', async () => {
  const first = await openFolderDatabase(folder)
  expect(statSync(folder).mode & 0o777).toBe(0o700)
  expect(statSync(path.dirname(folder)).mode & 0o777).toBe(0o700)
  await first.database.execute(sql`create table kept (n int)`)
  await first.database.execute(sql`insert into kept values (7)`)
  const settings = await first.database.execute<{ name: string; setting: string }>(
    sql`select name, setting from pg_settings where name in ('fsync', 'wal_sync_method', 'max_wal_size', 'full_page_writes', 'synchronous_commit') order by name`,
  )
  expect(Object.fromEntries(settings.rows.map((row) => [row.name, row.setting]))).toEqual({
    fsync: 'on',
    full_page_writes: 'on',
    max_wal_size: '64',
    synchronous_commit: 'on',
    wal_sync_method: 'fsync',
  })
  await expect(openFolderDatabase(folder)).rejects.toThrow(/this process has it open already/)
  await first.close()
  expect(readdirSync(path.dirname(folder))).toEqual(['database'])

  const second = await openFolderDatabase(folder)
  expect((await second.database.execute(sql`select n from kept`)).rows).toEqual([{ n: 7 }])
  await second.close()
})

test('no change is acknowledged before the disk has it', async () => {
  const opened = await openFolderDatabase(folder)
  const counters = opened.counters
  if (!counters) throw new Error('this back end counts its syncs')
  const early: number[] = []
  for (let n = 0; n < 200; n++) {
    const before = counters.syncs
    if (n % 2 === 0) await opened.database.execute(sql`insert into kept values (${n})`)
    else
      await opened.database.transaction(async (tx) => {
        await tx.execute(sql`insert into kept values (${n})`)
      })
    if (counters.syncs <= before) early.push(n)
  }
  expect(early).toEqual([])
  await opened.close()
})

test('the log of changes does not grow for ever, and maintenance runs through', async () => {
  const opened = await openFolderDatabase(folder)
  const logBytes = () =>
    readdirSync(path.join(folder, 'pg_wal'), { withFileTypes: true })
      .filter((entry) => entry.isFile())
      .reduce((sum, entry) => sum + statSync(path.join(folder, 'pg_wal', entry.name)).size, 0)
  await opened.database.execute(sql`create table filler (content text)`)
  for (let round = 0; round < 8; round++) {
    // some 25 MB of changes, then as many small questions as it takes to be looked at
    await opened.database.execute(
      sql`insert into filler select repeat(md5(n::text), 6) from generate_series(1, 100000) n`,
    )
    for (let n = 0; n < 32; n++) await opened.database.execute(sql`select 1`)
  }
  // twice the 64 MB it may hold, against the 200 MB that were written
  expect(logBytes()).toBeLessThan(128e6)
  await maintainDatabase(opened.database)
  const [filler] = (
    await opened.database.execute<{ rows: number }>(
      sql`select reltuples::float8 as rows from pg_class where relname = 'filler'`,
    )
  ).rows
  expect(filler?.rows).toBe(800_000)
  await opened.close()
})
