import { rmSync } from 'node:fs'
import { afterAll, beforeAll, beforeEach, describe, expect, test, vi } from 'vitest'
import { z } from 'zod'
import { GET as getDescription } from '@/app/api/v1/openapi.json/route'
import { operations, refusalsOf, type Operation } from '@/app/api/v1/_operations'
import type * as respond from '@/app/api/v1/_respond'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { members, methods } from '@/db/schema'
import type * as results from '@/lib/access/results'
import { signIn } from '@/lib/access/sign-in'
import { createToken } from '@/lib/access/tokens'
import type * as session from '@/lib/auth/session'
import { methodSettingsSchema } from '@/lib/domain/method'
import { exampleRanking } from '@/tests/support/example-ranking'
import { askApi, type Asked } from '@/tests/support/ask-api'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'
import { makePerson, TEST_PASSWORD } from '@/tests/support/make-person'

/*
 * Every operation of the interface is asked once so that it does what it is for, and its answer held against openapi.json as it is published; then each
 * is asked in the ways its description says it refuses.
 */
const dataDir = await vi.hoisted(async () => {
  const { mkdtempSync } = await import('node:fs')
  const { tmpdir } = await import('node:os')
  process.env.DATA_DIR = mkdtempSync(`${tmpdir()}/ik-described-`)
  return process.env.DATA_DIR
})
const cookie = vi.hoisted((): { secret: string | null } => ({ secret: null }))
vi.mock('@/lib/auth/session', async (original) => ({
  ...(await original<typeof session>()),
  readSessionSecret: async () => cookie.secret,
}))
/** What a publication freezes is the ranking of the campaign; for one test it is given. */
const given = vi.hoisted((): { rank: ((campaignId: string) => unknown) | null } => ({ rank: null }))
vi.mock('@/lib/access/results', async (original) => {
  const real = await original<typeof results>()
  return {
    ...real,
    rankCampaign: async (...asked: Parameters<typeof real.rankCampaign>) =>
      given.rank === null ? real.rankCampaign(...asked) : given.rank(asked[1]),
  }
})
/** The schemas that the handler parsed with. */
const parsed = vi.hoisted((): { body: unknown; query: unknown } => ({ body: undefined, query: undefined }))
vi.mock('@/app/api/v1/_respond', async (original) => {
  const real = await original<typeof respond>()
  return {
    ...real,
    readJson: async (request: Request, schema: z.ZodType) => {
      parsed.body = schema
      return real.readJson(request, schema)
    },
    readQuery: (request: Request, schema: z.ZodType) => {
      parsed.query = schema
      return real.readQuery(request, schema)
    },
  }
})

const ORIGIN = 'http://localhost:3000'
const published = z
  .looseObject({
    paths: z.record(
      z.string(),
      z.record(
        z.string(),
        z.looseObject({
          responses: z.record(
            z.string(),
            z.looseObject({ content: z.record(z.string(), z.looseObject({ schema: z.json() })).optional() }),
          ),
        }),
      ),
    ),
  })
  .parse(await (await getDescription()).json())

let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
const secrets = { admin: '', lead: '' }
let person: Awaited<ReturnType<typeof makePerson>>
let ownSession: string
let leadSession: string
beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
  const wanted = { name: 'script', scopes: ['read', 'intake', 'write'], campaignId: null, validDays: 1 } as const
  secrets.admin = (await createToken(lab.admin, { ...wanted, scopes: [...wanted.scopes] })).secret
  secrets.lead = (await createToken(lab.own.lead, { ...wanted, scopes: [...wanted.scopes] })).secret
  person = await makePerson('researcher')
  const credentials = { email: person.email, password: TEST_PASSWORD }
  ownSession = (await signIn(credentials, { address: '10.8.0.1', userAgent: '', knownPeople: [] })).secret
  const signer = await makePerson('lead')
  await (
    await getDatabase()
  )
    .insert(members)
    .values({ campaignId: lab.own.campaign.id, userId: signer.id, role: 'lead' })
  const signs = { email: signer.email, password: TEST_PASSWORD }
  leadSession = (await signIn(signs, { address: '10.8.0.2', userAgent: '', knownPeople: [] })).secret
})
afterAll(async () => {
  await opened.close()
  rmSync(dataDir, { recursive: true, force: true })
})
beforeEach(() => {
  cookie.secret = null
})

