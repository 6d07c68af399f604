import { z } from 'zod'
import { createRun, listRuns } from '@/lib/access/runs'
import { newRunSchema } from '@/lib/domain/run'
import { pageOf } from '../_page'
import { runListQuery } from '../_queries'
import { answer, handle, readJson, readQuery } from '../_respond'

/** Runs the caller may see, latest start first, page by page. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor, ...filter } = readQuery(request, runListQuery)
    const { page, answer: listed } = pageOf(
      'runs',
      { limit, cursor },
      z.strictObject({ startedAt: z.string(), id: z.string() }),
    )
    return listed(await listRuns(actor, filter, page), (row) => ({ startedAt: row.startedAt, id: row.id }))
  })
}

export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const made = await createRun(actor, await readJson(request, newRunSchema))
    return answer(made, { status: 201, record: made, location: `/api/v1/runs/${made.id}` })
  })
}
