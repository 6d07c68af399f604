import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { getDatabase, type OpenDatabase } from '@/db/client'
import { selectCalibrationRecords } from '@/db/queries/reduction-inputs'
import { selectValidCalibrations } from '@/db/queries/rigs'
import {
  changeCalibration,
  createCalibration,
  getCalibration,
  listCalibrations,
  listValidCalibrations,
  supersedeCalibration,
} from '@/lib/access/calibrations'
import { createColumnMap, findColumnMap, listColumnMaps } from '@/lib/access/column-maps'
import { changeReaction, createReaction, getReaction, listReactions } from '@/lib/access/reactions'
import { changeRig, createRig, getRig, listRigs } from '@/lib/access/rigs'
import {
  addLot,
  addSiteCount,
  changeSample,
  createSample,
  getSample,
  listCampaignsOfSample,
  listLots,
  listSamples,
  listSiteCounts,
} from '@/lib/access/samples'
import { newCalibrationSchema } from '@/lib/domain/calibration'
import { newColumnMapSchema } from '@/lib/domain/column-map'
import { newReactionSchema } from '@/lib/domain/reaction'
import { newRigSchema } from '@/lib/domain/rig'
import { newLotSchema, newSampleSchema, newSiteCountSchema } from '@/lib/domain/sample'
import { actorOf } from '@/tests/support/actors'
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

const factors = (more: object = {}) =>
  newCalibrationSchema.parse({
    kind: 'response-factors',
    name: 'Spring cylinder',
    convention: 'factor',
    entries: [{ species: 'CO2', value: 2e-8, unit: 'mole fraction per area count', relativeStandardUncertainty: 0.01 }],
    validFrom: '2026-01-01T00:00:00Z',
    ...more,
  })
const reaction = (more: object = {}) =>
  newReactionSchema.parse({
    code: 'RWGS',
    name: 'Reverse shift',
    keyReactant: 'CO2',
    steps: [{ CO2: -1, H2: -1, CO: 1, H2O: 1 }],
    ...more,
  })
const rig = (more: object = {}) =>
  newRigSchema.parse({ code: 'Rig X', name: 'New rig', channels: [{ code: '1' }], ...more })
const map = (more: object = {}) =>
  newColumnMapSchema.parse({
    rigId: lab.rig.id,
    instrument: 'GC 1',
    fingerprint: 'f1',
    specification: { kind: 'analyser', columns: [], decimalMark: ',', timeZone: 'UTC' },
    ...more,
  })

test('response factors that the reduction would pass over or guess at are refused, and nothing of them is kept', async () => {
  const entry = { species: 'CO2', value: 2e-8, unit: '' }
  const before = (await trail()).length
  for (const [field, more] of [
    ['convention', { convention: null }],
    ['entries.1.species', { entries: [entry, { ...entry, species: null }] }],
    ['entries.1.species', { entries: [entry, entry] }],
    ['entries.0.value', { entries: [{ ...entry, value: 0 }] }],
    ['entries.1.value', { entries: [entry, { ...entry, species: 'CO', value: -1e-8 }] }],
  ] as const) {
    const refusal = await refusalOf(createCalibration(lab.own.actor('technician'), factors(more)))
    expect([refusal.code, refusal.details.issues?.map((issue) => issue.field)]).toEqual(['unprocessable', [field]])
  }
  expect((await trail()).length).toBe(before)
})

describe('who may', () => {
  test('a guest of the house reads nothing of it', async () => {
    const guest = lab.own.actor('guest')
    const refusals = await Promise.all(
      [
        listReactions(guest),
        getReaction(guest, lab.reaction.id),
        listRigs(guest),
        getRig(guest, lab.rig.id),
        listCalibrations(guest),
        listColumnMaps(guest),
        listSamples(guest),
        getSample(guest, lab.own.sample.id),
        createSample(guest, newSampleSchema.parse({ code: 'S', name: 'S' })),
        createCalibration(guest, factors()),
        createColumnMap(guest, map()),
      ].map(refusalOf),
    )
    expect(new Set(refusals.map((refusal) => refusal.code))).toEqual(new Set(['not-allowed']))
  })

  test.each([
    { role: 'technician', reactions: false, rigs: false },
    { role: 'researcher', reactions: true, rigs: false },
    { role: 'lead', reactions: true, rigs: false },
  ] as const)('$role: reactions $reactions, rigs $rigs', async ({ role, reactions }) => {
    const actor = lab.own.actor(role)
    const making = createReaction(actor, reaction({ code: `RWGS-${role}` }))
    if (reactions) expect((await making).version).toBe(1)
    else expect((await refusalOf(making)).code).toBe('not-allowed')
    expect((await refusalOf(createRig(actor, rig()))).code).toBe('not-allowed')
    expect((await refusalOf(changeRig(actor, lab.rig.id, { name: 'mine' }, 1))).code).toBe('not-allowed')
    expect((await listRigs(actor)).map((row) => row.code)).toEqual(['Rig B'])
  })

  test('a token does no more than its scopes', async () => {
    const reader = lab.own.actor('lead', { tokenScopes: ['read'] })
    expect((await listReactions(reader)).length).toBeGreaterThan(0)
    expect((await refusalOf(createReaction(reader, reaction({ code: 'T' })))).code).toBe('not-allowed')
    const writer = lab.own.actor('lead', { tokenScopes: ['write'] })
    expect((await refusalOf(listReactions(writer))).code).toBe('not-allowed')
  })
})

