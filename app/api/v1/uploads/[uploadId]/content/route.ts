import { Readable } from 'node:stream'
import { openUploadContent } from '@/lib/access/uploads'
import { pathIds } from '../../../_path-id'
import { downloadHeaders } from '../../../_ranking-request'
import { handle } from '../../../_respond'

/** The bytes as they were handed in, to be kept and not shown: whatever they are, a browser runs nothing of them. */
export async function GET(request: Request, context: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { upload, stream, byteCount } = await openUploadContent(actor, (await pathIds(context)).uploadId)
    return new Response(Readable.toWeb(stream) as ReadableStream<Uint8Array>, {
      headers: {
        ...downloadHeaders(upload.fileName, 'application/octet-stream'),
        'Content-Length': String(byteCount),
        'Content-Security-Policy': "sandbox; default-src 'none'",
      },
    })
  })
}
