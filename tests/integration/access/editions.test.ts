import { createHash } from 'node:crypto'
import { sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { editionRuns, editions } from '@/db/schema'
import { getEdition, listEditions, proposeEdition, publishEdition, withdrawEdition } from '@/lib/access/editions'
import type * as results from '@/lib/access/results'
import { changeLoading } from '@/lib/access/loadings'
import { addExclusion, addRemark, changeRun, createRun, decide, editHold, getRun, handIn } from '@/lib/access/runs'
import { hashPassword } from '@/lib/auth/password'
import { updatePassword } from '@/db/mutations/people'
import { canonicalJson } from '@/lib/domain/canonical-json'
import { type RankingRow } from '@/lib/domain/ranking'
import { exampleRanking } from '@/tests/support/example-ranking'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'
import { refusalOf, trail } from '@/tests/support/trail'

/** What a publication freezes is the ranking of the campaign; here one that is given, over a run that is real. */
const given = vi.hoisted((): { rank: ((campaignId: string) => Promise<unknown>) | null } => ({ rank: null }))
vi.mock('@/lib/access/results', async (original) => ({
  ...(await original<typeof results>()),
  rankCampaign: async (_actor: unknown, campaignId: string) => given.rank?.(campaignId),
}))

const PASSWORD = 'copper lattice ninety winters'
let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
let runId: string
let methodId: string

beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
  const db = await getDatabase()
  const hash = await hashPassword(PASSWORD)
  await db.transaction((tx) => updatePassword(tx, lab.own.lead.userId, hash, 'b1'))
  const run = await createRun(lab.own.actor('technician'), lab.own.runInput())
  const handedIn = await handIn(lab.own.actor('technician'), run.id, run.version)
  const decided = await decide(lab.own.lead, run.id, { decision: 'counts', reason: 'balance closes' }, handedIn.version)
  runId = decided.id
  const method = await db.execute<{ id: string }>(
    sql`select id from methods where campaign_id = ${lab.own.campaign.id}`,
  )
  methodId = method.rows[0]?.id ?? ''
  given.rank = async (campaignId) => {
    const now = await getRun(lab.own.lead, runId)
    const row = exampleRanking().rows[0]
    if (row === undefined) throw new Error('an example has a row')
    const rows: RankingRow[] = [
      {
        ...row,
        rank: 1,
        runs: [
          { runId, code: now.code, state: 'decided', decision: now.decision, isIncluded: true, reason: '' },
          {
            runId: lab.own.run.id,
            code: lab.own.run.code,
            state: 'open',
            decision: null,
            isIncluded: false,
            reason: 'no lead has decided on it',
          },
        ],
      },
    ]
    return {
      ranking: { ...exampleRanking(), campaignId, rows, computedAt: new Date().toISOString() },
      method: { id: methodId, number: 1, settings: {} },
      runs: [{ run: { runId }, key: `key of ${now.notes}` }],
    }
  }
})
afterAll(() => opened.close())

const campaign = () => lab.own.campaign.id
const statement = 'Reviewed, and released to the partners.'
const publish = async (more: object = {}) => {
  const proposal = await proposeEdition(lab.own.lead, campaign())
  return publishEdition(lab.own.lead, campaign(), {
    contentSha256: proposal.contentSha256,
    statement,
    password: PASSWORD,
    ...more,
  })
}

describe('before it is published', () => {
  test('the lead sees what would be in it and what would not', async () => {
    const proposal = await proposeEdition(lab.own.lead, campaign())
    expect(proposal.number).toBe(1)
    expect(proposal.refusal).toBe('')
    expect(proposal.runs).toMatchObject([{ runId, decision: 'counts', decisionReason: 'balance closes', files: [] }])
    expect(proposal.leftOut).toMatchObject([{ runCode: lab.own.run.code, reason: 'no lead has decided on it' }])
  })

  test('only a lead of the campaign may, at a screen', async () => {
    for (const role of ['technician', 'researcher'] as const)
      expect((await refusalOf(proposeEdition(lab.own.actor(role), campaign()))).code).toBe('not-allowed')
    for (const actor of [lab.own.actor('guest'), lab.other.lead])
      expect((await refusalOf(proposeEdition(actor, campaign()))).code).toBe('not-found')
    expect((await refusalOf(proposeEdition(lab.admin, campaign()))).code).toBe('not-allowed')
    const token = { ...lab.own.lead, tokenScopes: ['read', 'intake', 'write'] as const }
    expect((await refusalOf(proposeEdition(token, campaign()))).code).toBe('not-allowed')
  })

  test('a wrong password, a proposal of yesterday and a change meanwhile publish nothing', async () => {
    const before = (await trail()).length
    expect((await refusalOf(publish({ password: 'not the password' }))).details.issues).toMatchObject([
      { field: 'password' },
    ])
    expect((await refusalOf(publish({ contentSha256: 'a'.repeat(64) }))).code).toBe('stale')
    expect((await trail()).length).toBe(before)
    const proposal = await proposeEdition(lab.own.lead, campaign())
    const rank = given.rank
    // somebody writes while the ranking is being made
    given.rank = async (campaignId) => {
      await addRemark(lab.own.lead, lab.own.run.id, 'look at this again')
      return rank?.(campaignId)
    }
    expect((await refusalOf(publish({ contentSha256: proposal.contentSha256 }))).code).toBe('stale')
    given.rank = rank
    expect(await listEditions(lab.own.lead, campaign())).toEqual([])
  })
})

