import { z } from 'zod'
import { addCalibrationFiles } from '@/lib/access/calibration-files'
import { idSchema, instantSchema } from '@/lib/domain/text'
import { answer, handle, readQuery } from '../../_respond'

const querySchema = z.strictObject({
  convention: z.enum(['factor', 'sensitivity']).optional(),
  validFrom: instantSchema,
  validTo: instantSchema.optional(),
  rigId: idSchema.optional(),
  instrument: z.string().trim().max(100).default(''),
  relativeStandardUncertainty: z.coerce.number().gte(0).lte(1).optional(),
})

/** Makes calibrations of dropped tables of response factors. */
export async function POST(request: Request): Promise<Response> {
  return handle(request, async (actor) => {
    const query = readQuery(request, querySchema)
    const items = await addCalibrationFiles(actor, request, {
      convention: query.convention ?? null,
      validFrom: query.validFrom,
      validTo: query.validTo ?? null,
      rigId: query.rigId ?? null,
      instrument: query.instrument,
      relativeStandardUncertainty: query.relativeStandardUncertainty ?? null,
    })
    return answer({ items }, { status: 201 })
  })
}
