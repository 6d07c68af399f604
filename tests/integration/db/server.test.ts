import { sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openServerDatabase, type OpenDatabase } from '@/db/client'
import { withDatabaseLimits } from '@/db/database-limits'
import { samples } from '@/db/schema'
import { AppError } from '@/lib/domain/errors'
import { administer, freshDatabase, onServer } from '../../support/fresh-database'
import { makeRun } from '../../support/make-run'

const codeOf = (work: Promise<unknown>) =>
  work.then(
    () => 'no error',
    (error: unknown) => (error instanceof AppError ? error.code : error),
  )

describe.skipIf(process.env.TEST_BACKEND !== 'postgres' && !process.env.TEST_DATABASE_URL)(
  'on a PostgreSQL server',
  () => {
    let opened: OpenDatabase
    beforeAll(async () => {
      opened = await freshDatabase()
      await makeRun(opened.database, 'a')
      await makeRun(opened.database, 'b')
    })
    afterAll(() => opened.close())

    test('two servers that start at once on an empty database migrate it once', async () => {
      const name = 'migrated_at_once'
      await administer(`drop database if exists ${name} with (force)`, `create database ${name}`)
      const both = await Promise.all([openServerDatabase(onServer(name)), openServerDatabase(onServer(name))])
      const [first] = both
      const count = await first.database.execute<{ n: number }>(sql`select count(*)::int as n from schema_migrations`)
      expect(count.rows[0]?.n).toBeGreaterThan(2)
      await Promise.all(both.map((one) => one.close()))
      await administer(`drop database ${name} with (force)`)
    })

    test('two changes that wait for each other: one is done, one hears "busy", and neither is half done', async () => {
      let arrived = 0
      let release = () => {}
      const bothIn = new Promise<void>((resolve) => (release = resolve))
      const rename = (own: string, other: string) =>
        opened.database.transaction(async (tx) => {
          await tx.execute(sql`update samples set name = ${own} where code = ${own}`)
          arrived += 1
          if (arrived === 2) release()
          await bothIn
          await tx.execute(sql`update samples set name = ${own} where code = ${other}`)
        })
      const codes = await Promise.all([codeOf(rename('a', 'b')), codeOf(rename('b', 'a'))])
      expect(codes.sort()).toEqual(['busy', 'no error'])
      const names = (await opened.database.select({ name: samples.name }).from(samples)).map((row) => row.name)
      expect(new Set(names).size).toBe(1)
    })

    test('a stuck statement is ended at the deadline of its change', async () => {
      const work = () => opened.database.transaction((tx) => tx.execute(sql`select pg_sleep(60)`))
      expect(await withDatabaseLimits({ callMs: 200 }, () => codeOf(work()))).toBe('busy')
    })

    test('the outer database inside a change is refused, as in the thread', async () => {
      await expect(
        opened.database.transaction(async () => opened.database.execute(sql`select 1`)),
      ).rejects.toMatchObject({ cause: { message: expect.stringMatching(/goes through the transaction/) } })
    })

    test('counts are numbers, and one too large to be exact is refused', async () => {
      expect(await opened.database.$count(samples)).toBe(2)
      expect((await opened.database.execute(sql`select 9007199254740991::bigint as n`)).rows).toEqual([
        { n: 9007199254740991 },
      ])
      await expect(opened.database.execute(sql`select 9007199254740993::bigint as n`)).rejects.toThrow()
    })
  },
)
