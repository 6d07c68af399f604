import { z } from 'zod'
import { codeSchema, nameSchema, notesSchema } from './text'

export const reactorKinds = ['plug-flow', 'stirred-tank', 'batch'] as const

const rigChannelsSchema = z
  .array(z.strictObject({ code: codeSchema, tubeInnerDiameterM: z.number().gt(0).lt(1).nullable().default(null) }))
  .min(1)
  .max(64)

export const newRigSchema = z.strictObject({
  code: codeSchema,
  name: nameSchema,
  reactorKind: z.enum(reactorKinds).default('plug-flow'),
  timeZone: z.string().min(1).max(60).default('UTC'),
  channels: rigChannelsSchema,
  barometerPa: z.number().gte(50_000).lte(120_000).default(101_325),
  maximumPressurePa: z.number().gt(0).lte(1e8).nullable().default(null),
  maximumTemperatureK: z.number().gt(0).lte(3_000).nullable().default(null),
  lineLagS: z.number().gte(0).lte(3_600).default(0),
  flowReferenceTemperatureK: z.number().gt(200).lt(400).nullable().default(null),
  flowReferencePressurePa: z.number().gt(50_000).lt(200_000).nullable().default(null),
  notes: notesSchema,
})
export type NewRig = z.infer<typeof newRigSchema>

export interface Rig extends NewRig {
  readonly id: string
  readonly version: number
}

export const rigChangeSchema = z.strictObject({
  name: nameSchema.optional(),
  reactorKind: z.enum(reactorKinds).optional(),
  timeZone: z.string().min(1).max(60).optional(),
  channels: rigChannelsSchema.optional(),
  barometerPa: z.number().gte(50_000).lte(120_000).optional(),
  maximumPressurePa: z.number().gt(0).lte(1e8).nullable().optional(),
  maximumTemperatureK: z.number().gt(0).lte(3_000).nullable().optional(),
  lineLagS: z.number().gte(0).lte(3_600).optional(),
  flowReferenceTemperatureK: z.number().gt(200).lt(400).nullable().optional(),
  flowReferencePressurePa: z.number().gt(50_000).lt(200_000).nullable().optional(),
  notes: z.string().trim().max(4_000).optional(),
})
export type RigChange = z.infer<typeof rigChangeSchema>
