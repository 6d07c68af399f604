import { addSiteCount, listSiteCounts } from '@/lib/access/samples'
import { newSiteCountSchema } from '@/lib/domain/sample'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ sampleId: string }> }

/** Site counts of a sample. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listSiteCounts(actor, (await pathIds(context)).sampleId) }))
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { sampleId } = await pathIds(context)
    return answer(await addSiteCount(actor, sampleId, await readJson(request, newSiteCountSchema)), { status: 201 })
  })
}
