import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { insertAuditEntry } from '../../db/mutations/audit'
import {
  insertOneTimeCode,
  insertUser,
  raiseSessionEpoch,
  revokeSessionsOf,
  revokeTokensOf,
  updateDisplayName,
  updatePassword,
  updateUserAsAdmin,
  consumeOneTimeCode,
  withdrawOneTimeCodes,
} from '../../db/mutations/people'
import {
  selectAccount,
  selectAccountByEmail,
  selectOneTimeCode,
  selectPeople,
  selectPersonNames,
  selectWorkingAdmins,
} from '../../db/queries/people'
import { hashPassword, PASSWORD_SCHEME, verifyPassword } from '../auth/password'
import { passwordFault } from '../auth/password-fault'
import { networkOf, takeFromBudget } from '../auth/rate-limit'
import { hashSecret, makeSecret } from '../auth/secret'
import { logSecurityEvent } from '../auth/security-log'
import { LOCKED_AFTER } from '../auth/sign-in-delay'
import { AppError } from '../domain/errors'
import {
  type Invitation,
  type NewPerson,
  type PersonChange,
  type PersonName,
  type PersonSummary,
} from '../domain/person'
import { type Actor } from '../domain/role'
import { environment } from '../environment'
import { can } from '../policy/can'
import { authorise, hideUnless } from './authorise'
import { ownActor } from './own-actor'
import { SESSION_IDLE_S } from './session-rules'
import { startSession, type Caller } from './sign-in'

const INVITATION_LIFE_S = 7 * 86_400
const NO_PASSWORD = { passwordHash: '', passwordScheme: 'none' } as const

/** Everybody, as the admin sees them. */
export async function listPeople(actor: Actor, now = new Date()): Promise<PersonSummary[]> {
  authorise(can.manageUsers(actor))
  const rows = await selectPeople(await getDatabase(), new Date(now.getTime() - SESSION_IDLE_S * 1000), now)
  return rows.map((row) => ({
    id: row.id,
    email: row.email,
    displayName: row.displayName,
    role: row.role,
    isDisabled: row.disabledAt !== null,
    hasPassword: row.passwordHash !== '',
    isLocked: row.failedSignIns >= LOCKED_AFTER,
    sessionCount: row.disabledAt === null ? row.sessionCount : 0,
    lastSeenAt: row.lastSeenAt?.toISOString() ?? null,
    createdAt: row.createdAt.toISOString(),
    version: row.version,
  }))
}

/** One person, as the admin sees them. */
export async function getPerson(actor: Actor, userId: string): Promise<PersonSummary> {
  const person = (await listPeople(actor)).find((one) => one.id === userId)
  hideUnless(person !== undefined)
  return person
}

/** Names to choose members from, for leads and admins. */
export async function listPersonNames(actor: Actor): Promise<PersonName[]> {
  authorise(can.listPeople(actor))
  return selectPersonNames(await getDatabase())
}

function invitationOf(user: { id: string; email: string }, code: string, expiresAt: Date): Invitation {
  return {
    userId: user.id,
    email: user.email,
    code,
    // Behind the hash sign a browser sends it to nobody, so that no log or referrer keeps it.
    url: `${environment.APP_ORIGIN}/invitation#${code}`,
    expiresAt: expiresAt.toISOString(),
  }
}

/** Makes a person who has no password yet, and the invitation that lets them choose one. */
export async function createPerson(actor: Actor, input: NewPerson, now = new Date()): Promise<Invitation> {
  authorise(can.manageUsers(actor))
  const user = {
    id: randomUUID(),
    email: input.email,
    displayName: input.displayName,
    role: input.role,
    ...NO_PASSWORD,
  }
  const code = makeSecret('code_')
  const expiresAt = new Date(now.getTime() + INVITATION_LIFE_S * 1000)
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    if (!(await insertUser(tx, user)))
      throw new AppError('conflict', `There is an account for ${input.email} already.`, {
        issues: [{ field: 'email', message: 'There is an account with this e-mail address already.' }],
      })
    await insertOneTimeCode(tx, {
      codeHash: hashSecret(code),
      purpose: 'invitation',
      userId: user.id,
      createdAt: now,
      expiresAt,
    })
    await insertAuditEntry(tx, {
      actor,
      action: 'make-person',
      entity: 'user',
      entityId: user.id,
      after: { email: user.email, displayName: user.displayName, role: user.role },
    })
  })
  return invitationOf(user, code, expiresAt)
}

/** A new invitation for a person who lost the first one or their password; older ones are worthless from now on. */
export async function inviteAgain(actor: Actor, userId: string, now = new Date()): Promise<Invitation> {
  authorise(can.manageUsers(actor))
  const db = await getDatabase()
  const account = await selectAccount(db, userId)
  hideUnless(account !== null)
  const code = makeSecret('code_')
  const expiresAt = new Date(now.getTime() + INVITATION_LIFE_S * 1000)
  await db.transaction(async (tx) => {
    await withdrawOneTimeCodes(tx, 'invitation', userId, now)
    await insertOneTimeCode(tx, {
      codeHash: hashSecret(code),
      purpose: 'invitation',
      userId,
      createdAt: now,
      expiresAt,
    })
    await insertAuditEntry(tx, { actor, action: 'invite-again', entity: 'user', entityId: userId })
  })
  return invitationOf(account, code, expiresAt)
}

