import { getEdition, rankingOfEdition } from '@/lib/access/editions'
import { rankingWorkbook } from '@/lib/exports/ranking-workbook'
import { editionPath, type EditionContext } from '../../../../../_edition-path'
import { downloadHeaders } from '../../../../../_ranking-request'
import { handle } from '../../../../../_respond'

/** The table of an edition as a workbook with typed cells. */
export async function GET(request: Request, context: EditionContext): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, number } = await editionPath(context)
    const edition = await getEdition(actor, campaignId, number)
    const ranking = rankingOfEdition(edition)
    const workbook = await rankingWorkbook(ranking, edition.content.methodSettings)
    return new Response(new Uint8Array(workbook), {
      headers: downloadHeaders(
        `${ranking.campaignCode} edition ${number}.xlsx`,
        'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
      ),
    })
  })
}
