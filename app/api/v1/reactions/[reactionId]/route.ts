import { changeReaction, getReaction } from '@/lib/access/reactions'
import { reactionChangeSchema } from '@/lib/domain/reaction'
import { pathIds } from '../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

type Context = { params: Promise<{ reactionId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { reactionId } = await pathIds(context)
    const found = await getReaction(actor, reactionId)
    return answer(found, { record: found })
  })
}

export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { reactionId } = await pathIds(context)
    const version = versionFromIfMatch(request, reactionId)
    const changed = await changeReaction(actor, reactionId, await readJson(request, reactionChangeSchema), version)
    return answer(changed, { record: changed })
  })
}
