import { getRunResult } from '@/lib/access/results'
import { handle } from '../../../_respond'

/** One run with its files, its log as drawn, its points and its line. */
export async function GET(request: Request, { params }: { params: Promise<{ runId: string }> }): Promise<Response> {
  return handle(request, async (actor) => getRunResult(actor, (await params).runId))
}
