import { and, eq, isNull, lt, ne, sql } from 'drizzle-orm'
import { type Role, type TokenScope } from '../../lib/domain/role'
import { type Executor, type Transaction } from '../executor'
import { drafts, idempotencyKeys, oneTimeCodes, preferences, sessions, tokens, users } from '../schema/people'

export async function insertUser(
  tx: Transaction,
  user: {
    readonly id: string
    readonly email: string
    readonly displayName: string
    readonly role: Role
    readonly passwordHash: string
    readonly passwordScheme: string
  },
): Promise<boolean> {
  const made = await tx
    .insert(users)
    .values({
      id: user.id,
      email: user.email,
      displayName: user.displayName,
      role: user.role,
      passwordHash: user.passwordHash,
      passwordScheme: user.passwordScheme,
    })
    .onConflictDoNothing()
    .returning({ id: users.id })
  return made.length === 1
}

/**
 * Counts an attempt before its password is looked at, so that attempts side by side cannot share one place; a right
 * password sets the count back. Answers the count before this attempt, and when the latest one failed.
 */
export async function countSignInAttempt(
  tx: Transaction,
  userId: string,
  now: Date,
  isAllowed: (failedSignIns: number, lastFailedAt: Date | null) => boolean,
): Promise<{ allowed: boolean; failedSignIns: number; lastFailedAt: Date | null }> {
  const [row] = await tx
    .select({ failedSignIns: users.failedSignIns, lastFailedAt: users.lastFailedAt })
    .from(users)
    .where(eq(users.id, userId))
    .for('update')
  const failedSignIns = row?.failedSignIns ?? 0
  const lastFailedAt = row?.lastFailedAt ?? null
  const allowed = isAllowed(failedSignIns, lastFailedAt)
  if (allowed)
    await tx
      .update(users)
      .set({ failedSignIns: sql`${users.failedSignIns} + 1`, lastFailedAt: now })
      .where(eq(users.id, userId))
  return { allowed, failedSignIns, lastFailedAt }
}

export async function clearFailedSignIns(tx: Transaction, userId: string): Promise<void> {
  await tx.update(users).set({ failedSignIns: 0, lastFailedAt: null }).where(eq(users.id, userId))
}

export async function insertSession(
  tx: Transaction,
  session: {
    readonly idHash: string
    readonly userId: string
    readonly epoch: number
    readonly now: Date
    readonly expiresAt: Date
    readonly ipPrefix: string
    readonly userAgent: string
  },
): Promise<void> {
  await tx.insert(sessions).values({
    idHash: session.idHash,
    userId: session.userId,
    epoch: session.epoch,
    createdAt: session.now,
    signedInAt: session.now,
    lastSeenAt: session.now,
    expiresAt: session.expiresAt,
    ipPrefix: session.ipPrefix,
    userAgent: session.userAgent,
  })
}

/** Notes that a session is in use; a session that ended meanwhile stays as it is. */
export async function touchSession(db: Executor, idHash: string, now: Date): Promise<void> {
  await db
    .update(sessions)
    .set({ lastSeenAt: now })
    .where(and(eq(sessions.idHash, idHash), isNull(sessions.revokedAt), lt(sessions.lastSeenAt, now)))
}

export async function revokeSession(tx: Transaction, idHash: string, now: Date): Promise<boolean> {
  const ended = await tx
    .update(sessions)
    .set({ revokedAt: now })
    .where(and(eq(sessions.idHash, idHash), isNull(sessions.revokedAt)))
    .returning({ idHash: sessions.idHash })
  return ended.length === 1
}

/** Ends the sessions of a person, all or all but one; answers how many. */
export async function revokeSessionsOf(
  tx: Transaction,
  userId: string,
  now: Date,
  exceptIdHash: string | null,
): Promise<number> {
  const ended = await tx
    .update(sessions)
    .set({ revokedAt: now })
    .where(
      and(
        eq(sessions.userId, userId),
        isNull(sessions.revokedAt),
        exceptIdHash === null ? undefined : ne(sessions.idHash, exceptIdHash),
      ),
    )
    .returning({ idHash: sessions.idHash })
  return ended.length
}

/** Makes every session of the person older than this moment worthless, whatever its row says. */
export async function raiseSessionEpoch(tx: Transaction, userId: string): Promise<void> {
  await tx
    .update(users)
    .set({ sessionEpoch: sql`${users.sessionEpoch} + 1` })
    .where(eq(users.id, userId))
}

/** False when the version is not the one the editor saw. */
export async function updateUserAsAdmin(
  tx: Transaction,
  userId: string,
  version: number,
  change: { readonly role: Role; readonly disabledAt: Date | null },
): Promise<boolean> {
  const changed = await tx
    .update(users)
    .set({ role: change.role, disabledAt: change.disabledAt, version: version + 1 })
    .where(and(eq(users.id, userId), eq(users.version, version)))
    .returning({ id: users.id })
  return changed.length === 1
}

export async function updateDisplayName(tx: Transaction, userId: string, displayName: string): Promise<void> {
  await tx
    .update(users)
    .set({ displayName, version: sql`${users.version} + 1` })
    .where(eq(users.id, userId))
}

export async function updatePassword(
  tx: Transaction,
  userId: string,
  passwordHash: string,
  passwordScheme: string,
): Promise<void> {
  await tx
    .update(users)
    .set({
      passwordHash,
      passwordScheme,
      failedSignIns: 0,
      lastFailedAt: null,
      version: sql`${users.version} + 1`,
    })
    .where(eq(users.id, userId))
}

