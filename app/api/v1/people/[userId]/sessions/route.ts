import { endSessionsOf } from '@/lib/access/sessions'
import { pathIds } from '../../../_path-id'
import { handle } from '../../../_respond'

/** Ends every session of a person. */
export async function DELETE(request: Request, context: { params: Promise<{ userId: string }> }): Promise<Response> {
  return handle(request, async (actor) => ({ ended: await endSessionsOf(actor, (await pathIds(context)).userId) }))
}
