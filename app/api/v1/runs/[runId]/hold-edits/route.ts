import { editHold, listHoldEdits } from '@/lib/access/runs'
import { holdEditSchema } from '@/lib/domain/run'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ runId: string }> }

/** Windows of holds moved by a person. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listHoldEdits(actor, (await pathIds(context)).runId) }))
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId } = await pathIds(context)
    return answer(await editHold(actor, runId, await readJson(request, holdEditSchema)), { status: 201 })
  })
}
