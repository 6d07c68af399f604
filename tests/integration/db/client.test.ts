import { eq, sql } from 'drizzle-orm'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { getDatabase, type Database, type OpenDatabase } from '@/db/client'
import { users } from '@/db/schema'
import { freshDatabase } from '../../support/fresh-database'

let opened: OpenDatabase
let db: Database
beforeAll(async () => {
  opened = await freshDatabase()
  db = opened.database
})
afterAll(() => opened.close())

const user = (id: string) => ({
  id,
  email: `${id}@example.test`,
  displayName: id,
  role: 'lead',
  passwordHash: 'x',
  passwordScheme: 'x',
})

test('is what getDatabase gives, starts empty, keeps what is committed', async () => {
  expect(await getDatabase()).toBe(db)
  expect(await db.select().from(users)).toEqual([])
  await db.transaction(async (tx) => {
    await tx.insert(users).values(user('u1'))
    expect(await tx.select().from(users)).toHaveLength(1)
  })
  const [row] = await db.select().from(users).where(eq(users.id, 'u1'))
  expect(row?.createdAt).toBeInstanceOf(Date)
})

test('a thrown error takes the whole transaction back', async () => {
  await expect(
    db.transaction(async (tx) => {
      await tx.insert(users).values(user('u2'))
      throw new Error('no')
    }),
  ).rejects.toThrow('no')
  expect(await db.select().from(users).where(eq(users.id, 'u2'))).toEqual([])
})

test('a swallowed statement error cannot pass for a commit', async () => {
  await expect(
    db.transaction(async (tx) => {
      await tx.insert(users).values(user('u3'))
      await tx
        .insert(users)
        .values(user('u3'))
        .catch(() => {})
    }),
  ).rejects.toThrow()
  expect(await db.select().from(users).where(eq(users.id, 'u3'))).toEqual([])
})

test('an error inside a savepoint leaves the rest to be committed', async () => {
  await db.transaction(async (tx) => {
    await tx.insert(users).values(user('u4'))
    await tx
      .transaction(async (inner) => {
        await inner.insert(users).values(user('u4'))
      })
      .catch(() => {})
  })
  expect(await db.select().from(users).where(eq(users.id, 'u4'))).toHaveLength(1)
})

test('the outer database inside a transaction is refused instead of waiting for ever', async () => {
  await expect(db.transaction(async () => db.select().from(users))).rejects.toMatchObject({
    cause: { message: expect.stringMatching(/goes through the transaction/) },
  })
  await expect(db.transaction(async () => db.transaction(async () => 1))).rejects.toThrow(
    /goes through the transaction/,
  )
  expect((await db.execute<{ one: number }>(sql`select 1::int as one`)).rows).toEqual([{ one: 1 }])
})

test('transactions take turns and statements from outside wait for them', async () => {
  const order: string[] = []
  const first = db.transaction(async (tx) => {
    await tx.execute(sql`select 1`)
    order.push('first in')
    await tx.execute(sql`select 1`)
    order.push('first out')
  })
  const outside = db.execute(sql`select 2`).then(() => order.push('outside'))
  const second = db.transaction(async (tx) => {
    order.push('second in')
    await tx.execute(sql`select 1`)
  })
  await Promise.all([first, outside, second])
  expect(order.indexOf('first out')).toBeLessThan(order.indexOf('second in'))
})
