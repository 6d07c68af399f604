import { afterAll, beforeAll, beforeEach, describe, expect, test, vi } from 'vitest'
import { GET as getMe } from '@/app/api/v1/me/route'
import { DELETE as deleteDraft, GET as getDraft, PUT as putDraft } from '@/app/api/v1/drafts/[form]/route'
import { GET as getPeople, POST as postPerson } from '@/app/api/v1/people/route'
import { GET as getPerson, PATCH as patchPerson } from '@/app/api/v1/people/[userId]/route'
import { GET as getPreference, PUT as putPreference } from '@/app/api/v1/preferences/[key]/route'
import { DELETE as deleteToken } from '@/app/api/v1/tokens/[tokenId]/route'
import { GET as getTokens, POST as postToken } from '@/app/api/v1/tokens/route'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { idempotencyKeys } from '@/db/schema'
import { signIn } from '@/lib/access/sign-in'
import type * as session from '@/lib/auth/session'
import { freshDatabase } from '@/tests/support/fresh-database'
import { hashForTests, makePerson, TEST_PASSWORD } from '@/tests/support/make-person'

/* The one thing a route test cannot have is the framework's cookie jar. */
const cookie = vi.hoisted((): { secret: string | null } => ({ secret: null }))
vi.mock('@/lib/auth/session', async (original) => ({
  ...(await original<typeof session>()),
  readSessionSecret: async () => cookie.secret,
}))

const ORIGIN = 'http://localhost:3000'
let opened: OpenDatabase
let passwordHash: string
beforeAll(async () => {
  opened = await freshDatabase()
  passwordHash = await hashForTests()
})
afterAll(() => opened.close())
beforeEach(() => {
  cookie.secret = null
})

let address = 0
const nextAddress = () => `10.2.${++address >> 8}.${address & 255}`

function send(method: string, path: string, body?: unknown, headers: Record<string, string> = {}): Request {
  return new Request(`${ORIGIN}${path}`, {
    method,
    headers: {
      ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
      ...headers,
    },
    ...(body === undefined ? {} : { body: typeof body === 'string' ? body : JSON.stringify(body) }),
  })
}

async function problem(response: Response) {
  expect(response.headers.get('content-type')).toBe('application/problem+json')
  expect(response.headers.get('cache-control')).toBe('private, no-store')
  const body: Record<string, unknown> = await response.json()
  expect(body).toMatchObject({ status: response.status, type: `urn:inverse-kelvin:problem:${String(body.code)}` })
  expect(Object.keys(body)).toEqual(
    expect.arrayContaining(['type', 'title', 'status', 'detail', 'code', 'issues', 'requestId']),
  )
  expect(JSON.stringify(body)).not.toMatch(/node_modules|at .*\.ts:/)
  return body
}

async function signedIn(role: 'technician' | 'admin' = 'technician') {
  const person = await makePerson(role, { passwordHash })
  const { secret } = await signIn(
    { email: person.email, password: TEST_PASSWORD },
    { address: nextAddress(), userAgent: '', knownPeople: [] },
  )
  cookie.secret = secret
  return person
}

async function tokenFor(email: string, more: Record<string, unknown> = {}) {
  const response = await postToken(
    send(
      'POST',
      '/api/v1/tokens',
      { email, password: TEST_PASSWORD, name: 'rig computer', ...more },
      { 'X-Forwarded-For': nextAddress() },
    ),
  )
  expect(response.status).toBe(201)
  const body: { id: string; secret: string } = await response.json()
  return body
}
const bearer = (secret: string) => ({ Authorization: `Bearer ${secret}` })

