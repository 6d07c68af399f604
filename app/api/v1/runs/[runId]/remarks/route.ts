import { addRemark, listRemarks } from '@/lib/access/runs'
import { remarkSchema } from '@/lib/domain/run'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ runId: string }> }

/** Remarks on a run. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listRemarks(actor, (await pathIds(context)).runId) }))
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId } = await pathIds(context)
    const { body } = await readJson(request, remarkSchema)
    return answer(await addRemark(actor, runId, body), { status: 201 })
  })
}
