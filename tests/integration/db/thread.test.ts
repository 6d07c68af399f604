import { cpSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { openFolderDatabase, type OpenDatabase } from '@/db/client'
import { withDatabaseLimits } from '@/db/database-limits'
import { appErrorOf } from '@/lib/domain/errors'
import { freshDatabase } from '../../support/fresh-database'

const parent = mkdtempSync(path.join(tmpdir(), 'thread-'))
const folder = path.join(parent, 'database')
const ENDLESS = sql`select count(*) from generate_series(1, 3000000000) a`

const codeOf = (work: Promise<unknown>) =>
  work.then(
    () => 'no error',
    (error: unknown) => appErrorOf(error)?.code ?? error,
  )

describe.skipIf(process.env.TEST_BACKEND === 'postgres')('the database in its thread', () => {
  let opened: OpenDatabase
  beforeAll(async () => {
    await (await openFolderDatabase(folder)).close()
    cpSync(folder, path.join(parent, 'failing'), { recursive: true })
    opened = await openFolderDatabase(folder)
    await opened.database.execute(sql`create table kept (n int primary key)`)
  })
  afterAll(async () => {
    await opened.close()
    rmSync(parent, { recursive: true, force: true })
  })
  const keep = (n: number) => opened.database.execute(sql`insert into kept values (${n})`)
  const kept = async () =>
    (await opened.database.execute<{ n: number }>(sql`select n from kept order by n`)).rows.map((row) => row.n)

  test('a stuck question is ended at its deadline; meanwhile this thread lives, those waiting hear "busy", nothing is lost', async () => {
    await keep(1)
    let ticks = 0
    const ticking = setInterval(() => (ticks += 1), 10)
    const before = { ...opened.counters }
    const stuck = withDatabaseLimits({ callMs: 400 }, () => codeOf(opened.database.execute(ENDLESS)))
    const waiting = [codeOf(kept()), codeOf(keep(2)), codeOf(opened.database.transaction(async () => 1))]
    expect(await stuck).toBe('busy')
    expect(await Promise.all(waiting)).toEqual(['busy', 'busy', 'busy'])
    clearInterval(ticking)
    // 40 turns of 10 ms were due; a blocked thread has none
    expect(ticks).toBeGreaterThan(10)
    expect(await kept()).toEqual([1])
    expect(opened.counters).toMatchObject({
      deadlines: (before.deadlines ?? 0) + 1,
      reopenings: (before.reopenings ?? 0) + 1,
    })
  })

  test('the clock of a question starts when the one before it was answered', async () => {
    const slow = sql`select count(*) from generate_series(1, 2000000) a`
    const started = performance.now()
    await opened.database.execute(slow)
    const callMs = 4 * (performance.now() - started)
    // ten in a row take longer together than any one of them may
    const codes = await withDatabaseLimits({ callMs }, () =>
      Promise.all(Array.from({ length: 10 }, () => codeOf(opened.database.execute(slow)))),
    )
    expect(new Set(codes)).toEqual(new Set(['no error']))
  })

  test('a change that stays open too long is taken back without a new start, and its late statements are refused', async () => {
    const before = opened.counters?.reopenings
    let late: Promise<unknown> = Promise.resolve()
    let release = () => {}
    const held = new Promise<void>((resolve) => (release = resolve))
    const code = await withDatabaseLimits({ transactionMs: 200 }, () =>
      codeOf(
        opened.database.transaction(async (tx) => {
          await tx.execute(sql`insert into kept values (3)`)
          late = held.then(() => tx.execute(sql`insert into kept values (4)`))
          late.catch(() => {})
          await held
        }),
      ),
    )
    expect(code).toBe('busy')
    release()
    await expect(late).rejects.toMatchObject({ cause: { message: expect.stringMatching(/has ended/) } })
    expect(await kept()).toEqual([1])
    expect(opened.counters?.reopenings).toBe(before)
  })

  test('a change whose statement is stuck at the deadline of the change: ended, taken back, started anew', async () => {
    const code = await withDatabaseLimits({ transactionMs: 300 }, () =>
      codeOf(
        opened.database.transaction(async (tx) => {
          await tx.execute(sql`insert into kept values (5)`)
          await tx.execute(ENDLESS)
        }),
      ),
    )
    expect(code).toBe('busy')
    expect(await kept()).toEqual([1])
  })

  test('one who waits longer for a turn than allowed hears "busy", and the one before goes on', async () => {
    let release = () => {}
    const held = new Promise<void>((resolve) => (release = resolve))
    const first = opened.database.transaction(async (tx) => {
      await held
      await tx.execute(sql`insert into kept values (6)`)
    })
    expect(await withDatabaseLimits({ waitMs: 50 }, () => codeOf(kept()))).toBe('busy')
    release()
    await first
    expect(await kept()).toEqual([1, 6])
  })

  test('a statement of a transaction that has ended is refused', async () => {
    const escaped = await opened.database.transaction(async (tx) => ({ again: () => tx.execute(sql`select 1`) }))
    await expect(escaped.again()).rejects.toMatchObject({ cause: { message: expect.stringMatching(/has ended/) } })
  })

  test('large and binary values cross both ways', async () => {
    const bytes = Uint8Array.from({ length: 300_000 }, (_, index) => index % 256)
    const found = await opened.database.execute<{ bytes: Uint8Array }>(sql`select ${bytes}::bytea as bytes`)
    expect(Buffer.from(found.rows[0]?.bytes ?? []).equals(Buffer.from(bytes))).toBe(true)
  })

  test('a disk that refuses a sync: nothing more is taken, and the owner is told once', async () => {
    const other = path.join(parent, 'failing')
    const onSyncFailure = vi.fn()
    const failing = await openFolderDatabase(other, { failSyncAfter: 30, onSyncFailure })
    const codes: unknown[] = []
    await failing.database.execute(sql`create table t (n int)`).catch(() => {})
    for (let n = 0; n < 60; n++) codes.push(await codeOf(failing.database.execute(sql`insert into t values (${n})`)))
    expect(codes.at(-1)).toBe('storage-full')
    expect(codes.indexOf('storage-full')).toBeGreaterThan(0)
    expect(codes.slice(codes.indexOf('storage-full'))).not.toContain('no error')
    expect(onSyncFailure).toHaveBeenCalledOnce()
    await failing.close()
  })

  test('after closing, a question is refused at once', async () => {
    const other = await freshDatabase()
    await other.close()
    expect(await codeOf(other.database.execute(sql`select 1`))).toBe('busy')
  })
})
