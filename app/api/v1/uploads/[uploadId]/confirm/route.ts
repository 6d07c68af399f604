import { confirmUpload } from '@/lib/access/uploads'
import { answer, handle, versionFromIfMatch } from '../../../_respond'

/** Takes the readings of the file into the run. */
export async function POST(request: Request, { params }: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { uploadId } = await params
    const upload = await confirmUpload(actor, uploadId, versionFromIfMatch(request, uploadId))
    return answer(upload, { record: upload })
  })
}
