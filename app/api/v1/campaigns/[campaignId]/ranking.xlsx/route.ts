import { getMethodSettings, getRanking } from '@/lib/access/results'
import { rankingWorkbook } from '@/lib/exports/ranking-workbook'
import { pathIds } from '../../../_path-id'
import { downloadHeaders, rankingOptionsOf } from '../../../_ranking-request'
import { handle } from '../../../_respond'

/** The ranking as a workbook with typed cells. */
export async function GET(request: Request, context: { params: Promise<{ campaignId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const ranking = await getRanking(actor, (await pathIds(context)).campaignId, rankingOptionsOf(request))
    const settings = await getMethodSettings(actor, ranking.campaignId, ranking.methodNumber)
    const workbook = await rankingWorkbook(ranking, settings)
    return new Response(new Uint8Array(workbook), {
      headers: downloadHeaders(
        `${ranking.campaignCode} ranking.xlsx`,
        'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
      ),
    })
  })
}
