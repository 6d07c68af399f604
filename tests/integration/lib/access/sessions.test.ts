import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { auditEntries, sessions, users } from '@/db/schema'
import { actorOfSession } from '@/lib/access/actor-of-secret'
import { endOtherSessions, endSession, endSessionsOf, listSessions } from '@/lib/access/sessions'
import { signIn, signOut, type Caller } from '@/lib/access/sign-in'
import { changePassword, changePerson } from '@/lib/access/users'
import { hashSecret } from '@/lib/auth/secret'
import { AppError } from '@/lib/domain/errors'
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
const MINUTE = 60
const HOUR = 3600

let address = 0
/** A new address each time, so that the limits of one test do not reach another. */
function caller(): Caller {
  address += 1
  return { address: `10.1.${address >> 8}.${address & 255}`, userAgent: 'test', knownPeople: [] }
}

async function signedIn(role: 'technician' | 'admin' = 'technician') {
  const person = await makePerson(role, { passwordHash })
  const { secret } = await signIn({ email: person.email, password: TEST_PASSWORD }, caller(), START)
  return { person, secret }
}

async function actorNow(secret: string, now: Date) {
  const actor = await actorOfSession(secret, now)
  if (actor === null) throw new Error('the session does not open the door')
  return actor
}

describe('a session', () => {
  test('opens the door as the person who signed in', async () => {
    const { person, secret } = await signedIn()
    const actor = await actorNow(secret, after(5))
    expect(actor).toMatchObject({ userId: person.id, email: person.email, role: 'technician', tokenScopes: null })
    expect(actor.secondsSinceSignIn).toBe(5)
    expect(actor.sessionRef).not.toContain(secret)
  })

  test('is kept as a hash only', async () => {
    const { secret } = await signedIn()
    const rows = await (await getDatabase()).select().from(sessions)
    expect(JSON.stringify(rows)).not.toContain(secret)
    expect(rows.some((row) => row.idHash === hashSecret(secret))).toBe(true)
  })

  test('is another one at each sign-in', async () => {
    const person = await makePerson('technician', { passwordHash })
    const first = await signIn({ email: person.email, password: TEST_PASSWORD }, caller(), START)
    const second = await signIn({ email: person.email, password: TEST_PASSWORD }, caller(), START)
    expect(second.secret).not.toBe(first.secret)
  })

  test('is dead after 30 minutes without use, and lives on with use', async () => {
    const idle = await signedIn()
    expect(await actorOfSession(idle.secret, after(30 * MINUTE - 1))).not.toBeNull()
    const unused = await signedIn()
    expect(await actorOfSession(unused.secret, after(30 * MINUTE))).toBeNull()
    // used at 29:59 above, so it lives until 59:59
    expect(await actorOfSession(idle.secret, after(59 * MINUTE))).not.toBeNull()
  })

  test('is dead after 12 hours however much it is used', async () => {
    const { secret } = await signedIn()
    for (let minute = 20; minute < 12 * 60; minute += 20)
      expect(await actorOfSession(secret, after(minute * MINUTE))).not.toBeNull()
    expect(await actorOfSession(secret, after(12 * HOUR - 1))).not.toBeNull()
    expect(await actorOfSession(secret, after(12 * HOUR))).toBeNull()
  })

  test('is dead at the next request after signing out, for the same secret too', async () => {
    const { secret } = await signedIn()
    await signOut(secret, after(10))
    expect(await actorOfSession(secret, after(11))).toBeNull()
    await expect(signOut(secret, after(12))).resolves.toBeUndefined()
  })

  test('is dead at the next request when its epoch is over', async () => {
    const { person, secret } = await signedIn()
    await (await getDatabase()).update(users).set({ sessionEpoch: 7 }).where(eq(users.id, person.id))
    expect(await actorOfSession(secret, after(1))).toBeNull()
  })

  test('is dead at the next request when the account is closed, and stays dead when it is opened again', async () => {
    const { person, secret } = await signedIn()
    const admin = actorOf('admin')
    await changePerson(admin, person.id, { isDisabled: true, version: 1 }, after(1))
    expect(await actorOfSession(secret, after(2))).toBeNull()
    await changePerson(admin, person.id, { isDisabled: false, version: 2 }, after(3))
    expect(await actorOfSession(secret, after(4))).toBeNull()
  })

  test('is dead at the next request when the house role changes', async () => {
    const { person, secret } = await signedIn()
    await changePerson(actorOf('admin'), person.id, { role: 'researcher', version: 1 }, after(1))
    expect(await actorOfSession(secret, after(2))).toBeNull()
  })

  test('is dead at the next request when an admin ends the sessions of the person', async () => {
    const { person, secret } = await signedIn()
    expect(await endSessionsOf(actorOf('admin'), person.id, after(1))).toBe(1)
    expect(await actorOfSession(secret, after(2))).toBeNull()
  })

  test('takes the role from the database at each request', async () => {
    const { person, secret } = await signedIn()
    await (await getDatabase()).update(users).set({ role: 'guest' }).where(eq(users.id, person.id))
    expect((await actorNow(secret, after(1))).role).toBe('guest')
  })

  test('under a made-up secret is nobody’s', async () => {
    for (const secret of ['', 'x', 'A'.repeat(43), '../../etc', '\u0000'])
      expect(await actorOfSession(secret, START)).toBeNull()
  })
})

