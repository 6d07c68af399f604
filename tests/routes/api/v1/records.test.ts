import { rmSync } from 'node:fs'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { z } from 'zod'
import { operations } from '@/app/api/v1/_operations'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { insertUpload } from '@/db/mutations/uploads'
import { createCalibration } from '@/lib/access/calibrations'
import { createColumnMap } from '@/lib/access/column-maps'
import { createRun } from '@/lib/access/runs'
import { createToken } from '@/lib/access/tokens'
import type * as session from '@/lib/auth/session'
import { newCalibrationSchema } from '@/lib/domain/calibration'
import { newColumnMapSchema } from '@/lib/domain/column-map'
import { tokenScopes } from '@/lib/domain/role'
import { actorOf } from '@/tests/support/actors'
import { askApi, type Asked } from '@/tests/support/ask-api'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'
import { trail } from '@/tests/support/trail'

const dataDir = await vi.hoisted(async () => {
  const { mkdtempSync } = await import('node:fs')
  const { tmpdir } = await import('node:os')
  process.env.DATA_DIR = mkdtempSync(`${tmpdir()}/ik-records-`)
  return process.env.DATA_DIR
})
/* The one thing a route test cannot have is the framework's cookie jar; the requests carry tokens. */
vi.mock('@/lib/auth/session', async (original) => ({
  ...(await original<typeof session>()),
  readSessionSecret: async () => null,
}))

const callers = ['technician', 'researcher', 'lead', 'guest', 'admin', 'stranger'] as const

let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
const secrets = new Map<string, string>()
let uploadId: string
let calibrationId: string
let columnMapId: string
beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
  for (const caller of callers) {
    const actor =
      caller === 'admin'
        ? lab.admin
        : caller === 'stranger'
          ? lab.other.lead
          : actorOf(caller, { userId: `own-${caller}` })
    const token = await createToken(actor, {
      name: 'script',
      scopes: ['read', 'intake', 'write'],
      campaignId: null,
      validDays: 1,
    })
    secrets.set(caller, token.secret)
  }
  for (const scope of tokenScopes) {
    const others = tokenScopes.filter((one) => one !== scope && !(scope === 'intake' && one === 'write'))
    for (const [name, scopes] of [
      [`only ${scope}`, [scope]],
      [`without ${scope}`, others],
    ] as const) {
      const token = await createToken(lab.admin, { name, scopes: [...scopes], campaignId: null, validDays: 1 })
      secrets.set(name, token.secret)
    }
  }
  uploadId = 'upload-of-own'
  await (
    await getDatabase()
  ).transaction((tx) =>
    insertUpload(tx, {
      id: uploadId,
      campaignId: lab.own.campaign.id,
      runId: lab.own.run.id,
      sha256: 'a'.repeat(64),
      byteCount: 1,
      fileName: 'log.csv',
      createdBy: lab.own.lead.userId,
    }),
  )
  calibrationId = (await createCalibration(lab.admin, newCalibrationSchema.parse(calibrationBody()))).id
  columnMapId = (await createColumnMap(lab.admin, newColumnMapSchema.parse(columnMapBody()))).id
})
afterAll(async () => {
  await opened.close()
  rmSync(dataDir, { recursive: true, force: true })
})

const ask = (caller: string | null, method: string, address: string, asked?: Asked) =>
  askApi(caller === null ? null : (secrets.get(caller) ?? ''), method, address, asked)

const withId = z.looseObject({ id: z.string() })
const page = z.strictObject({ items: z.array(withId), next: z.string().nullable() })

const ids = () => ({
  c: lab.own.campaign.id,
  s: lab.own.sample.id,
  r: lab.own.run.id,
  l: lab.own.run.loadingId,
  g: lab.rig.id,
  x: lab.reaction.id,
  u: uploadId,
  k: calibrationId,
  m: columnMapId,
})
let counted = 0
const fresh = () => `N-${++counted}`

const runBody = () => ({
  campaignId: lab.own.campaign.id,
  rigId: lab.rig.id,
  channel: '1',
  loading: { sampleId: lab.own.sample.id, catalystMassKg: 1e-4 },
  startedAt: '2026-03-02T07:30:00+01:00',
})
const calibrationBody = () => ({
  kind: 'balance',
  name: fresh(),
  entries: [{ value: 1, unit: 'kg per kg', relativeStandardUncertainty: 0.001 }],
  validFrom: '2026-01-01T00:00:00Z',
})

