import { previewUpload } from '@/lib/access/uploads'
import { handle } from '../../../_respond'

/** What a confirmation would take in: problems by row and column, and each channel thinned for a picture. */
export async function GET(request: Request, { params }: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => previewUpload(actor, (await params).uploadId))
}
