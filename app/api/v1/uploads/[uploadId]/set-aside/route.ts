import { setUploadAside } from '@/lib/access/uploads'
import { pathIds } from '../../../_path-id'
import { setAsideRequest } from '../../../_requests'
import { answer, handle, readJson, versionFromIfMatch } from '../../../_respond'

/** Puts a file aside: it stays, its readings no longer count. */
export async function POST(request: Request, context: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { uploadId } = await pathIds(context)
    const version = versionFromIfMatch(request, uploadId)
    const { reason } = await readJson(request, setAsideRequest)
    const upload = await setUploadAside(actor, uploadId, version, reason)
    return answer(upload, { record: upload })
  })
}
