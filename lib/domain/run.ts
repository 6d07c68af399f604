import { z } from 'zod'
import { codeSchema, idSchema, instantSchema, notesSchema, reasonSchema, speciesSchema } from './text'

export const runStates = ['open', 'handed-in', 'decided'] as const
export type RunState = (typeof runStates)[number]
export const runDecisions = ['counts', 'set-aside', 'repeat'] as const
export type RunDecision = (typeof runDecisions)[number]
export const runKinds = ['catalyst', 'blank', 'diluent'] as const

/** A bed that is packed for this run. */
export const newLoadingSchema = z.strictObject({
  sampleId: idSchema,
  lotId: idSchema.nullable().default(null),
  catalystMassKg: z.number().gte(0).lt(10),
  massRelativeStandardUncertainty: z.number().gte(0).lte(0.5).default(0.005),
  diluentMassKg: z.number().gte(0).lt(10).default(0),
  diluentMaterial: z.string().trim().max(60).default(''),
  particleMinimumM: z.number().gt(0).lt(0.1).nullable().default(null),
  particleMaximumM: z.number().gt(0).lt(0.1).nullable().default(null),
  tubeInnerDiameterM: z.number().gt(0).lt(1).nullable().default(null),
  bedLengthM: z.number().gt(0).lt(10).nullable().default(null),
})
export type NewLoading = z.infer<typeof newLoadingSchema>
export interface Loading extends NewLoading {
  readonly id: string
  readonly code: string
  readonly rigId: string
  readonly channel: string
  readonly sampleCode: string
  readonly lotCode: string | null
  readonly packedAt: string | null
  readonly version: number
}

/** A weighing or a length that was noted wrongly; sample, rig and channel are what the loading is and stay. */
export const loadingChangeSchema = z.strictObject({
  lotId: idSchema.nullable().optional(),
  catalystMassKg: z.number().gte(0).lt(10).optional(),
  massRelativeStandardUncertainty: z.number().gte(0).lte(0.5).optional(),
  diluentMassKg: z.number().gte(0).lt(10).optional(),
  diluentMaterial: z.string().trim().max(60).optional(),
  particleMinimumM: z.number().gt(0).lt(0.1).nullable().optional(),
  particleMaximumM: z.number().gt(0).lt(0.1).nullable().optional(),
  tubeInnerDiameterM: z.number().gt(0).lt(1).nullable().optional(),
  bedLengthM: z.number().gt(0).lt(10).nullable().optional(),
})
export type LoadingChange = z.infer<typeof loadingChangeSchema>

export const feedEntrySchema = z.strictObject({
  species: speciesSchema,
  /** as typed, for example `7,2 mL/min` */
  flowText: z.string().trim().min(1).max(60),
  flowMolPerS: z.number().gte(0).lt(100),
  referenceTemperatureK: z.number().gt(200).lt(400),
  referencePressurePa: z.number().gt(50_000).lt(200_000),
  isInternalStandard: z.boolean().default(false),
})
export type FeedEntry = z.infer<typeof feedEntrySchema>

export const newRunSchema = z.strictObject({
  campaignId: idSchema,
  /** left empty, the next free number of the campaign is taken */
  code: codeSchema.nullable().default(null),
  rigId: idSchema,
  channel: codeSchema,
  kind: z.enum(runKinds).default('catalyst'),
  /** a new bed, or the one that is already in */
  loading: z.union([newLoadingSchema, z.strictObject({ loadingId: idSchema })]),
  startedAt: instantSchema,
  pressurePa: z.number().gt(0).lt(1e8).nullable().default(null),
  pressureKind: z.enum(['absolute', 'gauge']).default('absolute'),
  barometerPa: z.number().gte(50_000).lte(120_000).nullable().default(null),
  pressureText: z.string().trim().max(60).default(''),
  feed: z.array(feedEntrySchema).max(20).default([]),
  pretreatment: z.string().trim().max(2_000).default(''),
  notes: notesSchema,
})
export type NewRun = z.infer<typeof newRunSchema>

/** What may be changed while the run is open (or, for a researcher, until it is decided). */
export const runChangeSchema = z.strictObject({
  startedAt: instantSchema.optional(),
  pressurePa: z.number().gt(0).lt(1e8).nullable().optional(),
  pressureKind: z.enum(['absolute', 'gauge']).optional(),
  barometerPa: z.number().gte(50_000).lte(120_000).nullable().optional(),
  pressureText: z.string().trim().max(60).optional(),
  /** the whole feed, in order */
  feed: z.array(feedEntrySchema).max(20).optional(),
  pretreatment: z.string().trim().max(2_000).optional(),
  notes: z.string().trim().max(4_000).optional(),
  clockOffsetS: z.number().gte(-86_400).lte(86_400).optional(),
})
export type RunChange = z.infer<typeof runChangeSchema>

export interface RunSummary {
  readonly id: string
  readonly code: string
  readonly campaignId: string
  readonly campaignCode: string
  readonly sampleId: string
  readonly sampleCode: string
  readonly sampleName: string
  readonly rigId: string
  readonly rigCode: string
  readonly channel: string
  readonly loadingId: string
  readonly loadingCode: string
  readonly kind: (typeof runKinds)[number]
  readonly state: RunState
  readonly decision: RunDecision | null
  readonly startedAt: string
  readonly createdBy: string
  readonly createdByName: string
  readonly version: number
  readonly fileCount: number
  /** a published edition holds it: nothing of it changes while that edition stands */
  readonly isFrozen: boolean
}

export interface Run extends RunSummary {
  readonly loading: Loading
  readonly feed: readonly FeedEntry[]
  readonly pressurePa: number | null
  readonly pressureKind: 'absolute' | 'gauge'
  readonly barometerPa: number | null
  readonly pressureText: string
  readonly pretreatment: string
  readonly notes: string
  readonly clockOffsetS: number
  readonly decisionReason: string | null
}

export const decisionSchema = z.strictObject({ decision: z.enum(runDecisions), reason: reasonSchema })

export const exclusionSchema = z.strictObject({
  kind: z.enum(['hold', 'injection']),
  atS: z.number(),
  reason: reasonSchema,
})
export const holdEditSchema = z.strictObject({
  foundStartS: z.number(),
  startS: z.number().nullable(),
  endS: z.number().nullable(),
  reason: reasonSchema,
})

export const remarkSchema = z.strictObject({ body: z.string().trim().min(1).max(2_000) })
/** Why something is put back. */
export const withdrawalSchema = z.strictObject({ reason: reasonSchema })

export type NewDecision = z.infer<typeof decisionSchema>
export type NewExclusion = z.infer<typeof exclusionSchema>
export type NewHoldEdit = z.infer<typeof holdEditSchema>
export type NewRemark = z.infer<typeof remarkSchema>

interface MadeBy {
  readonly id: string
  readonly runId: string
  readonly createdBy: string
  readonly createdByName: string
  readonly createdAt: string
}

/** One of the decisions taken on a run; the latest is valid. */
export interface RunDecisionRecord extends NewDecision, MadeBy {}

/** A hold or an injection left out; put back when withdrawn, and kept. */
export interface RunExclusion extends NewExclusion, MadeBy {
  readonly withdrawnAt: string | null
}

/** A window moved by a person; the rule's own again when withdrawn. */
export interface RunHoldEdit extends NewHoldEdit, MadeBy {
  readonly withdrawnAt: string | null
}

export interface RunRemark extends NewRemark, MadeBy {}