describe('who is it', () => {
  test('nobody: 401 that says how', async () => {
    const response = await getMe(send('GET', '/api/v1/me'))
    expect(response.status).toBe(401)
    expect(response.headers.get('www-authenticate')).toMatch(/^Bearer/)
    expect((await problem(response)).code).toBe('not-signed-in')
  })

  test('a session', async () => {
    const person = await signedIn()
    const response = await getMe(send('GET', '/api/v1/me'))
    expect(response.status).toBe(200)
    expect(response.headers.get('cache-control')).toBe('private, no-store')
    expect(await response.json()).toEqual({
      id: person.id,
      email: person.email,
      displayName: person.displayName,
      role: 'technician',
      memberships: {},
      tokenScopes: null,
      tokenCampaignId: null,
    })
  })

  test.each(['Bearer ik_' + 'A'.repeat(43), 'Bearer x', 'Basic dXNlcjpwYXNz', 'Bearer', ''])(
    'an Authorization header that opens nothing is refused, and the cookie does not count then: %j',
    async (header) => {
      await signedIn()
      expect((await getMe(send('GET', '/api/v1/me', undefined, { Authorization: header }))).status).toBe(401)
    },
  )
})

describe('tokens', () => {
  test('are made with name and password, shown once, listed without the secret, and end at once', async () => {
    const person = await makePerson('researcher', { passwordHash })
    const made = await tokenFor(person.email, { scopes: ['read', 'write'], validDays: 7 })
    expect(made.secret).toMatch(/^ik_[A-Za-z0-9_-]{43}$/)
    const me = await getMe(send('GET', '/api/v1/me', undefined, bearer(made.secret)))
    expect(await me.json()).toMatchObject({ id: person.id, tokenScopes: ['read', 'write'] })
    const list = await getTokens(send('GET', '/api/v1/tokens', undefined, bearer(made.secret)))
    const text = await list.text()
    expect(text).toContain(made.id)
    expect(text).not.toContain(made.secret)
    const gone = await deleteToken(send('DELETE', `/api/v1/tokens/${made.id}`, undefined, bearer(made.secret)), {
      params: Promise.resolve({ tokenId: made.id }),
    })
    expect(gone.status).toBe(204)
    expect((await getMe(send('GET', '/api/v1/me', undefined, bearer(made.secret)))).status).toBe(401)
  })

  test('need no origin, as they ride on no cookie', async () => {
    const person = await makePerson('researcher', { passwordHash })
    const made = await tokenFor(person.email)
    const response = await deleteToken(
      send('DELETE', `/api/v1/tokens/${made.id}`, undefined, {
        ...bearer(made.secret),
        Origin: 'https://elsewhere.example',
      }),
      { params: Promise.resolve({ tokenId: made.id }) },
    )
    expect(response.status).toBe(204)
  })

  test('of others are not there', async () => {
    const mine = await tokenFor((await makePerson('researcher', { passwordHash })).email)
    const theirs = await tokenFor((await makePerson('researcher', { passwordHash })).email)
    const refused = await deleteToken(send('DELETE', `/api/v1/tokens/${theirs.id}`, undefined, bearer(mine.secret)), {
      params: Promise.resolve({ tokenId: theirs.id }),
    })
    const missing = await deleteToken(send('DELETE', `/api/v1/tokens/none`, undefined, bearer(mine.secret)), {
      params: Promise.resolve({ tokenId: 'none' }),
    })
    expect(refused.status).toBe(404)
    expect({ ...(await problem(refused)), requestId: '' }).toEqual({ ...(await problem(missing)), requestId: '' })
    expect((await getMe(send('GET', '/api/v1/me', undefined, bearer(theirs.secret)))).status).toBe(200)
  })

  test('of scope read do not manage tokens', async () => {
    const person = await makePerson('researcher', { passwordHash })
    const reader = await tokenFor(person.email, { scopes: ['read'] })
    expect((await getTokens(send('GET', '/api/v1/tokens', undefined, bearer(reader.secret)))).status).toBe(403)
  })

  test('for a campaign one has no part in: 404', async () => {
    const person = await makePerson('researcher', { passwordHash })
    const response = await postToken(
      send(
        'POST',
        '/api/v1/tokens',
        { email: person.email, password: TEST_PASSWORD, name: 'x', campaignId: 'somebody-elses' },
        { 'X-Forwarded-For': nextAddress() },
      ),
    )
    expect(response.status).toBe(404)
  })

  test('a wrong password and a name nobody has give the same answer', async () => {
    const person = await makePerson('researcher', { passwordHash })
    const answers = []
    for (const email of [person.email, 'nobody-at-all@example.test']) {
      const response = await postToken(
        send(
          'POST',
          '/api/v1/tokens',
          { email, password: 'not the right one at all', name: 'x' },
          { 'X-Forwarded-For': nextAddress() },
        ),
      )
      const headers = Object.fromEntries(response.headers)
      answers.push({
        status: response.status,
        headers: { ...headers, 'x-request-id': '' },
        body: { ...(await problem(response)), requestId: '' },
      })
    }
    expect(answers[0]).toEqual(answers[1])
    expect(answers[0]).toMatchObject({ status: 401 })
  })
})

