import { revokeToken } from '@/lib/access/tokens'
import { answer, handle } from '../../_respond'

/** Makes a token worthless from now on. */
export async function DELETE(request: Request, context: { params: Promise<{ tokenId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    await revokeToken(actor, (await context.params).tokenId)
    return answer(undefined, { status: 204 })
  })
}
