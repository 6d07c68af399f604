import { withdrawHoldEdit } from '@/lib/access/runs'
import { withdrawalSchema } from '@/lib/domain/run'
import { pathIds } from '../../../../../_path-id'
import { handle, readJson } from '../../../../../_respond'

/** Gives a window back to the rule; the record stays. */
export async function POST(
  request: Request,
  context: { params: Promise<{ runId: string; holdEditId: string }> },
): Promise<Response> {
  return handle(request, async (actor) => {
    const { runId, holdEditId } = await pathIds(context)
    const { reason } = await readJson(request, withdrawalSchema)
    return withdrawHoldEdit(actor, runId, holdEditId, reason)
  })
}
