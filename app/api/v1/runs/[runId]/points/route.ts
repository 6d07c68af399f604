import { getRunResult } from '@/lib/access/results'
import { pathIds } from '../../../_path-id'
import { handle } from '../../../_respond'

/** The points of a run with its line: what a script reads after adding files. */
export async function GET(request: Request, context: { params: Promise<{ runId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { run, reduction, notReadyReason } = await getRunResult(actor, (await pathIds(context)).runId)
    return {
      runId: run.id,
      runCode: run.code,
      notReadyReason: reduction === null ? notReadyReason : '',
      points: reduction?.points ?? [],
      fit: reduction?.fit ?? null,
      noFitReason: reduction?.noFitReason ?? '',
      cautions: reduction?.cautions ?? [],
      sharedSources: reduction?.sharedSources ?? [],
    }
  })
}
