import { getRanking } from '@/lib/access/results'
import { pathIds } from '../../../_path-id'
import { rankingOptionsOf } from '../../../_ranking-request'
import { handle } from '../../../_respond'

/** The live ranking of a campaign. */
export async function GET(request: Request, context: { params: Promise<{ campaignId: string }> }): Promise<Response> {
  return handle(request, async (actor) =>
    getRanking(actor, (await pathIds(context)).campaignId, rankingOptionsOf(request)),
  )
}
