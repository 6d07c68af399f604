import { reopenCampaign } from '@/lib/access/campaigns'
import { withdrawalSchema } from '@/lib/domain/run'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../../_respond'

/** Opens a closed campaign again. */
export async function POST(request: Request, context: { params: Promise<{ campaignId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    const version = versionFromIfMatch(request, campaignId)
    const { reason } = await readJson(request, withdrawalSchema)
    const campaign = await reopenCampaign(actor, campaignId, reason, version)
    return answer(campaign, { record: campaign })
  })
}
