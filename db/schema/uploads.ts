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
  uniqueIndex,
} from 'drizzle-orm/pg-core'
import { campaigns } from './campaigns'
import { at, bytea, createdAt, id, version } from './columns'
import { users } from './people'
import { columnMaps } from './rigs'
import { runs } from './runs'

/** A file as handed in. The bytes stand in the file store under their SHA-256 and are never altered. */
export const uploads = pgTable(
  'uploads',
  {
    id: id(),
    campaignId: text('campaign_id').notNull(),
    runId: text('run_id').notNull(),
    sha256: text('sha256').notNull(),
    byteCount: bigint('byte_count', { mode: 'number' }).notNull(),
    fileName: text('file_name').notNull(),
    /** received, reading, needs-answers, ready (to confirm), confirmed, failed, set-aside */
    state: text('state').notNull().default('received'),
    /** rig-log, analyser, attachment; null until known */
    kind: text('kind'),
    format: text('format'),
    /** what was detected: dialect, tables, columns, questions, first rows */
    detection: jsonb('detection'),
    /** list of { code, line, column, found, expected, sentence } */
    problems: jsonb('problems').notNull().default([]),
    /** the person's answers and corrections, before they become a column map */
    answers: jsonb('answers'),
    failure: text('failure'),
    columnMapId: text('column_map_id'),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    confirmedBy: text('confirmed_by'),
    confirmedAt: at('confirmed_at'),
    erasedAt: at('erased_at'),
    version: version(),
  },
  (t) => [
    check(
      'uploads_state_check',
      sql`${t.state} in ('received', 'reading', 'needs-answers', 'ready', 'confirmed', 'failed', 'set-aside')`,
    ),
    check('uploads_kind_check', sql`${t.kind} is null or ${t.kind} in ('rig-log', 'analyser', 'attachment')`),
    uniqueIndex('uploads_run_id_sha256_unique').on(t.runId, t.sha256),
    foreignKey({ name: 'uploads_campaign_id_fkey', columns: [t.campaignId], foreignColumns: [campaigns.id] }),
    foreignKey({ name: 'uploads_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'uploads_column_map_id_fkey', columns: [t.columnMapId], foreignColumns: [columnMaps.id] }),
    foreignKey({ name: 'uploads_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    foreignKey({ name: 'uploads_confirmed_by_fkey', columns: [t.confirmedBy], foreignColumns: [users.id] }),
    index('uploads_campaign_id_index').on(t.campaignId),
  ],
)

/** One reading of one file with one column map. Reading it again with another map makes a new set; the old one stays in history. */
export const readingSets = pgTable(
  'reading_sets',
  {
    id: id(),
    uploadId: text('upload_id').notNull(),
    runId: text('run_id').notNull(),
    kind: text('kind').notNull(),
    columnMapId: text('column_map_id'),
    /** SHA-256 over the channel names and values: what the results' cache key rests on */
    contentSha256: text('content_sha256').notNull(),
    rowCount: integer('row_count').notNull(),
    firstAt: at('first_at'),
    lastAt: at('last_at'),
    /** list of { channel, meaning, unit, species? } in order */
    channels: jsonb('channels').notNull(),
    parserVersion: text('parser_version').notNull(),
    createdAt: createdAt(),
    supersededAt: at('superseded_at'),
  },
  (t) => [
    check('reading_sets_kind_check', sql`${t.kind} in ('rig-log', 'injections')`),
    foreignKey({ name: 'reading_sets_upload_id_fkey', columns: [t.uploadId], foreignColumns: [uploads.id] }),
    foreignKey({ name: 'reading_sets_run_id_fkey', columns: [t.runId], foreignColumns: [runs.id] }),
    foreignKey({ name: 'reading_sets_column_map_id_fkey', columns: [t.columnMapId], foreignColumns: [columnMaps.id] }),
    index('reading_sets_run_id_index').on(t.runId),
    index('reading_sets_upload_id_index').on(t.uploadId),
  ],
)

/** Values of one channel, ten thousand a row: little-endian doubles, deflated. A row per value would cost twenty times the space. */
export const readings = pgTable(
  'readings',
  {
    readingSetId: text('reading_set_id').notNull(),
    channel: text('channel').notNull(),
    chunk: integer('chunk').notNull(),
    valueCount: integer('value_count').notNull(),
    /** null when every value of the chunk is missing */
    minimum: doublePrecision('minimum'),
    maximum: doublePrecision('maximum'),
    content: bytea('content').notNull(),
  },
  (t) => [
    primaryKey({ name: 'readings_pkey', columns: [t.readingSetId, t.channel, t.chunk] }),
    foreignKey({ name: 'readings_reading_set_id_fkey', columns: [t.readingSetId], foreignColumns: [readingSets.id] }),
  ],
)
