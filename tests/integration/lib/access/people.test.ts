import { randomUUID } from 'node:crypto'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { auditEntries, members, tokens as tokenTable, users } from '@/db/schema'
import { actorOfSession, actorOfToken } from '@/lib/access/actor-of-secret'
import { listCampaignNames } from '@/lib/access/campaign-names'
import { signIn, type Caller } from '@/lib/access/sign-in'
import { createToken, listTokens, revokeToken } from '@/lib/access/tokens'
import {
  acceptInvitation,
  changePerson,
  createPerson,
  inviteAgain,
  listPeople,
  listPersonNames,
} from '@/lib/access/users'
import { type NewToken } from '@/lib/domain/person'
import { roles, type Actor } from '@/lib/domain/role'
import { actorOf } from '@/tests/support/actors'
import { freshDatabase } from '@/tests/support/fresh-database'
import { hashForTests, makePerson, TEST_PASSWORD } from '@/tests/support/make-person'
import { makeRun } from '@/tests/support/make-run'

let opened: OpenDatabase
let passwordHash: string
beforeAll(async () => {
  opened = await freshDatabase()
  passwordHash = await hashForTests()
})
afterAll(() => opened.close())

const START = new Date('2026-03-02T08:00:00Z')
const after = (seconds: number) => new Date(START.getTime() + seconds * 1000)
const DAY = 86_400
let address = 0
const caller = (): Caller => ({ address: `10.8.0.${++address}`, userAgent: '', knownPeople: [] })
const NEW_PASSWORD = 'lantern walrus cobalt thimble'
const admin = actorOf('admin')

describe('an invitation', () => {
  const invite = (role: 'technician' | 'lead' = 'technician') =>
    createPerson(admin, { email: `${randomUUID()}@example.test`, displayName: 'Invited', role }, START)

  test('lets its person choose a password and signs them in', async () => {
    const invitation = await invite('lead')
    await expect(signIn({ email: invitation.email, password: '' }, caller(), after(1))).rejects.toMatchObject({
      code: 'not-signed-in',
    })
    const { secret, userId } = await acceptInvitation(
      { code: invitation.code, password: NEW_PASSWORD },
      caller(),
      after(2),
    )
    expect(userId).toBe(invitation.userId)
    expect(await actorOfSession(secret, after(3))).toMatchObject({ email: invitation.email, role: 'lead' })
    await expect(
      signIn({ email: invitation.email, password: NEW_PASSWORD }, caller(), after(4)),
    ).resolves.toMatchObject({ userId })
  })

  test('works once, also for two at the same moment', async () => {
    const { code } = await invite()
    const outcomes = await Promise.allSettled(
      [1, 2].map(() => acceptInvitation({ code, password: NEW_PASSWORD }, caller(), after(1))),
    )
    expect(outcomes.filter((one) => one.status === 'fulfilled')).toHaveLength(1)
    await expect(acceptInvitation({ code, password: NEW_PASSWORD }, caller(), after(2))).rejects.toMatchObject({
      code: 'not-found',
    })
  })

  test('runs out after a week, is replaced by the next one, and ends with the account', async () => {
    const first = await invite()
    const accept = (code: string, now: Date) => acceptInvitation({ code, password: NEW_PASSWORD }, caller(), now)
    await expect(accept(first.code, after(7 * DAY))).rejects.toMatchObject({ code: 'not-found' })
    const second = await inviteAgain(admin, first.userId, after(10))
    await expect(accept(first.code, after(11))).rejects.toMatchObject({ code: 'not-found' })
    await changePerson(admin, first.userId, { isDisabled: true, version: 1 }, after(12))
    await expect(accept(second.code, after(13))).rejects.toMatchObject({ code: 'not-found' })
    await changePerson(admin, first.userId, { isDisabled: false, version: 2 }, after(14))
    await expect(accept(second.code, after(15))).rejects.toMatchObject({ code: 'not-found' })
  })

  test('replaces a lost password, ends every session and opens a locked account', async () => {
    const person = await makePerson('researcher', { passwordHash })
    const { secret } = await signIn({ email: person.email, password: TEST_PASSWORD }, caller(), START)
    await (
      await getDatabase()
    )
      .update(users)
      .set({ failedSignIns: 100, lastFailedAt: START })
      .where(eq(users.id, person.id))
    const { code } = await inviteAgain(admin, person.id, after(1))
    expect(await actorOfSession(secret, after(2))).not.toBeNull()
    await acceptInvitation({ code, password: NEW_PASSWORD }, caller(), after(3))
    expect(await actorOfSession(secret, after(4))).toBeNull()
    await expect(signIn({ email: person.email, password: NEW_PASSWORD }, caller(), after(5))).resolves.toBeTruthy()
  })

  test('is not used up by a password that cannot be taken', async () => {
    const { code } = await invite()
    await expect(acceptInvitation({ code, password: 'too short' }, caller(), after(1))).rejects.toMatchObject({
      code: 'unprocessable',
    })
    await expect(acceptInvitation({ code, password: NEW_PASSWORD }, caller(), after(2))).resolves.toBeTruthy()
  })

  test('of somebody who has an account already is refused', async () => {
    const person = await makePerson('researcher', { passwordHash, email: 'There@Example.test' })
    await expect(
      createPerson(admin, { email: 'there@example.test', displayName: 'x', role: 'lead' }, START),
    ).rejects.toMatchObject({ code: 'conflict', details: { issues: [{ field: 'email' }] } })
    expect(person.email).toBe('There@Example.test')
  })
})

