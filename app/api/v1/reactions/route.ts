import { z } from 'zod'
import { createReaction, listReactions } from '@/lib/access/reactions'
import { newReactionSchema } from '@/lib/domain/reaction'
import { pageOf } from '../_page'
import { plainListQuery } from '../_queries'
import { answer, handle, readJson, readQuery } from '../_respond'

/** Reactions, page by page. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor } = readQuery(request, plainListQuery)
    const { page, answer: listed } = pageOf('reactions', { limit, cursor }, z.string())
    return listed(await listReactions(actor, page), (row) => row.code)
  })
}

export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const made = await createReaction(actor, await readJson(request, newReactionSchema))
    return answer(made, { status: 201, record: made, location: `/api/v1/reactions/${made.id}` })
  })
}
