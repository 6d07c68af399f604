import { getRanking } from '@/lib/access/results'
import { rankingOptionsOf } from '../../../_ranking-request'
import { handle } from '../../../_respond'

/** The live ranking of a campaign. */
export async function GET(
  request: Request,
  { params }: { params: Promise<{ campaignId: string }> },
): Promise<Response> {
  return handle(request, async (actor) => getRanking(actor, (await params).campaignId, rankingOptionsOf(request)))
}
