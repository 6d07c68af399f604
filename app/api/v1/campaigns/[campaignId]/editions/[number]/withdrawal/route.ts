import { withdrawEdition } from '@/lib/access/editions'
import { editionWithdrawalSchema } from '@/lib/domain/edition'
import { editionPath, type EditionContext } from '../../../../../_edition-path'
import { handle, readJson } from '../../../../../_respond'

/** Withdraws an edition; it stays, with the reason. */
export async function POST(request: Request, context: EditionContext): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, number } = await editionPath(context)
    const { reason } = await readJson(request, editionWithdrawalSchema)
    return withdrawEdition(actor, campaignId, number, reason)
  })
}