const nameOf = (operation: Operation) => `${operation.method} ${operation.path}`
const done = new Set<string>()
const record = z.looseObject({ id: z.string(), version: z.int() })

type Caller = keyof typeof secrets | 'person' | 'lead-person' | 'nobody'

/** Asks for what must succeed; answers the body, which is as openapi.json publishes it. */
async function succeed(caller: Caller, method: string, address: string, asked: Asked = {}) {
  parsed.body = undefined
  parsed.query = undefined
  const isAtScreen = caller === 'person' || caller === 'lead-person'
  cookie.secret = caller === 'person' ? ownSession : caller === 'lead-person' ? leadSession : null
  const secret = isAtScreen || caller === 'nobody' ? null : secrets[caller]
  const answer = await askApi(secret, method, address, {
    ...asked,
    headers: { ...(isAtScreen ? { Origin: ORIGIN } : {}), ...asked.headers },
  })
  const { operation, status, body } = answer
  expect(status, JSON.stringify(body)).toBeLessThan(300)
  // the schemas shown are the very ones that are parsed with
  expect(parsed.body, nameOf(operation)).toBe(operation.body)
  expect(parsed.query, nameOf(operation)).toBe(operation.query)
  const shown = published.paths[operation.path]?.[operation.method]?.responses[String(status)]
  expect(shown, `${nameOf(operation)} ${String(status)}`).toBeDefined()
  const schema = shown?.content?.['application/json']?.schema
  if (schema !== undefined) {
    const check = z.fromJSONSchema(z.looseObject({}).parse(schema))
    expect(check.parse(body)).toEqual(body)
    expect(check.safeParse({ nonsense: 1 }).success, nameOf(operation)).toBe(false)
  }
  done.add(nameOf(operation))
  return answer
}
const versionOf = (body: unknown) => {
  const { id, version } = record.parse(body)
  return { headers: { 'If-Match': `W/"${id}.${String(version)}"` } }
}
/** Makes a record, lists it, reads it and changes it. */
async function round(caller: Caller, list: string, made: object, change: object) {
  const created = await succeed(caller, 'POST', list, { body: made })
  const { id } = record.parse(created.body)
  expect(created.location).toBe(`/api/v1${list}/${id}`)
  const { items } = z
    .looseObject({ items: z.array(z.looseObject({ id: z.string() })) })
    .parse((await succeed(caller, 'GET', `${list}?limit=500`)).body)
  expect(items.filter((one) => one.id === id)).toHaveLength(1)
  const read = await succeed(caller, 'GET', `${list}/${id}`)
  expect([read.body, read.etag]).toEqual([created.body, `W/"${id}.1"`])
  const changed = await succeed(caller, 'PATCH', `${list}/${id}`, {
    body: change,
    headers: { 'If-Match': read.etag ?? '' },
  })
  expect([changed.body, changed.etag]).toMatchObject([{ ...change, version: 2 }, `W/"${id}.2"`])
  return record.parse(changed.body)
}
const formOf = (name: string, content: string) => {
  const form = new FormData()
  form.append('file', new File([content], name, { type: 'application/octet-stream' }))
  return form
}

