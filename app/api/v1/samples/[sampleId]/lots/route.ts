import { addLot, listLots } from '@/lib/access/samples'
import { newLotSchema } from '@/lib/domain/sample'
import { pathIds } from '../../../_path-id'
import { answer, handle, readJson } from '../../../_respond'

type Context = { params: Promise<{ sampleId: string }> }

/** Lots of a sample. */
export async function GET(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listLots(actor, (await pathIds(context)).sampleId) }))
}

export async function POST(request: Request, context: Context): Promise<Response> {
  return handle(request, async (actor) => {
    const { sampleId } = await pathIds(context)
    return answer(await addLot(actor, sampleId, await readJson(request, newLotSchema)), { status: 201 })
  })
}
