import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { users } from '@/db/schema'
import { signIn, type Caller } from '@/lib/access/sign-in'
import { changePerson } from '@/lib/access/users'
import { appErrorOf } from '@/lib/domain/errors'
import { actorOf } from '@/tests/support/actors'
import { freshDatabase } from '@/tests/support/fresh-database'
import { hashForTests, makePerson, TEST_PASSWORD } from '@/tests/support/make-person'

let opened: OpenDatabase
let passwordHash: string
beforeAll(async () => {
  opened = await freshDatabase()
  passwordHash = await hashForTests()
})
afterAll(() => opened.close())

const START = new Date('2026-03-02T08:00:00Z')
const after = (seconds: number) => new Date(START.getTime() + seconds * 1000)

let address = 0
/** Each call from a network of its own, unless the test is about addresses. */
const elsewhere = (knownPeople: readonly string[] = []): Caller => {
  address += 1
  return { address: `10.${address >> 8}.${address & 255}.1`, userAgent: '', knownPeople }
}
const attempt = async (email: string, password: string, now: Date, from = elsewhere()) => {
  try {
    await signIn({ email, password }, from, now)
    return 'in'
  } catch (error) {
    return appErrorOf(error)?.code ?? error
  }
}
const failuresOf = async (id: string) => {
  const [row] = await (await getDatabase()).select({ count: users.failedSignIns }).from(users).where(eq(users.id, id))
  return row?.count
}
const setFailures = async (id: string, failedSignIns: number, lastFailedAt: Date) => {
  await (await getDatabase()).update(users).set({ failedSignIns, lastFailedAt }).where(eq(users.id, id))
}

describe('a name', () => {
  test('is found however it is written', async () => {
    const person = await makePerson('researcher', { passwordHash, email: 'Mixed.Case@Example.test' })
    expect(await attempt('  mixed.case@example.TEST ', TEST_PASSWORD, START)).toBe('in')
    expect(await failuresOf(person.id)).toBe(0)
  })

  test('that nobody has, a wrong password and a closed account hear the same words', async () => {
    const open = await makePerson('researcher', { passwordHash })
    const closed = await makePerson('researcher', { passwordHash })
    await changePerson(actorOf('admin'), closed.id, { isDisabled: true, version: 1 })
    const invited = await makePerson('researcher', { passwordHash: '' })
    const heard = await Promise.all(
      [
        { email: 'nobody@example.test', password: TEST_PASSWORD },
        { email: open.email, password: 'wrong words entirely here' },
        { email: closed.email, password: TEST_PASSWORD },
        { email: invited.email, password: '' },
      ].map(async (credentials) => {
        const error = appErrorOf(await signIn(credentials, elsewhere(), START).catch((refusal: unknown) => refusal))
        return { code: error?.code, message: error?.message, details: error?.details }
      }),
    )
    expect(heard[0]).toMatchObject({ code: 'not-signed-in' })
    for (const one of heard) expect(one).toEqual(heard[0])
  })
})

describe('wrong passwords', () => {
  test('make the next attempt wait, longer each time, and a right one clears the count', async () => {
    const { id, email } = await makePerson('researcher', { passwordHash })
    for (let n = 0; n < 5; n += 1) expect(await attempt(email, 'wrong', START)).toBe('not-signed-in')
    expect(await failuresOf(id)).toBe(5)
    // the sixth has to come two seconds later; refused ones do not count
    expect(await attempt(email, TEST_PASSWORD, after(1))).toBe('too-many-requests')
    expect(await failuresOf(id)).toBe(5)
    expect(await attempt(email, 'wrong', after(2))).toBe('not-signed-in')
    expect(await attempt(email, TEST_PASSWORD, after(5))).toBe('too-many-requests')
    expect(await attempt(email, TEST_PASSWORD, after(6))).toBe('in')
    expect(await failuresOf(id)).toBe(0)
  })

  test('ten in a row cost a quarter of an hour', async () => {
    const { id, email } = await makePerson('researcher', { passwordHash })
    await setFailures(id, 10, START)
    expect(await attempt(email, TEST_PASSWORD, after(899))).toBe('too-many-requests')
    expect(await attempt(email, TEST_PASSWORD, after(900))).toBe('in')
  })

  test('a hundred in a row lock the account, for its own devices too', async () => {
    const { id, email } = await makePerson('researcher', { passwordHash })
    await setFailures(id, 100, START)
    expect(await attempt(email, TEST_PASSWORD, after(365 * 86_400))).toBe('too-many-requests')
    expect(await attempt(email, TEST_PASSWORD, after(365 * 86_400), elsewhere([id]))).toBe('too-many-requests')
  })

  test('by strangers do not keep the owner out of a device that is known', async () => {
    const { id, email } = await makePerson('researcher', { passwordHash })
    await setFailures(id, 12, START)
    expect(await attempt(email, TEST_PASSWORD, after(1))).toBe('too-many-requests')
    expect(await attempt(email, TEST_PASSWORD, after(1), elsewhere([id]))).toBe('in')
    expect(await attempt(email, TEST_PASSWORD, after(1), elsewhere(['somebody else']))).toBe('in')
  })

  test('for a name that nobody has are slowed down alike', async () => {
    const email = 'no-such-person@example.test'
    for (let n = 0; n < 5; n += 1) expect(await attempt(email, 'wrong', START)).toBe('not-signed-in')
    expect(await attempt(email, 'wrong', after(1))).toBe('too-many-requests')
    expect(await attempt(email, 'wrong', after(2))).toBe('not-signed-in')
  })

  test('side by side do not share one place in the count', async () => {
    const { id, email } = await makePerson('researcher', { passwordHash })
    const outcomes = await Promise.all(Array.from({ length: 12 }, () => attempt(email, 'wrong', START)))
    expect(outcomes.filter((one) => one === 'not-signed-in')).toHaveLength(5)
    expect(outcomes.filter((one) => one === 'too-many-requests')).toHaveLength(7)
    expect(await failuresOf(id)).toBe(5)
  })
})

test('one address may try thirty times in five minutes, whatever names it tries', async () => {
  const from: Caller = { address: '203.0.113.5', userAgent: '', knownPeople: [] }
  const outcomes: unknown[] = []
  // in groups, as the threads that hash have a queue of twenty
  for (let group = 0; group < 4; group += 1)
    outcomes.push(
      ...(await Promise.all(
        Array.from({ length: 10 }, (_, n) => attempt(`name-${group}-${n}@example.test`, 'wrong', START, from)),
      )),
    )
  expect(outcomes.filter((one) => one === 'not-signed-in')).toHaveLength(30)
  expect(outcomes.slice(30)).toEqual(Array.from({ length: 10 }, () => 'too-many-requests'))
})

test('a whole shift signs in from one address: what succeeds costs nothing', async () => {
  const { email } = await makePerson('researcher', { passwordHash })
  const from: Caller = { address: '203.0.113.77', userAgent: '', knownPeople: [] }
  for (let n = 0; n < 35; n += 1) expect(await attempt(email, TEST_PASSWORD, START, from), `sign-in ${n}`).toBe('in')
})
