import { z } from 'zod'
import { calibrationKinds, newCalibrationSchema, type Calibration } from '@/lib/domain/calibration'
import { type CampaignSample, type CampaignSummary, type Member } from '@/lib/domain/campaign'
import { newColumnMapSchema, type ColumnMap } from '@/lib/domain/column-map'
import { type Draft } from '@/lib/access/drafts'
import { type HistoryEntry } from '@/lib/domain/history'
import { methodSettingsSchema, type Method } from '@/lib/domain/method'
import { newReactionSchema, type Reaction } from '@/lib/domain/reaction'
import { newRigSchema, type Rig } from '@/lib/domain/rig'
import { type Invitation, type NewTokenAnswer, type PersonSummary, type TokenSummary } from '@/lib/domain/person'
import { campaignRoles, campaignRoleSchema, roleSchema, tokenScopeSchema } from '@/lib/domain/role'
import {
  decisionSchema,
  exclusionSchema,
  feedEntrySchema,
  holdEditSchema,
  newLoadingSchema,
  remarkSchema,
  runDecisions,
  runKinds,
  runStates,
  type Loading,
  type Run,
  type RunDecisionRecord,
  type RunExclusion,
  type RunHoldEdit,
  type RunRemark,
  type RunSummary,
} from '@/lib/domain/run'
import {
  newLotSchema,
  newSampleSchema,
  newSiteCountSchema,
  type Lot,
  type Sample,
  type SiteCount,
} from '@/lib/domain/sample'
import { instantSchema } from '@/lib/domain/text'

// What the API answers, one schema a record; the same names stand in openapi.json. Each is held to its domain type by the compiler
// and to the real answers by the route tests.

/** One page of a list; `next` is the cursor of the following one. */
export interface Listed<Row> {
  readonly items: readonly Row[]
  readonly next: string | null
}
export const listed = <T extends z.ZodType>(row: T) =>
  z.strictObject({ items: z.array(row), next: z.string().nullable() })

const text = z.string()
const version = z.int().gte(1)
const instant = instantSchema
const count = z.int().gte(0)
const made = { id: text, runId: text, createdBy: text, createdByName: text, createdAt: instant }

export const campaignRecord = z.strictObject({
  id: text,
  code: text,
  name: text,
  laboratory: text,
  description: text,
  reactionId: text,
  referenceSampleId: text.nullable(),
  closedAt: instant.nullable(),
  version,
  sampleCount: count,
  runCount: count,
  waitingCount: count,
  methodNumber: count.nullable(),
  myRole: z.enum([...campaignRoles, 'admin']),
}) satisfies z.ZodType<CampaignSummary>

export const memberRecord = z.strictObject({
  campaignId: text,
  userId: text,
  displayName: text,
  email: text,
  role: z.enum(campaignRoles),
  isDisabled: z.boolean(),
  createdAt: instant,
}) satisfies z.ZodType<Member>

export const methodRecord = z.strictObject({
  id: text,
  campaignId: text,
  number: version,
  settings: methodSettingsSchema,
  reason: text,
  createdBy: text,
  createdByName: text,
  createdAt: instant,
}) satisfies z.ZodType<Method>

export const campaignSampleRecord = z.strictObject({
  campaignId: text,
  sampleId: text,
  sampleCode: text,
  sampleName: text,
  composition: text,
  activeMetal: text.nullable(),
  runCount: count,
  isShortlisted: z.boolean(),
  priority: z.int().nullable(),
  remark: text,
  version,
}) satisfies z.ZodType<CampaignSample>

export const historyRecord = z.strictObject({
  seq: z.int().gte(1),
  at: instant,
  actorId: text,
  actorName: text,
  action: text,
  entity: text,
  entityId: text,
  before: z.unknown(),
  after: z.unknown(),
  reason: text,
}) satisfies z.ZodType<HistoryEntry>

export const reactionRecord = newReactionSchema.extend({ id: text, version }) satisfies z.ZodType<Reaction>
export const rigRecord = newRigSchema.extend({ id: text, version }) satisfies z.ZodType<Rig>

export const calibrationRecord = newCalibrationSchema.extend({
  kind: z.enum(calibrationKinds),
  id: text,
  version,
  createdBy: text,
  createdByName: text,
  createdAt: instant,
  supersededById: text.nullable(),
}) satisfies z.ZodType<Calibration>

