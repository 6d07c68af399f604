import { z } from 'zod'
import { campaignRoleSchema, type CampaignRole } from './role'
import { codeSchema, idSchema, nameSchema } from './text'

export const newCampaignSchema = z.strictObject({
  code: codeSchema,
  name: nameSchema,
  laboratory: z.string().trim().max(200).default(''),
  description: z.string().trim().max(4_000).default(''),
  reactionId: idSchema,
  referenceSampleId: idSchema.nullable().default(null),
})
export type NewCampaign = z.infer<typeof newCampaignSchema>

export interface CampaignSummary {
  readonly id: string
  readonly code: string
  readonly name: string
  readonly laboratory: string
  readonly description: string
  readonly reactionId: string
  readonly referenceSampleId: string | null
  readonly closedAt: string | null
  readonly version: number
  readonly sampleCount: number
  readonly runCount: number
  readonly waitingCount: number
  readonly methodNumber: number | null
  /** the actor's part in it */
  readonly myRole: CampaignRole | 'admin'
}

export const newMemberSchema = z.strictObject({ userId: idSchema, role: campaignRoleSchema })

/** The cells of the ranking that people may write, by role. */
export const campaignSampleChangeSchema = z.strictObject({
  remark: z.string().trim().max(500).optional(),
  isShortlisted: z.boolean().optional(),
  priority: z.int().gte(1).lte(9).nullable().optional(),
  /** the version the editor saw; another one in the database refuses the change */
  version: z.int().gte(1),
})
export type CampaignSampleChange = z.infer<typeof campaignSampleChangeSchema>

export const campaignChangeSchema = z.strictObject({
  name: nameSchema.optional(),
  laboratory: z.string().trim().max(200).optional(),
  description: z.string().trim().max(4_000).optional(),
  referenceSampleId: idSchema.nullable().optional(),
})
export type CampaignChange = z.infer<typeof campaignChangeSchema>
export type NewMember = z.infer<typeof newMemberSchema>

export interface Member {
  readonly campaignId: string
  readonly userId: string
  readonly displayName: string
  readonly email: string
  readonly role: CampaignRole
  readonly isDisabled: boolean
  readonly createdAt: string
}

/** A sample as one campaign holds it, with what people wrote beside it. */
export interface CampaignSample {
  readonly campaignId: string
  readonly sampleId: string
  readonly sampleCode: string
  readonly sampleName: string
  readonly composition: string
  readonly activeMetal: string | null
  readonly runCount: number
  readonly isShortlisted: boolean
  readonly priority: number | null
  readonly remark: string
  readonly version: number
}
