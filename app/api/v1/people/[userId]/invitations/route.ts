import { inviteAgain } from '@/lib/access/users'
import { pathIds } from '../../../_path-id'
import { answer, handle } from '../../../_respond'

/** A new invitation, also for a password that was lost; older ones are worthless from now on. */
export async function POST(request: Request, context: { params: Promise<{ userId: string }> }): Promise<Response> {
  return handle(request, async (actor) =>
    answer(await inviteAgain(actor, (await pathIds(context)).userId), { status: 201, holdsSecret: true }),
  )
}