describe('reactions and rigs', () => {
  test('a step that loses an element, or spares the key reactant, is refused at its field', async () => {
    const lost = await refusalOf(
      createReaction(lab.own.lead, reaction({ steps: [{ CO2: -1, H2: -4, CH4: 1, H2O: 1 }] })),
    )
    expect([lost.code, lost.details.issues?.[0]?.field]).toEqual(['unprocessable', 'steps.0'])
    expect(lost.message).toContain('does not balance')
    const spared = await refusalOf(createReaction(lab.own.lead, reaction({ steps: [{ H2: -2, O2: -1, H2O: 2 }] })))
    expect(spared.message).toContain('does not consume CO2')
  })

  test('the code is unique, the version seen counts, the entry goes with the change', async () => {
    const made = await createReaction(lab.own.lead, reaction())
    const again = await refusalOf(createReaction(lab.own.lead, reaction()))
    expect([again.code, again.details.constraint]).toEqual(['conflict', 'reactions_code_unique'])
    const changed = await changeReaction(lab.own.lead, made.id, { notes: 'beside the main step' }, 1)
    expect([changed.notes, changed.version]).toEqual(['beside the main step', 2])
    const before = (await trail()).length
    expect((await refusalOf(changeReaction(lab.own.lead, made.id, { notes: '' }, 1))).details.current).toEqual(changed)
    expect((await trail()).length).toBe(before)
    expect((await trail()).at(-1)).toMatchObject({
      action: 'reaction.change',
      before: { notes: '' },
      after: { notes: 'beside the main step' },
    })
  })

  test('a rig has a time zone that exists and channels told apart', async () => {
    const zone = await refusalOf(createRig(lab.admin, rig({ timeZone: 'Mars/Olympus' })))
    expect(zone.details.issues?.[0]?.field).toBe('timeZone')
    const twice = await refusalOf(createRig(lab.admin, rig({ channels: [{ code: '1' }, { code: '1' }] })))
    expect(twice.details.issues?.[0]?.field).toBe('channels')
    const made = await createRig(lab.admin, rig({ timeZone: 'Europe/Oslo' }))
    expect((await changeRig(lab.admin, made.id, { lineLagS: 12 }, 1)).lineLagS).toBe(12)
    expect((await refusalOf(createRig(lab.admin, rig()))).details.constraint).toBe('rigs_code_unique')
    expect((await listRigs(lab.admin, { limit: 1, after: 'Rig B' })).map((row) => row.code)).toEqual(['Rig X'])
  })
})

