import { changeRig, getRig } from '@/lib/access/rigs'
import { rigChangeSchema } from '@/lib/domain/rig'
import { pathIds } from '../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

type Context = { params: Promise<{ rigId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { rigId } = await pathIds(context)
    const found = await getRig(actor, rigId)
    return answer(found, { record: found })
  })
}

export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { rigId } = await pathIds(context)
    const version = versionFromIfMatch(request, rigId)
    const changed = await changeRig(actor, rigId, await readJson(request, rigChangeSchema), version)
    return answer(changed, { record: changed })
  })
}