/** Changes house role or opens and closes an account, as admin. A closed account's sessions and tokens end at once. */
export async function changePerson(
  actor: Actor,
  userId: string,
  change: PersonChange,
  now = new Date(),
): Promise<void> {
  authorise(can.manageUsers(actor))
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    const account = await selectAccount(tx, userId)
    hideUnless(account !== null)
    const role = change.role ?? account.role
    const isDisabled = change.isDisabled ?? account.disabledAt !== null
    if (account.role === 'admin' && (role !== 'admin' || isDisabled)) {
      const others = (await selectWorkingAdmins(tx)).filter((id) => id !== userId)
      if (others.length === 0)
        throw new AppError('conflict', 'This is the last admin who can sign in. Make another person admin first.')
    }
    const disabledAt = isDisabled ? (account.disabledAt ?? now) : null
    if (!(await updateUserAsAdmin(tx, userId, change.version, { role, disabledAt })))
      throw new AppError(
        'stale',
        'Somebody else changed this account meanwhile. Look at it again and repeat the change.',
      )
    if (role !== account.role || (isDisabled && account.disabledAt === null)) {
      await raiseSessionEpoch(tx, userId)
      await revokeSessionsOf(tx, userId, now, null)
    }
    if (isDisabled && account.disabledAt === null) {
      await revokeTokensOf(tx, userId, now)
      await withdrawOneTimeCodes(tx, 'invitation', userId, now)
    }
    await insertAuditEntry(tx, {
      actor,
      action: 'change-person',
      entity: 'user',
      entityId: userId,
      before: { role: account.role, isDisabled: account.disabledAt !== null },
      after: { role, isDisabled },
    })
  })
}

function refuseFaultyPassword(password: string, person: { email: string; displayName: string }, field: string): void {
  const fault = passwordFault(password, person)
  if (fault !== null)
    throw new AppError('unprocessable', `The password cannot be taken. ${fault}`, {
      issues: [{ field, message: fault }],
    })
}

/** Takes an invitation up: the person chooses a password and is signed in. Answers the secret of the new session. */
export async function acceptInvitation(
  input: { readonly code: string; readonly password: string },
  caller: Caller,
  now = new Date(),
): Promise<{ secret: string; userId: string }> {
  await takeFromBudget('sign-in-address', caller.address)
  const db = await getDatabase()
  const codeHash = hashSecret(input.code)
  const code = await selectOneTimeCode(db, codeHash, now)
  const account =
    code === null || code.purpose !== 'invitation' || code.userId === null ? null : await selectAccount(db, code.userId)
  if (account === null || account.disabledAt !== null) {
    logSecurityEvent('invitation-refused', { network: networkOf(caller.address) })
    throw new AppError(
      'not-found',
      'This invitation was used, has run out or was replaced. Ask an admin for a new one.',
    )
  }
  refuseFaultyPassword(input.password, account, 'password')
  const passwordHash = await hashPassword(input.password)
  await db.transaction(async (tx) => {
    if (!(await consumeOneTimeCode(tx, codeHash, now)))
      throw new AppError('not-found', 'This invitation was used a moment ago. Sign in, or ask an admin for a new one.')
    await updatePassword(tx, account.id, passwordHash, PASSWORD_SCHEME)
    await raiseSessionEpoch(tx, account.id)
    await revokeSessionsOf(tx, account.id, now, null)
    await insertAuditEntry(tx, {
      actor: ownActor(account, 'invitation'),
      action: 'accept-invitation',
      entity: 'user',
      entityId: account.id,
    })
  })
  const renewed = await selectAccount(db, account.id)
  hideUnless(renewed !== null)
  return { secret: await startSession(renewed, caller, now), userId: account.id }
}

/** Changes the actor's own display name. */
export async function changeProfile(actor: Actor, input: { readonly displayName: string }): Promise<void> {
  authorise(actor.tokenScopes === null, 'A profile is changed at a screen, not with a token.')
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    await updateDisplayName(tx, actor.userId, input.displayName)
    await insertAuditEntry(tx, {
      actor,
      action: 'change-profile',
      entity: 'user',
      entityId: actor.userId,
      before: { displayName: actor.displayName },
      after: { displayName: input.displayName },
    })
  })
}

/**
 * Changes the actor's own password, the present one given. Every session ends, and a new one begins for this screen:
 * answers its secret.
 */
export async function changePassword(
  actor: Actor,
  input: { readonly currentPassword: string; readonly newPassword: string },
  caller: Caller,
  now = new Date(),
): Promise<{ secret: string; endedSessions: number }> {
  authorise(actor.tokenScopes === null, 'A password is changed at a screen, not with a token.')
  await takeFromBudget('sign-in-device', `change ${actor.userId}`)
  const db = await getDatabase()
  const account = await selectAccountByEmail(db, actor.email)
  hideUnless(account !== null && account.id === actor.userId)
  if (!(await verifyPassword(input.currentPassword, account.passwordHash === '' ? null : account.passwordHash)))
    throw new AppError('unprocessable', 'The present password is not right.', {
      issues: [{ field: 'currentPassword', message: 'The present password is not right.' }],
    })
  refuseFaultyPassword(input.newPassword, account, 'newPassword')
  const passwordHash = await hashPassword(input.newPassword)
  const ended = await db.transaction(async (tx) => {
    await updatePassword(tx, account.id, passwordHash, PASSWORD_SCHEME)
    await raiseSessionEpoch(tx, account.id)
    const count = await revokeSessionsOf(tx, account.id, now, null)
    await insertAuditEntry(tx, { actor, action: 'change-password', entity: 'user', entityId: account.id })
    return count
  })
  const renewed = await selectAccount(db, account.id)
  hideUnless(renewed !== null)
  return { secret: await startSession(renewed, caller, now), endedSessions: Math.max(0, ended - 1) }
}
