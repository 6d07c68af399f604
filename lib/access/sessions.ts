import 'server-only'
import { getDatabase } from '../../db/client'
import { insertAuditEntry } from '../../db/mutations/audit'
import { raiseSessionEpoch, revokeSession, revokeSessionsOf } from '../../db/mutations/people'
import { selectAccount, selectLiveSessions } from '../../db/queries/people'
import { type SessionSummary } from '../domain/person'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { sessionRefOf } from './session-ref'
import { authorise, hideUnless } from './authorise'
import { SESSION_IDLE_S } from './session-rules'

function seenAfter(now: Date): Date {
  return new Date(now.getTime() - SESSION_IDLE_S * 1000)
}

/** The actor's own sessions that still open the door, latest first. */
export async function listSessions(actor: Actor, now = new Date()): Promise<SessionSummary[]> {
  authorise(actor.tokenScopes === null, 'Sessions are seen and ended at a screen, not with a token.')
  const rows = await selectLiveSessions(await getDatabase(), actor.userId, seenAfter(now), now)
  return rows.map((row) => ({
    ref: sessionRefOf(row.idHash),
    isThisOne: sessionRefOf(row.idHash) === actor.sessionRef,
    signedInAt: row.signedInAt.toISOString(),
    lastSeenAt: row.lastSeenAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    ipPrefix: row.ipPrefix,
    userAgent: row.userAgent,
  }))
}

/** Ends one of the actor's own sessions. */
export async function endSession(actor: Actor, ref: string, now = new Date()): Promise<void> {
  authorise(actor.tokenScopes === null, 'Sessions are seen and ended at a screen, not with a token.')
  const db = await getDatabase()
  const rows = await selectLiveSessions(db, actor.userId, seenAfter(now), now)
  const session = rows.find((row) => sessionRefOf(row.idHash) === ref)
  hideUnless(session !== undefined)
  await db.transaction(async (tx) => {
    await revokeSession(tx, session.idHash, now)
    await insertAuditEntry(tx, { actor, action: 'end-session', entity: 'session', entityId: ref })
  })
}

/** Ends every other session of the actor; answers how many. */
export async function endOtherSessions(actor: Actor, now = new Date()): Promise<number> {
  authorise(actor.tokenScopes === null, 'Sessions are seen and ended at a screen, not with a token.')
  const db = await getDatabase()
  const rows = await selectLiveSessions(db, actor.userId, seenAfter(now), now)
  const own = rows.find((row) => sessionRefOf(row.idHash) === actor.sessionRef)
  return db.transaction(async (tx) => {
    const ended = await revokeSessionsOf(tx, actor.userId, now, own?.idHash ?? null)
    await insertAuditEntry(tx, {
      actor,
      action: 'end-other-sessions',
      entity: 'user',
      entityId: actor.userId,
      after: { ended },
    })
    return ended
  })
}

/** Ends every session of a person, as admin; answers how many rows were still open. */
export async function endSessionsOf(actor: Actor, userId: string, now = new Date()): Promise<number> {
  authorise(can.manageUsers(actor))
  const db = await getDatabase()
  hideUnless((await selectAccount(db, userId)) !== null)
  return db.transaction(async (tx) => {
    await raiseSessionEpoch(tx, userId)
    const ended = await revokeSessionsOf(tx, userId, now, null)
    await insertAuditEntry(tx, {
      actor,
      action: 'end-sessions-of',
      entity: 'user',
      entityId: userId,
      after: { ended },
    })
    return ended
  })
}
