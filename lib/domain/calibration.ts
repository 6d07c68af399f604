import { z } from 'zod'
import { idSchema, instantSchema, nameSchema, speciesSchema } from './text'

export const calibrationKinds = [
  'response-factors',
  'flow-controller',
  'cylinder',
  'balance',
  'thermocouple',
  'pressure-gauge',
] as const

export const calibrationEntrySchema = z.strictObject({
  /** null for a calibration that is about the instrument as a whole */
  species: speciesSchema.nullable().default(null),
  value: z.number(),
  /** unit of the value, for example `mole fraction per area count` or `K` */
  unit: z.string().max(60),
  /** one standard uncertainty: relative, or absolute in the unit of the value */
  relativeStandardUncertainty: z.number().gte(0).lte(2).nullable().default(null),
  absoluteStandardUncertainty: z.number().gte(0).nullable().default(null),
})

export const newCalibrationSchema = z.strictObject({
  kind: z.enum(calibrationKinds),
  name: nameSchema,
  instrument: z.string().trim().max(100).default(''),
  rigId: idSchema.nullable().default(null),
  /** response factors only: amount per area, or area per amount, as the file has it */
  convention: z.enum(['factor', 'sensitivity']).nullable().default(null),
  entries: z.array(calibrationEntrySchema).min(1).max(200),
  standardUsed: z.string().trim().max(300).default(''),
  fileSha256: z.string().length(64).nullable().default(null),
  validFrom: instantSchema,
  validTo: instantSchema.nullable().default(null),
  supersedesId: idSchema.nullable().default(null),
})
export type NewCalibration = z.infer<typeof newCalibrationSchema>
export type CalibrationEntry = z.infer<typeof calibrationEntrySchema>

export interface Calibration extends NewCalibration {
  readonly id: string
  readonly version: number
  readonly createdBy: string
  readonly createdByName: string
  readonly createdAt: string
  /** the calibration that corrected this one */
  readonly supersededById: string | null
}

/** What may change of a calibration: the end of its validity. A wrong value is corrected by a calibration that supersedes it. */
export const calibrationChangeSchema = z.strictObject({ validTo: instantSchema.nullable() })
export type CalibrationChange = z.infer<typeof calibrationChangeSchema>
