'use server'

import { revalidatePath } from 'next/cache'
import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { addSampleToCampaign } from '@/lib/access/campaigns'
import { addLot, addSiteCount, changeSample, createSample } from '@/lib/access/samples'
import { answerAction } from '@/lib/domain/action-answer'
import { FormReader } from '@/lib/domain/form-reader'
import {
  newLotSchema,
  newSampleSchema,
  newSiteCountSchema,
  sampleChangeSchema,
  siteCountMethods,
} from '@/lib/domain/sample'
import { readSample } from './_read-sample'

export async function createSampleAction(_previous: FormState, data: FormData): Promise<FormState> {
  const answer = await answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const code = form.required('code', 'Give the code that stands on the vial, for example CQ-101.')
    const record = readSample(form)
    form.finish()
    const campaignIds = form.texts('campaignIds')
    return (await createSample(actor, newSampleSchema.parse({ code, ...record, campaignIds }))).id
  })
  if (!answer.ok) return answer
  redirect(routeOf(`/samples/${answer.value}`))
}

export async function changeSampleAction(
  key: { readonly id: string; readonly version: number },
  _previous: FormState,
  data: FormData,
): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const record = readSample(form)
    form.finish()
    await changeSample(actor, key.id, sampleChangeSchema.parse(record), key.version)
    revalidatePath('/samples/[sampleId]', 'page')
    return 'Saved.'
  })
}

export async function addLotAction(sampleId: string, _previous: FormState, data: FormData): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const lot = {
      code: form.required('code', 'Give the lot a code, for example 2.'),
      madeAt: form.instant('madeAt', 'UTC'),
      notes: form.text('notes'),
    }
    form.finish()
    await addLot(actor, sampleId, newLotSchema.parse(lot))
    revalidatePath('/samples/[sampleId]', 'page')
    return 'Lot kept.'
  })
}

export async function addSiteCountAction(sampleId: string, _previous: FormState, data: FormData): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const molPerKg = form.requiredQuantity(
      'molPerKg',
      'amount-per-mass',
      'Give the site count, for example 120 µmol/g.',
    )
    const count = {
      lotId: form.orNull('lotId'),
      method: form.choice('method', siteCountMethods, 'Choose how the sites were counted.'),
      molPerKg,
      relativeStandardUncertainty: form.requiredQuantity(
        'relativeStandardUncertainty',
        'fraction',
        'Say how sure the count is, as one standard uncertainty, for example 8 %.',
      ),
      state: form.choice('state', ['fresh', 'spent'], 'Choose fresh or spent.'),
      countedAt: form.instant('countedAt', 'UTC'),
      notes: form.text('notes'),
    }
    form.finish()
    await addSiteCount(actor, sampleId, newSiteCountSchema.parse(count))
    revalidatePath('/samples/[sampleId]', 'page')
    return 'Site count kept. Turnover frequencies that use it follow.'
  })
}

export async function addToCampaignAction(sampleId: string, _previous: FormState, data: FormData): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const campaignId = form.required('campaignId', 'Choose a campaign.')
    form.finish()
    await addSampleToCampaign(actor, campaignId, sampleId)
    revalidatePath('/samples/[sampleId]', 'page')
    return 'Added to the campaign.'
  })
}
