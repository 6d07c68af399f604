import { z } from 'zod'
import { columnMapSpecificationSchema } from '@/lib/domain/column-map'
import { personChangeSchema } from '@/lib/domain/person'
import { campaignSampleChangeSchema } from '@/lib/domain/campaign'
import { campaignRoleSchema } from '@/lib/domain/role'
import { idSchema, instantSchema, reasonSchema } from '@/lib/domain/text'
import { idInAddress } from './_path-id'

// Bodies and queries that belong to the API alone: the handler parses with the schema that openapi.json shows.

const kept = z.json().refine((content) => content !== null, 'Say what to keep; nothing is kept under null.')
export const preferenceRequest = z.strictObject({ content: kept })
export const draftRequest = z.strictObject({ content: kept })

// the version an edit was made from stands in If-Match
export const personChangeRequest = personChangeSchema.omit({ version: true })
export const campaignSampleChangeRequest = campaignSampleChangeSchema.omit({ version: true })
export const memberChangeRequest = z.strictObject({ role: campaignRoleSchema })
export const campaignSampleRequest = z.strictObject({ sampleId: idSchema })

export const tokenListQuery = z.strictObject({ userId: idInAddress.optional() })

export const calibrationFilesQuery = z.strictObject({
  convention: z.enum(['factor', 'sensitivity']).optional(),
  validFrom: instantSchema,
  validTo: instantSchema.optional(),
  rigId: idInAddress.optional(),
  instrument: z.string().trim().max(100).default(''),
  relativeStandardUncertainty: z.coerce.number().gte(0).lte(1).optional(),
})

export const uploadCorrectionRequest = z.strictObject({
  specification: columnMapSpecificationSchema.optional(),
  answers: z.record(z.string().max(40), z.string().max(100)).optional(),
})
export const setAsideRequest = z.strictObject({ reason: reasonSchema })
