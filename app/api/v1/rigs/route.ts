import { z } from 'zod'
import { createRig, listRigs } from '@/lib/access/rigs'
import { newRigSchema } from '@/lib/domain/rig'
import { pageOf } from '../_page'
import { plainListQuery } from '../_queries'
import { answer, handle, readJson, readQuery } from '../_respond'

/** Rigs, page by page. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor } = readQuery(request, plainListQuery)
    const { page, answer: listed } = pageOf('rigs', { limit, cursor }, z.string())
    return listed(await listRigs(actor, page), (row) => row.code)
  })
}

export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const made = await createRig(actor, await readJson(request, newRigSchema))
    return answer(made, { status: 201, record: made, location: `/api/v1/rigs/${made.id}` })
  })
}
