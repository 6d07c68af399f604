import { getEdition } from '@/lib/access/editions'
import { editionPath, type EditionContext } from '../../../../_edition-path'
import { handle } from '../../../../_respond'

/** One edition as it was published. */
export async function GET(request: Request, context: EditionContext): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, number } = await editionPath(context)
    return getEdition(actor, campaignId, number)
  })
}
