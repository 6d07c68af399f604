import { revokeToken } from '@/lib/access/tokens'
import { pathIds } from '../../_path-id'
import { answer, handle } from '../../_respond'

/** Makes a token worthless from now on. */
export async function DELETE(request: Request, context: { params: Promise<{ tokenId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    await revokeToken(actor, (await pathIds(context)).tokenId)
    return answer(undefined, { status: 204 })
  })
}