const columnMapBody = () => ({
  rigId: lab.rig.id,
  instrument: fresh(),
  fingerprint: 'f',
  specification: { kind: 'analyser', columns: [], decimalMark: '.', timeZone: 'UTC' },
})

interface Line {
  readonly route: string
  readonly body?: () => unknown
  /** an edit made from version 99, so that 412 says: allowed, had it been the version there */
  readonly stale?: string
  readonly headers?: Readonly<Record<string, string>>
  /** technician, researcher, lead, guest, admin, lead of another campaign */
  readonly is: readonly [number, number, number, number, number, number]
}

/** Written by hand from the table of who may do what. */
const table: readonly Line[] = [
  { route: 'GET /campaigns', is: [200, 200, 200, 200, 200, 200] },
  { route: 'GET /campaigns/:c', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/members', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/methods', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/samples', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/samples/:s', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/history', is: [403, 403, 200, 404, 200, 404] },
  { route: 'GET /runs', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /runs/:r', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /runs/:r/decision', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /runs/:r/exclusions', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /runs/:r/hold-edits', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /runs/:r/remarks', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /loadings', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /loadings/:l', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /samples', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /samples/:s', is: [200, 200, 200, 403, 200, 404] },
  { route: 'GET /samples/:s/lots', is: [200, 200, 200, 403, 200, 404] },
  { route: 'GET /samples/:s/site-counts', is: [200, 200, 200, 403, 200, 404] },
  { route: 'GET /reactions', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /reactions/:x', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /rigs', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /rigs/:g', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /rigs/:g/last-run', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /calibrations', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /calibrations/:k', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /column-maps', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /column-maps/:m', is: [200, 200, 200, 403, 200, 200] },
  { route: 'GET /campaigns/:c/ranking', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/ranking.csv', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/ranking.xlsx', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /campaigns/:c/editions', is: [200, 200, 200, 200, 200, 404] },
  // none has been published here; a guest may ask
  { route: 'GET /campaigns/:c/editions/1', is: [404, 404, 404, 404, 404, 404] },
  { route: 'GET /campaigns/:c/editions/1/ranking.csv', is: [404, 404, 404, 404, 404, 404] },
  { route: 'GET /campaigns/:c/editions/1/ranking.xlsx', is: [404, 404, 404, 404, 404, 404] },
  // signed by a person at a screen: no token may, a lead's neither
  { route: 'GET /campaigns/:c/editions/proposal', is: [403, 403, 403, 404, 403, 404] },
  {
    route: 'POST /campaigns/:c/editions',
    body: () => ({ contentSha256: 'a'.repeat(64), statement: 'Reviewed and released.', password: 'x' }),
    is: [403, 403, 403, 404, 403, 404],
  },
  {
    route: 'POST /campaigns/:c/editions/1/withdrawal',
    body: () => ({ reason: 'wrong site count' }),
    is: [403, 403, 403, 404, 403, 404],
  },
  { route: 'GET /runs/:r/result', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /runs/:r/points', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /runs/:r/uploads', is: [200, 200, 200, 404, 200, 404] },
  // a form without a file, so that 400 says: allowed, had there been one
  { route: 'POST /runs/:r/uploads', body: () => new FormData(), is: [400, 400, 400, 404, 400, 404] },
  {
    route: 'POST /calibrations/files?validFrom=2026-01-01T00:00:00Z',
    body: () => new FormData(),
    is: [400, 400, 400, 403, 400, 400],
  },
  { route: 'GET /uploads/:u', is: [200, 200, 200, 404, 200, 404] },
  { route: 'GET /uploads/:u/preview', is: [422, 422, 422, 404, 422, 404] },
  { route: 'GET /uploads/:u/content', is: [404, 404, 404, 404, 404, 404] },
  {
    route: 'PATCH /uploads/:u',
    body: () => ({ answers: { kind: 'attachment' } }),
    stale: 'u',
    is: [412, 412, 412, 404, 412, 404],
  },
  { route: 'POST /uploads/:u/confirm', stale: 'u', is: [412, 412, 412, 404, 412, 404] },
  {
    route: 'POST /uploads/:u/set-aside',
    body: () => ({ reason: 'of another run' }),
    stale: 'u',
    is: [412, 412, 412, 404, 412, 404],
  },
  { route: 'GET /me', is: [200, 200, 200, 200, 200, 200] },
  { route: 'GET /tokens', is: [200, 200, 200, 200, 200, 200] },
  { route: 'GET /tokens?userId=own-researcher', is: [403, 200, 403, 403, 200, 403] },
  { route: 'DELETE /tokens/none', is: [404, 404, 404, 404, 404, 404] },
  { route: 'GET /people', is: [403, 403, 403, 403, 200, 403] },
  { route: 'GET /people/own-lead', is: [403, 403, 403, 403, 200, 403] },
  {
    route: 'POST /people',
    body: () => ({ email: `${fresh()}@example.test`, displayName: 'New', role: 'technician' }),
    is: [403, 403, 403, 403, 201, 403],
  },
  {
    route: 'PATCH /people/own-guest',
    body: () => ({ isDisabled: false }),
    headers: { 'If-Match': 'W/"own-guest.99"' },
    is: [403, 403, 403, 403, 412, 403],
  },
  { route: 'POST /people/own-guest/invitations', is: [403, 403, 403, 403, 201, 403] },
  { route: 'DELETE /people/other-guest/sessions', is: [403, 403, 403, 403, 200, 403] },
  // what a person at a screen keeps is out of reach of every token
  { route: 'GET /drafts/log-run', is: [403, 403, 403, 403, 403, 403] },
  { route: 'PUT /drafts/log-run', body: () => ({ content: { notes: 'x' } }), is: [403, 403, 403, 403, 403, 403] },
  { route: 'DELETE /drafts/log-run', is: [403, 403, 403, 403, 403, 403] },
  { route: 'GET /preferences/ranking-columns', is: [403, 403, 403, 403, 403, 403] },
  { route: 'PUT /preferences/ranking-columns', body: () => ({ content: {} }), is: [403, 403, 403, 403, 403, 403] },
  {
    route: 'PATCH /calibrations/:k',
    body: () => ({ validTo: null }),
    stale: 'k',
    is: [412, 412, 412, 403, 412, 412],
  },
  {
    route: 'POST /campaigns/:c/reopen',
    body: () => ({ reason: 'more to do' }),
    stale: 'c',
    is: [403, 403, 409, 404, 403, 404],
  },
  {
    route: 'PATCH /campaigns/:c/members/nobody',
    body: () => ({ role: 'guest' }),
    is: [403, 403, 404, 404, 404, 404],
  },
  {
    route: 'POST /runs/:r/exclusions/none/withdrawal',
    body: () => ({ reason: 'it was fine' }),
    is: [403, 404, 404, 404, 404, 404],
  },
  {
    route: 'POST /runs/:r/hold-edits/none/withdrawal',
    body: () => ({ reason: 'it was fine' }),
    is: [403, 404, 404, 404, 404, 404],
  },
  {
    route: 'POST /campaigns',
    body: () => ({ code: fresh(), name: 'New', reactionId: lab.reaction.id }),
    is: [403, 403, 201, 403, 201, 201],
  },
  { route: 'PATCH /campaigns/:c', body: () => ({ name: 'New' }), stale: 'c', is: [403, 403, 412, 404, 403, 404] },
  {
    route: 'POST /campaigns/:c/close',
    body: () => ({ reason: 'finished' }),
    stale: 'c',
    is: [403, 403, 412, 404, 403, 404],
  },
  {
    route: 'POST /campaigns/:c/members',
    body: () => ({ userId: 'nobody', role: 'guest' }),
    is: [403, 403, 422, 404, 422, 404],
  },
  {
    route: 'DELETE /campaigns/:c/members/own-lead',
    is: [403, 403, 409, 404, 409, 404],
  },
  {
    route: 'POST /campaigns/:c/methods',
    body: () => ({ settings: {}, reason: 'as before' }),
    is: [403, 403, 201, 404, 403, 404],
  },
  {
    route: 'POST /campaigns/:c/samples',
    body: () => ({ sampleId: lab.own.sample.id }),
    is: [409, 409, 409, 404, 409, 404],
  },
  {
    route: 'PATCH /campaigns/:c/samples/:s',
    body: () => ({ remark: 'x' }),
    stale: 's',
    is: [403, 412, 412, 404, 412, 404],
  },
  {
    route: 'PATCH /campaigns/:c/samples/:s',
    body: () => ({ isShortlisted: true }),
    stale: 's',
    is: [403, 403, 412, 404, 403, 404],
  },
  {
    route: 'PATCH /campaigns/:c/samples/:s',
    body: () => ({ priority: 1 }),
    stale: 's',
    is: [403, 403, 412, 404, 403, 404],
  },
  { route: 'POST /runs', body: runBody, is: [201, 201, 201, 404, 201, 404] },
  { route: 'PATCH /runs/:r', body: () => ({ notes: 'x' }), stale: 'r', is: [412, 412, 412, 404, 412, 404] },
  { route: 'POST /runs/:r/hand-in', stale: 'r', is: [412, 412, 412, 404, 412, 404] },
  {
    route: 'POST /runs/:r/decision',
    body: () => ({ decision: 'counts', reason: 'looks right' }),
    stale: 'r',
    is: [403, 403, 412, 404, 403, 404],
  },
  {
    route: 'POST /runs/:r/exclusions',
    body: () => ({ kind: 'hold', atS: ++counted, reason: 'slipped' }),
    is: [403, 201, 201, 404, 201, 404],
  },
  {
    route: 'POST /runs/:r/hold-edits',
    body: () => ({ foundStartS: ++counted, startS: 1, endS: 2, reason: 'late to settle' }),
    is: [403, 201, 201, 404, 201, 404],
  },
  { route: 'POST /runs/:r/remarks', body: () => ({ body: 'x' }), is: [403, 201, 201, 404, 201, 404] },
  { route: 'PATCH /loadings/:l', body: () => ({ bedLengthM: 0.02 }), stale: 'l', is: [412, 412, 412, 404, 412, 404] },
  { route: 'POST /samples', body: () => ({ code: fresh(), name: 'New' }), is: [201, 201, 201, 403, 201, 201] },
  { route: 'PATCH /samples/:s', body: () => ({ notes: 'x' }), stale: 's', is: [412, 412, 412, 403, 412, 404] },
  { route: 'POST /samples/:s/lots', body: () => ({ code: fresh() }), is: [201, 201, 201, 403, 201, 404] },
  {
    route: 'POST /samples/:s/site-counts',
    body: () => ({ method: 'H2 chemisorption', molPerKg: 0.06 }),
    is: [201, 201, 201, 403, 201, 404],
  },
  {
    route: 'POST /reactions',
    body: () => ({ code: fresh(), name: 'New', keyReactant: 'CO2', steps: [{ CO2: -1, H2: -1, CO: 1, H2O: 1 }] }),
    is: [403, 201, 201, 403, 201, 201],
  },
  { route: 'PATCH /reactions/:x', body: () => ({ notes: 'x' }), stale: 'x', is: [403, 412, 412, 403, 412, 412] },
  {
    route: 'POST /rigs',
    body: () => ({ code: fresh(), name: 'New', channels: [{ code: '1' }] }),
    is: [403, 403, 403, 403, 201, 403],
  },
  { route: 'PATCH /rigs/:g', body: () => ({ notes: 'x' }), stale: 'g', is: [403, 403, 403, 403, 412, 403] },
  { route: 'POST /calibrations', body: calibrationBody, is: [201, 201, 201, 403, 201, 201] },
  {
    route: 'POST /column-maps',
    body: columnMapBody,
    is: [201, 201, 201, 403, 201, 201],
  },
]

const addressOf = (route: string) => {
  const [method = '', path = ''] = route.split(' ')
  const known: Readonly<Record<string, string>> = ids()
  return { method, path: path.replaceAll(/:(\w)\b/g, (_, name: string) => known[name] ?? '') }
}

describe('who may do what, by HTTP', () => {
  test.each(table)('$route is $is', async ({ route, body, stale, headers, is }) => {
    const { method, path } = addressOf(route)
    const known: Readonly<Record<string, string>> = ids()
    const got: number[] = []
    for (const caller of callers) {
      const before = (await trail()).length
      const answer = await ask(caller, method, path, {
        ...(body === undefined ? {} : { body: body() }),
        headers: { ...headers, ...(stale === undefined ? {} : { 'If-Match': `W/"${known[stale]}.99"` }) },
      })
      got.push(answer.status)
      // a change that was made has its entry, one that was refused has none
      const isDone = answer.status === 201 || (method === 'DELETE' && answer.status === 200)
      expect((await trail()).length - before, caller).toBe(isDone ? 1 : 0)
    }
    expect(got).toEqual([...is])
    expect((await ask(null, method, path, body === undefined ? {} : { body: body() })).status).toBe(401)
  })
})

/** Where the table holds no line for an operation, and where it is held instead. */
const ELSEWHERE: Readonly<Record<string, string>> = {
  'get /openapi.json': 'openapi.test.ts: open to all',
  'post /tokens': 'people.test.ts: needs a password, not a token',
}

const operationOf = (route: string) => {
  const [method = '', path = ''] = route.split(' ')
  const parts = path.replace(/\?.*/, '').split('/')
  const literals = (pattern: string) => pattern.split('/').filter((part) => !part.startsWith('{')).length
  return operations
    .filter((one) => {
      const pattern = one.path.split('/')
      return (
        one.method === method.toLowerCase() &&
        pattern.length === parts.length &&
        pattern.every((part, n) => part === parts[n] || part.startsWith('{'))
      )
    })
    .sort((a, b) => literals(b.path) - literals(a.path))[0]
}

test('the table has a line for every operation of the interface', () => {
  const held = new Set(table.map(({ route }) => operationOf(route)))
  expect(
    operations
      .filter((one) => !held.has(one))
      .map((one) => `${one.method} ${one.path}`)
      .sort(),
  ).toEqual(Object.keys(ELSEWHERE).sort())
})

describe('the scope that the description asks for is the one that is needed', () => {
  test.each(table.filter(({ route }) => operationOf(route)?.isForPersons !== true))(
    '$route',
    async ({ route, body, stale, headers, is }) => {
      const scope = operationOf(route)?.scope
      if (scope === null || scope === undefined) throw new Error(`${route} needs no scope`)
      const { method, path } = addressOf(route)
      const known: Readonly<Record<string, string>> = ids()
      const statusFor = async (token: string) => {
        const answer = await ask(token, method, path, {
          ...(body === undefined ? {} : { body: body() }),
          headers: { ...headers, ...(stale === undefined ? {} : { 'If-Match': `W/"${known[stale]}.99"` }) },
        })
        return answer.status
      }
      if (scope === 'any') {
        // to know oneself no scope is needed; what is not there is hidden from each alike
        for (const one of tokenScopes) expect(await statusFor(`only ${one}`)).toBe(is[4])
        return
      }
      expect([403, 404]).toContain(await statusFor(`without ${scope}`))
      // the token is an admin's
      if (![403, 404].includes(is[4])) expect([403, 404]).not.toContain(await statusFor(`only ${scope}`))
    },
  )
})

test.each([
  '/campaigns/nowhere',
  '/campaigns/nowhere/members',
  '/campaigns/nowhere/methods',
  '/campaigns/nowhere/samples',
  '/campaigns/nowhere/history',
  '/campaigns/nowhere/editions',
  '/campaigns/nowhere/ranking',
  '/runs?campaignId=nowhere',
  '/samples/nowhere/lots',
  '/runs/nowhere/remarks',
  '/runs/nowhere/uploads',
])('who reads everything finds nothing where nothing is: %s', async (address) => {
  expect((await ask('admin', 'GET', address)).status).toBe(404)
})

describe('edits', () => {
  test('the ETag of what was read is asked for, holds once, and not for something else', async () => {
    const made = await ask('lead', 'POST', '/samples', { body: { code: fresh(), name: 'New' } })
    const { id } = withId.parse(made.body)
    expect([made.etag, made.location]).toEqual([`W/"${id}.1"`, `/api/v1/samples/${id}`])
    const read = await ask('lead', 'GET', `/samples/${id}`)
    expect([read.etag, read.body]).toEqual([made.etag, made.body])
    const edit = (headers: Record<string, string>) =>
      ask('lead', 'PATCH', `/samples/${id}`, { body: { notes: 'dried' }, headers })
    expect((await edit({})).status).toBe(428)
    expect((await edit({ 'If-Match': `W/"${lab.own.sample.id}.1"` })).status).toBe(412)
    const first = await edit({ 'If-Match': read.etag ?? '' })
    expect([first.status, first.etag]).toEqual([200, `W/"${id}.2"`])
    const second = await edit({ 'If-Match': read.etag ?? '' })
    expect([second.status, second.body]).toMatchObject([412, { code: 'stale', details: { current: first.body } }])
  })

  test('a run from logging to decision', async () => {
    const made = await ask('technician', 'POST', '/runs', { body: runBody() })
    const { id } = withId.parse(made.body)
    const seen = { headers: { 'If-Match': made.etag ?? '' } }
    expect((await ask('technician', 'POST', `/runs/${id}/hand-in`)).status).toBe(428)
    const handedIn = await ask('technician', 'POST', `/runs/${id}/hand-in`, seen)
    expect([handedIn.status, handedIn.body]).toMatchObject([200, { state: 'handed-in', version: 2 }])
    expect((await ask('technician', 'POST', `/runs/${id}/hand-in`, seen)).status).toBe(412)
    const now = { 'If-Match': handedIn.etag ?? '' }
    expect((await ask('researcher', 'POST', `/runs/${id}/hand-in`, { headers: now })).status).toBe(409)
    const decided = await ask('lead', 'POST', `/runs/${id}/decision`, {
      body: { decision: 'counts', reason: 'balance closes' },
      headers: now,
    })
    expect([decided.status, decided.body]).toMatchObject([
      200,
      { state: 'decided', decision: 'counts', decisionReason: 'balance closes', version: 3 },
    ])
  })
})

describe('requests that are not as described', () => {
  test.each([
    { name: 'a field too many', body: () => ({ ...runBody(), state: 'decided' }), status: 400 },
    { name: 'a field too few', body: () => ({ campaignId: lab.own.campaign.id }), status: 400 },
    {
      name: 'an instant without its offset',
      body: () => ({ ...runBody(), startedAt: '2026-03-02T07:30' }),
      status: 400,
    },
    { name: 'no JSON', body: () => '{', status: 400 },
    { name: 'another type', body: runBody, type: 'text/plain', status: 415 },
    { name: 'a channel the rig has not', body: () => ({ ...runBody(), channel: '9' }), status: 422 },
    { name: 'a code taken already', body: () => ({ ...runBody(), code: 'R-0001' }), status: 409 },
  ])('$name: $status', async ({ body, type, status }) => {
    const before = (await trail()).length
    const answer = await ask('lead', 'POST', '/runs', { body: body(), ...(type === undefined ? {} : { type }) })
    expect(answer.status).toBe(status)
    expect((await trail()).length).toBe(before)
  })

  test.each([
    { query: '?limit=0' },
    { query: '?limit=501' },
    { query: '?limit=many' },
    { query: '?state=lost' },
    { query: '?sort=code' },
    { query: '?cursor=e30.AAAA' },
    { query: '?state=open&state=decided' },
  ])('a list asked $query: 400', async ({ query }) => {
    expect((await ask('lead', 'GET', `/runs${query}`)).status).toBe(400)
  })
})

test('the same creating request twice makes one run and answers alike; another under its key is refused', async () => {
  const headers = { 'Idempotency-Key': '6a2f1e08-3c37-4d0c-9a51-8a8a8c1f77aa' }
  const body = runBody()
  const first = await ask('lead', 'POST', '/runs', { body, headers })
  const before = (await trail()).length
  const again = await ask('lead', 'POST', '/runs', { body, headers })
  expect([again.status, again.body, again.etag]).toEqual([201, first.body, first.etag])
  expect((await ask('lead', 'POST', '/runs', { body: { ...body, notes: 'x' }, headers })).status).toBe(422)
  expect((await trail()).length).toBe(before)
})

test('pages follow on by their cursor, and a cursor opens no other list', async () => {
  for (let n = 0; n < 5; n++) await createRun(lab.own.lead, lab.own.runInput())
  const whole = page.parse((await ask('lead', 'GET', '/runs?limit=500')).body)
  expect(whole.next).toBeNull()
  const seen: string[] = []
  let cursor: string | null = null
  do {
    const query: string = cursor === null ? '?limit=4' : `?limit=4&cursor=${encodeURIComponent(cursor)}`
    const part = page.parse((await ask('lead', 'GET', `/runs${query}`)).body)
    seen.push(...part.items.map((row) => row.id))
    cursor = part.next
    if (cursor !== null)
      expect((await ask('lead', 'GET', `/loadings?cursor=${encodeURIComponent(cursor)}`)).status).toBe(400)
  } while (cursor !== null)
  expect(seen).toEqual(whole.items.map((row) => row.id))
})