describe('calibrations', () => {
  const validAt = async (instant: string, rigId: string | null = null) =>
    (await listValidCalibrations(lab.own.lead, new Date(instant), rigId)).map((row) => row.name)

  test('the one that supersedes counts where it is valid, the earlier one elsewhere; one supersedes once', async () => {
    const technician = lab.own.actor('technician')
    const first = await createCalibration(technician, factors())
    const second = await supersedeCalibration(
      technician,
      first.id,
      factors({ name: 'Corrected', validFrom: '2026-02-01T00:00:00Z', validTo: '2026-06-01T00:00:00Z' }),
    )
    expect((await getCalibration(technician, first.id)).supersededById).toBe(second.id)
    const again = await refusalOf(supersedeCalibration(technician, first.id, factors({ name: 'Third' })))
    expect(again.code).toBe('conflict')
    expect(await validAt('2025-12-31T23:59:59Z')).toEqual([])
    expect(await validAt('2026-01-15T00:00:00Z')).toEqual(['Spring cylinder'])
    expect(await validAt('2026-02-01T00:00:00Z')).toEqual(['Corrected'])
    expect(await validAt('2026-05-31T23:59:59Z')).toEqual(['Corrected'])
    expect(await validAt('2026-06-01T00:00:00Z')).toEqual(['Spring cylinder'])

    // superseded at second hand too
    await supersedeCalibration(
      technician,
      second.id,
      factors({ name: 'Corrected again', validFrom: '2026-05-01T00:00:00Z' }),
    )
    expect(await validAt('2026-07-01T00:00:00Z')).toEqual(['Corrected again'])
    expect(await validAt('2026-04-01T00:00:00Z')).toEqual(['Corrected'])
  })

  test('those of a rig are used on that rig only', async () => {
    const own = await createCalibration(
      lab.own.lead,
      factors({
        kind: 'thermocouple',
        name: 'Well 3',
        convention: null,
        rigId: lab.rig.id,
        validFrom: '2027-01-01T00:00:00Z',
      }),
    )
    expect(await validAt('2027-01-02T00:00:00Z', lab.rig.id)).toContain('Well 3')
    expect(await validAt('2027-01-02T00:00:00Z')).not.toContain('Well 3')
    const db = await getDatabase()
    expect(
      (await selectValidCalibrations(db, new Date('2027-01-02T00:00:00Z'), 'other-rig')).map((row) => row.id),
    ).not.toContain(own.id)

    const ended = await changeCalibration(lab.own.lead, own.id, { validTo: '2027-06-01T00:00:00Z' }, 1)
    expect([ended.validTo, ended.version]).toEqual(['2027-06-01T00:00:00.000Z', 2])
    expect((await refusalOf(changeCalibration(lab.own.lead, own.id, { validTo: null }, 1))).code).toBe('stale')
    const backwards = await refusalOf(changeCalibration(lab.own.lead, own.id, { validTo: '2026-06-01T00:00:00Z' }, 2))
    expect([backwards.code, backwards.details.constraint]).toEqual(['invalid', 'calibrations_validity_check'])
  })

  test('another kind supersedes nothing', async () => {
    const [any] = await listCalibrations(lab.own.lead, { kind: 'thermocouple' })
    const refusal = await refusalOf(createCalibration(lab.own.lead, factors({ supersedesId: any?.id })))
    expect(refusal.details.issues?.[0]?.field).toBe('supersedesId')
  })

  test('pages of the list follow on', async () => {
    const all = await listCalibrations(lab.own.lead)
    const first = all[0]
    if (first === undefined) throw new Error('no calibration')
    const next = await listCalibrations(
      lab.own.lead,
      {},
      { limit: 10, after: { validFrom: first.validFrom, id: first.id } },
    )
    expect(next.map((row) => row.id)).toEqual(all.slice(1).map((row) => row.id))
  })
})

test('column maps are numbered by rig and instrument, and found by the newest of their columns', async () => {
  const technician = lab.own.actor('technician')
  const made = await Promise.all(Array.from({ length: 5 }, () => createColumnMap(technician, map())))
  expect(made.map((row) => row.number).sort()).toEqual([1, 2, 3, 4, 5])
  const other = await createColumnMap(technician, map({ instrument: 'GC 2', fingerprint: 'f2' }))
  expect(other.number).toBe(1)
  expect((await findColumnMap(technician, lab.rig.id, 'f1'))?.number).toBe(5)
  expect(await findColumnMap(technician, lab.rig.id, 'f3')).toBeNull()
  expect((await listColumnMaps(technician, { instrument: 'GC 2' })).map((row) => row.id)).toEqual([other.id])
  expect((await refusalOf(createColumnMap(technician, map({ rigId: 'no-rig' })))).code).toBe('unprocessable')
})

