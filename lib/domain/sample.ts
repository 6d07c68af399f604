import { z } from 'zod'
import { codeSchema, idSchema, instantSchema, nameSchema, notesSchema } from './text'

const fraction = z.number().gt(0).lt(1).nullable().default(null)

export const newSampleSchema = z.strictObject({
  code: codeSchema,
  name: nameSchema,
  composition: z.string().trim().max(300).default(''),
  activeMetal: z
    .string()
    .regex(/^[A-Z][a-z]?$/)
    .nullable()
    .default(null),
  metalMassFraction: fraction,
  particleDensityKgPerM3: z.number().gt(0).lt(30_000).nullable().default(null),
  poreFraction: fraction,
  tortuosity: z.number().gte(0.1).lte(50).nullable().default(null),
  meanPoreRadiusM: z.number().gt(0).lt(1e-3).nullable().default(null),
  bedVoidFraction: fraction,
  notes: notesSchema,
  /** campaigns it is tested in; the maker must belong to each */
  campaignIds: z.array(idSchema).max(50).default([]),
})
export type NewSample = z.infer<typeof newSampleSchema>

export interface Sample extends Omit<NewSample, 'campaignIds'> {
  readonly id: string
  readonly version: number
}

export const newLotSchema = z.strictObject({
  code: codeSchema,
  madeAt: instantSchema.nullable().default(null),
  notes: notesSchema,
})
export interface Lot extends z.infer<typeof newLotSchema> {
  readonly id: string
  readonly sampleId: string
}

export const siteCountMethods = [
  'H2 chemisorption',
  'CO chemisorption',
  'O2 chemisorption',
  'H2-O2 titration',
  'N2O decomposition',
  'in-situ titration',
  'electron microscopy',
  'total metal',
] as const

export const newSiteCountSchema = z.strictObject({
  lotId: idSchema.nullable().default(null),
  method: z.enum(siteCountMethods),
  molPerKg: z.number().gt(0).lt(100),
  relativeStandardUncertainty: z.number().gte(0).lte(1).default(0.1),
  state: z.enum(['fresh', 'spent']).default('fresh'),
  countedAt: instantSchema.nullable().default(null),
  notes: notesSchema,
})
export type NewSiteCount = z.infer<typeof newSiteCountSchema>
export interface SiteCount extends NewSiteCount {
  readonly id: string
  readonly sampleId: string
  readonly createdAt: string
}

/** The code stays: labels and files name the sample by it. */
export const sampleChangeSchema = z.strictObject({
  name: nameSchema.optional(),
  composition: z.string().trim().max(300).optional(),
  activeMetal: z
    .string()
    .regex(/^[A-Z][a-z]?$/)
    .nullable()
    .optional(),
  metalMassFraction: z.number().gt(0).lt(1).nullable().optional(),
  particleDensityKgPerM3: z.number().gt(0).lt(30_000).nullable().optional(),
  poreFraction: z.number().gt(0).lt(1).nullable().optional(),
  tortuosity: z.number().gte(0.1).lte(50).nullable().optional(),
  meanPoreRadiusM: z.number().gt(0).lt(1e-3).nullable().optional(),
  bedVoidFraction: z.number().gt(0).lt(1).nullable().optional(),
  notes: z.string().trim().max(4_000).optional(),
})
export type SampleChange = z.infer<typeof sampleChangeSchema>
export type NewLot = z.infer<typeof newLotSchema>
