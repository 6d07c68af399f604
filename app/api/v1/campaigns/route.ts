import { z } from 'zod'
import { createCampaign, listCampaigns } from '@/lib/access/campaigns'
import { newCampaignSchema } from '@/lib/domain/campaign'
import { pageOf } from '../_page'
import { campaignListQuery } from '../_queries'
import { answer, handle, readJson, readQuery } from '../_respond'

/** Campaigns the caller belongs to, page by page. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor, ...filter } = readQuery(request, campaignListQuery)
    const { page, answer: listed } = pageOf('campaigns', { limit, cursor }, z.string())
    return listed(await listCampaigns(actor, filter, page), (row) => row.code)
  })
}

export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const made = await createCampaign(actor, await readJson(request, newCampaignSchema))
    return answer(made, { status: 201, record: made, location: `/api/v1/campaigns/${made.id}` })
  })
}
