import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { type OpenDatabase } from '@/db/client'
import {
  addMember,
  addSampleToCampaign,
  changeCampaign,
  changeCampaignSample,
  changeMember,
  closeCampaign,
  createCampaign,
  getCampaign,
  getCurrentMethod,
  listCampaigns,
  listCampaignSamples,
  listMembers,
  listMethods,
  removeMember,
  reopenCampaign,
  saveMethod,
} from '@/lib/access/campaigns'
import { listCampaignNames } from '@/lib/access/campaign-names'
import { listHistory } from '@/lib/access/history'
import { createRun } from '@/lib/access/runs'
import { methodSettingsSchema } from '@/lib/domain/method'
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

const input = (code: string) => ({
  code,
  name: code,
  laboratory: '',
  description: '',
  reactionId: lab.reaction.id,
  referenceSampleId: null,
})

describe('what one sees', () => {
  test('members list their campaign and not the other; counts are of their own rows', async () => {
    for (const role of ['technician', 'researcher', 'lead'] as const) {
      const list = await listCampaigns(lab.own.actor(role))
      expect(list.map((row) => row.code)).toEqual(['C-own'])
      expect(list[0]).toMatchObject({ sampleCount: 1, runCount: 1, waitingCount: 1, methodNumber: 1, myRole: role })
    }
    expect((await listCampaigns(lab.admin)).map((row) => [row.code, row.myRole])).toEqual([
      ['C-other', 'admin'],
      ['C-own', 'admin'],
    ])
    expect((await listCampaigns(lab.admin, {}, { limit: 1, after: 'C-other' })).map((row) => row.code)).toEqual([
      'C-own',
    ])
  })

  test('a guest knows the name of the campaign and nothing else', async () => {
    const guest = lab.own.actor('guest')
    expect(await listCampaigns(guest)).toEqual([])
    expect((await listCampaignNames(guest)).map((row) => row.code)).toEqual(['C-own'])
    expect((await refusalOf(getCampaign(guest, lab.own.campaign.id))).code).toBe('not-found')
  })

  test('another campaign does not exist, whatever is asked of it', async () => {
    const actor = lab.own.lead
    const { campaign, sample } = lab.other
    const asked = [
      () => getCampaign(actor, campaign.id),
      () => listMembers(actor, campaign.id),
      () => listMethods(actor, campaign.id),
      () => getCurrentMethod(actor, campaign.id),
      () => listCampaignSamples(actor, campaign.id),
      () => listHistory(actor, campaign.id),
      () => changeCampaign(actor, campaign.id, { name: 'taken' }, 1),
      () => closeCampaign(actor, campaign.id, 'taken over', 1),
      () => addMember(actor, campaign.id, { userId: 'own-lead', role: 'lead' }),
      () => removeMember(actor, campaign.id, 'other-guest'),
      () => saveMethod(actor, campaign.id, { settings: methodSettingsSchema.parse({}), reason: 'taken' }),
      () => addSampleToCampaign(actor, campaign.id, lab.own.sample.id),
      () => changeCampaignSample(actor, campaign.id, sample.id, { remark: 'x', version: 1 }),
    ]
    const before = (await trail()).length
    for (const ask of asked) expect((await refusalOf(ask())).code).toBe('not-found')
    expect((await trail()).length).toBe(before)
    expect((await getCampaign(lab.other.lead, campaign.id)).name).toBe('Campaign other')
  })

  test('a token bound to one campaign is blind to the maker’s other ones', async () => {
    const bound = actorOf('lead', {
      userId: 'own-lead',
      memberships: { [lab.own.campaign.id]: 'lead', [lab.other.campaign.id]: 'lead' },
      tokenScopes: ['read', 'write', 'intake'],
      tokenCampaignId: lab.own.campaign.id,
    })
    expect((await listCampaigns(bound)).map((row) => row.code)).toEqual(['C-own'])
    expect((await refusalOf(getCampaign(bound, lab.other.campaign.id))).code).toBe('not-found')
  })
})

