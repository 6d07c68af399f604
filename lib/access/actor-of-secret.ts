import 'server-only'
import { getDatabase } from '../../db/client'
import { touchSession, touchToken } from '../../db/mutations/people'
import { selectMemberships, selectSession, selectTokenBySecretHash } from '../../db/queries/people'
import { hashApiToken } from '../auth/api-token'
import { hashSecret } from '../auth/secret'
import { type Actor } from '../domain/role'
import { sessionRefOf } from './session-ref'
import { isSessionAlive, SESSION_TOUCH_S } from './session-rules'

const LONGEST_UNNOTED_TOKEN_USE_S = 60

/** The person behind a session secret, with role, state and memberships as the database has them now. */
export async function actorOfSession(secret: string, now = new Date()): Promise<Actor | null> {
  const db = await getDatabase()
  const idHash = hashSecret(secret)
  const session = await selectSession(db, idHash)
  if (session === null || !isSessionAlive(session, now)) return null
  if (now.getTime() - session.lastSeenAt.getTime() > SESSION_TOUCH_S * 1000) await touchSession(db, idHash, now)
  return {
    userId: session.userId,
    displayName: session.displayName,
    email: session.email,
    role: session.role,
    memberships: await selectMemberships(db, session.userId),
    tokenScopes: null,
    tokenCampaignId: null,
    sessionRef: sessionRefOf(idHash),
    secondsSinceSignIn: Math.max(0, (now.getTime() - session.signedInAt.getTime()) / 1000),
  }
}

/** The owner of a token, held to its scopes. */
export async function actorOfToken(secret: string, now = new Date()): Promise<Actor | null> {
  const secretHash = hashApiToken(secret)
  if (secretHash === null) return null
  const db = await getDatabase()
  const token = await selectTokenBySecretHash(db, secretHash)
  if (token === null || token.revokedAt !== null || token.disabledAt !== null) return null
  if (token.expiresAt !== null && token.expiresAt.getTime() <= now.getTime()) return null
  const unnotedS = token.lastUsedAt === null ? Infinity : (now.getTime() - token.lastUsedAt.getTime()) / 1000
  if (unnotedS > LONGEST_UNNOTED_TOKEN_USE_S) await touchToken(db, token.id, now)
  return {
    userId: token.userId,
    displayName: token.displayName,
    email: token.email,
    role: token.role,
    memberships: await selectMemberships(db, token.userId),
    tokenScopes: token.scopes,
    tokenCampaignId: token.campaignId,
    sessionRef: `token:${token.id}`,
    secondsSinceSignIn: null,
  }
}
