import 'server-only'
import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { cache } from 'react'
import { bearerToken } from '../auth/api-token'
import { safeNextPath } from '../auth/next-path'
import { assertSameOrigin } from '../auth/same-origin'
import { readSessionSecret } from '../auth/session'
import { AppError } from '../domain/errors'
import { type Actor } from '../domain/role'
import { actorOfSession, actorOfToken } from './actor-of-secret'

const NOT_SIGNED_IN = 'Sign in first, or send a token that is still valid.'

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
