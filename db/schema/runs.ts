import { sql } from 'drizzle-orm'
import {
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
} from 'drizzle-orm/pg-core'
import { campaigns } from './campaigns'
import { at, createdAt, id, version } from './columns'
import { users } from './people'
import { rigs } from './rigs'
import { loadings } from './samples'

export const runs = pgTable(
  'runs',
  {
    id: id(),
    code: text('code').notNull(),
    campaignId: text('campaign_id').notNull(),
    loadingId: text('loading_id').notNull(),
    rigId: text('rig_id').notNull(),
    kind: text('kind').notNull(),
    /** open, handed-in, decided */
    state: text('state').notNull().default('open'),
    /** latest decision: counts, set-aside, repeat; null while undecided */
    decision: text('decision'),
    startedAt: at('started_at').notNull(),
    pressurePa: doublePrecision('pressure_pa'),
    pressureKind: text('pressure_kind').notNull().default('absolute'),
    barometerPa: doublePrecision('barometer_pa'),
    /** as typed, for the form to show again */
    pressureText: text('pressure_text').notNull().default(''),
    pretreatment: text('pretreatment').notNull().default(''),
    notes: text('notes').notNull().default(''),
    /** added to the analyser's clock to give the rig's */
    clockOffsetS: doublePrecision('clock_offset_s').notNull().default(0),
    handedInAt: at('handed_in_at'),
    handedInBy: text('handed_in_by'),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('runs_campaign_id_code_unique').on(t.campaignId, t.code),
    check('runs_kind_check', sql`${t.kind} in ('catalyst', 'blank', 'diluent')`),
    check('runs_state_check', sql`${t.state} in ('open', 'handed-in', 'decided')`),
    check(
      'runs_decision_check',
      sql`(${t.decision} is null) = (${t.state} <> 'decided') and (${t.decision} is null or ${t.decision} in ('counts', 'set-aside', 'repeat'))`,
    ),
    check('runs_pressure_kind_check', sql`${t.pressureKind} in ('absolute', 'gauge')`),
    foreignKey({ name: 'runs_campaign_id_fkey', columns: [t.campaignId], foreignColumns: [campaigns.id] }),
    foreignKey({ name: 'runs_loading_id_fkey', columns: [t.loadingId], foreignColumns: [loadings.id] }),
    foreignKey({ name: 'runs_rig_id_fkey', columns: [t.rigId], foreignColumns: [rigs.id] }),
    foreignKey({ name: 'runs_handed_in_by_fkey', columns: [t.handedInBy], foreignColumns: [users.id] }),
    foreignKey({ name: 'runs_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('runs_campaign_id_index').on(t.campaignId),
    index('runs_loading_id_index').on(t.loadingId),
    index('runs_rig_id_started_at_index').on(t.rigId, t.startedAt),
  ],
)

/** The planned feed, one row a species, as typed and as molar flow. */
export const feeds = pgTable(
  'feeds',
  {
    runId: text('run_id').notNull(),
    species: text('species').notNull(),
    position: integer('position').notNull(),
    flowText: text('flow_text').notNull(),
    flowMolPerS: doublePrecision('flow_mol_per_s').notNull(),
    referenceTemperatureK: doublePrecision('reference_temperature_k').notNull(),
    referencePressurePa: doublePrecision('reference_pressure_pa').notNull(),
    isInternalStandard: integer('is_internal_standard').notNull().default(0),
  },
  (t) => [
    primaryKey({ name: 'feeds_pkey', columns: [t.runId, t.species] }),
    foreignKey({ name: 'feeds_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    check('feeds_flow_check', sql`${t.flowMolPerS} >= 0`),
  ],
)

/** Windows moved by a person; the hold as found by rule is the key. */
export const holdEdits = pgTable(
  'hold_edits',
  {
    id: id(),
    runId: text('run_id').notNull(),
    foundStartS: doublePrecision('found_start_s').notNull(),
    startS: doublePrecision('start_s'),
    endS: doublePrecision('end_s'),
    reason: text('reason').notNull(),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    withdrawnAt: at('withdrawn_at'),
  },
  (t) => [
    foreignKey({ name: 'hold_edits_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'hold_edits_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('hold_edits_run_id_index').on(t.runId),
  ],
)

/** A hold or an injection left out by a person, with the reason. Putting it back withdraws the row; nothing is deleted. */
export const exclusions = pgTable(
  'exclusions',
  {
    id: id(),
    runId: text('run_id').notNull(),
    kind: text('kind').notNull(),
    atS: doublePrecision('at_s').notNull(),
    reason: text('reason').notNull(),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    withdrawnBy: text('withdrawn_by'),
    withdrawnAt: at('withdrawn_at'),
  },
  (t) => [
    check('exclusions_kind_check', sql`${t.kind} in ('hold', 'injection')`),
    foreignKey({ name: 'exclusions_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'exclusions_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    foreignKey({ name: 'exclusions_withdrawn_by_fkey', columns: [t.withdrawnBy], foreignColumns: [users.id] }),
    index('exclusions_run_id_index').on(t.runId),
  ],
)

/** Every decision a lead took, the latest one valid. */
export const decisions = pgTable(
  'decisions',
  {
    id: id(),
    runId: text('run_id').notNull(),
    decision: text('decision').notNull(),
    reason: text('reason').notNull(),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    check('decisions_decision_check', sql`${t.decision} in ('counts', 'set-aside', 'repeat')`),
    foreignKey({ name: 'decisions_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'decisions_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('decisions_run_id_index').on(t.runId),
  ],
)

export const remarks = pgTable(
  'remarks',
  {
    id: id(),
    runId: text('run_id').notNull(),
    body: text('body').notNull(),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({ name: 'remarks_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'remarks_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('remarks_run_id_index').on(t.runId),
  ],
)
