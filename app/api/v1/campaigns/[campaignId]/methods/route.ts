import { saveMethod, listMethods } from '@/lib/access/campaigns'
import { newMethodSchema } from '@/lib/domain/method'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ campaignId: string }> }

/** Versions of the method, newest first; a new one is saved with its reason. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listMethods(actor, (await pathIds(context)).campaignId) }))
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    return answer(await saveMethod(actor, campaignId, await readJson(request, newMethodSchema)), { status: 201 })
  })
}
