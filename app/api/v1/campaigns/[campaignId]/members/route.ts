import { addMember, listMembers } from '@/lib/access/campaigns'
import { newMemberSchema } from '@/lib/domain/campaign'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ campaignId: string }> }

/** People of a campaign. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listMembers(actor, (await pathIds(context)).campaignId) }))
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    return answer(await addMember(actor, campaignId, await readJson(request, newMemberSchema)), { status: 201 })
  })
}