describe('samples', () => {
  test('one sees those of one’s campaigns and one’s own, and changes no other', async () => {
    const technician = lab.own.actor('technician')
    const loose = await createSample(lab.other.lead, newSampleSchema.parse({ code: 'S-loose', name: 'In no campaign' }))
    expect((await listSamples(technician)).map((row) => row.code)).toEqual(['S-own'])
    expect((await listSamples(lab.other.lead)).map((row) => row.code)).toEqual(['S-loose', 'S-other'])
    expect((await listSamples(lab.admin)).map((row) => row.code)).toEqual(['S-loose', 'S-other', 'S-own'])
    const id = lab.other.sample.id
    const refusals = await Promise.all(
      [
        getSample(technician, id),
        getSample(technician, loose.id),
        listLots(technician, id),
        listSiteCounts(technician, id),
        listCampaignsOfSample(technician, id),
        changeSample(technician, id, { name: 'mine' }, 1),
        addLot(technician, id, newLotSchema.parse({ code: 'A' })),
        addSiteCount(technician, id, newSiteCountSchema.parse({ method: 'H2 chemisorption', molPerKg: 0.06 })),
      ].map(refusalOf),
    )
    expect(new Set(refusals.map((refusal) => refusal.code))).toEqual(new Set(['not-found']))
    expect((await getSample(lab.other.lead, id)).name).toBe('Sample other')
  })

  test('a sample goes into campaigns of its maker only, and not at all otherwise', async () => {
    const before = (await trail()).length
    const input = newSampleSchema.parse({
      code: 'S-both',
      name: 'Both',
      campaignIds: [lab.own.campaign.id, lab.other.campaign.id],
    })
    expect((await refusalOf(createSample(lab.own.lead, input))).code).toBe('not-found')
    expect((await trail()).length).toBe(before)
    const taken = await refusalOf(createSample(lab.own.lead, newSampleSchema.parse({ code: 'S-other', name: 'Taken' })))
    expect([taken.code, taken.details.constraint]).toEqual(['conflict', 'samples_code_unique'])
  })

  test('lots, site counts and edits, each with its entry', async () => {
    const technician = lab.own.actor('technician')
    const { id } = lab.own.sample
    const lot = await addLot(technician, id, newLotSchema.parse({ code: 'A', madeAt: '2026-01-05T12:00:00+01:00' }))
    expect(lot.madeAt).toBe('2026-01-05T11:00:00.000Z')
    expect((await refusalOf(addLot(technician, id, newLotSchema.parse({ code: 'A' })))).details.constraint).toBe(
      'lots_sample_id_code_unique',
    )
    const count = await addSiteCount(
      technician,
      id,
      newSiteCountSchema.parse({
        lotId: lot.id,
        method: 'H2 chemisorption',
        molPerKg: 0.062,
        relativeStandardUncertainty: 0.05,
      }),
    )
    expect(await listSiteCounts(technician, id)).toEqual([count])
    const foreign = newSiteCountSchema.parse({ lotId: 'no-lot', method: 'total metal', molPerKg: 0.1 })
    expect((await refusalOf(addSiteCount(technician, id, foreign))).details.issues?.[0]?.field).toBe('lotId')
    const changed = await changeSample(technician, id, { metalMassFraction: 0.05 }, 1)
    expect([changed.metalMassFraction, changed.version]).toEqual([0.05, 2])
    expect((await refusalOf(changeSample(technician, id, { notes: 'x' }, 1))).code).toBe('stale')
    expect((await refusalOf(changeSample(technician, id, {}, 2))).code).toBe('invalid')
    expect((await trail()).filter((entry) => entry.entityId === id).map((entry) => entry.action)).toEqual([
      'sample.create',
      'campaign-sample.add',
      'lot.add',
      'site-count.add',
      'sample.change',
    ])
    expect(await listCampaignsOfSample(technician, id)).toEqual([lab.own.campaign.id])
  })

  test('a token that only adds may add a sample and not read the others', async () => {
    const adder = actorOf('technician', {
      userId: 'own-technician',
      memberships: { [lab.own.campaign.id]: 'technician' },
      tokenScopes: ['intake'],
    })
    const made = await createSample(
      adder,
      newSampleSchema.parse({ code: 'S-token', name: 'By token', campaignIds: [lab.own.campaign.id] }),
    )
    expect(made.code).toBe('S-token')
    expect((await refusalOf(listSamples(adder))).code).toBe('not-allowed')
  })
})

test('what a run’s numbers rest on is chosen at its own time, whichever runs are reduced beside it', async () => {
  const db = await getDatabase()
  const technician = lab.own.actor('technician')
  const first = await createCalibration(
    technician,
    factors({ name: 'A', kind: 'flow-controller', convention: null, validFrom: '2030-01-01T00:00:00Z' }),
  )
  const second = await supersedeCalibration(
    technician,
    first.id,
    factors({ name: 'B', kind: 'flow-controller', convention: null, validFrom: '2030-02-01T00:00:00Z' }),
  )
  const records = await selectCalibrationRecords(db, new Date('2030-01-10T00:00:00Z'), new Date('2030-03-01T00:00:00Z'))
  const links = records
    .filter((record) => record.kind === 'flow-controller')
    .map((record) => [record.name, record.supersededByIds])
  expect(links).toEqual([
    ['B', []],
    ['A', [second.id]],
  ])
})