describe('every operation does what its description says', () => {
  test('the description and oneself', async () => {
    const description = await succeed('nobody', 'GET', '/openapi.json')
    expect(description.body).toMatchObject({ openapi: '3.1.0' })
    expect((await succeed('lead', 'GET', '/me')).body).toMatchObject({
      id: 'own-lead',
      memberships: { [lab.own.campaign.id]: 'lead' },
      tokenScopes: ['read', 'intake', 'write'],
    })
  })

  test('tokens', async () => {
    const made = await succeed('nobody', 'POST', '/tokens', {
      body: { email: person.email, password: TEST_PASSWORD, name: 'rig B', scopes: ['read'], validDays: 7 },
      headers: { 'X-Forwarded-For': '10.8.0.2' },
    })
    const { id, secret } = z.looseObject({ id: z.string(), secret: z.string() }).parse(made.body)
    expect(secret).toMatch(/^ik_/)
    const list = await succeed('admin', 'GET', `/tokens?userId=${person.id}`)
    expect(list.body).toMatchObject({ tokens: [{ id, name: 'rig B', scopes: ['read'], revokedAt: null }] })
    await succeed('admin', 'DELETE', `/tokens/${id}`)
    expect((await askApi(secret, 'GET', '/me')).status).toBe(401)
  })

  test('people', async () => {
    const made = await succeed('admin', 'POST', '/people', {
      body: { email: 'new@example.test', displayName: 'New', role: 'technician' },
    })
    const { userId } = z.looseObject({ userId: z.string() }).parse(made.body)
    expect(made.body).toMatchObject({ email: 'new@example.test' })
    const again = await succeed('admin', 'POST', `/people/${userId}/invitations`)
    expect(again.body).toMatchObject({ userId, email: 'new@example.test' })
    const read = await succeed('admin', 'GET', `/people/${userId}`)
    const changed = await succeed('admin', 'PATCH', `/people/${userId}`, {
      body: { role: 'researcher' },
      ...versionOf(read.body),
    })
    expect(changed.body).toMatchObject({ role: 'researcher', version: 2 })
    expect((await succeed('admin', 'GET', '/people')).body).toMatchObject({
      people: expect.arrayContaining([changed.body]),
    })
    expect((await succeed('admin', 'DELETE', `/people/${userId}/sessions`)).body).toEqual({ ended: 0 })
  })

  test('what a person keeps', async () => {
    const kept = await succeed('person', 'PUT', '/drafts/log-run', { body: { content: { mass: '80 mg' } } })
    expect((await succeed('person', 'GET', '/drafts/log-run')).body).toEqual(kept.body)
    expect(kept.body).toMatchObject({ draft: { content: { mass: '80 mg' } } })
    await succeed('person', 'DELETE', '/drafts/log-run')
    await succeed('person', 'PUT', '/preferences/ranking-columns', { body: { content: ['rank'] } })
    expect((await succeed('person', 'GET', '/preferences/ranking-columns')).body).toEqual({ content: ['rank'] })
  })

  test('what the house has: reactions, rigs, calibrations, column maps', async () => {
    await round(
      'lead',
      '/reactions',
      { code: 'RWGS', name: 'Shift', keyReactant: 'CO2', steps: [{ CO2: -1, H2: -1, CO: 1, H2O: 1 }] },
      { notes: 'reverse' },
    )
    const rig = await round(
      'admin',
      '/rigs',
      { code: 'Rig C', name: 'Two tubes', channels: [{ code: '1' }] },
      { notes: 'new' },
    )
    expect((await succeed('lead', 'GET', `/rigs/${rig.id}/last-run?channel=1`)).body).toEqual({ run: null })
    expect((await succeed('lead', 'GET', `/rigs/${lab.rig.id}/last-run`)).body).toMatchObject({
      run: { id: lab.own.run.id },
    })
    await round(
      'lead',
      '/calibrations',
      {
        kind: 'balance',
        name: 'Balance',
        entries: [{ value: 1, unit: 'kg per kg', relativeStandardUncertainty: 0.001 }],
        validFrom: '2026-01-01T00:00:00Z',
      },
      { validTo: '2026-12-31T00:00:00.000Z' },
    )
    const table = 'species,mole fraction per area count\nCO2,8.1e-7\nCH4,7.6e-7\n'
    const query = `validFrom=2026-01-01T00:00:00Z&rigId=${lab.rig.id}&instrument=GC&relativeStandardUncertainty=0.01`
    const files = await succeed('lead', 'POST', `/calibrations/files?${query}`, { body: formOf('spring.csv', table) })
    expect(files.body).toMatchObject({
      items: [
        {
          name: 'spring',
          instrument: 'GC',
          convention: 'factor',
          entries: [
            { species: 'CO2', value: 8.1e-7, relativeStandardUncertainty: 0.01 },
            { species: 'CH4', value: 7.6e-7, relativeStandardUncertainty: 0.01 },
          ],
        },
      ],
    })
    const map = await succeed('lead', 'POST', '/column-maps', {
      body: {
        rigId: lab.rig.id,
        instrument: 'Analyser',
        fingerprint: 'f',
        specification: { kind: 'analyser', columns: [], decimalMark: '.', timeZone: 'UTC' },
      },
    })
    const { id } = z.looseObject({ id: z.string() }).parse(map.body)
    expect((await succeed('lead', 'GET', `/column-maps/${id}`)).body).toEqual(map.body)
    expect((await succeed('lead', 'GET', '/column-maps?fingerprint=f')).body).toEqual({ items: [map.body], next: null })
  })

  test('samples and packed beds', async () => {
    const sample = await round('lead', '/samples', { code: 'CQ-1', name: '5 wt% Ni' }, { notes: 'dried' })
    const lot = await succeed('lead', 'POST', `/samples/${sample.id}/lots`, { body: { code: 'lot 3' } })
    expect((await succeed('lead', 'GET', `/samples/${sample.id}/lots`)).body).toEqual({ items: [lot.body] })
    const count = await succeed('lead', 'POST', `/samples/${sample.id}/site-counts`, {
      body: { method: 'H2 chemisorption', molPerKg: 0.062, relativeStandardUncertainty: 0.08 },
    })
    expect(count.body).toMatchObject({ molPerKg: 0.062, sampleId: sample.id })
    expect((await succeed('lead', 'GET', `/samples/${sample.id}/site-counts`)).body).toEqual({ items: [count.body] })
    const beds = await succeed('lead', 'GET', `/loadings?sampleId=${lab.own.sample.id}`)
    expect(beds.body).toMatchObject({ items: [{ id: lab.own.run.loadingId, sampleCode: 'S-own' }], next: null })
    const bed = await succeed('lead', 'GET', `/loadings/${lab.own.run.loadingId}`)
    const packed = await succeed('lead', 'PATCH', `/loadings/${lab.own.run.loadingId}`, {
      body: { bedLengthM: 0.02 },
      ...versionOf(bed.body),
    })
    expect(packed.body).toMatchObject({ bedLengthM: 0.02, version: 2 })
    const within = `/campaigns/${lab.own.campaign.id}/samples`
    const added = await succeed('lead', 'POST', within, { body: { sampleId: sample.id } })
    expect((await succeed('lead', 'GET', within)).body).toMatchObject({ items: [{ sampleCode: 'CQ-1' }, {}] })
    expect((await succeed('lead', 'GET', `${within}/${sample.id}`)).body).toEqual(added.body)
    const marked = await succeed('lead', 'PATCH', `${within}/${sample.id}`, {
      body: { remark: 'the best', isShortlisted: true, priority: 2 },
      headers: { 'If-Match': `W/"${sample.id}.1"` },
    })
    expect(marked.body).toMatchObject({ remark: 'the best', isShortlisted: true, priority: 2, version: 2 })
  })

  test('a campaign, its people, its method and its end', async () => {
    const campaign = await round(
      'lead',
      '/campaigns',
      { code: 'C-3', name: 'Third', reactionId: lab.reaction.id },
      { name: 'The third' },
    )
    const here = `/campaigns/${campaign.id}`
    const member = await succeed('lead', 'POST', `${here}/members`, {
      body: { userId: 'own-technician', role: 'technician' },
    })
    const promoted = await succeed('lead', 'PATCH', `${here}/members/own-technician`, { body: { role: 'researcher' } })
    expect([member.body, promoted.body]).toMatchObject([{ role: 'technician' }, { role: 'researcher' }])
    expect((await succeed('lead', 'GET', `${here}/members`)).body).toMatchObject({
      items: [
        { userId: 'own-lead', role: 'lead' },
        { userId: 'own-technician', role: 'researcher' },
      ],
    })
    await succeed('lead', 'DELETE', `${here}/members/own-technician`)
    const method = await succeed('lead', 'POST', `${here}/methods`, {
      body: { settings: { referenceTemperatureK: 560 }, reason: 'as agreed' },
    })
    expect(method.body).toMatchObject({ number: 2, settings: { referenceTemperatureK: 560 } })
    expect((await succeed('lead', 'GET', `${here}/methods`)).body).toMatchObject({
      items: [method.body, { number: 1 }],
    })
    const ranking = await succeed('lead', 'GET', `${here}/ranking?referenceTemperatureK=555&provisional=0&method=1`)
    expect(ranking.body).toMatchObject({ campaignCode: 'C-3', methodNumber: 1, referenceTemperatureK: 555, rows: [] })
    expect((await succeed('lead', 'GET', `${here}/ranking.csv`)).body).toMatch(/^\uFEFF?"Rank",/)
    await succeed('lead', 'GET', `${here}/ranking.xlsx`)
    const closed = await succeed('lead', 'POST', `${here}/close`, {
      body: { reason: 'finished' },
      ...versionOf(campaign),
    })
    const open = await succeed('lead', 'POST', `${here}/reopen`, {
      body: { reason: 'one more' },
      ...versionOf(closed.body),
    })
    expect([closed.body, open.body]).toMatchObject([{ closedAt: expect.any(String) }, { closedAt: null }])
    expect((await succeed('lead', 'GET', `${here}/history?limit=2`)).body).toMatchObject({
      items: [
        { action: 'campaign.reopen', reason: 'one more' },
        { action: 'campaign.close', reason: 'finished' },
      ],
    })
  })

  test('a run with its files, what is left out of it, and its decision', async () => {
    const run = await round(
      'lead',
      '/runs',
      {
        campaignId: lab.own.campaign.id,
        rigId: lab.rig.id,
        channel: '1',
        loading: { sampleId: lab.own.sample.id, catalystMassKg: 1e-4 },
        startedAt: '2026-03-02T07:30:00.000Z',
      },
      { notes: 'tube changed' },
    )
    const here = `/runs/${run.id}`
    const log = 'time;T bed [C]\n2026-03-02 07:30:00;25,1\n2026-03-02 07:30:10;25,3\n'
    const added = await succeed('lead', 'POST', `${here}/uploads`, { body: formOf('log.csv', log) })
    const again = await succeed('lead', 'POST', `${here}/uploads`, { body: formOf('same.csv', log) })
    expect([added.status, again.status]).toEqual([201, 200])
    const [file] = z.looseObject({ items: z.array(record) }).parse(added.body).items
    if (file === undefined) throw new Error('one file went in')
    const { id } = file
    expect(added.body).toMatchObject({ items: [{ isNew: true, fileName: 'log.csv', kind: 'rig-log' }] })
    expect(again.body).toMatchObject({ items: [{ id, isNew: false, fileName: 'log.csv' }] })
    const answered = await succeed('lead', 'PATCH', `/uploads/${id}`, { body: { answers: {} }, ...versionOf(file) })
    const read = await succeed('lead', 'GET', `/uploads/${id}`)
    expect(read.body).toEqual(answered.body)
    expect((await succeed('lead', 'GET', `/uploads/${id}/preview`)).body).toMatchObject({
      rowCount: 2,
      // 25.1 and 25.3 degrees Celsius; 0 of them are 273.15 K
      channels: [{ name: 'bedTemperatureK', minimum: 298.25, maximum: expect.closeTo(298.45, 9), missingCount: 0 }],
    })
    expect((await succeed('lead', 'GET', `/uploads/${id}/content`)).body).toBe(log)
    const confirmed = await succeed('lead', 'POST', `/uploads/${id}/confirm`, versionOf(read.body))
    expect(confirmed.body).toMatchObject({ state: 'confirmed' })
    const aside = await succeed('lead', 'POST', `/uploads/${id}/set-aside`, {
      body: { reason: 'of another run' },
      ...versionOf(confirmed.body),
    })
    expect((await succeed('lead', 'GET', `${here}/uploads`)).body).toEqual({ items: [aside.body] })
    expect(aside.body).toMatchObject({ state: 'set-aside' })
    const result = await succeed('lead', 'GET', `${here}/result`)
    expect(result.body).toMatchObject({ run: { id: run.id, notes: 'tube changed' }, uploads: [aside.body] })
    expect((await succeed('lead', 'GET', `${here}/points`)).body).toMatchObject({
      runId: run.id,
      points: [],
      fit: null,
    })

    const out = await succeed('lead', 'POST', `${here}/exclusions`, {
      body: { kind: 'hold', atS: 600, reason: 'flow slipped' },
    })
    expect((await succeed('lead', 'GET', `${here}/exclusions`)).body).toEqual({ items: [out.body] })
    const back = await succeed(
      'lead',
      'POST',
      `${here}/exclusions/${z.looseObject({ id: z.string() }).parse(out.body).id}/withdrawal`,
      { body: { reason: 'it was fine' } },
    )
    expect([out.body, back.body]).toMatchObject([{ withdrawnAt: null }, { withdrawnAt: expect.any(String) }])
    const moved = await succeed('lead', 'POST', `${here}/hold-edits`, {
      body: { foundStartS: 600, startS: 700, endS: 900, reason: 'late to settle' },
    })
    expect((await succeed('lead', 'GET', `${here}/hold-edits`)).body).toEqual({ items: [moved.body] })
    const given = await succeed(
      'lead',
      'POST',
      `${here}/hold-edits/${z.looseObject({ id: z.string() }).parse(moved.body).id}/withdrawal`,
      { body: { reason: 'it had settled' } },
    )
    expect([moved.body, given.body]).toMatchObject([
      { startS: 700, endS: 900, withdrawnAt: null },
      { withdrawnAt: expect.any(String) },
    ])
    const remark = await succeed('lead', 'POST', `${here}/remarks`, { body: { body: 'grey after unloading' } })
    expect((await succeed('lead', 'GET', `${here}/remarks`)).body).toEqual({ items: [remark.body] })

    const handedIn = await succeed('lead', 'POST', `${here}/hand-in`, versionOf(run))
    const decided = await succeed('lead', 'POST', `${here}/decision`, {
      body: { decision: 'repeat', reason: 'no analysis' },
      ...versionOf(handedIn.body),
    })
    expect([handedIn.body, decided.body]).toMatchObject([
      { state: 'handed-in' },
      { state: 'decided', decision: 'repeat', decisionReason: 'no analysis' },
    ])
    expect((await succeed('lead', 'GET', `${here}/decision`)).body).toMatchObject({
      items: [{ decision: 'repeat', reason: 'no analysis' }],
    })
  })

  test('editions', async () => {
    const here = `/campaigns/${lab.own.campaign.id}/editions`
    const ranking = exampleRanking()
    const [row] = ranking.rows
    const { id: runId, code } = lab.own.run
    const [method] = await (await getDatabase()).select().from(methods)
    given.rank = (campaignId) => ({
      ranking: {
        ...ranking,
        campaignId,
        rows: [{ ...row, runs: [{ runId, code, state: 'decided', decision: 'counts', isIncluded: true, reason: '' }] }],
      },
      method: { id: method?.id, number: 1, settings: methodSettingsSchema.parse({}) },
      runs: [{ run: { runId }, key: 'the name of a reduction' }],
    })
    const proposal = await succeed('lead-person', 'GET', `${here}/proposal`)
    const { contentSha256 } = z.looseObject({ contentSha256: z.string() }).parse(proposal.body)
    cookie.secret = leadSession
    for (const [change, status] of [
      [{ password: 'not the password' }, 422],
      [{ contentSha256: 'a'.repeat(64) }, 412],
    ] as const) {
      const body = { contentSha256, statement: 'Reviewed and released.', password: TEST_PASSWORD, ...change }
      expect((await askApi(null, 'POST', here, { body, headers: { Origin: ORIGIN } })).status).toBe(status)
    }
    const published = await succeed('lead-person', 'POST', here, {
      body: { contentSha256, statement: 'Reviewed and released.', password: TEST_PASSWORD },
    })
    given.rank = null
    expect(published.body).toMatchObject({ number: 1, contentSha256, isIntact: true, withdrawnAt: null })
    expect(published.location).toBe(`/api/v1${here}/1`)
    expect((await succeed('lead', 'GET', here)).body).toMatchObject({ items: [{ number: 1, contentSha256 }] })
    expect((await succeed('lead', 'GET', `${here}/1`)).body).toEqual(published.body)
    const text = await succeed('lead', 'GET', `${here}/1/ranking.csv`)
    expect(String(text.body)).toContain(row?.sampleCode)
    await succeed('lead', 'GET', `${here}/1/ranking.xlsx`)
    const withdrawn = await succeed('lead-person', 'POST', `${here}/1/withdrawal`, {
      body: { reason: 'wrong site count' },
    })
    expect(withdrawn.body).toMatchObject({ number: 1, withdrawnReason: 'wrong site count' })
  })

  test('and none was left out', () => {
    expect(operations.map(nameOf).filter((name) => !done.has(name))).toEqual([])
  })
})

