import { getRunResult } from '@/lib/access/results'
import { pathIds } from '../../../_path-id'
import { handle } from '../../../_respond'

/** One run with its files, its log as drawn, its points and its line. */
export async function GET(request: Request, context: { params: Promise<{ runId: string }> }): Promise<Response> {
  return handle(request, async (actor) => getRunResult(actor, (await pathIds(context)).runId))
}
