import { sql } from 'drizzle-orm'
import {
  bigint,
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
} from 'drizzle-orm/pg-core'
import { campaigns, methods } from './campaigns'
import { at, createdAt, id } from './columns'
import { users } from './people'
import { runs } from './runs'
import { samples } from './samples'

/**
 * Results are kept under the hash of all that went into them (readings, records, method, engine), so nothing is ever invalidated by hand:
 * a changed input has another key. Recomputing gives the stored answer.
 */
export const reductions = pgTable(
  'reductions',
  {
    /** SHA-256 of the canonical inputs */
    key: text('key').primaryKey(),
    runId: text('run_id').notNull(),
    methodId: text('method_id').notNull(),
    engineId: text('engine_id').notNull(),
    /** the whole result but its points, holds and fit */
    summary: jsonb('summary').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({ name: 'reductions_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'reductions_method_id_fkey', columns: [t.methodId], foreignColumns: [methods.id] }),
    index('reductions_run_id_index').on(t.runId),
  ],
)

export const holds = pgTable(
  'holds',
  {
    reductionKey: text('reduction_key').notNull(),
    position: integer('position').notNull(),
    kind: text('kind').notNull(),
    number: integer('number').notNull(),
    startedAt: at('started_at').notNull(),
    endedAt: at('ended_at').notNull(),
    setTemperatureK: doublePrecision('set_temperature_k').notNull(),
    content: jsonb('content').notNull(),
  },
  (t) => [
    primaryKey({ name: 'holds_pkey', columns: [t.reductionKey, t.position] }),
    foreignKey({ name: 'holds_reduction_key_fkey', columns: [t.reductionKey], foreignColumns: [reductions.key] }),
  ],
)

export const points = pgTable(
  'points',
  {
    reductionKey: text('reduction_key').notNull(),
    holdNumber: integer('hold_number').notNull(),
    temperatureK: doublePrecision('temperature_k').notNull(),
    rateMolPerKgS: doublePrecision('rate_mol_per_kg_s'),
    conversion: doublePrecision('conversion'),
    content: jsonb('content').notNull(),
  },
  (t) => [
    primaryKey({ name: 'points_pkey', columns: [t.reductionKey, t.holdNumber] }),
    foreignKey({ name: 'points_reduction_key_fkey', columns: [t.reductionKey], foreignColumns: [reductions.key] }),
  ],
)

/** The line of one run, or of all counting runs of one sample in a campaign. */
export const fits = pgTable(
  'fits',
  {
    key: text('key').primaryKey(),
    campaignId: text('campaign_id').notNull(),
    sampleId: text('sample_id').notNull(),
    /** set for the line of one run, null for the line of the sample */
    runId: text('run_id'),
    methodId: text('method_id').notNull(),
    engineId: text('engine_id').notNull(),
    activationEnergyJPerMol: doublePrecision('activation_energy_j_per_mol'),
    lnPreExponential: doublePrecision('ln_pre_exponential'),
    content: jsonb('content').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({ name: 'fits_campaign_id_fkey', columns: [t.campaignId], foreignColumns: [campaigns.id] }),
    foreignKey({ name: 'fits_sample_id_fkey', columns: [t.sampleId], foreignColumns: [samples.id] }),
    foreignKey({ name: 'fits_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'fits_method_id_fkey', columns: [t.methodId], foreignColumns: [methods.id] }),
    index('fits_campaign_id_index').on(t.campaignId),
  ],
)

/** A published, frozen, numbered state of a campaign's results. */
export const editions = pgTable(
  'editions',
  {
    id: id(),
    campaignId: text('campaign_id').notNull(),
    number: integer('number').notNull(),
    methodId: text('method_id').notNull(),
    engineId: text('engine_id').notNull(),
    content: jsonb('content').notNull(),
    contentSha256: text('content_sha256').notNull(),
    statement: text('statement').notNull(),
    publishedBy: text('published_by').notNull(),
    publishedAt: at('published_at').notNull(),
    withdrawnAt: at('withdrawn_at'),
    withdrawnBy: text('withdrawn_by'),
    withdrawnReason: text('withdrawn_reason'),
  },
  (t) => [
    unique('editions_campaign_id_number_unique').on(t.campaignId, t.number),
    foreignKey({ name: 'editions_campaign_id_fkey', columns: [t.campaignId], foreignColumns: [campaigns.id] }),
    foreignKey({ name: 'editions_method_id_fkey', columns: [t.methodId], foreignColumns: [methods.id] }),
    foreignKey({ name: 'editions_published_by_fkey', columns: [t.publishedBy], foreignColumns: [users.id] }),
    foreignKey({ name: 'editions_withdrawn_by_fkey', columns: [t.withdrawnBy], foreignColumns: [users.id] }),
    check(
      'editions_withdrawal_check',
      sql`(${t.withdrawnAt} is null) = (${t.withdrawnBy} is null) and (${t.withdrawnAt} is null) = (${t.withdrawnReason} is null)`,
    ),
  ],
)

/** The runs an edition holds. While it stands they are frozen: triggers refuse any change of what was written of them. */
export const editionRuns = pgTable(
  'edition_runs',
  {
    editionId: text('edition_id').notNull(),
    runId: text('run_id').notNull(),
    reductionKey: text('reduction_key').notNull(),
  },
  (t) => [
    primaryKey({ name: 'edition_runs_pkey', columns: [t.editionId, t.runId] }),
    foreignKey({ name: 'edition_runs_edition_id_fkey', columns: [t.editionId], foreignColumns: [editions.id] }),
    foreignKey({ name: 'edition_runs_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    index('edition_runs_run_id_index').on(t.runId),
  ],
)

/** Append-only and hash-chained by a trigger; a change and its entry stand or fall together. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    seq: bigint('seq', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    at: at('at').notNull().defaultNow(),
    actorId: text('actor_id').notNull(),
    sessionRef: text('session_ref').notNull().default(''),
    action: text('action').notNull(),
    entity: text('entity').notNull(),
    entityId: text('entity_id').notNull(),
    campaignId: text('campaign_id'),
    before: jsonb('before'),
    after: jsonb('after'),
    reason: text('reason').notNull().default(''),
    previousHash: text('previous_hash').notNull().default(''),
    hash: text('hash').notNull().default(''),
  },
  (t) => [
    index('audit_entries_entity_entity_id_index').on(t.entity, t.entityId),
    index('audit_entries_campaign_id_index').on(t.campaignId),
  ],
)
