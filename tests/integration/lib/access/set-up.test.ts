import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { oneTimeCodes, users } from '@/db/schema'
import { actorOfSession } from '@/lib/access/actor-of-secret'
import { completeSetUp, ensureSetUpCode, isSetUpNeeded, makeAdminByCommand } from '@/lib/access/set-up'
import { type Caller } from '@/lib/access/sign-in'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makePerson } from '@/tests/support/make-person'

let opened: OpenDatabase
beforeAll(async () => {
  opened = await freshDatabase()
})
afterAll(() => opened.close())

const START = new Date('2026-03-02T08:00:00Z')
const after = (seconds: number) => new Date(START.getTime() + seconds * 1000)
let address = 0
const caller = (): Caller => ({ address: `10.9.0.${++address}`, userAgent: '', knownPeople: [] })
const admin = (code: string, email = 'first@example.test') => ({
  code,
  email,
  displayName: 'First',
  password: 'kettle orbit marzipan tundra',
})
async function newCode(now: Date): Promise<string> {
  const made = await ensureSetUpCode(now)
  if (made === null) throw new Error('no code, as there is an admin')
  return made.code
}

describe('an empty installation', () => {
  test('has nobody in it, and no default account', async () => {
    expect(await (await getDatabase()).select().from(users)).toEqual([])
    expect(await isSetUpNeeded()).toBe(true)
  })

  test('keeps the hash of its code only', async () => {
    const code = await newCode(START)
    expect(JSON.stringify(await (await getDatabase()).select().from(oneTimeCodes))).not.toContain(code)
  })

  test('refuses made-up, replaced and old codes and weak passwords, and makes nobody', async () => {
    const replaced = await newCode(START)
    const code = await newCode(after(1))
    for (const [wrong, now] of [
      ['code_' + 'A'.repeat(43), after(2)],
      ['', after(2)],
      [replaced, after(2)],
      [code, after(86_401)],
    ] as const)
      await expect(completeSetUp(admin(wrong), caller(), now)).rejects.toMatchObject({ code: 'not-found' })
    await expect(
      completeSetUp({ ...admin(code), password: 'first first first' }, caller(), after(3)),
    ).rejects.toMatchObject({ code: 'unprocessable' })
    expect(await (await getDatabase()).select().from(users)).toEqual([])
  })

  test('makes one admin from one code, of two who use it at once', async () => {
    const code = await newCode(START)
    const outcomes = await Promise.allSettled([
      completeSetUp(admin(code, 'one@example.test'), caller(), after(1)),
      completeSetUp(admin(code, 'two@example.test'), caller(), after(1)),
    ])
    const made = outcomes.flatMap((one) => (one.status === 'fulfilled' ? [one.value] : []))
    expect(made).toHaveLength(1)
    const people = await (await getDatabase()).select().from(users)
    expect(people.map((one) => one.role)).toEqual(['admin'])
    const actor = await actorOfSession(made[0]?.secret ?? '', after(2))
    expect(actor).toMatchObject({ userId: made[0]?.userId, role: 'admin' })
    await expect(completeSetUp(admin(code), caller(), after(3))).rejects.toMatchObject({ code: 'not-found' })
  })

  test('has no code to give once there is an admin', async () => {
    expect(await isSetUpNeeded()).toBe(false)
    expect(await ensureSetUpCode(START)).toBeNull()
  })
})

describe('the command', () => {
  test('makes an admin, and gives an admin a new password', async () => {
    const input = { email: 'shell@example.test', displayName: 'Shell', password: 'lantern walrus cobalt thimble' }
    expect(await makeAdminByCommand(input)).toBe('made')
    expect(await makeAdminByCommand({ ...input, password: 'harbour violin mosaic quartz' })).toBe('renewed')
  })

  test('refuses weak passwords and does not raise others', async () => {
    const person = await makePerson('researcher', { passwordHash: 'none' })
    const input = { displayName: 'Shell', password: 'lantern walrus cobalt thimble' }
    await expect(makeAdminByCommand({ ...input, email: person.email })).rejects.toMatchObject({ code: 'conflict' })
    await expect(
      makeAdminByCommand({ ...input, email: 'other@example.test', password: 'password12345678' }),
    ).rejects.toMatchObject({ code: 'unprocessable' })
  })
})
