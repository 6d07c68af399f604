import { z } from 'zod'
import { createSample, listSamples } from '@/lib/access/samples'
import { newSampleSchema } from '@/lib/domain/sample'
import { pageOf } from '../_page'
import { plainListQuery } from '../_queries'
import { answer, handle, readJson, readQuery } from '../_respond'

/** Samples the caller may see, page by page. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor } = readQuery(request, plainListQuery)
    const { page, answer: listed } = pageOf('samples', { limit, cursor }, z.string())
    return listed(await listSamples(actor, page), (row) => row.code)
  })
}

export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const made = await createSample(actor, await readJson(request, newSampleSchema))
    return answer(made, { status: 201, record: made, location: `/api/v1/samples/${made.id}` })
  })
}
