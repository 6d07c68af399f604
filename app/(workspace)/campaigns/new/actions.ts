'use server'

import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { addSampleToCampaign, createCampaign } from '@/lib/access/campaigns'
import { answerAction } from '@/lib/domain/action-answer'
import { newCampaignSchema } from '@/lib/domain/campaign'
import { FormReader } from '@/lib/domain/form-reader'

export async function createCampaignAction(_previous: FormState, data: FormData): Promise<FormState> {
  const answer = await answerAction(async () => {
    const founder = await requireActor()
    const form = new FormReader(data)
    const input = {
      code: form.required('code', 'Give a short code, for example CQ-METH-1.'),
      name: form.required('name', 'Name the campaign.'),
      reactionId: form.required('reactionId', 'Choose the reaction.'),
      laboratory: form.text('laboratory'),
      description: form.text('description'),
    }
    form.finish()
    const campaign = await createCampaign(founder, newCampaignSchema.parse(input))
    // the new membership is read afresh
    const actor = await requireActor()
    for (const sampleId of form.texts('sampleIds')) await addSampleToCampaign(actor, campaign.id, sampleId)
    return campaign.id
  })
  if (!answer.ok) return answer
  redirect(routeOf(`/campaigns/${answer.value}/method`))
}
