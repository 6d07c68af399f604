import { getEdition, rankingOfEdition } from '@/lib/access/editions'
import { rankingCsv } from '@/lib/exports/ranking-csv'
import { editionPath, type EditionContext } from '../../../../../_edition-path'
import { downloadHeaders } from '../../../../../_ranking-request'
import { handle } from '../../../../../_respond'

/** The table of an edition as text for spreadsheets and scripts. */
export async function GET(request: Request, context: EditionContext): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, number } = await editionPath(context)
    const ranking = rankingOfEdition(await getEdition(actor, campaignId, number))
    return new Response(rankingCsv(ranking), {
      headers: downloadHeaders(`${ranking.campaignCode} edition ${number}.csv`, 'text/csv; charset=utf-8'),
    })
  })
}
