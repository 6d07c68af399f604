import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { auditEntries, campaigns, members, runs, samples, uploads } from '@/db/schema'
import { createToken } from '@/lib/access/tokens'
import { type Role } from '@/lib/domain/role'
import { actorOf } from '@/tests/support/actors'
import { findHandlers } from '@/tests/support/find-handlers'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makePerson } from '@/tests/support/make-person'
import { makeRun } from '@/tests/support/make-run'

/*
 * A campaign one has no part in does not exist: every handler that names something in it answers for it what it answers for
 * a name that was never given to anything, byte for byte, and says nothing of it.
 */
const SCOPED = ['campaignId', 'runId', 'uploadId', 'loadingId']
const handlers = (await findHandlers()).filter((one) => one.parameters.some((name) => SCOPED.includes(name)))

/** Never shown by any answer to somebody who has no part in its campaign. */
const CANARY = 'canary'
const strangers = ['technician', 'researcher', 'lead', 'guest'] as const satisfies readonly Role[]

let opened: OpenDatabase
let foreign: Awaited<ReturnType<typeof makeRun>>
const secrets = new Map<Role, string>()
beforeAll(async () => {
  opened = await freshDatabase()
  const db = await getDatabase()
  foreign = await makeRun(db, CANARY)
  const own = await makeRun(db, 'own')
  for (const role of strangers) {
    const person = await makePerson(role, { passwordHash: 'none' })
    await db.insert(members).values({ campaignId: own.campaignId, userId: person.id, role })
    const token = await createToken(actorOf(role, { userId: person.id }), {
      name: 'script',
      scopes: ['read', 'intake', 'write'],
      campaignId: null,
      validDays: 1,
    })
    secrets.set(role, token.secret)
  }
})
afterAll(() => opened.close())

async function ask(handler: (typeof handlers)[number], role: Role, ids: Readonly<Record<string, string>>) {
  const params = Object.fromEntries(handler.parameters.map((name) => [name, ids[name] ?? 'none']))
  const id = Object.values(params).at(-1) ?? ''
  const hasBody = !['GET', 'HEAD', 'DELETE'].includes(handler.method)
  const answer = await handler.call(
    new Request('http://localhost:3000/api/v1/any', {
      method: handler.method,
      headers: {
        Authorization: `Bearer ${secrets.get(role)}`,
        'If-Match': `W/"${id}.1"`,
        ...(hasBody ? { 'Content-Type': 'application/json' } : {}),
      },
      ...(hasBody ? { body: '{}' } : {}),
    }),
    { params: Promise.resolve(params) },
  )
  if (!(answer instanceof Response)) throw new Error('no answer')
  const body = await answer.text()
  // what was asked for may be said back; what was found may not
  const said = Object.values(params).reduce((text, one) => text.replaceAll(one, '…'), body)
  return {
    status: answer.status,
    body: said.replace(/"requestId":"[^"]*"/, ''),
    headers: Object.fromEntries([...answer.headers].filter(([name]) => name !== 'x-request-id')),
  }
}

const stateOf = async () => {
  const db = await getDatabase()
  return JSON.stringify([
    await db.select().from(campaigns),
    await db.select().from(runs),
    await db.select().from(samples),
    await db.select().from(uploads),
    await db.select().from(members),
    await db.select().from(auditEntries),
  ])
}

test('there are handlers to look at', () => {
  expect(handlers.length).toBeGreaterThan(3)
})

describe.each(strangers)('to a %s of another campaign', (role) => {
  test.each(handlers)('what is in this one does not exist: $name', async (handler) => {
    const before = await stateOf()
    const never = {
      campaignId: 'nowhere',
      runId: 'nowhere',
      uploadId: 'nowhere',
      loadingId: 'nowhere',
      userId: 'nowhere',
    }
    const shown = await ask(handler, role, foreign)
    expect(shown.body).not.toContain(CANARY)
    expect(shown.status).toBeGreaterThanOrEqual(400)
    expect(shown.status).not.toBe(500)
    if (handler.method === 'GET') expect(shown.status).toBe(404)
    expect(shown).toEqual(await ask(handler, role, never))
    expect(await stateOf()).toBe(before)
  })
})