describe('who may', () => {
  test.each([
    { role: 'technician', code: 'not-allowed' },
    { role: 'researcher', code: 'not-allowed' },
    { role: 'guest', code: 'not-found' },
  ] as const)('a $role leads nothing', async ({ role, code }) => {
    const actor = lab.own.actor(role)
    const id = lab.own.campaign.id
    const settings = methodSettingsSchema.parse({})
    for (const refusal of await Promise.all(
      [
        changeCampaign(actor, id, { name: 'x' }, 1),
        closeCampaign(actor, id, 'because', 1),
        addMember(actor, id, { userId: 'stranger', role: 'guest' }),
        removeMember(actor, id, 'own-guest'),
        saveMethod(actor, id, { settings, reason: 'because' }),
        changeCampaignSample(actor, id, lab.own.sample.id, { isShortlisted: true, version: 1 }),
        changeCampaignSample(actor, id, lab.own.sample.id, { priority: 1, version: 1 }),
        listHistory(actor, id),
      ].map(refusalOf),
    ))
      expect(refusal.code).toBe(code)
    expect((await refusalOf(createCampaign(actor, input('C-no')))).code).toBe('not-allowed')
  })

  test('an admin manages members and neither decides nor sets the method', async () => {
    const id = lab.own.campaign.id
    const settings = methodSettingsSchema.parse({})
    expect((await refusalOf(saveMethod(lab.admin, id, { settings, reason: 'because' }))).code).toBe('not-allowed')
    expect(
      (await refusalOf(changeCampaignSample(lab.admin, id, lab.own.sample.id, { isShortlisted: true, version: 1 })))
        .code,
    ).toBe('not-allowed')
    await addMember(lab.admin, id, { userId: 'stranger', role: 'researcher' })
    expect((await listMembers(lab.own.lead, id)).map((row) => row.userId)).toContain('stranger')
    expect((await refusalOf(addMember(lab.admin, id, { userId: 'stranger', role: 'lead' }))).details.constraint).toBe(
      'members_pkey',
    )
    await removeMember(lab.admin, id, 'stranger')
    expect((await listMembers(lab.own.lead, id)).map((row) => row.userId)).not.toContain('stranger')
  })
})

