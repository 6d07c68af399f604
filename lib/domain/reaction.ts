import { z } from 'zod'
import { codeSchema, nameSchema, notesSchema, speciesSchema } from './text'

/** Stoichiometric numbers, positive for products. */
export const stoichiometrySchema = z.record(speciesSchema, z.number().min(-20).max(20))

/** Standard enthalpy and entropy at 298.15 K and a constant heat capacity, for species the built-in tables do not hold. */
export const thermochemistrySchema = z.record(
  speciesSchema,
  z.strictObject({
    enthalpyJPerMol: z.number(),
    entropyJPerMolK: z.number(),
    heatCapacityJPerMolK: z.number().gte(0),
    source: z.string().max(300),
  }),
)

export const newReactionSchema = z.strictObject({
  code: codeSchema,
  name: nameSchema,
  keyReactant: speciesSchema,
  steps: z.array(stoichiometrySchema).min(1).max(6),
  thermochemistry: thermochemistrySchema.nullable().default(null),
  notes: notesSchema,
})
export type NewReaction = z.infer<typeof newReactionSchema>

export interface Reaction extends NewReaction {
  readonly id: string
  readonly version: number
}

/** The code stays: results and files name the reaction by it. Defaults of a new record do not apply to a change. */
export const reactionChangeSchema = z.strictObject({
  name: nameSchema.optional(),
  keyReactant: speciesSchema.optional(),
  steps: z.array(stoichiometrySchema).min(1).max(6).optional(),
  thermochemistry: thermochemistrySchema.nullable().optional(),
  notes: z.string().trim().max(4_000).optional(),
})
export type ReactionChange = z.infer<typeof reactionChangeSchema>