describe('requests', () => {
  test('with fields that are not known are refused, and say which', async () => {
    const response = await postToken(
      send('POST', '/api/v1/tokens', { email: 'a@example.test', password: 'x', name: 'y', role: 'admin' }),
    )
    expect(response.status).toBe(400)
    expect(JSON.stringify((await problem(response)).issues)).toContain('role')
  })

  test('that are no JSON are refused', async () => {
    expect((await postToken(send('POST', '/api/v1/tokens', '{"email":'))).status).toBe(400)
    const form = new Request(`${ORIGIN}/api/v1/tokens`, { method: 'POST', body: new URLSearchParams({ email: 'x' }) })
    expect((await postToken(form)).status).toBe(415)
    const long = send('POST', '/api/v1/tokens', JSON.stringify({ email: 'x'.repeat(1_000_001) }))
    expect((await postToken(long)).status).toBe(413)
  })

  test('with a parameter twice are refused', async () => {
    const person = await makePerson('admin', { passwordHash })
    const { secret } = await tokenFor(person.email)
    expect((await getTokens(send('GET', '/api/v1/tokens?userId=a&userId=b', undefined, bearer(secret)))).status).toBe(
      400,
    )
    expect((await getTokens(send('GET', '/api/v1/tokens?other=a', undefined, bearer(secret)))).status).toBe(400)
  })
})

describe('a change that rides on a cookie', () => {
  const draft = (headers: Record<string, string>) =>
    putDraft(send('PUT', '/api/v1/drafts/log-run', { content: { mass: '80 mg' } }, headers), {
      params: Promise.resolve({ form: 'log-run' }),
    })

  test.each([
    ['from here', { Origin: ORIGIN }],
    ['from here, as the browser says too', { Origin: ORIGIN, 'Sec-Fetch-Site': 'same-origin' }],
    ['with no Origin, where the browser says it is from here', { 'Sec-Fetch-Site': 'same-origin' }],
  ])('%s is taken', async (_, headers) => {
    await signedIn()
    expect((await draft(headers)).status).toBe(200)
  })

  test.each([
    ['with neither Origin nor Sec-Fetch-Site', {}],
    ['from another site', { Origin: 'https://elsewhere.example', 'Sec-Fetch-Site': 'cross-site' }],
    ['from another port', { Origin: 'http://localhost:3001' }],
    ['from a sandboxed frame', { Origin: 'null' }],
    ['from a neighbour', { Origin: ORIGIN, 'Sec-Fetch-Site': 'same-site' }],
    ['with no Origin, from another site', { 'Sec-Fetch-Site': 'cross-site' }],
    ['with no Origin, typed in', { 'Sec-Fetch-Site': 'none' }],
    [
      'with a Host that agrees with its Origin',
      { Origin: 'https://elsewhere.example', 'X-Forwarded-Host': 'elsewhere.example' },
    ],
    ['from a name that begins like ours', { Origin: 'http://localhost:3000.elsewhere.example' }],
  ])('%s is refused and changes nothing', async (_, headers) => {
    await signedIn()
    const response = await draft(headers)
    expect(response.status).toBe(403)
    expect((await problem(response)).code).toBe('bad-origin')
    const read = await getDraft(send('GET', '/api/v1/drafts/log-run'), { params: Promise.resolve({ form: 'log-run' }) })
    expect(await read.json()).toEqual({ draft: null })
  })
})

