import { addExclusion, listExclusions } from '@/lib/access/runs'
import { exclusionSchema } from '@/lib/domain/run'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ runId: string }> }

/** Holds and injections left out, with reasons. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listExclusions(actor, (await pathIds(context)).runId) }))
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId } = await pathIds(context)
    return answer(await addExclusion(actor, runId, await readJson(request, exclusionSchema)), { status: 201 })
  })
}