export const columnMapRecord = newColumnMapSchema
  .omit({ sampleFileSha256: true })
  .extend({ id: text, number: version, createdBy: text, createdAt: instant }) satisfies z.ZodType<ColumnMap>

export const sampleRecord = newSampleSchema
  .omit({ campaignIds: true })
  .extend({ id: text, version }) satisfies z.ZodType<Sample>
export const lotRecord = newLotSchema.extend({ id: text, sampleId: text }) satisfies z.ZodType<Lot>
export const siteCountRecord = newSiteCountSchema.extend({
  id: text,
  sampleId: text,
  createdAt: instant,
}) satisfies z.ZodType<SiteCount>

export const loadingRecord = newLoadingSchema.extend({
  id: text,
  code: text,
  rigId: text,
  channel: text,
  sampleCode: text,
  lotCode: text.nullable(),
  packedAt: instant.nullable(),
  version,
}) satisfies z.ZodType<Loading>

export const runSummaryRecord = z.strictObject({
  id: text,
  code: text,
  campaignId: text,
  campaignCode: text,
  sampleId: text,
  sampleCode: text,
  sampleName: text,
  rigId: text,
  rigCode: text,
  channel: text,
  loadingId: text,
  loadingCode: text,
  kind: z.enum(runKinds),
  state: z.enum(runStates),
  decision: z.enum(runDecisions).nullable(),
  startedAt: instant,
  createdBy: text,
  createdByName: text,
  version,
  fileCount: count,
  isFrozen: z.boolean(),
}) satisfies z.ZodType<RunSummary>

export const runRecord = runSummaryRecord.extend({
  loading: loadingRecord,
  feed: z.array(feedEntrySchema),
  pressurePa: z.number().nullable(),
  pressureKind: z.enum(['absolute', 'gauge']),
  barometerPa: z.number().nullable(),
  pressureText: text,
  pretreatment: text,
  notes: text,
  clockOffsetS: z.number(),
  decisionReason: text.nullable(),
}) satisfies z.ZodType<Run>

export const decisionRecord = decisionSchema.extend(made) satisfies z.ZodType<RunDecisionRecord>
export const exclusionRecord = exclusionSchema.extend({
  ...made,
  withdrawnAt: instant.nullable(),
}) satisfies z.ZodType<RunExclusion>
export const holdEditRecord = holdEditSchema.extend({
  ...made,
  withdrawnAt: instant.nullable(),
}) satisfies z.ZodType<RunHoldEdit>
export const remarkRecord = remarkSchema.extend(made) satisfies z.ZodType<RunRemark>

export const meRecord = z.strictObject({
  id: text,
  email: text,
  displayName: text,
  role: roleSchema,
  memberships: z.record(text, campaignRoleSchema),
  tokenScopes: z.array(tokenScopeSchema).nullable(),
  tokenCampaignId: text.nullable(),
})

export const tokenRecord = z.strictObject({
  id: text,
  name: text,
  scopes: z.array(tokenScopeSchema),
  campaignId: text.nullable(),
  createdAt: instant,
  lastUsedAt: instant.nullable(),
  expiresAt: instant.nullable(),
  revokedAt: instant.nullable(),
}) satisfies z.ZodType<TokenSummary>
export const newTokenRecord = tokenRecord.extend({ secret: text }) satisfies z.ZodType<NewTokenAnswer>

export const personRecord = z.strictObject({
  id: text,
  email: text,
  displayName: text,
  role: roleSchema,
  isDisabled: z.boolean(),
  hasPassword: z.boolean(),
  isLocked: z.boolean(),
  sessionCount: count,
  lastSeenAt: instant.nullable(),
  createdAt: instant,
  version,
}) satisfies z.ZodType<PersonSummary>

export const invitationRecord = z.strictObject({
  userId: text,
  email: text,
  code: text,
  url: text,
  expiresAt: instant,
}) satisfies z.ZodType<Invitation>

export const draftRecord = z.strictObject({ content: z.unknown(), savedAt: instant }) satisfies z.ZodType<Draft>

/** What every refusal answers, as RFC 9457 writes it. */
export const problemRecord = z.strictObject({
  type: text,
  title: text,
  status: z.int().gte(400).lte(599),
  detail: text,
  code: text,
  issues: z.array(z.strictObject({ field: text, message: text })),
  details: z.record(text, z.unknown()).exactOptional(),
  requestId: text,
})