describe('changes', () => {
  test('the maker leads the new campaign, method 1 has the defaults, one entry says so', async () => {
    const before = (await trail()).length
    const campaign = await createCampaign(actorOf('lead', { userId: 'own-lead' }), input('C-new'))
    expect(campaign).toMatchObject({ code: 'C-new', myRole: 'lead', methodNumber: 1, version: 1, sampleCount: 0 })
    const lead = actorOf('lead', { userId: 'own-lead', memberships: { [campaign.id]: 'lead' } })
    expect((await getCurrentMethod(lead, campaign.id)).settings).toEqual(methodSettingsSchema.parse({}))
    const entries = (await trail()).slice(before)
    expect(entries.map((entry) => [entry.action, entry.actorId, entry.campaignId])).toEqual([
      ['campaign.create', 'own-lead', campaign.id],
    ])
  })

  test('a code taken already refuses the whole campaign, the entry with it', async () => {
    const before = (await trail()).length
    const refusal = await refusalOf(createCampaign(actorOf('lead', { userId: 'own-lead' }), input('C-own')))
    expect([refusal.code, refusal.details.constraint]).toEqual(['conflict', 'campaigns_code_unique'])
    expect((await trail()).length).toBe(before)
  })

  test('an edit of an old version is refused, with what is there now', async () => {
    const id = lab.own.campaign.id
    const changed = await changeCampaign(lab.own.lead, id, { name: 'Renamed' }, 1)
    expect(changed.version).toBe(2)
    const refusal = await refusalOf(changeCampaign(lab.own.lead, id, { name: 'Lost' }, 1))
    expect(refusal.code).toBe('stale')
    expect(refusal.details.current).toMatchObject({ name: 'Renamed', version: 2 })
    const last = (await trail()).at(-1)
    expect([last?.action, last?.before, last?.after]).toEqual([
      'campaign.change',
      { name: 'Campaign own' },
      { name: 'Renamed' },
    ])
  })

  test('remark, shortlist and priority by role, each counting the version up', async () => {
    const { campaign, sample } = lab.own
    const remarked = await changeCampaignSample(lab.own.actor('researcher'), campaign.id, sample.id, {
      remark: 'holds up',
      version: 1,
    })
    expect(remarked).toMatchObject({ remark: 'holds up', isShortlisted: false, version: 2 })
    const listed = await changeCampaignSample(lab.own.lead, campaign.id, sample.id, {
      isShortlisted: true,
      priority: 2,
      version: 2,
    })
    expect(listed).toMatchObject({ remark: 'holds up', isShortlisted: true, priority: 2, version: 3 })
    const stale = await refusalOf(
      changeCampaignSample(lab.own.lead, campaign.id, sample.id, { priority: 1, version: 2 }),
    )
    expect([stale.code, stale.details.current]).toEqual(['stale', listed])
    const mixed = changeCampaignSample(lab.own.actor('researcher'), campaign.id, sample.id, {
      remark: 'mixed',
      priority: 9,
      version: 3,
    })
    expect((await refusalOf(mixed)).code).toBe('not-allowed')
    const rows = await listCampaignSamples(lab.own.lead, campaign.id)
    expect(rows).toEqual([listed])
  })

  test('a method is never changed: the next number, with the reason and what is different', async () => {
    const id = lab.own.campaign.id
    const settings = methodSettingsSchema.parse({ maximumConversion: 0.15 })
    const method = await saveMethod(lab.own.lead, id, { settings, reason: 'stay differential' }, 1)
    expect(method).toMatchObject({ number: 2, reason: 'stay differential', createdByName: 'own-lead' })
    expect((await refusalOf(saveMethod(lab.own.lead, id, { settings, reason: 'again' }, 1))).code).toBe('stale')
    expect((await listMethods(lab.own.lead, id)).map((row) => row.number)).toEqual([2, 1])
    expect((await listMethods(lab.other.lead, lab.other.campaign.id)).map((row) => row.number)).toEqual([1])
    const last = (await trail()).at(-1)
    expect([last?.before, last?.after]).toEqual([
      { number: 1, maximumConversion: 0.2 },
      { number: 2, maximumConversion: 0.15 },
    ])
  })

  test('a campaign keeps a lead, and a guest of the house stays a guest', async () => {
    const id = lab.own.campaign.id
    expect((await refusalOf(removeMember(lab.admin, id, 'own-lead'))).code).toBe('conflict')
    expect((await refusalOf(changeMember(lab.admin, id, 'own-lead', 'researcher'))).code).toBe('conflict')
    expect((await refusalOf(addMember(lab.admin, id, { userId: 'other-guest', role: 'lead' }))).code).toBe(
      'unprocessable',
    )
    await changeMember(lab.own.lead, id, 'own-researcher', 'lead')
    await changeMember(lab.own.lead, id, 'own-researcher', 'researcher')
  })

  test('a closed campaign takes no run until it is opened again', async () => {
    const { campaign, lead, runInput } = lab.own
    const { version } = await getCampaign(lead, campaign.id)
    const closed = await closeCampaign(lead, campaign.id, 'finished', version)
    expect(closed.closedAt).not.toBeNull()
    expect((await refusalOf(createRun(lead, runInput()))).code).toBe('conflict')
    expect((await listCampaigns(lead, { isClosed: true })).map((row) => row.code)).toEqual(['C-own'])
    const reopened = await reopenCampaign(lead, campaign.id, 'one more sample', closed.version)
    expect(reopened.closedAt).toBeNull()
    await createRun(lead, runInput())
  })

  test('the history tells the campaign’s entries and no other’s', async () => {
    const entries = await listHistory(lab.own.lead, lab.own.campaign.id)
    const other = await trail()
    const seqs = new Set(entries.map((entry) => entry.seq))
    expect(
      other.filter((entry) => entry.campaignId === lab.own.campaign.id).every((entry) => seqs.has(entry.seq)),
    ).toBe(true)
    expect(JSON.stringify(entries)).not.toContain(lab.other.campaign.id)
    expect(entries.some((entry) => entry.action === 'sample.create')).toBe(true)
    expect(await listHistory(lab.own.lead, lab.own.campaign.id, { limit: 2, after: entries[0]?.seq ?? 0 })).toEqual(
      entries.slice(1, 3),
    )
  })
})