describe('every operation refuses as its description says', () => {
  /** An address of it, with something that is there where the order of looking asks for it. */
  const addressOf = (operation: Operation) =>
    operation.path
      .replace('{campaignId}', lab.own.campaign.id)
      .replace('{runId}', lab.own.run.id)
      .replace('{loadingId}', lab.own.run.loadingId)
      .replace('{sampleId}', lab.own.sample.id)
      .replace('{rigId}', lab.rig.id)
      .replace('{reactionId}', lab.reaction.id)
      .replace('{number}', '1')
      .replace('{form}', 'log-run')
      .replace('{key}', 'ranking-columns')
      .replaceAll(/\{\w+\}/g, 'nowhere')
  const statusOf = async (operation: Operation, asked: Asked & { address?: string; secret?: string | null } = {}) => {
    const isOfPerson = operation.isForPersons === true
    cookie.secret = isOfPerson && asked.secret !== null ? ownSession : null
    const address = asked.address ?? addressOf(operation)
    const last = address
      .split('?')[0]
      ?.replace(/\/(close|reopen|decision|hand-in|confirm|set-aside)$/, '')
      .split('/')
      .at(-1)
    const headers = {
      ...(isOfPerson ? { Origin: ORIGIN } : {}),
      ...(operation.isVersioned === true ? { 'If-Match': `W/"${last ?? ''}.1"` } : {}),
      ...asked.headers,
    }
    const secret =
      asked.secret !== undefined ? asked.secret : isOfPerson || operation.scope === null ? null : secrets.admin
    const answer = await askApi(secret, operation.method.toUpperCase(), address, { ...asked, headers })
    expect(answer.operation).toBe(operation)
    return answer.status
  }
  const saysSo = (operation: Operation, status: number) => refusalsOf(operation).includes(status)
  const named = operations.map((operation) => ({ name: nameOf(operation), operation }))

  test.each(named.filter(({ operation }) => operation.scope !== null))(
    '$name: 401 for nobody',
    async ({ operation }) => {
      expect(saysSo(operation, 401)).toBe(true)
      expect(await statusOf(operation, { secret: null })).toBe(401)
    },
  )

  test.each(named.filter(({ operation }) => operation.body !== undefined))(
    '$name: 400, 413 and 415 for a body that is not as described',
    async ({ operation }) => {
      expect([400, 413, 415].every((status) => saysSo(operation, status))).toBe(true)
      expect(await statusOf(operation, { body: { colour: 1 } })).toBe(400)
      expect(await statusOf(operation, { body: '{' })).toBe(400)
      expect(await statusOf(operation, { body: ' '.repeat(1_000_001) })).toBe(413)
      expect(await statusOf(operation, { body: '{}', type: 'text/plain' })).toBe(415)
    },
  )

  test.each(named.filter(({ operation }) => operation.query !== undefined))(
    '$name: 400 for a parameter that is not described, or twice',
    async ({ operation }) => {
      expect(saysSo(operation, 400)).toBe(true)
      for (const query of ['colour=1', 'colour=1&colour=2'])
        expect(await statusOf(operation, { address: `${addressOf(operation)}?${query}` })).toBe(400)
    },
  )

  test.each(named.filter(({ operation }) => operation.isVersioned === true))(
    '$name: 428 without a version, 412 with that of something else',
    async ({ operation }) => {
      expect([412, 428].every((status) => saysSo(operation, status))).toBe(true)
      const body = operation.body === undefined ? {} : { body: {} }
      expect(await statusOf(operation, { ...body, headers: { 'If-Match': 'W/"something-else.1"' } })).toBe(412)
      const { headers: _, ...none } = { ...body, headers: {} }
      cookie.secret = null
      expect((await askApi(secrets.admin, operation.method.toUpperCase(), addressOf(operation), none)).status).toBe(428)
    },
  )

  test.each(named.filter(({ operation }) => operation.path.includes('{')))(
    '$name: what cannot be a name is none, and no fault of the house',
    async ({ operation }) => {
      const address = operation.path.replaceAll(/\{\w+\}/g, '%00')
      const expected = operation.parts === undefined ? 404 : 400
      expect(saysSo(operation, expected)).toBe(true)
      const body = operation.isForPersons === true && operation.method === 'put' ? { body: { content: 1 } } : {}
      expect(await statusOf(operation, { address, ...body })).toBe(expected)
    },
  )

  test('no text that the database cannot hold is a fault of the house', async () => {
    const draft = operations.find((one) => nameOf(one) === 'put /drafts/{form}')
    if (draft === undefined) throw new Error('drafts are kept')
    expect(await statusOf(draft, { body: { content: { notes: 'a\u0000b' } } })).toBe(400)
    const preference = operations.find((one) => nameOf(one) === 'put /preferences/{key}')
    if (preference === undefined) throw new Error('preferences are kept')
    expect(await statusOf(preference, { body: { content: 'a\u0000b' } })).toBe(400)
    const sample = operations.find((one) => nameOf(one) === 'post /samples')
    if (sample === undefined) throw new Error('samples are made')
    expect(await statusOf(sample, { body: { code: 'a\u0000b', name: 'x' } })).toBe(400)
    const tokens = operations.find((one) => nameOf(one) === 'get /tokens')
    if (tokens === undefined) throw new Error('tokens are listed')
    expect(await statusOf(tokens, { address: '/tokens?userId=%00' })).toBe(400)
  })
})