describe('drafts and preferences', () => {
  test('nothing is kept under null: the field is named, and nothing is overwritten', async () => {
    await signedIn()
    const here = { Origin: ORIGIN }
    const form = { params: Promise.resolve({ form: 'log-run' }) }
    await putDraft(send('PUT', '/api/v1/drafts/log-run', { content: { mass: '80 mg' } }, here), form)
    const refused = [
      await putDraft(send('PUT', '/api/v1/drafts/log-run', { content: null }, here), form),
      await putPreference(send('PUT', '/api/v1/preferences/ranking-columns', { content: null }, here), {
        params: Promise.resolve({ key: 'ranking-columns' }),
      }),
    ]
    for (const answer of refused) {
      expect(answer.status).toBe(400)
      expect(await answer.json()).toMatchObject({
        issues: [{ field: 'content', message: 'Say what to keep; nothing is kept under null.' }],
      })
    }
    const read = await getDraft(send('GET', '/api/v1/drafts/log-run'), form)
    expect(await read.json()).toMatchObject({ draft: { content: { mass: '80 mg' } } })
  })

  const here = { Origin: ORIGIN }
  const form = { params: Promise.resolve({ form: 'log-run' }) }

  test('are kept per person, replaced and forgotten', async () => {
    await signedIn()
    const first = cookie.secret
    await putDraft(send('PUT', '/api/v1/drafts/log-run', { content: { mass: '80 mg' } }, here), form)
    await putDraft(send('PUT', '/api/v1/drafts/log-run', { content: { mass: '81 mg' } }, here), form)
    expect(await (await getDraft(send('GET', '/api/v1/drafts/log-run'), form)).json()).toMatchObject({
      draft: { content: { mass: '81 mg' } },
    })
    await signedIn()
    expect(await (await getDraft(send('GET', '/api/v1/drafts/log-run'), form)).json()).toEqual({ draft: null })
    cookie.secret = first
    expect((await deleteDraft(send('DELETE', '/api/v1/drafts/log-run', undefined, here), form)).status).toBe(204)
    expect(await (await getDraft(send('GET', '/api/v1/drafts/log-run'), form)).json()).toEqual({ draft: null })
  })

  test('have names and sizes of reason', async () => {
    await signedIn()
    const long = await putDraft(send('PUT', '/api/v1/drafts/x', { content: 'x'.repeat(64_001) }, here), form)
    expect(long.status).toBe(413)
    for (const name of ['../etc', 'A', '__proto__', ''])
      expect(
        (await getDraft(send('GET', '/api/v1/drafts/x'), { params: Promise.resolve({ form: name }) })).status,
        name,
      ).toBe(400)
  })

  test('say how a person wants something shown', async () => {
    await signedIn()
    const key = { params: Promise.resolve({ key: 'ranking-columns:calder-quay' }) }
    expect(await (await getPreference(send('GET', '/api/v1/preferences/k'), key)).json()).toEqual({ content: null })
    expect(
      (await putPreference(send('PUT', '/api/v1/preferences/k', { content: ['rank', 'Ea'] }, here), key)).status,
    ).toBe(204)
    expect(await (await getPreference(send('GET', '/api/v1/preferences/k'), key)).json()).toEqual({
      content: ['rank', 'Ea'],
    })
  })
})

