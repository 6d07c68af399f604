import { handIn } from '@/lib/access/runs'
import { pathIds } from '../../../_path-id'
import { answer, handle, versionFromIfMatch } from '../../../_respond'

/** Nothing more comes: the run waits for a decision. */
export async function POST(request: Request, context: { params: Promise<{ runId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId } = await pathIds(context)
    const run = await handIn(actor, runId, versionFromIfMatch(request, runId))
    return answer(run, { record: run })
  })
}
