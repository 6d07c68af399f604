import { getRanking } from '@/lib/access/results'
import { rankingCsv } from '@/lib/exports/ranking-csv'
import { pathIds } from '../../../_path-id'
import { downloadHeaders, rankingOptionsOf } from '../../../_ranking-request'
import { handle } from '../../../_respond'

/** The ranking as text for spreadsheets and scripts. */
export async function GET(request: Request, context: { params: Promise<{ campaignId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const ranking = await getRanking(actor, (await pathIds(context)).campaignId, rankingOptionsOf(request))
    return new Response(rankingCsv(ranking), {
      headers: downloadHeaders(`${ranking.campaignCode} ranking.csv`, 'text/csv; charset=utf-8'),
    })
  })
}