describe('own sessions', () => {
  test('are listed, ended one by one or all others at once', async () => {
    const person = await makePerson('researcher', { passwordHash })
    const secrets: string[] = []
    for (let n = 0; n < 3; n += 1)
      secrets.push((await signIn({ email: person.email, password: TEST_PASSWORD }, caller(), after(n))).secret)
    const [first = '', second = '', third = ''] = secrets
    const actor = await actorNow(first, after(10))
    const list = await listSessions(actor, after(10))
    expect(list).toHaveLength(3)
    expect(list.filter((one) => one.isThisOne)).toHaveLength(1)
    expect(JSON.stringify(list)).not.toContain(first)

    const other = await actorNow(second, after(10))
    await endSession(actor, other.sessionRef, after(11))
    expect(await actorOfSession(second, after(12))).toBeNull()
    expect(await actorOfSession(third, after(12))).not.toBeNull()

    expect(await endOtherSessions(actor, after(13))).toBe(1)
    expect(await actorOfSession(third, after(14))).toBeNull()
    expect(await actorOfSession(first, after(14))).not.toBeNull()
  })

  test('of somebody else are not there', async () => {
    const mine = await signedIn()
    const theirs = await signedIn()
    const me = await actorNow(mine.secret, after(1))
    const you = await actorNow(theirs.secret, after(1))
    await expect(endSession(me, you.sessionRef, after(2))).rejects.toMatchObject({ code: 'not-found' })
    expect(await actorOfSession(theirs.secret, after(3))).not.toBeNull()
  })

  test('cannot be seen or ended with a token', async () => {
    const { secret } = await signedIn()
    const actor = { ...(await actorNow(secret, after(1))), tokenScopes: ['read', 'write'] as const }
    await expect(listSessions(actor)).rejects.toMatchObject({ code: 'not-allowed' })
    await expect(endOtherSessions(actor)).rejects.toMatchObject({ code: 'not-allowed' })
  })

  test('end when the password changes, and the changer gets a new one', async () => {
    const { secret } = await signedIn()
    const actor = await actorNow(secret, after(1))
    const from = caller()
    await expect(
      changePassword(
        actor,
        { currentPassword: 'not this one at all', newPassword: 'harbour violin mosaic quartz' },
        from,
        after(2),
      ),
    ).rejects.toMatchObject({ code: 'unprocessable' })
    expect(await actorOfSession(secret, after(3))).not.toBeNull()
    const changed = await changePassword(
      actor,
      { currentPassword: TEST_PASSWORD, newPassword: 'harbour violin mosaic quartz' },
      from,
      after(4),
    )
    expect(await actorOfSession(secret, after(5))).toBeNull()
    expect(await actorOfSession(changed.secret, after(5))).not.toBeNull()
    await expect(signIn({ email: actor.email, password: TEST_PASSWORD }, caller(), after(6))).rejects.toThrow(AppError)
    await expect(
      signIn({ email: actor.email, password: 'harbour violin mosaic quartz' }, caller(), after(60)),
    ).resolves.toMatchObject({ userId: actor.userId })
  })
})

test('signing in and out, ending and changing leave an entry each, with no secret in it', async () => {
  const { person, secret } = await signedIn()
  await signOut(secret, after(1))
  const entries = await (await getDatabase()).select().from(auditEntries).where(eq(auditEntries.actorId, person.id))
  expect(entries.map((entry) => entry.action)).toEqual(['sign-in', 'sign-out'])
  expect(JSON.stringify(entries)).not.toContain(secret)
})
