import { changePerson, getPerson } from '@/lib/access/users'
import { pathIds } from '../../_path-id'
import { personChangeRequest } from '../../_requests'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

interface Context {
  params: Promise<{ userId: string }>
}

export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const person = await getPerson(actor, (await pathIds(context)).userId)
    return answer(person, { record: person })
  })
}

/** Changes the house role, or closes and opens the account. */
export async function PATCH(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { userId } = await pathIds(context)
    const version = versionFromIfMatch(request, userId)
    await changePerson(actor, userId, { ...(await readJson(request, personChangeRequest)), version })
    const person = await getPerson(actor, userId)
    return answer(person, { record: person })
  })
}
