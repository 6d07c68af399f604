import { changeLoading, getLoading } from '@/lib/access/loadings'
import { loadingChangeSchema } from '@/lib/domain/run'
import { pathIds } from '../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

type Context = { params: Promise<{ loadingId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { loadingId } = await pathIds(context)
    const found = await getLoading(actor, loadingId)
    return answer(found, { record: found })
  })
}

export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { loadingId } = await pathIds(context)
    const version = versionFromIfMatch(request, loadingId)
    const changed = await changeLoading(actor, loadingId, await readJson(request, loadingChangeSchema), version)
    return answer(changed, { record: changed })
  })
}
