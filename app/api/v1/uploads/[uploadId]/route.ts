import { correctUpload, getUpload } from '@/lib/access/uploads'
import { pathIds } from '../../_path-id'
import { uploadCorrectionRequest } from '../../_requests'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

/** One file with what was detected and what is still open. */
export async function GET(request: Request, context: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const upload = await getUpload(actor, (await pathIds(context)).uploadId)
    return answer(upload, { record: upload })
  })
}

/** Answers to questions, and corrections of what the columns mean. */
export async function PATCH(request: Request, context: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const { uploadId } = await pathIds(context)
    const version = versionFromIfMatch(request, uploadId)
    const { specification, answers } = await readJson(request, uploadCorrectionRequest)
    const upload = await correctUpload(
      actor,
      uploadId,
      { ...(specification === undefined ? {} : { specification }), ...(answers === undefined ? {} : { answers }) },
      version,
    )
    return answer(upload, { record: upload })
  })
}
