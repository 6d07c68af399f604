import { z } from 'zod'
import { calibrationKinds } from '@/lib/domain/calibration'
import { runDecisions, runStates } from '@/lib/domain/run'
import { instantSchema } from '@/lib/domain/text'
import { pageQuery } from './_page'
import { idInAddress as id } from './_path-id'

const word = z
  .string()
  .min(1)
  .max(100)

  .regex(/^[^\u0000]+$/)

/** Lists without a filter. */
export const plainListQuery = z.strictObject(pageQuery)
export const campaignListQuery = z.strictObject({
  ...pageQuery,
  isClosed: z
    .enum(['true', 'false'])
    .transform((value) => value === 'true')
    .optional(),
})
export const runListQuery = z.strictObject({
  ...pageQuery,
  campaignId: id.optional(),
  sampleId: id.optional(),
  rigId: id.optional(),
  loadingId: id.optional(),
  createdBy: id.optional(),
  state: z.enum(runStates).optional(),
  decision: z.enum(runDecisions).optional(),
})
export const loadingListQuery = z.strictObject({
  ...pageQuery,
  rigId: id.optional(),
  channel: word.optional(),
  sampleId: id.optional(),
})
export const calibrationListQuery = z.strictObject({
  ...pageQuery,
  kind: z.enum(calibrationKinds).optional(),
  rigId: id.optional(),
})
export const validCalibrationsQuery = z.strictObject({ at: instantSchema, rigId: id.optional() })
export const columnMapListQuery = z.strictObject({
  ...pageQuery,
  rigId: id.optional(),
  instrument: word.optional(),
  fingerprint: word.optional(),
})
export const lastRunQuery = z.strictObject({ channel: word.optional() })
