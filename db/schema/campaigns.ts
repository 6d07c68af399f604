import { sql } from 'drizzle-orm'
import { check, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, unique } from 'drizzle-orm/pg-core'
import { at, createdAt, id, version } from './columns'
import { users } from './people'
import { reactions } from './reactions'
import { samples } from './samples'

export const campaigns = pgTable(
  'campaigns',
  {
    id: id(),
    code: text('code').notNull(),
    name: text('name').notNull(),
    laboratory: text('laboratory').notNull().default(''),
    description: text('description').notNull().default(''),
    reactionId: text('reaction_id').notNull(),
    referenceSampleId: text('reference_sample_id'),
    closedAt: at('closed_at'),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('campaigns_code_unique').on(t.code),
    foreignKey({ name: 'campaigns_reaction_id_fkey', columns: [t.reactionId], foreignColumns: [reactions.id] }),
    foreignKey({
      name: 'campaigns_reference_sample_id_fkey',
      columns: [t.referenceSampleId],
      foreignColumns: [samples.id],
    }),
    foreignKey({ name: 'campaigns_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
  ],
)

export const members = pgTable(
  'members',
  {
    campaignId: text('campaign_id').notNull(),
    userId: text('user_id').notNull(),
    role: text('role').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ name: 'members_pkey', columns: [t.campaignId, t.userId] }),
    foreignKey({ name: 'members_campaign_id_fkey', columns: [t.campaignId], foreignColumns: [campaigns.id] }),
    foreignKey({ name: 'members_user_id_fkey', columns: [t.userId], foreignColumns: [users.id] }),
    index('members_user_id_index').on(t.userId),
    check('members_role_check', sql`${t.role} in ('technician', 'researcher', 'lead', 'guest')`),
  ],
)

/** Numbered and never changed: another setting is another version, with a reason. */
export const methods = pgTable(
  'methods',
  {
    id: id(),
    campaignId: text('campaign_id').notNull(),
    number: integer('number').notNull(),
    settings: jsonb('settings').notNull(),
    reason: text('reason').notNull(),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('methods_campaign_id_number_unique').on(t.campaignId, t.number),
    foreignKey({ name: 'methods_campaign_id_fkey', columns: [t.campaignId], foreignColumns: [campaigns.id] }),
    foreignKey({ name: 'methods_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
  ],
)

/** A sample in a campaign, with what the ranking lets people write beside it. */
export const campaignSamples = pgTable(
  'campaign_samples',
  {
    campaignId: text('campaign_id').notNull(),
    sampleId: text('sample_id').notNull(),
    isShortlisted: integer('is_shortlisted').notNull().default(0),
    priority: integer('priority'),
    remark: text('remark').notNull().default(''),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    primaryKey({ name: 'campaign_samples_pkey', columns: [t.campaignId, t.sampleId] }),
    foreignKey({ name: 'campaign_samples_campaign_id_fkey', columns: [t.campaignId], foreignColumns: [campaigns.id] }),
    foreignKey({ name: 'campaign_samples_sample_id_fkey', columns: [t.sampleId], foreignColumns: [samples.id] }),
    index('campaign_samples_sample_id_index').on(t.sampleId),
    check('campaign_samples_priority_check', sql`${t.priority} is null or ${t.priority} between 1 and 9`),
  ],
)
