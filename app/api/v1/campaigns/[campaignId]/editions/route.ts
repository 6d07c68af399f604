import { listEditions, publishEdition } from '@/lib/access/editions'
import { publicationSchema } from '@/lib/domain/edition'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ campaignId: string }> }

/** Published editions, newest first. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listEditions(actor, (await pathIds(context)).campaignId) }))
}

/** Publishes what the proposal showed. */
export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { campaignId } = await pathIds(context)
    const edition = await publishEdition(actor, campaignId, await readJson(request, publicationSchema))
    return answer(edition, { status: 201, location: `/api/v1/campaigns/${campaignId}/editions/${edition.number}` })
  })
}
