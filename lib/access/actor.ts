import 'server-only'
import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { cache } from 'react'
import { getDatabase } from '../../db/client'
import { touchSession, touchToken } from '../../db/mutations/people'
import { selectMemberships, selectSession, selectTokenBySecretHash } from '../../db/queries/people'
import { bearerToken, hashApiToken } from '../auth/api-token'
import { safeNextPath } from '../auth/next-path'
import { assertSameOrigin } from '../auth/same-origin'
import { hashSecret } from '../auth/secret'
import { readSessionSecret } from '../auth/session'
import { AppError } from '../domain/errors'
import { type Actor } from '../domain/role'
import { sessionRefOf } from './session-ref'
import { isSessionAlive, SESSION_TOUCH_S } from './session-rules'

const NOT_SIGNED_IN = 'Sign in first, or send a token that is still valid.'
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

/** Who looks at this page, or null. Asked once in a render, however many parts of the page want to know. */
export const getActor = cache(async (): Promise<Actor | null> => {
  const secret = await readSessionSecret()
  return secret === null ? null : actorOfSession(secret)
})

/** A request with a body changes something: an action, whichever way the browser sent its form. */
function carriesBody(requestHeaders: Headers): boolean {
  return requestHeaders.has('next-action') || requestHeaders.has('content-type')
}

/**
 * Refuses an action that another site’s page sent. Actions that act for somebody get this from `requireActor`; one that
 * has nobody yet, such as the sign-in itself, calls it.
 */
export async function assertActionFromHere(): Promise<void> {
  assertSameOrigin('POST', await headers())
}

/** Who acts, in a page or an action; nobody is sent to sign in, and back to this page afterwards. */
export async function requireActor(): Promise<Actor> {
  const requestHeaders = await headers()
  if (carriesBody(requestHeaders)) assertSameOrigin('POST', requestHeaders)
  const actor = await getActor()
  if (actor !== null) return actor
  const path = safeNextPath(requestHeaders.get('x-request-path'))
  redirect(path === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(path)}`)
}

/** Who sends a request to the API: a token, and then no cookie counts; else a session, with the origin of changes checked. */
export async function actorFromRequest(request: Request): Promise<Actor> {
  const bearer = bearerToken(request.headers)
  if (bearer.kind !== 'none') {
    const actor = bearer.kind === 'token' ? await actorOfToken(bearer.secret) : null
    if (actor === null) throw new AppError('not-signed-in', NOT_SIGNED_IN)
    return actor
  }
  const secret = await readSessionSecret()
  if (secret === null) throw new AppError('not-signed-in', NOT_SIGNED_IN)
  assertSameOrigin(request.method, request.headers)
  const actor = await actorOfSession(secret)
  if (actor === null) throw new AppError('not-signed-in', NOT_SIGNED_IN)
  return actor
}
