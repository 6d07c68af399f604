import { lastRunOnRig } from '@/lib/access/runs'
import { pathIds } from '../../../_path-id'
import { lastRunQuery } from '../../../_queries'
import { handle, readQuery } from '../../../_respond'

/** The run that started last on the rig, of those the caller may see: what a form is filled from. */
export async function GET(request: Request, context: { params: Promise<{ rigId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { rigId } = await pathIds(context)
    return { run: await lastRunOnRig(actor, rigId, readQuery(request, lastRunQuery).channel ?? null) }
  })
}