describe('people', () => {
  test.each(roles.filter((role) => role !== 'admin'))('a %s neither sees nor changes them', async (role) => {
    const actor = actorOf(role, { memberships: { c: role === 'guest' ? 'guest' : role } })
    const person = await makePerson('technician', { passwordHash })
    const refused = { code: 'not-allowed' }
    await expect(listPeople(actor)).rejects.toMatchObject(refused)
    await expect(createPerson(actor, { email: 'x@example.test', displayName: 'x', role })).rejects.toMatchObject(
      refused,
    )
    await expect(inviteAgain(actor, person.id)).rejects.toMatchObject(refused)
    await expect(changePerson(actor, person.id, { role: 'admin', version: 1 })).rejects.toMatchObject(refused)
    if (role === 'lead')
      await expect(listPersonNames(actor)).resolves.toContainEqual(expect.objectContaining({ id: person.id }))
    else await expect(listPersonNames(actor)).rejects.toMatchObject(refused)
  })

  test('are listed without their hashes, with sessions and state', async () => {
    const person = await makePerson('researcher', { passwordHash })
    await signIn({ email: person.email, password: TEST_PASSWORD }, caller(), START)
    const list = await listPeople(admin, after(60))
    const entry = list.find((one) => one.id === person.id)
    expect(entry).toEqual({
      id: person.id,
      email: person.email,
      displayName: person.displayName,
      role: 'researcher',
      isDisabled: false,
      hasPassword: true,
      isLocked: false,
      sessionCount: 1,
      lastSeenAt: START.toISOString(),
      createdAt: expect.stringMatching(/^\d{4}-/),
      version: 1,
    })
    expect((await listPeople(admin, after(3600))).find((one) => one.id === person.id)).toMatchObject({
      sessionCount: 0,
      lastSeenAt: START.toISOString(),
    })
    expect(JSON.stringify(list)).not.toContain('$2')
  })

  test('are changed from the version that was read, with before and after in the trail', async () => {
    const person = await makePerson('technician', { passwordHash })
    await changePerson(admin, person.id, { role: 'lead', version: 1 }, after(1))
    await expect(changePerson(admin, person.id, { role: 'guest', version: 1 }, after(2))).rejects.toMatchObject({
      code: 'stale',
    })
    const trail = await (await getDatabase()).select().from(auditEntries).where(eq(auditEntries.entityId, person.id))
    expect(trail).toHaveLength(1)
    expect(trail[0]).toMatchObject({
      action: 'change-person',
      actorId: admin.userId,
      before: { role: 'technician', isDisabled: false },
      after: { role: 'lead', isDisabled: false },
    })
  })

  test('that do not exist are not there', async () => {
    await expect(changePerson(admin, 'nobody', { role: 'lead', version: 1 })).rejects.toMatchObject({
      code: 'not-found',
    })
    await expect(inviteAgain(admin, 'nobody')).rejects.toMatchObject({ code: 'not-found' })
  })
})

