import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertLot, insertSample, insertSiteCount, updateSample } from '../../db/mutations/samples'
import {
  selectCampaignsOfSample,
  selectLots,
  selectSample,
  selectSamples,
  selectSiteCounts,
  type SampleScope,
} from '../../db/queries/samples'
import { changedFields } from '../audit/changed-fields'
import { wholeList, type Page } from '../domain/page'
import { type Actor } from '../domain/role'
import {
  type Lot,
  type NewLot,
  type NewSample,
  type NewSiteCount,
  type Sample,
  type SampleChange,
  type SiteCount,
} from '../domain/sample'
import { can } from '../policy/can'
import { readableCampaigns } from '../policy/campaign-scope'
import { authorise, hideUnless } from './authorise'
import { authoriseIn, holdOpenCampaign, readableSamples, touchableSamples } from './campaign-rights'
import { putSampleInto } from './campaigns'
import { refuseEmpty, refuseField, refuseStale } from './stale'

async function foundSample(db: Executor, scope: SampleScope, id: string): Promise<Sample> {
  const sample = await selectSample(db, scope, id)
  hideUnless(sample !== null)
  return sample
}

/** Samples of the actor's campaigns and the actor's own, by code. */
export async function listSamples(actor: Actor, page: Page<string> = wholeList): Promise<Sample[]> {
  authorise(can.readHouse(actor))
  return selectSamples(await getDatabase(), readableSamples(actor), page)
}

export async function getSample(actor: Actor, id: string): Promise<Sample> {
  authorise(can.readHouse(actor))
  return foundSample(await getDatabase(), readableSamples(actor), id)
}

/** Ids of the campaigns the actor reads that hold the sample. */
export async function listCampaignsOfSample(actor: Actor, id: string): Promise<string[]> {
  authorise(can.readHouse(actor))
  const db = await getDatabase()
  await foundSample(db, readableSamples(actor), id)
  return selectCampaignsOfSample(db, readableCampaigns(actor), id)
}

/** Keeps a sample and puts it into the campaigns named, each of which its maker works in. */
export async function createSample(actor: Actor, input: NewSample): Promise<Sample> {
  authorise(can.addSample(actor))
  const { campaignIds, ...fields } = input
  const wanted = [...new Set(campaignIds)].sort()
  for (const campaignId of wanted) authoriseIn(actor, campaignId, can.addSampleToCampaign(actor, campaignId))
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    for (const campaignId of wanted) await holdOpenCampaign(tx, campaignId)
    await insertSample(tx, { ...fields, id, createdBy: actor.userId })
    await insertAuditEntry(tx, { actor, action: 'sample.create', entity: 'sample', entityId: id, after: fields })
    for (const campaignId of wanted) await putSampleInto(tx, actor, campaignId, id)
    return foundSample(tx, touchableSamples(actor), id)
  })
}

export async function changeSample(actor: Actor, id: string, change: SampleChange, version: number): Promise<Sample> {
  authorise(can.editSample(actor))
  refuseEmpty(change)
  const scope = touchableSamples(actor)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const before = await foundSample(tx, scope, id)
    if (!(await updateSample(tx, id, version, change))) refuseStale(await foundSample(tx, scope, id))
    const after = await foundSample(tx, scope, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'sample.change',
      entity: 'sample',
      entityId: id,
      ...changedFields(before, after),
    })
    return after
  })
}

export async function listLots(actor: Actor, sampleId: string): Promise<Lot[]> {
  authorise(can.readHouse(actor))
  const db = await getDatabase()
  await foundSample(db, readableSamples(actor), sampleId)
  return selectLots(db, readableSamples(actor), sampleId)
}

export async function addLot(actor: Actor, sampleId: string, input: NewLot): Promise<Lot> {
  authorise(can.addLot(actor))
  const scope = touchableSamples(actor)
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await foundSample(tx, scope, sampleId)
    await insertLot(tx, { ...input, id, sampleId, createdBy: actor.userId })
    const lot = (await selectLots(tx, scope, sampleId)).find((one) => one.id === id)
    hideUnless(lot !== undefined)
    await insertAuditEntry(tx, { actor, action: 'lot.add', entity: 'sample', entityId: sampleId, after: lot })
    return lot
  })
}

/** Latest first. */
export async function listSiteCounts(actor: Actor, sampleId: string): Promise<SiteCount[]> {
  authorise(can.readHouse(actor))
  const db = await getDatabase()
  await foundSample(db, readableSamples(actor), sampleId)
  return selectSiteCounts(db, readableSamples(actor), sampleId)
}

export async function addSiteCount(actor: Actor, sampleId: string, input: NewSiteCount): Promise<SiteCount> {
  authorise(can.addSiteCount(actor))
  const scope = touchableSamples(actor)
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await foundSample(tx, scope, sampleId)
    if (input.lotId !== null && !(await selectLots(tx, scope, sampleId)).some((lot) => lot.id === input.lotId))
      refuseField('lotId', 'The sample has no such lot.')
    await insertSiteCount(tx, { ...input, id, sampleId, createdBy: actor.userId })
    const count = (await selectSiteCounts(tx, scope, sampleId)).find((one) => one.id === id)
    hideUnless(count !== undefined)
    await insertAuditEntry(tx, {
      actor,
      action: 'site-count.add',
      entity: 'sample',
      entityId: sampleId,
      after: count,
    })
    return count
  })
}