export async function insertToken(
  tx: Transaction,
  token: {
    readonly id: string
    readonly userId: string
    readonly name: string
    readonly secretHash: string
    readonly scopes: readonly TokenScope[]
    readonly campaignId: string | null
    readonly createdAt: Date
    readonly expiresAt: Date
  },
): Promise<void> {
  await tx.insert(tokens).values({
    id: token.id,
    userId: token.userId,
    name: token.name,
    secretHash: token.secretHash,
    scopes: [...token.scopes],
    campaignId: token.campaignId,
    createdAt: token.createdAt,
    expiresAt: token.expiresAt,
  })
}

export async function touchToken(db: Executor, tokenId: string, now: Date): Promise<void> {
  await db.update(tokens).set({ lastUsedAt: now }).where(eq(tokens.id, tokenId))
}

export async function revokeToken(tx: Transaction, tokenId: string, now: Date): Promise<boolean> {
  const ended = await tx
    .update(tokens)
    .set({ revokedAt: now })
    .where(and(eq(tokens.id, tokenId), isNull(tokens.revokedAt)))
    .returning({ id: tokens.id })
  return ended.length === 1
}

export async function revokeTokensOf(tx: Transaction, userId: string, now: Date): Promise<number> {
  const ended = await tx
    .update(tokens)
    .set({ revokedAt: now })
    .where(and(eq(tokens.userId, userId), isNull(tokens.revokedAt)))
    .returning({ id: tokens.id })
  return ended.length
}

export async function insertOneTimeCode(
  tx: Transaction,
  code: {
    readonly codeHash: string
    readonly purpose: 'set-up' | 'invitation' | 'reset'
    readonly userId: string | null
    readonly createdAt: Date
    readonly expiresAt: Date
  },
): Promise<void> {
  await tx.insert(oneTimeCodes).values({
    codeHash: code.codeHash,
    purpose: code.purpose,
    userId: code.userId,
    createdAt: code.createdAt,
    expiresAt: code.expiresAt,
  })
}

/** Uses a code up; of two at the same moment one gets false. */
export async function consumeOneTimeCode(tx: Transaction, codeHash: string, now: Date): Promise<boolean> {
  const used = await tx
    .update(oneTimeCodes)
    .set({ usedAt: now })
    .where(and(eq(oneTimeCodes.codeHash, codeHash), isNull(oneTimeCodes.usedAt)))
    .returning({ codeHash: oneTimeCodes.codeHash })
  return used.length === 1
}

/** A new code makes the older ones of its kind worthless. */
export async function withdrawOneTimeCodes(
  tx: Transaction,
  purpose: 'set-up' | 'invitation' | 'reset',
  userId: string | null,
  now: Date,
): Promise<void> {
  await tx
    .update(oneTimeCodes)
    .set({ usedAt: now })
    .where(
      and(
        eq(oneTimeCodes.purpose, purpose),
        userId === null ? isNull(oneTimeCodes.userId) : eq(oneTimeCodes.userId, userId),
        isNull(oneTimeCodes.usedAt),
      ),
    )
}

export async function upsertDraft(
  db: Executor,
  userId: string,
  form: string,
  content: unknown,
  now: Date,
): Promise<void> {
  await db
    .insert(drafts)
    .values({ userId, form, content, updatedAt: now })
    .onConflictDoUpdate({ target: [drafts.userId, drafts.form], set: { content, updatedAt: now } })
}

export async function deleteDraft(db: Executor, userId: string, form: string): Promise<void> {
  await db.delete(drafts).where(and(eq(drafts.userId, userId), eq(drafts.form, form)))
}

export async function upsertPreference(
  db: Executor,
  userId: string,
  key: string,
  content: unknown,
  now: Date,
): Promise<void> {
  await db
    .insert(preferences)
    .values({ userId, key, content, updatedAt: now })
    .onConflictDoUpdate({ target: [preferences.userId, preferences.key], set: { content, updatedAt: now } })
}

/** Takes the key for a request that is about to run; false when somebody has it. Old ones are cleared first. */
export async function claimIdempotencyKey(
  tx: Transaction,
  claim: {
    readonly userId: string
    readonly key: string
    readonly requestHash: string
    readonly now: Date
    readonly answeredBefore: Date
    readonly unansweredBefore: Date
  },
): Promise<boolean> {
  await tx
    .delete(idempotencyKeys)
    .where(
      and(
        eq(idempotencyKeys.userId, claim.userId),
        sql`(${lt(idempotencyKeys.createdAt, claim.answeredBefore)} or (${isNull(idempotencyKeys.status)} and ${isNull(idempotencyKeys.response)} and ${lt(idempotencyKeys.createdAt, claim.unansweredBefore)}))`,
      ),
    )
  const made = await tx
    .insert(idempotencyKeys)
    .values({ userId: claim.userId, key: claim.key, requestHash: claim.requestHash, createdAt: claim.now })
    .onConflictDoNothing()
    .returning({ key: idempotencyKeys.key })
  return made.length === 1
}

/** One claim of a key; the time tells it from a later one that took its place. */
export interface KeyClaim {
  readonly userId: string
  readonly key: string
  readonly claimedAt: Date
}

const ofClaim = ({ userId, key, claimedAt }: KeyClaim) =>
  and(eq(idempotencyKeys.userId, userId), eq(idempotencyKeys.key, key), eq(idempotencyKeys.createdAt, claimedAt))

export async function storeIdempotentAnswer(
  db: Executor,
  claim: KeyClaim,
  status: number,
  response: unknown,
): Promise<void> {
  await db.update(idempotencyKeys).set({ status, response }).where(ofClaim(claim))
}

/** Frees the key of a request that came to nothing; one whose change was committed keeps it. */
export async function releaseIdempotencyKey(db: Executor, claim: KeyClaim): Promise<void> {
  await db
    .delete(idempotencyKeys)
    .where(and(ofClaim(claim), isNull(idempotencyKeys.status), isNull(idempotencyKeys.response)))
}
