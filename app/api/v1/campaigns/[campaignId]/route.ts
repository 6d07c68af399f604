import { changeCampaign, getCampaign } from '@/lib/access/campaigns'
import { campaignChangeSchema } from '@/lib/domain/campaign'
import { pathIds } from '../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

type Context = { params: Promise<{ campaignId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    const found = await getCampaign(actor, campaignId)
    return answer(found, { record: found })
  })
}

export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    const version = versionFromIfMatch(request, campaignId)
    const changed = await changeCampaign(actor, campaignId, await readJson(request, campaignChangeSchema), version)
    return answer(changed, { record: changed })
  })
}
