import { and, count, desc, eq, gt, inArray, isNull, max, sql } from 'drizzle-orm'
import {
  campaignRoleSchema,
  roleSchema,
  tokenScopeSchema,
  type CampaignRole,
  type Role,
  type TokenScope,
} from '../../lib/domain/role'
import { type PersonName } from '../../lib/domain/person'
import { type Executor } from '../executor'
import { campaigns, members } from '../schema/campaigns'
import { idempotencyKeys, oneTimeCodes, drafts, preferences, sessions, tokens, users } from '../schema/people'

export interface AccountRow {
  readonly id: string
  readonly email: string
  readonly displayName: string
  readonly role: Role
  readonly passwordHash: string
  readonly passwordScheme: string
  readonly sessionEpoch: number
  readonly failedSignIns: number
  readonly lastFailedAt: Date | null
  readonly disabledAt: Date | null
  readonly createdAt: Date
  readonly version: number
}

const accountColumns = {
  id: users.id,
  email: users.email,
  displayName: users.displayName,
  role: users.role,
  passwordHash: users.passwordHash,
  passwordScheme: users.passwordScheme,
  sessionEpoch: users.sessionEpoch,
  failedSignIns: users.failedSignIns,
  lastFailedAt: users.lastFailedAt,
  disabledAt: users.disabledAt,
  createdAt: users.createdAt,
  version: users.version,
}

export async function selectAccountByEmail(db: Executor, email: string): Promise<AccountRow | null> {
  const [row] = await db
    .select(accountColumns)
    .from(users)
    .where(eq(sql`lower(${users.email})`, email.toLowerCase()))
    .limit(1)
  return row === undefined ? null : { ...row, role: roleSchema.parse(row.role) }
}

export async function selectAccount(db: Executor, userId: string): Promise<AccountRow | null> {
  const [row] = await db.select(accountColumns).from(users).where(eq(users.id, userId)).limit(1)
  return row === undefined ? null : { ...row, role: roleSchema.parse(row.role) }
}

export interface SessionRow {
  readonly idHash: string
  readonly userId: string
  readonly epoch: number
  readonly signedInAt: Date
  readonly lastSeenAt: Date
  readonly expiresAt: Date
  readonly revokedAt: Date | null
  readonly email: string
  readonly displayName: string
  readonly role: Role
  readonly sessionEpoch: number
  readonly disabledAt: Date | null
}

/** A session with the account as it stands now: role and state come from the account, never from the cookie. */
export async function selectSession(db: Executor, idHash: string): Promise<SessionRow | null> {
  const [row] = await db
    .select({
      idHash: sessions.idHash,
      userId: sessions.userId,
      epoch: sessions.epoch,
      signedInAt: sessions.signedInAt,
      lastSeenAt: sessions.lastSeenAt,
      expiresAt: sessions.expiresAt,
      revokedAt: sessions.revokedAt,
      email: users.email,
      displayName: users.displayName,
      role: users.role,
      sessionEpoch: users.sessionEpoch,
      disabledAt: users.disabledAt,
    })
    .from(sessions)
    .innerJoin(users, eq(users.id, sessions.userId))
    .where(eq(sessions.idHash, idHash))
    .limit(1)
  return row === undefined ? null : { ...row, role: roleSchema.parse(row.role) }
}

export async function selectMemberships(db: Executor, userId: string): Promise<Record<string, CampaignRole>> {
  const rows = await db
    .select({ campaignId: members.campaignId, role: members.role })
    .from(members)
    .where(eq(members.userId, userId))
  return Object.fromEntries(rows.map((row) => [row.campaignId, campaignRoleSchema.parse(row.role)]))
}

export interface TokenRow {
  readonly id: string
  readonly userId: string
  readonly scopes: readonly TokenScope[]
  readonly campaignId: string | null
  readonly lastUsedAt: Date | null
  readonly expiresAt: Date | null
  readonly revokedAt: Date | null
  readonly email: string
  readonly displayName: string
  readonly role: Role
  readonly disabledAt: Date | null
}

export async function selectTokenBySecretHash(db: Executor, secretHash: string): Promise<TokenRow | null> {
  const [row] = await db
    .select({
      id: tokens.id,
      userId: tokens.userId,
      scopes: tokens.scopes,
      campaignId: tokens.campaignId,
      lastUsedAt: tokens.lastUsedAt,
      expiresAt: tokens.expiresAt,
      revokedAt: tokens.revokedAt,
      email: users.email,
      displayName: users.displayName,
      role: users.role,
      disabledAt: users.disabledAt,
    })
    .from(tokens)
    .innerJoin(users, eq(users.id, tokens.userId))
    .where(eq(tokens.secretHash, secretHash))
    .limit(1)
  return row === undefined
    ? null
    : { ...row, role: roleSchema.parse(row.role), scopes: row.scopes.map((scope) => tokenScopeSchema.parse(scope)) }
}

/** Tokens of one person, newest first, without their secrets. */
export async function selectTokens(db: Executor, userId: string) {
  const rows = await db
    .select({
      id: tokens.id,
      name: tokens.name,
      scopes: tokens.scopes,
      campaignId: tokens.campaignId,
      createdAt: tokens.createdAt,
      lastUsedAt: tokens.lastUsedAt,
      expiresAt: tokens.expiresAt,
      revokedAt: tokens.revokedAt,
    })
    .from(tokens)
    .where(eq(tokens.userId, userId))
    .orderBy(desc(tokens.createdAt), tokens.id)
  return rows.map((row) => ({ ...row, scopes: row.scopes.map((scope) => tokenScopeSchema.parse(scope)) }))
}

