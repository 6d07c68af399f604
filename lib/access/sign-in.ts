import 'server-only'
import { getDatabase } from '../../db/client'
import { insertAuditEntry } from '../../db/mutations/audit'
import {
  clearFailedSignIns,
  countSignInAttempt,
  insertSession,
  revokeSession,
  updatePassword,
} from '../../db/mutations/people'
import { type AccountRow, selectAccount, selectAccountByEmail, selectSession } from '../../db/queries/people'
import { refuseEvenly } from '../auth/even-refusal'
import { hashPassword, PASSWORD_SCHEME, verifyPassword } from '../auth/password'
import {
  callerAddress,
  networkOf,
  restoreBudget,
  returnToBudget,
  takeFromBudget,
  tooManyAttempts,
} from '../auth/rate-limit'
import { hashSecret, makeSecret } from '../auth/secret'
import { logSecurityEvent } from '../auth/security-log'
import { SESSION_LIFE_S } from '../auth/session-life'
import { LOCKED_AFTER, secondsToWait } from '../auth/sign-in-delay'
import { AppError, appErrorOf } from '../domain/errors'
import { ownActor } from './own-actor'
import { sessionRefOf } from './session-ref'

/** Where an attempt comes from. */
export interface Caller {
  readonly address: string
  readonly userAgent: string
  /** people whom this device has signed in before, from its own sealed cookie */
  readonly knownPeople: readonly string[]
}

const REFUSED =
  'E-mail address and password do not fit together, or the account cannot be used. Check both, or ask an admin.'

/* Names that nobody has are slowed down like those that somebody has, so that the delay does not tell them apart. */
const STRANGERS = Symbol.for('inverse-kelvin.unknown-names')
const MAXIMUM_STRANGERS = 10_000
function strangers(): Map<string, { failures: number; lastFailedAt: Date }> {
  const holder: typeof globalThis & { [STRANGERS]?: Map<string, { failures: number; lastFailedAt: Date }> } = globalThis
  return (holder[STRANGERS] ??= new Map())
}

function countStranger(email: string, now: Date): void {
  const all = strangers()
  const key = hashSecret(email)
  const earlier = all.get(key)
  const waitS = earlier === undefined ? 0 : secondsToWait(earlier.failures, earlier.lastFailedAt, now)
  if (waitS > 0) throw tooManyAttempts(Number.isFinite(waitS) ? waitS : 900)
  all.delete(key)
  all.set(key, { failures: (earlier?.failures ?? 0) + 1, lastFailedAt: now })
  for (const oldest of all.keys()) {
    if (all.size <= MAXIMUM_STRANGERS) break
    all.delete(oldest)
  }
}

async function countAttempt(account: AccountRow | null, email: string, caller: Caller, now: Date): Promise<void> {
  if (account === null) return countStranger(email, now)
  if (caller.knownPeople.includes(account.id) && account.failedSignIns < LOCKED_AFTER)
    return takeFromBudget('sign-in-device', `${account.id} ${networkOf(caller.address)}`)
  const db = await getDatabase()
  const attempt = await db.transaction((tx) =>
    countSignInAttempt(
      tx,
      account.id,
      now,
      (failures, lastFailedAt) => secondsToWait(failures, lastFailedAt, now) <= 0,
    ),
  )
  if (attempt.allowed) return
  const waitS = secondsToWait(attempt.failedSignIns, attempt.lastFailedAt, now)
  throw tooManyAttempts(Number.isFinite(waitS) ? waitS : 900)
}

/**
 * The account that name and password open. Every limit comes before the hash; a name that nobody has, a wrong password
 * and a closed account get the same words after the same work.
 */
export async function checkPassword(
  credentials: { readonly email: string; readonly password: string },
  caller: Caller,
  now = new Date(),
): Promise<AccountRow> {
  try {
    return await refuseEvenly(() => openAccount(credentials, caller, now))
  } catch (error) {
    const code = appErrorOf(error)?.code
    if (code === 'not-signed-in') logSecurityEvent('sign-in-refused', { network: networkOf(caller.address) })
    if (code === 'too-many-requests') logSecurityEvent('too-many-attempts', { network: networkOf(caller.address) })
    throw error
  }
}

async function openAccount(
  credentials: { readonly email: string; readonly password: string },
  caller: Caller,
  now: Date,
): Promise<AccountRow> {
  await takeFromBudget('sign-in-address', caller.address)
  await takeFromBudget('sign-in-network', networkOf(caller.address))
  const email = credentials.email.trim().toLowerCase()
  const db = await getDatabase()
  const account = await selectAccountByEmail(db, email)
  await countAttempt(account, email, caller, now)
  const storedHash = account === null || account.passwordHash === '' ? null : account.passwordHash
  const fits = await verifyPassword(credentials.password, storedHash)
  if (account === null || !fits || account.disabledAt !== null) throw new AppError('not-signed-in', REFUSED)
  await db.transaction((tx) => clearFailedSignIns(tx, account.id))
  await returnToBudget('sign-in-address', caller.address)
  await returnToBudget('sign-in-network', networkOf(caller.address))
  await restoreBudget('sign-in-device', `${account.id} ${networkOf(caller.address)}`)
  return account
}

/** A session under a new secret; what the secret was before is never taken over. */
export async function startSession(account: AccountRow, caller: Caller, now = new Date()): Promise<string> {
  const secret = makeSecret()
  const idHash = hashSecret(secret)
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    await insertSession(tx, {
      idHash,
      userId: account.id,
      epoch: account.sessionEpoch,
      now,
      expiresAt: new Date(now.getTime() + SESSION_LIFE_S * 1000),
      ipPrefix: networkOf(caller.address),
      userAgent: caller.userAgent.replace(/[^\x20-\x7e]/g, '').slice(0, 200),
    })
    await insertAuditEntry(tx, {
      actor: ownActor(account, sessionRefOf(idHash)),
      action: 'sign-in',
      entity: 'session',
      entityId: sessionRefOf(idHash),
    })
  })
  return secret
}

/** Signs in: a new session for the right password. Answers its secret, for the cookie only, and whose it is. */
export async function signIn(
  credentials: { readonly email: string; readonly password: string },
  caller: Caller,
  now = new Date(),
): Promise<{ secret: string; userId: string }> {
  const account = await checkPassword(credentials, caller, now)
  if (account.passwordScheme !== PASSWORD_SCHEME) {
    const passwordHash = await hashPassword(credentials.password)
    const db = await getDatabase()
    await db.transaction((tx) => updatePassword(tx, account.id, passwordHash, PASSWORD_SCHEME))
  }
  return { secret: await startSession(account, caller, now), userId: account.id }
}

/** Signs out: the session is dead from now on, wherever its cookie may have got to. */
export async function signOut(secret: string, now = new Date()): Promise<void> {
  const db = await getDatabase()
  const idHash = hashSecret(secret)
  const session = await selectSession(db, idHash)
  if (session === null || session.revokedAt !== null) return
  const account = await selectAccount(db, session.userId)
  if (account === null) return
  await db.transaction(async (tx) => {
    if (!(await revokeSession(tx, idHash, now))) return
    await insertAuditEntry(tx, {
      actor: ownActor(account, sessionRefOf(idHash)),
      action: 'sign-out',
      entity: 'session',
      entityId: sessionRefOf(idHash),
    })
  })
}

/** Where a request comes from, out of its headers. */
export function callerFrom(headers: Headers, knownPeople: readonly string[] = []): Caller {
  return { address: callerAddress(headers), userAgent: headers.get('user-agent') ?? '', knownPeople }
}
