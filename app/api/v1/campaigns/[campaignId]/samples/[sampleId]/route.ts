import { changeCampaignSample, getCampaignSample } from '@/lib/access/campaigns'
import { pathIds } from '../../../../_path-id'
import { campaignSampleChangeRequest } from '../../../../_requests'
import { answer, handle, readJson, versionFromIfMatch } from '../../../../_respond'

type Context = { params: Promise<{ campaignId: string; sampleId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, sampleId } = await pathIds(context)
    const found = await getCampaignSample(actor, campaignId, sampleId)
    return answer(found, { record: { id: sampleId, version: found.version } })
  })
}

/** Writes a cell of the ranking: remark by researchers, shortlist and priority by leads. */
export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, sampleId } = await pathIds(context)
    const version = versionFromIfMatch(request, sampleId)
    const change = await readJson(request, campaignSampleChangeRequest)
    const changed = await changeCampaignSample(actor, campaignId, sampleId, { ...change, version })
    return answer(changed, { record: { id: sampleId, version: changed.version } })
  })
}
