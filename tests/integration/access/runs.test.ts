import { sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { getLoading, changeLoading, listLoadings } from '@/lib/access/loadings'
import {
  addExclusion,
  addRemark,
  changeRun,
  correctRun,
  createRun,
  decide,
  editHold,
  getRun,
  handIn,
  lastRunOnRig,
  listDecisions,
  listExclusions,
  listHoldEdits,
  listRemarks,
  listRuns,
  withdrawExclusion,
  withdrawHoldEdit,
} from '@/lib/access/runs'
import { freshDatabase } from '@/tests/support/fresh-database'
import { makeLaboratory } from '@/tests/support/make-laboratory'
import { refusalOf, trail } from '@/tests/support/trail'

let opened: OpenDatabase
let lab: Awaited<ReturnType<typeof makeLaboratory>>
beforeAll(async () => {
  opened = await freshDatabase()
  lab = await makeLaboratory()
})
afterAll(() => opened.close())

const feed = [
  {
    species: 'CO2',
    flowText: '7,2 mL/min',
    flowMolPerS: 5.35e-6,
    referenceTemperatureK: 273.15,
    referencePressurePa: 101325,
    isInternalStandard: false,
  },
]
const leftOut = { kind: 'hold', atS: 1_772_434_800, reason: 'thermocouple slipped' } as const
const window = { foundStartS: 1_772_434_800, startS: 1_772_435_000, endS: null, reason: 'late to settle' }

describe('what one sees', () => {
  test('lists hold the runs and loadings of one’s campaigns, whatever the filter asks for', async () => {
    for (const role of ['technician', 'researcher', 'lead'] as const) {
      const actor = lab.own.actor(role)
      expect((await listRuns(actor)).map((run) => run.id)).toEqual([lab.own.run.id])
      expect(await listRuns(actor, { sampleId: lab.other.sample.id })).toEqual([])
      expect((await listRuns(actor, { rigId: lab.rig.id })).map((run) => run.id)).toEqual([lab.own.run.id])
      expect((await refusalOf(listRuns(actor, { campaignId: lab.other.campaign.id }))).code).toBe('not-found')
      expect((await listLoadings(actor, { rigId: lab.rig.id })).map((row) => row.id)).toEqual([lab.own.run.loadingId])
    }
    expect((await listRuns(lab.admin)).length).toBe(2)
    expect((await refusalOf(listRuns(lab.own.actor('guest')))).code).toBe('not-allowed')
  })

  test('the other campaign’s run does not exist, to read or to change, and nothing of it moves', async () => {
    const before = (await trail()).length
    const id = lab.other.run.id
    for (const role of ['technician', 'researcher', 'lead', 'guest'] as const) {
      const actor = lab.own.actor(role)
      for (const refusal of await Promise.all(
        [
          getRun(actor, id),
          listDecisions(actor, id),
          listExclusions(actor, id),
          listHoldEdits(actor, id),
          listRemarks(actor, id),
          changeRun(actor, id, { notes: 'mine' }, 1),
          handIn(actor, id, 1),
          decide(actor, id, { decision: 'counts', reason: 'looks right' }, 1),
          addExclusion(actor, id, leftOut),
          editHold(actor, id, window),
          addRemark(actor, id, 'hello'),
          createRun(actor, lab.other.runInput()),
        ].map(refusalOf),
      ))
        expect(refusal.code).toBe('not-found')
    }
    expect((await refusalOf(getLoading(lab.own.lead, lab.other.run.loadingId))).code).toBe('not-found')
    expect((await refusalOf(changeLoading(lab.own.lead, lab.other.run.loadingId, { bedLengthM: 0.1 }, 1))).code).toBe(
      'not-found',
    )
    expect(await getRun(lab.other.lead, id)).toEqual(lab.other.run)
    expect((await trail()).length).toBe(before)
  })

  test('the last run on a rig is the last of one’s own campaigns', async () => {
    expect((await lastRunOnRig(lab.own.lead, lab.rig.id))?.id).toBe(lab.own.run.id)
    expect(await lastRunOnRig(lab.own.lead, lab.rig.id, '2')).toBeNull()
    expect((await refusalOf(lastRunOnRig(lab.own.actor('guest'), lab.rig.id))).code).toBe('not-allowed')
  })
})

describe('logging a run', () => {
  test('codes count on in the campaign, loadings through the house', async () => {
    expect([lab.own.run.code, lab.other.run.code]).toEqual(['R-0001', 'R-0001'])
    expect([lab.own.run.loadingCode, lab.other.run.loadingCode]).toEqual(['L-0001', 'L-0002'])
    const named = await createRun(lab.own.actor('technician'), lab.own.runInput({ code: 'R-0041', feed }))
    expect([named.code, named.loadingCode, named.feed]).toEqual(['R-0041', 'L-0003', feed])
    const next = await createRun(
      lab.own.actor('technician'),
      lab.own.runInput({ loading: { loadingId: named.loadingId }, startedAt: '2026-03-03T07:30:00Z' }),
    )
    expect([next.code, next.loadingId]).toEqual(['R-0042', named.loadingId])
    const last = (await trail()).at(-1)
    expect([last?.action, last?.entityId, last?.campaignId]).toEqual(['run.create', next.id, lab.own.campaign.id])
  })

  test('a gauge pressure keeps the barometer of the day', async () => {
    const run = await createRun(
      lab.own.lead,
      lab.own.runInput({ pressurePa: 2e5, pressureKind: 'gauge', channel: '2', startedAt: '2026-03-04T00:00:00Z' }),
    )
    expect(run.barometerPa).toBe(101_325)
  })

  test.each([
    { name: 'a channel the rig has not', more: { channel: '9' }, field: 'channel' },
    { name: 'a rig that is not there', more: { rigId: 'no-rig' }, field: 'rigId' },
    { name: 'a species twice', more: { feed: [feed[0], feed[0]] }, field: 'feed.1.species' },
  ])('$name is refused at its field, and nothing is kept', async ({ more, field }) => {
    const before = (await trail()).length
    const refusal = await refusalOf(createRun(lab.own.lead, lab.own.runInput(more)))
    expect([refusal.code, refusal.details.issues?.[0]?.field]).toEqual(['unprocessable', field])
    expect((await trail()).length).toBe(before)
  })

  test('beds: of a sample elsewhere, of nothing, in another channel', async () => {
    const { lead, runInput } = lab.own
    const field = async (more: object) =>
      (await refusalOf(createRun(lead, runInput(more)))).details.issues?.map((issue) => issue.field)
    expect(await field({ loading: { sampleId: lab.other.sample.id, catalystMassKg: 1e-4 } })).toEqual([
      'loading.sampleId',
    ])
    expect(await field({ loading: { sampleId: lab.own.sample.id, catalystMassKg: 0 } })).toEqual([
      'loading.catalystMassKg',
    ])
    expect(await field({ loading: { loadingId: lab.other.run.loadingId } })).toEqual(['loading.loadingId'])
    expect(await field({ loading: { loadingId: lab.own.run.loadingId }, channel: '2' })).toEqual(['loading.loadingId'])
    const blank = await createRun(
      lead,
      runInput({ kind: 'blank', loading: { sampleId: lab.own.sample.id, catalystMassKg: 0 } }),
    )
    expect(blank.kind).toBe('blank')
  })

  test('a code taken already takes the loading and the entry back with it', async () => {
    const before = (await trail()).length
    const beds = (await listLoadings(lab.own.lead)).length
    const refusal = await refusalOf(createRun(lab.own.lead, lab.own.runInput({ code: 'R-0001' })))
    expect([refusal.code, refusal.details.constraint]).toEqual(['conflict', 'runs_campaign_id_code_unique'])
    expect([(await trail()).length, (await listLoadings(lab.own.lead)).length]).toEqual([before, beds])
  })

  test('twenty people at once get twenty codes', async () => {
    const made = await Promise.all(Array.from({ length: 20 }, () => createRun(lab.other.lead, lab.other.runInput())))
    expect(new Set(made.map((run) => run.code)).size).toBe(20)
    expect(new Set(made.map((run) => run.loadingCode)).size).toBe(20)
  })
})

describe('from open to decided', () => {
  test('who may edit, hand in and decide, in each state', async () => {
    const technician = lab.own.actor('technician')
    const researcher = lab.own.actor('researcher')
    const { lead } = lab.own
    let run = await createRun(technician, lab.own.runInput())
    const strange = await createRun(researcher, lab.own.runInput())
    expect((await refusalOf(changeRun(technician, strange.id, { notes: 'x' }, 1))).code).toBe('not-allowed')
    expect((await refusalOf(handIn(technician, strange.id, 1))).code).toBe('not-allowed')
    expect((await refusalOf(decide(lead, run.id, { decision: 'counts', reason: 'too early' }, 1))).code).toBe(
      'conflict',
    )

    run = await changeRun(technician, run.id, { notes: 'leak test passed', feed }, run.version)
    expect([run.notes, run.feed, run.version]).toEqual(['leak test passed', feed, 2])
    run = await handIn(technician, run.id, run.version)
    expect(run.state).toBe('handed-in')
    expect((await refusalOf(handIn(researcher, run.id, run.version))).code).toBe('conflict')
    expect((await refusalOf(changeRun(technician, run.id, { notes: 'late' }, run.version))).code).toBe('not-allowed')
    run = await changeRun(researcher, run.id, { notes: 'seen' }, run.version)

    for (const actor of [technician, researcher, lab.admin])
      expect(
        (await refusalOf(decide(actor, run.id, { decision: 'counts', reason: 'looks right' }, run.version))).code,
      ).toBe('not-allowed')
    run = await decide(lead, run.id, { decision: 'set-aside', reason: 'carbon balance open' }, run.version)
    expect([run.state, run.decision, run.decisionReason]).toEqual(['decided', 'set-aside', 'carbon balance open'])
    expect((await refusalOf(changeRun(researcher, run.id, { notes: 'late' }, run.version))).code).toBe('not-allowed')
    run = await decide(lead, run.id, { decision: 'counts', reason: 'balance found' }, run.version)
    expect((await listDecisions(researcher, run.id)).map((row) => row.decision)).toEqual(['counts', 'set-aside'])
    run = await changeRun(lead, run.id, { notes: 'lead was here' }, run.version)
    expect(run.version).toBe(7)
    expect((await trail()).filter((entry) => entry.entityId === run.id).map((entry) => entry.action)).toEqual([
      'run.create',
      'run.change',
      'run.hand-in',
      'run.change',
      'run.decide',
      'run.decide',
      'run.change',
    ])
  })

  test('of many edits of one version one is kept; the others are told, and leave no entry', async () => {
    const run = await createRun(lab.own.lead, lab.own.runInput())
    const before = (await trail()).length
    const outcomes = await Promise.allSettled(
      Array.from({ length: 10 }, (_, n) => changeRun(lab.own.lead, run.id, { notes: `edit ${n}` }, 1)),
    )
    expect(outcomes.filter((outcome) => outcome.status === 'fulfilled').length).toBe(1)
    for (const outcome of outcomes)
      if (outcome.status === 'rejected') expect(outcome.reason).toMatchObject({ code: 'stale' })
    expect((await trail()).length).toBe(before + 1)
    expect((await refusalOf(handIn(lab.own.lead, run.id, 1))).code).toBe('stale')
  })

  test('when the entry cannot be written, the change is not made', async () => {
    const run = await createRun(lab.own.lead, lab.own.runInput())
    const db = await getDatabase()
    await db.execute(sql`alter table audit_entries add constraint refuse_all check (action <> 'run.hand-in') not valid`)
    try {
      await expect(handIn(lab.own.lead, run.id, 1)).rejects.toThrow()
    } finally {
      await db.execute(sql`alter table audit_entries drop constraint refuse_all`)
    }
    expect(await getRun(lab.own.lead, run.id)).toEqual(run)
  })

  test('a bed is corrected by who may edit every run on it', async () => {
    const run = await createRun(lab.own.actor('technician'), lab.own.runInput())
    const bed = await changeLoading(lab.own.actor('technician'), run.loadingId, { catalystMassKg: 1.1e-4 }, 1)
    expect([bed.catalystMassKg, bed.version]).toEqual([1.1e-4, 2])
    await handIn(lab.own.actor('technician'), run.id, 1)
    expect(
      (await refusalOf(changeLoading(lab.own.actor('technician'), run.loadingId, { bedLengthM: 0.02 }, 2))).code,
    ).toBe('not-allowed')
    expect((await refusalOf(changeLoading(lab.own.lead, run.loadingId, { bedLengthM: 0.02 }, 1))).code).toBe('stale')
  })
})

describe('points left out, windows, remarks', () => {
  test.each([
    { role: 'technician', code: 'not-allowed' },
    { role: 'guest', code: 'not-found' },
  ] as const)('a $role leaves nothing out and writes no remark', async ({ role, code }) => {
    const actor = lab.own.actor(role)
    for (const refusal of await Promise.all(
      [
        addExclusion(actor, lab.own.run.id, leftOut),
        editHold(actor, lab.own.run.id, window),
        addRemark(actor, lab.own.run.id, 'hello'),
      ].map(refusalOf),
    ))
      expect(refusal.code).toBe(code)
  })

  test('what is left out is put back, never deleted', async () => {
    const researcher = lab.own.actor('researcher')
    const { id } = lab.own.run
    const exclusion = await addExclusion(researcher, id, leftOut)
    expect(exclusion).toMatchObject({ ...leftOut, createdByName: 'own-researcher', withdrawnAt: null })
    expect((await refusalOf(addExclusion(lab.own.lead, id, leftOut))).code).toBe('conflict')
    const back = await withdrawExclusion(lab.own.lead, id, exclusion.id, 'it had not slipped')
    expect(back.withdrawnAt).not.toBeNull()
    expect((await refusalOf(withdrawExclusion(lab.own.lead, id, exclusion.id, 'again'))).code).toBe('conflict')
    expect((await refusalOf(withdrawExclusion(lab.other.lead, lab.other.run.id, exclusion.id, 'theirs'))).code).toBe(
      'not-found',
    )
    await addExclusion(researcher, id, leftOut)
    expect((await listExclusions(researcher, id)).map((row) => row.withdrawnAt === null)).toEqual([false, true])
    expect(await listExclusions(lab.other.lead, lab.other.run.id)).toEqual([])
  })

  test('an edit of the same hold takes the place of the earlier one', async () => {
    const { lead } = lab.own
    const { id } = lab.own.run
    await editHold(lead, id, window)
    const second = await editHold(lead, id, { ...window, startS: 1_772_435_100 })
    const rows = await listHoldEdits(lead, id)
    expect(rows.map((row) => [row.startS, row.withdrawnAt === null])).toEqual([
      [1_772_435_000, false],
      [1_772_435_100, true],
    ])
    await withdrawHoldEdit(lead, id, second.id, 'the rule was right')
    expect((await listHoldEdits(lead, id)).every((row) => row.withdrawnAt !== null)).toBe(true)
    expect((await refusalOf(editHold(lead, id, { ...window, endS: window.startS }))).code).toBe('unprocessable')
    expect((await refusalOf(editHold(lead, id, { ...window, startS: null }))).code).toBe('unprocessable')
  })

  test('remarks read from the oldest', async () => {
    const researcher = lab.own.actor('researcher')
    await addRemark(researcher, lab.own.run.id, 'first')
    await addRemark(lab.own.lead, lab.own.run.id, 'second')
    expect((await listRemarks(researcher, lab.own.run.id)).map((row) => [row.body, row.createdByName])).toEqual([
      ['first', 'own-researcher'],
      ['second', 'own-lead'],
    ])
  })
})

test('lists go on after any row of theirs, without gap or repeat', async () => {
  const all = await listRuns(lab.other.lead)
  const seen: string[] = []
  let after: { startedAt: string; id: string } | null = null
  for (;;) {
    const rows = await listRuns(lab.other.lead, {}, { limit: 6, after })
    seen.push(...rows.map((row) => row.id))
    const last = rows.at(-1)
    if (last === undefined) break
    after = { startedAt: last.startedAt, id: last.id }
  }
  expect(seen).toEqual(all.map((row) => row.id))
})

describe('corrections', () => {
  test('of run and bed are one change: both or neither', async () => {
    const technician = lab.own.actor('technician')
    const run = await createRun(technician, lab.own.runInput())
    const versions = { run: run.version, bed: run.loading.version }
    const before = (await trail()).length
    const done = await correctRun(
      technician,
      run.id,
      { run: { notes: 'weighed again' }, bed: { catalystMassKg: 8.2e-5 } },
      versions,
    )
    expect([done.notes, done.loading.catalystMassKg]).toEqual(['weighed again', 8.2e-5])
    expect((await trail()).slice(before).map(({ action }) => action)).toEqual(['loading.change', 'run.change'])

    // the bed's version is new, the run's is the old one: nothing of it may stay
    const stale = { run: versions.run, bed: done.loading.version }
    const refusal = await refusalOf(
      correctRun(technician, run.id, { run: { notes: 'x' }, bed: { catalystMassKg: 9e-5 } }, stale),
    )
    expect(refusal.code).toBe('stale')
    expect((await getRun(technician, run.id)).loading.catalystMassKg).toBe(8.2e-5)
    expect((await trail()).length).toBe(before + 2)
  })

  test('with nothing in them change nothing', async () => {
    const technician = lab.own.actor('technician')
    const run = await createRun(technician, lab.own.runInput())
    const before = (await trail()).length
    const same = await correctRun(technician, run.id, { run: {}, bed: {} }, { run: 1, bed: 1 })
    expect([same.version, (await trail()).length]).toEqual([run.version, before])
  })

  test('are made by who may edit the run', async () => {
    const run = await createRun(lab.own.actor('technician'), lab.own.runInput())
    const versions = { run: run.version, bed: run.loading.version }
    const change = { run: { notes: 'x' }, bed: {} }
    const other = lab.own.actor('technician', { userId: 'own-researcher' })
    expect((await refusalOf(correctRun(other, run.id, change, versions))).code).toBe('not-allowed')
    for (const actor of [lab.own.actor('guest'), lab.other.lead])
      expect((await refusalOf(correctRun(actor, run.id, change, versions))).code).toBe('not-found')
    expect((await correctRun(lab.own.actor('researcher'), run.id, change, versions)).notes).toBe('x')
  })
})
