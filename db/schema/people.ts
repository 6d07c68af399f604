import { sql } from 'drizzle-orm'
import {
  check,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uniqueIndex,
} from 'drizzle-orm/pg-core'
import { at, createdAt, id, version } from './columns'

export const users = pgTable(
  'users',
  {
    id: id(),
    email: text('email').notNull(),
    displayName: text('display_name').notNull(),
    role: text('role').notNull(),
    passwordHash: text('password_hash').notNull(),
    /** scheme of the hash, so that it can be renewed at sign-in */
    passwordScheme: text('password_scheme').notNull(),
    /** a session made under an older epoch is dead */
    sessionEpoch: integer('session_epoch').notNull().default(1),
    failedSignIns: integer('failed_sign_ins').notNull().default(0),
    lastFailedAt: at('last_failed_at'),
    disabledAt: at('disabled_at'),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    uniqueIndex('users_email_unique').on(sql`lower(${t.email})`),
    check('users_role_check', sql`${t.role} in ('technician', 'researcher', 'lead', 'guest', 'admin')`),
  ],
)

export const sessions = pgTable(
  'sessions',
  {
    /** SHA-256 of the random reference in the cookie, hex */
    idHash: text('id_hash').primaryKey(),
    userId: text('user_id').notNull(),
    epoch: integer('epoch').notNull(),
    createdAt: createdAt(),
    signedInAt: at('signed_in_at').notNull().defaultNow(),
    lastSeenAt: at('last_seen_at').notNull().defaultNow(),
    expiresAt: at('expires_at').notNull(),
    revokedAt: at('revoked_at'),
    ipPrefix: text('ip_prefix').notNull().default(''),
    userAgent: text('user_agent').notNull().default(''),
  },
  (t) => [
    foreignKey({ name: 'sessions_user_id_fkey', columns: [t.userId], foreignColumns: [users.id] }),
    index('sessions_user_id_index').on(t.userId),
  ],
)

export const tokens = pgTable(
  'tokens',
  {
    id: id(),
    userId: text('user_id').notNull(),
    name: text('name').notNull(),
    /** SHA-256 of the secret, hex */
    secretHash: text('secret_hash').notNull(),
    scopes: text('scopes').array().notNull(),
    campaignId: text('campaign_id'),
    createdAt: createdAt(),
    lastUsedAt: at('last_used_at'),
    expiresAt: at('expires_at'),
    revokedAt: at('revoked_at'),
  },
  (t) => [
    foreignKey({ name: 'tokens_user_id_fkey', columns: [t.userId], foreignColumns: [users.id] }),
    unique('tokens_secret_hash_unique').on(t.secretHash),
  ],
)

/** Short-lived secrets with one use: the first set-up, an invitation, a password reset. Only the hash is kept. */
export const oneTimeCodes = pgTable(
  'one_time_codes',
  {
    codeHash: text('code_hash').primaryKey(),
    purpose: text('purpose').notNull(),
    userId: text('user_id'),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    usedAt: at('used_at'),
  },
  (t) => [
    foreignKey({ name: 'one_time_codes_user_id_fkey', columns: [t.userId], foreignColumns: [users.id] }),
    check('one_time_codes_purpose_check', sql`${t.purpose} in ('set-up', 'invitation', 'reset')`),
  ],
)

/** What a person typed and has not sent yet: survives an idle lock, a reload and a lost connection. */
export const drafts = pgTable(
  'drafts',
  {
    userId: text('user_id').notNull(),
    /** which form: `log-run`, … */
    form: text('form').notNull(),
    content: jsonb('content').notNull(),
    updatedAt: at('updated_at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'drafts_pkey', columns: [t.userId, t.form] }),
    foreignKey({ name: 'drafts_user_id_fkey', columns: [t.userId], foreignColumns: [users.id] }),
  ],
)

/** Column state, saved views and the like, per person. */
export const preferences = pgTable(
  'preferences',
  {
    userId: text('user_id').notNull(),
    key: text('key').notNull(),
    content: jsonb('content').notNull(),
    updatedAt: at('updated_at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'preferences_pkey', columns: [t.userId, t.key] }),
    foreignKey({ name: 'preferences_user_id_fkey', columns: [t.userId], foreignColumns: [users.id] }),
  ],
)

/** The answer to a creating request, kept for a day, so that a repeated request gets the same answer and makes nothing twice. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    userId: text('user_id').notNull(),
    key: text('key').notNull(),
    requestHash: text('request_hash').notNull(),
    status: integer('status'),
    response: jsonb('response'),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ name: 'idempotency_keys_pkey', columns: [t.userId, t.key] }),
    foreignKey({ name: 'idempotency_keys_user_id_fkey', columns: [t.userId], foreignColumns: [users.id] }),
  ],
)
