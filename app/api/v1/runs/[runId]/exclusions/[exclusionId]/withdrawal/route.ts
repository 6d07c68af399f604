import { withdrawExclusion } from '@/lib/access/runs'
import { withdrawalSchema } from '@/lib/domain/run'
import { pathIds } from '../../../../../_path-id'
import { handle, readJson } from '../../../../../_respond'

/** Puts back what was left out; the record stays. */
export async function POST(
  request: Request,
  context: { params: Promise<{ runId: string; exclusionId: string }> },
): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId, exclusionId } = await pathIds(context)
    const { reason } = await readJson(request, withdrawalSchema)
    return withdrawExclusion(actor, runId, exclusionId, reason)
  })
}
