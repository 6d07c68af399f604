import { z } from 'zod'
import { listLoadings } from '@/lib/access/loadings'
import { pageOf } from '../_page'
import { loadingListQuery } from '../_queries'
import { handle, readQuery } from '../_respond'

/** Packed beds, newest first. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor, ...filter } = readQuery(request, loadingListQuery)
    const { page, answer: listed } = pageOf('loadings', { limit, cursor }, z.string())
    return listed(await listLoadings(actor, filter, page), (row) => row.id)
  })
}
