import { createPerson, listPeople } from '@/lib/access/users'
import { newPersonSchema } from '@/lib/domain/person'
import { answer, handle, readJson } from '../_respond'

/** Everybody with an account, for an admin. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => ({ people: await listPeople(actor) }))
}

/** Makes a person and the invitation to pass on to them. Its code is in this answer only. */
export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const invitation = await createPerson(actor, await readJson(request, newPersonSchema))
    return answer(invitation, { status: 201, location: `/api/v1/people/${invitation.userId}`, holdsSecret: true })
  })
}
