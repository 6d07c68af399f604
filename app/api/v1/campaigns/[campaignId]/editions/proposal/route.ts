import { proposeEdition } from '@/lib/access/editions'
import { pathIds } from '../../../../_path-id'
import { handle } from '../../../../_respond'

/** What a publication would freeze now. */
export async function GET(request: Request, context: { params: Promise<{ campaignId: string }> }): Promise<Response> {
  return handle(request, async (actor) => proposeEdition(actor, (await pathIds(context)).campaignId))
}
