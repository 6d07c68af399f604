import { addFiles, listUploads } from '@/lib/access/uploads'
import { pathIds } from '../../../_path-id'
import { answer, handle } from '../../../_respond'

/** Files of a run. */
export async function GET(request: Request, context: { params: Promise<{ runId: string }> }): Promise<Response> {
  return handle(request, async (actor) => ({ items: await listUploads(actor, (await pathIds(context)).runId) }))
}

/** Adds files: multipart/form-data, or one file as the body with its name in X-File-Name. Bytes that are there already are answered with 200. */
export async function POST(request: Request, context: { params: Promise<{ runId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const added = await addFiles(actor, (await pathIds(context)).runId, request)
    return answer(
      { items: added.map((entry) => ({ ...entry.upload, isNew: entry.isNew })) },
      {
        status: added.some((entry) => entry.isNew) ? 201 : 200,
      },
    )
  })
}
