import { confirmUpload } from '@/lib/access/uploads'
import { pathIds } from '../../../_path-id'
import { answer, handle, versionFromIfMatch } from '../../../_respond'

/** Takes the readings of the file into the run. */
export async function POST(request: Request, context: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { uploadId } = await pathIds(context)
    const upload = await confirmUpload(actor, uploadId, versionFromIfMatch(request, uploadId))
    return answer(upload, { record: upload })
  })
}
