import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { type OpenDatabase } from '@/db/client'
import { signIn } from '@/lib/access/sign-in'
import type * as session from '@/lib/auth/session'
import { findActions, findHandlers } from '@/tests/support/find-handlers'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makePerson, TEST_PASSWORD } from '@/tests/support/make-person'

/*
 * Every handler and every action of the application, found by looking for its file: one that is added later and forgets
 * to ask who it acts for fails here without anybody having to remember this test.
 */
const request = vi.hoisted((): { secret: string | null; headers: Headers } => ({
  secret: null,
  headers: new Headers(),
}))
vi.mock('@/lib/auth/session', async (original) => ({
  ...(await original<typeof session>()),
  readSessionSecret: async () => request.secret,
  readKnownPeople: async () => [],
}))
vi.mock('next/headers', () => ({
  headers: async () => request.headers,
  cookies: async () => {
    throw new Error('no action may touch a cookie before it knows who asks')
  },
}))

const ORIGIN = 'http://localhost:3000'
/** Answer without anybody signed in, each for its reason. */
const PUBLIC_HANDLERS: Readonly<Record<string, string>> = {
  'POST app/api/v1/tokens/route.ts': 'takes e-mail address and password in its body',
  'GET app/api/v1/openapi.json/route.ts': 'describes the interface, not what is in it',
  'GET app/api/v1/health/route.ts': 'says that the server lives',
  'GET app/api/v1/health/live/route.ts': 'says that the server lives',
  'GET app/api/v1/health/ready/route.ts': 'says that the server is ready',
  'POST app/(public)/sign-out/route.ts': 'ends a session, if there is one',
}

const handlers = await findHandlers()
const actions = (await findActions()).map((one) => ({ ...one, isPublic: one.file.startsWith('app/(public)/') }))

let opened: OpenDatabase
let secret: string
beforeAll(async () => {
  opened = await freshDatabase()
  const person = await makePerson('admin')
  const credentials = { email: person.email, password: TEST_PASSWORD }
  secret = (await signIn(credentials, { address: '10.7.0.1', userAgent: '', knownPeople: [] })).secret
})
afterAll(() => opened.close())

/** Any parameter of any address has some value. */
const context = { params: Promise.resolve(new Proxy({}, { get: (_, key) => (key === 'then' ? undefined : 'none') })) }
const send = (method: string, headers: Record<string, string>) =>
  new Request(`${ORIGIN}/api/v1/any`, {
    method,
    headers: { 'If-Match': 'W/"none.1"', ...headers },
    ...(method === 'GET' || method === 'HEAD' ? {} : { body: '{}' }),
  })
const json = { 'Content-Type': 'application/json' }

test('there are handlers and actions to look at', () => {
  expect(handlers.length).toBeGreaterThan(10)
  expect(actions.length).toBeGreaterThan(10)
})

describe('a handler', () => {
  const guarded = handlers.filter((one) => !Object.hasOwn(PUBLIC_HANDLERS, one.name))

  test.each(guarded)('answers nobody with 401: $name', async ({ method, call }) => {
    request.secret = null
    for (const headers of [{}, { ...json, Origin: ORIGIN }, { Authorization: `Bearer ik_${'A'.repeat(43)}` }]) {
      const answer = await call(send(method, headers), context)
      expect(answer).toBeInstanceOf(Response)
      expect(answer instanceof Response ? answer.status : 0).toBe(401)
    }
  })

  test.each(guarded.filter((one) => !['GET', 'HEAD'].includes(one.method)))(
    'does nothing for a cookie that comes from elsewhere: $name',
    async ({ method, call }) => {
      request.secret = secret
      for (const headers of [
        {},
        { Origin: 'https://evil.example' },
        { Origin: 'null' },
        { Origin: ORIGIN, 'Sec-Fetch-Site': 'cross-site' },
        { 'Sec-Fetch-Site': 'same-site' },
      ]) {
        const answer = await call(send(method, { ...json, ...headers }), context)
        expect(answer instanceof Response ? answer.status : 0, JSON.stringify(headers)).toBe(403)
      }
    },
  )

  test.each(guarded)('lets no shared cache keep its answer: $name', async ({ method, call }) => {
    request.secret = null
    const answer = await call(send(method, json), context)
    expect(answer instanceof Response ? answer.headers.get('cache-control') : '').toBe('private, no-store')
  })
})

describe('an action', () => {
  const given = () => [new FormData(), new FormData(), new FormData(), new FormData()]

  test.each(actions.filter((one) => !one.isPublic))(
    'sends nobody to sign in before it does anything: $name',
    async ({ call }) => {
      request.secret = null
      request.headers = new Headers({ origin: ORIGIN, 'content-type': 'text/plain', 'next-action': 'x' })
      await expect(call(...given())).rejects.toMatchObject({
        digest: expect.stringMatching(/^NEXT_REDIRECT;.*;\/sign-in/),
      })
    },
  )

  test.each(actions)('does nothing when it is sent from elsewhere: $name', async ({ call, isPublic }) => {
    request.secret = isPublic ? null : secret
    for (const headers of [
      {},
      { origin: 'https://evil.example' },
      { origin: 'null' },
      { origin: ORIGIN, 'sec-fetch-site': 'cross-site' },
    ]) {
      request.headers = new Headers({ 'content-type': 'text/plain', 'next-action': 'x', ...headers })
      const outcome = await call(...given()).catch((error: unknown) => error)
      expect(outcome, JSON.stringify(headers)).toMatchObject({ code: 'bad-origin' })
    }
  })
})
