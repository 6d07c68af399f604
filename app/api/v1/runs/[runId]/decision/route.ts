import { decide, listDecisions } from '@/lib/access/runs'
import { decisionSchema } from '@/lib/domain/run'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson, versionFromIfMatch } from '../../../_respond'

type Context = { params: Promise<{ runId: string }> }

/** Decisions on a run, the latest one in force. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listDecisions(actor, (await pathIds(context)).runId) }))
}

/** A lead decides on the version of the run that was read. */
export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId } = await pathIds(context)
    const version = versionFromIfMatch(request, runId)
    const run = await decide(actor, runId, await readJson(request, decisionSchema), version)
    return answer(run, { record: run })
  })
}
