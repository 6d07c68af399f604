import { changeSample, getSample } from '@/lib/access/samples'
import { sampleChangeSchema } from '@/lib/domain/sample'
import { pathIds } from '../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

type Context = { params: Promise<{ sampleId: string }> }

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { sampleId } = await pathIds(context)
    const found = await getSample(actor, sampleId)
    return answer(found, { record: found })
  })
}

export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { sampleId } = await pathIds(context)
    const version = versionFromIfMatch(request, sampleId)
    const changed = await changeSample(actor, sampleId, await readJson(request, sampleChangeSchema), version)
    return answer(changed, { record: changed })
  })
}
