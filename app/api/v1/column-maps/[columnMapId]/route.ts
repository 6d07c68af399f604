import { getColumnMap } from '@/lib/access/column-maps'
import { pathIds } from '../../_path-id'
import { handle } from '../../_respond'

export async function GET(request: Request, context: { params: Promise<{ columnMapId: string }> }): Promise<Response> {
  return handle(request, async (actor) => getColumnMap(actor, (await pathIds(context)).columnMapId))
}
