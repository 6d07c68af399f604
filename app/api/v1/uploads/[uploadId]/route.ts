import { z } from 'zod'
import { correctUpload, getUpload } from '@/lib/access/uploads'
import { columnMapSpecificationSchema } from '@/lib/domain/column-map'
import { answer, handle, readJson, versionFromIfMatch } from '../../_respond'

const correctionSchema = z.strictObject({
  specification: columnMapSpecificationSchema.optional(),
  answers: z.record(z.string().max(40), z.string().max(100)).optional(),
})

/** One file with what was detected and what is still open. */
export async function GET(request: Request, { params }: { params: Promise<{ uploadId: string }> }): Promise<Response> {
  return handle(request, async (actor) => {
    const upload = await getUpload(actor, (await params).uploadId)
    return answer(upload, { record: upload })
  })
}

/** Answers to questions, and corrections of what the columns mean. */
export async function PATCH(
  request: Request,
  { params }: { params: Promise<{ uploadId: string }> },
): Promise<Response> {
  return handle(request, async (actor) => {
    const { uploadId } = await params
    const version = versionFromIfMatch(request, uploadId)
    const { specification, answers } = await readJson(request, correctionSchema)
    const upload = await correctUpload(
      actor,
      uploadId,
      { ...(specification === undefined ? {} : { specification }), ...(answers === undefined ? {} : { answers }) },
      version,
    )
    return answer(upload, { record: upload })
  })
}
