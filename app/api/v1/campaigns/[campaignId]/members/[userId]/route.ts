import { changeMember, removeMember } from '@/lib/access/campaigns'
import { pathIds } from '../../../../_path-id'
import { memberChangeRequest } from '../../../../_requests'
import { answer, handle, readJson } from '../../../../_respond'

type Context = { params: Promise<{ campaignId: string; userId: string }> }

/** Gives somebody another role in the campaign. */
export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, userId } = await pathIds(context)
    return changeMember(actor, campaignId, userId, (await readJson(request, memberChangeRequest)).role)
  })
}

export async function DELETE(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId, userId } = await pathIds(context)
    await removeMember(actor, campaignId, userId)
    return answer(undefined, { status: 204 })
  })
}
