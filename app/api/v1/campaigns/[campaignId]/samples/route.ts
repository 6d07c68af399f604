import { z } from 'zod'
import { addSampleToCampaign, listCampaignSamples } from '@/lib/access/campaigns'
import { pageOf } from '../../../_page'
import { pathIds } from '../../../_path-id'
import { plainListQuery } from '../../../_queries'
import { campaignSampleRequest } from '../../../_requests'
import { answer, handle, readJson, readQuery } from '../../../_respond'

type Context = { params: Promise<{ campaignId: string }> }

/** Samples of a campaign with what people wrote beside them. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    const { page, answer: listed } = pageOf('campaign-samples', readQuery(request, plainListQuery), z.string())
    return listed(await listCampaignSamples(actor, campaignId, page), (row) => row.sampleCode)
  })
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    const { sampleId } = await readJson(request, campaignSampleRequest)
    return answer(await addSampleToCampaign(actor, campaignId, sampleId), { status: 201 })
  })
}
