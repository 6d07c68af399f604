import { previewUpload } from '@/lib/access/uploads'
import { pathIds } from '../../../_path-id'
import { handle } from '../../../_respond'

/** What a confirmation would take in: problems by row and column, and each channel thinned for a picture. */
export async function GET(request: Request, context: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => previewUpload(actor, (await pathIds(context)).uploadId))
}
