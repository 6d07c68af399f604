import { z } from 'zod'
import { listHistory } from '@/lib/access/history'
import { pageOf } from '../../../_page'
import { pathIds } from '../../../_path-id'
import { plainListQuery } from '../../../_queries'
import { handle, readQuery } from '../../../_respond'

/** Who changed what, latest first. */
export async function GET(request: Request, context: { params: Promise<{ campaignId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    const { page, answer: listed } = pageOf('history', readQuery(request, plainListQuery), z.int())
    return listed(await listHistory(actor, campaignId, page), (row) => row.seq)
  })
}
