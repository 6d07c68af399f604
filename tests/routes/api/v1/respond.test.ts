import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { z } from 'zod'
import { answer, handle, handlePublic, readJson, readQuery, versionFromIfMatch } from '@/app/api/v1/_respond'
import { type OpenDatabase } from '@/db/client'
import { createToken } from '@/lib/access/tokens'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { AppError, appErrorCodes } from '@/lib/domain/errors'
import { actorOf } from '@/tests/support/actors'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makePerson } from '@/tests/support/make-person'

let opened: OpenDatabase
let secret: string
beforeAll(async () => {
  opened = await freshDatabase()
  const person = await makePerson('researcher', { passwordHash: 'none' })
  const token = await createToken(actorOf('researcher', { userId: person.id }), {
    name: 'test',
    scopes: ['read', 'write'],
    campaignId: null,
    validDays: 1,
  })
  secret = token.secret
})
afterAll(() => opened.close())

const post = (body: unknown, headers: Record<string, string> = {}) =>
  new Request('http://localhost:3000/api/v1/things', {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', Authorization: `Bearer ${secret}`, ...headers },
    body: JSON.stringify(body),
  })
const get = () => new Request('http://localhost:3000/api/v1/things')

describe('a body', () => {
  const schema = z.strictObject({
    code: z.string(),
    feed: z.array(z.strictObject({ species: z.string() })).default([]),
  })
  const read = (body: string | ReadableStream<Uint8Array>) =>
    handlePublic(
      new Request('http://localhost:3000/api/v1/things', {
        method: 'POST',
        headers: { 'Content-Type': 'application/json' },
        body,
        ...(typeof body === 'string' ? {} : { duplex: 'half' }),
      }),
      async (request) => readJson(request, schema),
    )

  /** A body without Content-Length that goes on for as long as somebody reads. */
  const endless = () => {
    let sent = 0
    let isCancelled = false
    const stream = new ReadableStream<Uint8Array>({
      pull(controller) {
        sent += 65_536
        controller.enqueue(new Uint8Array(65_536).fill(0x20))
      },
      cancel() {
        isCancelled = true
      },
    })
    return { stream, seen: () => ({ isCancelled, isShort: sent < 1_300_000 }) }
  }

  test('that never ends is read to the limit and no further', async () => {
    const { stream, seen } = endless()
    const answer = await read(stream)
    expect(answer.status).toBe(413)
    expect(await answer.json()).toMatchObject({ code: 'too-large' })
    expect(seen()).toEqual({ isCancelled: true, isShort: true })
  })

  test('nor is it under a key', async () => {
    const { stream, seen } = endless()
    const request = new Request('http://localhost:3000/api/v1/things', {
      method: 'POST',
      headers: {
        'Content-Type': 'application/json',
        Authorization: `Bearer ${secret}`,
        'Idempotency-Key': 'a-key-without-end',
      },
      body: stream,
      ...{ duplex: 'half' },
    })
    const answer = await handle(request, async () => readJson(request, schema))
    expect(answer.status).toBe(413)
    expect(seen()).toEqual({ isCancelled: true, isShort: true })
  })

  test('with fields that do not exist is refused with each of them by name', async () => {
    const answer = await read(JSON.stringify({ code: 'a', colour: 1, feed: [{ species: 'CO2', purity: 2 }] }))
    expect(answer.status).toBe(400)
    const { issues } = (await answer.json()) as { issues: { field: string; message: string }[] }
    expect(issues.sort((a, b) => (a.field < b.field ? -1 : 1))).toEqual([
      { field: 'colour', message: 'There is no such field here. Allowed: code, feed.' },
      { field: 'feed.0.purity', message: 'There is no such field here. Allowed: species.' },
    ])
  })

  test('so are parameters of an address', async () => {
    const query = z.strictObject({ limit: z.string().optional(), cursor: z.string().optional() })
    const answer = await handlePublic(
      new Request('http://localhost:3000/api/v1/things?sort=code&limit=2'),
      async (request) => readQuery(request, query),
    )
    expect(answer.status).toBe(400)
    expect(await answer.json()).toMatchObject({
      issues: [{ field: 'sort', message: 'There is no such field here. Allowed: limit, cursor.' }],
    })
  })
})

