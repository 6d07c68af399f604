'use server'

import { requireActor } from '@/lib/access/actor'
import { changeCampaignSample } from '@/lib/access/campaigns'
import { answerAction } from '@/lib/domain/action-answer'
import { campaignSampleChangeSchema, type CampaignSampleChange } from '@/lib/domain/campaign'
import { type ActionResult } from '@/lib/domain/errors'
import { idSchema } from '@/lib/domain/text'

/** Writes a cell of the ranking; answers the version that the next change has to name. */
export async function changeCampaignSampleAction(
  campaignId: string,
  sampleId: string,
  change: CampaignSampleChange,
): Promise<ActionResult<{ version: number }>> {
  const actor = await requireActor()
  return answerAction(async () => {
    const sample = await changeCampaignSample(
      actor,
      idSchema.parse(campaignId),
      idSchema.parse(sampleId),
      campaignSampleChangeSchema.parse(change),
    )
    return { version: sample.version }
  })
}