export async function selectTokenOwner(db: Executor, tokenId: string): Promise<string | null> {
  const [row] = await db.select({ userId: tokens.userId }).from(tokens).where(eq(tokens.id, tokenId)).limit(1)
  return row?.userId ?? null
}

/** Sessions of one person that still open the door. */
export async function selectLiveSessions(db: Executor, userId: string, seenAfter: Date, now: Date) {
  return db
    .select({
      idHash: sessions.idHash,
      signedInAt: sessions.signedInAt,
      lastSeenAt: sessions.lastSeenAt,
      expiresAt: sessions.expiresAt,
      ipPrefix: sessions.ipPrefix,
      userAgent: sessions.userAgent,
    })
    .from(sessions)
    .innerJoin(users, and(eq(users.id, sessions.userId), eq(users.sessionEpoch, sessions.epoch)))
    .where(
      and(
        eq(sessions.userId, userId),
        isNull(sessions.revokedAt),
        gt(sessions.expiresAt, now),
        gt(sessions.lastSeenAt, seenAfter),
      ),
    )
    .orderBy(desc(sessions.lastSeenAt))
}

/** Everybody, for the admin's list. */
export async function selectPeople(db: Executor, seenAfter: Date, now: Date) {
  const live = db
    .select({
      userId: sessions.userId,
      sessionCount: count().as('session_count'),
      lastSeenAt: max(sessions.lastSeenAt).as('last_seen_at'),
    })
    .from(sessions)
    .innerJoin(users, and(eq(users.id, sessions.userId), eq(users.sessionEpoch, sessions.epoch)))
    .where(and(isNull(sessions.revokedAt), gt(sessions.expiresAt, now), gt(sessions.lastSeenAt, seenAfter)))
    .groupBy(sessions.userId)
    .as('live')
  const seen = db
    .select({ userId: sessions.userId, lastSeenAt: max(sessions.lastSeenAt).as('ever_seen_at') })
    .from(sessions)
    .groupBy(sessions.userId)
    .as('seen')
  const rows = await db
    .select({
      ...accountColumns,
      sessionCount: live.sessionCount,
      lastSeenAt: seen.lastSeenAt,
    })
    .from(users)
    .leftJoin(live, eq(live.userId, users.id))
    .leftJoin(seen, eq(seen.userId, users.id))
    .orderBy(users.displayName, users.id)
  return rows.map((row) => ({
    ...row,
    role: roleSchema.parse(row.role),
    // A server answers counts as text where the in-process database answers numbers.
    sessionCount: Number(row.sessionCount ?? 0),
  }))
}

/** Names of people who can sign in, to choose members from. */
export async function selectPersonNames(db: Executor): Promise<PersonName[]> {
  const rows = await db
    .select({ id: users.id, displayName: users.displayName, email: users.email, role: users.role })
    .from(users)
    .where(isNull(users.disabledAt))
    .orderBy(users.displayName, users.id)
  return rows.map((row) => ({ ...row, role: roleSchema.parse(row.role) }))
}

/** Admins who can sign in, so that the last one is not locked out. */
export async function selectWorkingAdmins(db: Executor): Promise<string[]> {
  const rows = await db
    .select({ id: users.id })
    .from(users)
    .where(and(eq(users.role, 'admin'), isNull(users.disabledAt), sql`${users.passwordHash} <> ''`))
  return rows.map((row) => row.id)
}

/** Campaigns by code, within a scope that may be empty. */
export async function selectCampaignNames(
  db: Executor,
  scope: 'all' | readonly string[],
): Promise<{ id: string; code: string; name: string }[]> {
  if (scope !== 'all' && scope.length === 0) return []
  return db
    .select({ id: campaigns.id, code: campaigns.code, name: campaigns.name })
    .from(campaigns)
    .where(scope === 'all' ? undefined : inArray(campaigns.id, [...scope]))
    .orderBy(campaigns.code)
}

/** An unused code that has not run out. */
export async function selectOneTimeCode(
  db: Executor,
  codeHash: string,
  now: Date,
): Promise<{ purpose: string; userId: string | null } | null> {
  const [row] = await db
    .select({ purpose: oneTimeCodes.purpose, userId: oneTimeCodes.userId })
    .from(oneTimeCodes)
    .where(and(eq(oneTimeCodes.codeHash, codeHash), isNull(oneTimeCodes.usedAt), gt(oneTimeCodes.expiresAt, now)))
    .limit(1)
  return row ?? null
}

export async function selectDraft(
  db: Executor,
  userId: string,
  form: string,
): Promise<{ content: unknown; updatedAt: Date } | null> {
  const [row] = await db
    .select({ content: drafts.content, updatedAt: drafts.updatedAt })
    .from(drafts)
    .where(and(eq(drafts.userId, userId), eq(drafts.form, form)))
    .limit(1)
  return row ?? null
}

export async function selectPreference(
  db: Executor,
  userId: string,
  key: string,
): Promise<{ content: unknown; updatedAt: Date } | null> {
  const [row] = await db
    .select({ content: preferences.content, updatedAt: preferences.updatedAt })
    .from(preferences)
    .where(and(eq(preferences.userId, userId), eq(preferences.key, key)))
    .limit(1)
  return row ?? null
}

export async function selectIdempotencyKey(
  db: Executor,
  userId: string,
  key: string,
): Promise<{ requestHash: string; status: number | null; response: unknown; createdAt: Date } | null> {
  const [row] = await db
    .select({
      requestHash: idempotencyKeys.requestHash,
      status: idempotencyKeys.status,
      response: idempotencyKeys.response,
      createdAt: idempotencyKeys.createdAt,
    })
    .from(idempotencyKeys)
    .where(and(eq(idempotencyKeys.userId, userId), eq(idempotencyKeys.key, key)))
    .limit(1)
  return row ?? null
}
