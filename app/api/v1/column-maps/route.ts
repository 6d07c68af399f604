import { z } from 'zod'
import { createColumnMap, listColumnMaps } from '@/lib/access/column-maps'
import { newColumnMapSchema } from '@/lib/domain/column-map'
import { pageOf } from '../_page'
import { columnMapListQuery } from '../_queries'
import { answer, handle, readJson, readQuery } from '../_respond'

const keySchema = z.strictObject({ rigId: z.string(), instrument: z.string(), number: z.int() })

/** Column maps by rig and instrument. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const { limit, cursor, ...filter } = readQuery(request, columnMapListQuery)
    const { page, answer: listed } = pageOf('column-maps', { limit, cursor }, keySchema)
    return listed(await listColumnMaps(actor, filter, page), ({ rigId, instrument, number }) => ({
      rigId,
      instrument,
      number,
    }))
  })
}

export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const made = await createColumnMap(actor, await readJson(request, newColumnMapSchema))
    return answer(made, { status: 201, location: `/api/v1/column-maps/${made.id}` })
  })
}