describe('people', () => {
  test('are an admin’s to see and to make', async () => {
    const technician = await makePerson('technician', { passwordHash })
    const { secret } = await tokenFor(technician.email)
    expect((await getPeople(send('GET', '/api/v1/people', undefined, bearer(secret)))).status).toBe(403)
    const response = await postPerson(
      send('POST', '/api/v1/people', { email: 'new@example.test', displayName: 'New', role: 'admin' }, bearer(secret)),
    )
    expect(response.status).toBe(403)
  })

  test('are made once for one Idempotency-Key', async () => {
    const admin = await makePerson('admin', { passwordHash })
    const { secret } = await tokenFor(admin.email)
    const body = { email: 'once@example.test', displayName: 'Once', role: 'researcher' }
    const post = (content: unknown, key: string) =>
      postPerson(send('POST', '/api/v1/people', content, { ...bearer(secret), 'Idempotency-Key': key }))
    const first = await post(body, 'key-of-the-first')
    expect(first.status).toBe(201)
    const invitation: { code: string } = await first.json()
    // The answer held a secret: it is not kept, so that a repeated request is told that it was done.
    const again = await post(body, 'key-of-the-first')
    expect(again.status).toBe(409)
    expect(JSON.stringify(await problem(again))).not.toContain(invitation.code)
    expect(JSON.stringify(await (await getDatabase()).select().from(idempotencyKeys))).not.toContain(invitation.code)
    const other = await post({ ...body, displayName: 'Other' }, 'key-of-the-first')
    expect(other.status).toBe(422)
    const fresh = await post(body, 'key-of-another')
    expect(fresh.status).toBe(409)
    const short = await post(body, 'short')
    expect(short.status).toBe(400)
  })

  test('twenty requests side by side with one key make one person', async () => {
    const admin = await makePerson('admin', { passwordHash })
    const { secret } = await tokenFor(admin.email)
    const body = { email: 'side-by-side@example.test', displayName: 'Side', role: 'researcher' }
    const statuses = await Promise.all(
      Array.from({ length: 20 }, async () => {
        const response = await postPerson(
          send('POST', '/api/v1/people', body, { ...bearer(secret), 'Idempotency-Key': 'side-by-side-key' }),
        )
        return response.status
      }),
    )
    expect(statuses.every((status) => status === 201 || status === 409)).toBe(true)
    const people = await getPeople(send('GET', '/api/v1/people', undefined, bearer(secret)))
    const list: { people: { email: string }[] } = await people.json()
    expect(list.people.filter((one) => one.email === body.email)).toHaveLength(1)
  })

  test('are changed from the version that was read', async () => {
    const admin = await makePerson('admin', { passwordHash })
    const { secret } = await tokenFor(admin.email)
    const person = await makePerson('technician', { passwordHash })
    const context = { params: Promise.resolve({ userId: person.id }) }
    const path = `/api/v1/people/${person.id}`
    const read = await getPerson(send('GET', path, undefined, bearer(secret)), context)
    const etag = read.headers.get('etag') ?? ''
    expect(etag).toBe(`W/"${person.id}.1"`)
    const patch = (headers: Record<string, string>) =>
      patchPerson(send('PATCH', path, { role: 'researcher' }, { ...bearer(secret), ...headers }), context)
    expect((await patch({})).status).toBe(428)
    expect((await patch({ 'If-Match': '*' })).status).toBe(412)
    expect((await patch({ 'If-Match': `W/"${person.id}.2"` })).status).toBe(412)
    expect((await patch({ 'If-Match': `W/"somebody.1"` })).status).toBe(412)
    const changed = await patch({ 'If-Match': etag })
    expect(changed.status).toBe(200)
    expect(changed.headers.get('etag')).toBe(`W/"${person.id}.2"`)
    expect(await changed.json()).toMatchObject({ role: 'researcher', version: 2 })
    expect((await patch({ 'If-Match': etag })).status).toBe(412)
  })

  test('keep one admin who can sign in', async () => {
    const { secret, admin } = await (async () => {
      const one = await makePerson('admin', { passwordHash })
      return { admin: one, ...(await tokenFor(one.email)) }
    })()
    const people: { people: { id: string; role: string; version: number }[] } = await (
      await getPeople(send('GET', '/api/v1/people', undefined, bearer(secret)))
    ).json()
    const change = (id: string, version: number) =>
      patchPerson(
        send(
          'PATCH',
          `/api/v1/people/${id}`,
          { role: 'lead' },
          { ...bearer(secret), 'If-Match': `W/"${id}.${version}"` },
        ),
        { params: Promise.resolve({ userId: id }) },
      )
    for (const one of people.people)
      if (one.role === 'admin' && one.id !== admin.id) expect((await change(one.id, one.version)).status).toBe(200)
    expect((await change(admin.id, 1)).status).toBe(409)
  })
})