describe('a failure', () => {
  /* The statuses as the product describes them, written out once more by hand. */
  test.each([
    ['not-signed-in', 401],
    ['not-allowed', 403],
    ['not-found', 404],
    ['conflict', 409],
    ['stale', 412],
    ['precondition-required', 428],
    ['invalid', 400],
    ['unprocessable', 422],
    ['too-large', 413],
    ['unsupported', 415],
    ['too-many-requests', 429],
    ['bad-origin', 403],
    ['busy', 503],
    ['storage-full', 507],
  ] as const)('%s answers %i', async (code, status) => {
    const response = await handlePublic(get(), async () => {
      throw new AppError(code, 'Run 42 has 2 temperatures; a fit needs 3.', { issues: [{ field: 'a', message: 'b' }] })
    })
    expect(response.status).toBe(status)
    expect(await response.json()).toMatchObject({
      type: `urn:inverse-kelvin:problem:${code}`,
      status,
      code,
      detail: 'Run 42 has 2 temperatures; a fit needs 3.',
      issues: [{ field: 'a', message: 'b' }],
    })
  })
  test('of every code is listed above', () => {
    expect(appErrorCodes).toHaveLength(14)
  })

  test('wrapped by another layer keeps its code', async () => {
    const response = await handlePublic(get(), async () => {
      throw new Error('query failed', { cause: new AppError('conflict', 'There is one already.') })
    })
    expect(response.status).toBe(409)
  })

  test('of the analysis answers 422 with its own code and numbers', async () => {
    const response = await handlePublic(get(), async () => {
      throw new AnalysisError('too-few-points', 'A line needs 3 points; there are 2.', { count: 2 })
    })
    expect(response.status).toBe(422)
    expect(await response.json()).toMatchObject({ code: 'too-few-points', details: { count: 2 } })
  })

  test('with a time to wait says it in the header', async () => {
    const response = await handlePublic(get(), async () => {
      throw new AppError('busy', 'Later.', { retryAfterS: 1.2 })
    })
    expect(response.headers.get('retry-after')).toBe('2')
  })

  test('nobody foresaw shows nothing of the inside and is logged with a reference', async () => {
    const log = vi.spyOn(console, 'error').mockImplementation(() => {})
    const response = await handlePublic(get(), async () => {
      throw new Error('password of the database is hunter2', { cause: new Error('deep') })
    })
    expect(response.status).toBe(500)
    const text = await response.text()
    expect(text).not.toMatch(/hunter2|deep|\.ts/)
    const requestId: unknown = JSON.parse(text).requestId
    expect(log.mock.calls).toHaveLength(1)
    const line = String(log.mock.calls[0]?.[0])
    expect(line).toContain(String(requestId))
    expect(line).toContain('deep')
    expect(line).not.toContain('\n')
    log.mockRestore()
  })
})

describe('a version', () => {
  const withMatch = (value: string) => new Request('http://localhost/', { headers: { 'If-Match': value } })
  test('is read from strong and weak marks of this record', () => {
    expect(versionFromIfMatch(withMatch('W/"run.7"'), 'run')).toBe(7)
    expect(versionFromIfMatch(withMatch('"run.7"'), 'run')).toBe(7)
    expect(versionFromIfMatch(withMatch('W/"a.b.12"'), 'a.b')).toBe(12)
  })
  test('is written so that it can be read', () => {
    const etag = answer({}, { record: { id: 'x.y', version: 3 } }).headers.get('etag') ?? ''
    expect(versionFromIfMatch(withMatch(etag), 'x.y')).toBe(3)
  })
  test.each(['*', '', '"run"', 'run.7', 'W/"run.7", W/"run.8"', 'W/"run.-1"', 'W/"other.7"'])(
    '%j is refused',
    (value) => {
      expect(() => versionFromIfMatch(withMatch(value), 'run')).toThrow(expect.objectContaining({ code: 'stale' }))
    },
  )
})

describe('a repeated request', () => {
  const schema = z.strictObject({ name: z.string() })
  let count = 0
  const make = (request: Request) =>
    handle(request, async () => {
      const { name } = await readJson(request, schema)
      count += 1
      return answer({ name, count }, { status: 201, location: '/there', record: { id: name, version: 1 } })
    })

  test('gets the first answer again, headers included, and the work is done once', async () => {
    count = 0
    const headers = { 'Idempotency-Key': 'a-key-of-my-own' }
    const first = await make(post({ name: 'a' }, headers))
    const second = await make(post({ name: 'a' }, headers))
    expect(count).toBe(1)
    expect([first.status, second.status]).toEqual([201, 201])
    expect(await second.text()).toBe(await first.text())
    for (const name of ['etag', 'location', 'content-type', 'cache-control'])
      expect(second.headers.get(name), name).toBe(first.headers.get(name))
  })

  test('without a key is done again', async () => {
    count = 0
    await make(post({ name: 'a' }))
    await make(post({ name: 'a' }))
    expect(count).toBe(2)
  })

  test('that failed the first time may be mended and sent again with its key', async () => {
    count = 0
    const headers = { 'Idempotency-Key': 'a-key-for-mending' }
    expect((await make(post({ nme: 'a' }, headers))).status).toBe(400)
    expect((await make(post({ name: 'a' }, headers))).status).toBe(201)
    expect(count).toBe(1)
  })

  test('while the first is running is asked to wait', async () => {
    let finish: () => void = () => {}
    const finished = new Promise<void>((done) => (finish = done))
    let begun: () => void = () => {}
    const hasBegun = new Promise<void>((done) => (begun = done))
    const headers = { 'Idempotency-Key': 'a-key-for-two' }
    const first = handle(post({ name: 'a' }, headers), async () => {
      begun()
      await finished
      return { ok: true }
    })
    await hasBegun
    const second = await make(post({ name: 'a' }, headers))
    expect(second.status).toBe(409)
    expect(second.headers.get('retry-after')).toBe('2')
    finish()
    expect((await first).status).toBe(200)
    expect(await (await make(post({ name: 'a' }, headers))).json()).toEqual({ ok: true })
  })
})
