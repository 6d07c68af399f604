import { callerFrom } from '@/lib/access/sign-in'
import { createTokenWithPassword, listTokens } from '@/lib/access/tokens'
import { tokenRequestSchema } from '@/lib/domain/person'
import { tokenListQuery } from '../_requests'
import { answer, handle, handlePublic, readJson, readQuery } from '../_respond'

/** Own tokens, or somebody's for an admin, without their secrets. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => ({
    tokens: await listTokens(actor, readQuery(request, tokenListQuery).userId ?? actor.userId),
  }))
}

/** A token for e-mail address and password, so that a script needs no browser. Its secret is in this answer only. */
export async function POST(request: Request): Promise<Response> {
  return handlePublic(request, async () => {
    const { email, password, ...input } = await readJson(request, tokenRequestSchema)
    const token = await createTokenWithPassword({ email, password }, input, callerFrom(request.headers))
    return answer(token, { status: 201, location: `/api/v1/tokens/${token.id}`, holdsSecret: true })
  })
}