describe('published', () => {
  test('it holds what was proposed, under the hash of its canonical text, signed', async () => {
    const edition = await publish()
    expect(edition).toMatchObject({
      number: 1,
      methodNumber: 1,
      statement,
      publishedByName: 'own-lead',
      runCount: 1,
      withdrawnAt: null,
      isIntact: true,
    })
    expect(edition.contentSha256).toBe(createHash('sha256').update(canonicalJson(edition.content)).digest('hex'))
    const [entry] = (await trail()).slice(-1)
    expect(entry).toMatchObject({
      action: 'edition.publish',
      reason: statement,
      after: { number: 1, contentSha256: edition.contentSha256 },
    })
  })

  test('everybody of the campaign reads it, a guest too, and nobody else', async () => {
    for (const role of ['technician', 'researcher', 'lead', 'guest'] as const)
      expect((await getEdition(lab.own.actor(role), campaign(), 1)).number).toBe(1)
    expect((await listEditions(lab.own.actor('guest'))).map(({ number }) => number)).toEqual([1])
    for (const role of ['technician', 'researcher', 'lead', 'guest'] as const) {
      const actor = lab.other.actor(role)
      expect((await refusalOf(getEdition(actor, campaign(), 1))).code).toBe('not-found')
      expect((await refusalOf(listEditions(actor, campaign()))).code).toBe('not-found')
      expect(await listEditions(actor)).toEqual([])
    }
    expect((await refusalOf(getEdition(lab.own.lead, campaign(), 2))).code).toBe('not-found')
  })

  test('nothing of its run changes any more, whoever asks', async () => {
    const run = await getRun(lab.own.lead, runId)
    expect(run.isFrozen).toBe(true)
    const before = (await trail()).length
    for (const actor of [lab.own.lead, lab.own.actor('researcher'), lab.admin])
      for (const attempt of [
        () => changeRun(actor, runId, { notes: 'x' }, run.version),
        () => changeLoading(actor, run.loadingId, { bedLengthM: 0.02 }, run.loading.version),
        () => addExclusion(actor, runId, { kind: 'hold', atS: 1, reason: 'slipped' }),
        () => editHold(actor, runId, { foundStartS: 1, startS: 2, endS: 3, reason: 'late to settle' }),
        () => decide(actor, runId, { decision: 'set-aside', reason: 'changed my mind' }, run.version),
      ])
        expect(['not-allowed', 'conflict']).toContain((await refusalOf(attempt())).code)
    expect((await trail()).length).toBe(before)
  })

  test.each([
    ['the run', sql`update runs set notes = 'x'`],
    ['its bed', sql`update loadings set bed_length_m = 1`],
    ['its decision', sql`delete from decisions`],
    [
      'a point left out',
      sql`insert into exclusions (id, run_id, kind, at_s, reason, created_by) select 'x', run_id, 'hold', 1, 'x', 'admin' from edition_runs`,
    ],
    [
      'a window',
      sql`insert into hold_edits (id, run_id, found_start_s, reason, created_by) select 'x', run_id, 1, 'x', 'admin' from edition_runs`,
    ],
    [
      'the feed',
      sql`insert into feeds (run_id, species, position, flow_text, flow_mol_per_s, reference_temperature_k, reference_pressure_pa) select run_id, 'N2', 1, '1', 1, 273.15, 101325 from edition_runs`,
    ],
    [
      'a file',
      sql`insert into uploads (id, campaign_id, run_id, sha256, byte_count, file_name, created_by) select 'x', ${'c'}, run_id, ${'a'.repeat(64)}, 1, 'x', 'admin' from edition_runs`,
    ],
    ['its number', sql`update editions set number = 7`],
    ['its content', sql`update editions set content = '{}'`],
    ['its hash', sql`update editions set content_sha256 = 'x'`],
    ['itself', sql`delete from editions`],
    ['what it holds', sql`delete from edition_runs`],
    ['all of them', sql`truncate editions cascade`],
  ])('SQL does not touch %s', async (_name, statementSql) => {
    const db = await getDatabase()
    const before = [
      await db.select().from(editions),
      await db.select().from(editionRuns),
      await getRun(lab.own.lead, runId),
    ]
    const refusal = await db.execute(statementSql).then(
      () => 'done',
      (error: unknown) => JSON.stringify([String(error), String((error as Error).cause)]),
    )
    expect(refusal).toMatch(/held by a published edition|never changed or removed/)
    expect([
      await db.select().from(editions),
      await db.select().from(editionRuns),
      await getRun(lab.own.lead, runId),
    ]).toEqual(before)
  })
})

describe('withdrawn', () => {
  test('it stays with the reason, its run can be worked on, and the next one has the next number', async () => {
    const edition = await withdrawEdition(lab.own.lead, campaign(), 1, 'The site count was wrong.')
    expect(edition).toMatchObject({
      withdrawnByName: 'own-lead',
      withdrawnReason: 'The site count was wrong.',
      isIntact: true,
    })
    expect((await refusalOf(withdrawEdition(lab.own.lead, campaign(), 1, 'again, please'))).code).toBe('conflict')
    expect((await getEdition(lab.own.actor('guest'), campaign(), 1)).withdrawnReason).toBe('The site count was wrong.')
    const run = await getRun(lab.own.lead, runId)
    expect(run.isFrozen).toBe(false)
    expect((await changeRun(lab.own.lead, runId, { notes: 'corrected' }, run.version)).notes).toBe('corrected')
    const next = await publish()
    expect(next.number).toBe(2)
    expect(next.contentSha256).not.toBe(edition.contentSha256)
    expect((await getRun(lab.own.lead, runId)).isFrozen).toBe(true)
  })
})
