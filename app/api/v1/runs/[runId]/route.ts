import { changeRun, getRun } from '@/lib/access/runs'
import { runChangeSchema } from '@/lib/domain/run'
import { pathIds } from '../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

type Context = { params: Promise<{ runId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId } = await pathIds(context)
    const found = await getRun(actor, runId)
    return answer(found, { record: found })
  })
}

export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId } = await pathIds(context)
    const version = versionFromIfMatch(request, runId)
    const changed = await changeRun(actor, runId, await readJson(request, runChangeSchema), version)
    return answer(changed, { record: changed })
  })
}