describe('a token', () => {
  const input: NewToken = { name: 'rig computer', scopes: ['read', 'intake'], campaignId: null, validDays: 30 }
  async function owner() {
    const person = await makePerson('researcher', { passwordHash })
    return { person, actor: actorOf('researcher', { userId: person.id, email: person.email }) }
  }

  test('acts as its owner within its scopes, until it ends', async () => {
    const { person, actor } = await owner()
    const token = await createToken(actor, input, START)
    expect(await actorOfToken(token.secret, after(1))).toMatchObject({
      userId: person.id,
      role: 'researcher',
      tokenScopes: ['read', 'intake'],
      secondsSinceSignIn: null,
      sessionRef: `token:${token.id}`,
    })
    expect(await actorOfToken(token.secret, after(30 * DAY - 1))).not.toBeNull()
    expect(await actorOfToken(token.secret, after(30 * DAY))).toBeNull()
  })

  test('is kept as a hash only', async () => {
    const { actor } = await owner()
    const { secret } = await createToken(actor, input, START)
    expect(JSON.stringify(await (await getDatabase()).select().from(tokenTable))).not.toContain(secret)
    expect(JSON.stringify(await (await getDatabase()).select().from(auditEntries))).not.toContain(secret)
    expect(JSON.stringify(await listTokens(actor))).not.toContain(secret)
  })

  test('is dead at the next request when revoked, and when its owner is closed out', async () => {
    const one = await owner()
    const token = await createToken(one.actor, input, START)
    await revokeToken(one.actor, token.id, after(1))
    expect(await actorOfToken(token.secret, after(2))).toBeNull()
    const two = await owner()
    const other = await createToken(two.actor, input, START)
    await changePerson(admin, two.person.id, { isDisabled: true, version: 1 }, after(1))
    expect(await actorOfToken(other.secret, after(2))).toBeNull()
    await changePerson(admin, two.person.id, { isDisabled: false, version: 2 }, after(3))
    expect(await actorOfToken(other.secret, after(4))).toBeNull()
  })

  test('has the role its owner has now', async () => {
    const { person, actor } = await owner()
    const { secret } = await createToken(actor, input, START)
    await changePerson(admin, person.id, { role: 'guest', version: 1 }, after(1))
    expect(await actorOfToken(secret, after(2))).toMatchObject({ role: 'guest' })
  })

  test('makes no tokens', async () => {
    const { actor } = await owner()
    const { secret } = await createToken(actor, { ...input, scopes: ['read', 'intake', 'write'] }, START)
    const script = await actorOfToken(secret, after(1))
    if (script === null) throw new Error('the token does not work')
    await expect(createToken(script, input, after(2))).rejects.toMatchObject({ code: 'not-allowed' })
  })

  test('of others is ended by an admin only', async () => {
    const { person, actor } = await owner()
    const token = await createToken(actor, input, START)
    await expect(listTokens(actorOf('lead'), person.id)).rejects.toMatchObject({ code: 'not-allowed' })
    await expect(revokeToken(actorOf('lead'), token.id)).rejects.toMatchObject({ code: 'not-found' })
    expect(await listTokens(admin, person.id)).toHaveLength(1)
    await revokeToken(admin, token.id, after(1))
    expect(await actorOfToken(token.secret, after(2))).toBeNull()
  })

  test('that is no token is nobody’s', async () => {
    for (const secret of ['', 'ik_', `ik_${'A'.repeat(43)}`, `ik_${'A'.repeat(44)}`, `xx_${'A'.repeat(43)}`, '\u0000'])
      expect(await actorOfToken(secret, START), secret).toBeNull()
  })
})

describe('membership', () => {
  test('is read at each request: added, changed and taken away, it counts at the next one', async () => {
    const db = await getDatabase()
    const { campaignId } = await makeRun(db, 'membership')
    await makeRun(db, 'elsewhere')
    const person = await makePerson('researcher')
    const { secret } = await signIn({ email: person.email, password: TEST_PASSWORD }, caller(), START)
    const now = async () => {
      const actor = await actorOfSession(secret, after(1))
      if (actor === null) throw new Error('the session does not open the door')
      return { actor, names: (await listCampaignNames(actor)).map((campaign) => campaign.id) }
    }
    expect(await now()).toMatchObject({ actor: { memberships: {} }, names: [] })
    await db.insert(members).values({ campaignId, userId: person.id, role: 'technician' })
    expect(await now()).toMatchObject({ actor: { memberships: { [campaignId]: 'technician' } }, names: [campaignId] })
    await db.update(members).set({ role: 'lead' }).where(eq(members.userId, person.id))
    expect(await now()).toMatchObject({ actor: { memberships: { [campaignId]: 'lead' } }, names: [campaignId] })
    await db.delete(members).where(eq(members.userId, person.id))
    expect(await now()).toMatchObject({ actor: { memberships: {} }, names: [] })
  })

  test('is not needed by an admin, and a bound token sees its one campaign', async () => {
    const names = async (actor: Actor) => (await listCampaignNames(actor)).map((campaign) => campaign.code)
    expect(await names(admin)).toEqual(['elsewhere', 'membership'])
    const bound = actorOf('admin', { tokenScopes: ['read'], tokenCampaignId: 'membership-campaign' })
    expect(await names(bound)).toEqual(['membership'])
  })
})
