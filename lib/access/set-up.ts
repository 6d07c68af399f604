import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { insertAuditEntry } from '../../db/mutations/audit'
import {
  insertOneTimeCode,
  insertUser,
  updatePassword,
  consumeOneTimeCode,
  withdrawOneTimeCodes,
} from '../../db/mutations/people'
import { selectAccountByEmail, selectOneTimeCode, selectWorkingAdmins } from '../../db/queries/people'
import { hashPassword, PASSWORD_SCHEME } from '../auth/password'
import { passwordFault } from '../auth/password-fault'
import { networkOf, takeFromBudget } from '../auth/rate-limit'
import { hashSecret, makeSecret } from '../auth/secret'
import { logSecurityEvent } from '../auth/security-log'
import { AppError } from '../domain/errors'
import { ownActor } from './own-actor'
import { startSession, type Caller } from './sign-in'

const CODE_LIFE_S = 86_400

/** Whether nobody could run this house yet: there is no admin who can sign in. */
export async function isSetUpNeeded(): Promise<boolean> {
  return (await selectWorkingAdmins(await getDatabase())).length === 0
}

/**
 * A code with one use for making the first admin, or null when there is one. The start script prints it where only the
 * person who started the server reads it; each start makes a new one and the older ones worthless.
 */
export async function ensureSetUpCode(now = new Date()): Promise<{ code: string; expiresAt: string } | null> {
  if (!(await isSetUpNeeded())) return null
  const code = makeSecret('code_')
  const expiresAt = new Date(now.getTime() + CODE_LIFE_S * 1000)
  const db = await getDatabase()
  await db.transaction(async (tx) => {
    await withdrawOneTimeCodes(tx, 'set-up', null, now)
    await insertOneTimeCode(tx, {
      codeHash: hashSecret(code),
      purpose: 'set-up',
      userId: null,
      createdAt: now,
      expiresAt,
    })
  })
  return { code, expiresAt: expiresAt.toISOString() }
}

interface FirstAdmin {
  readonly email: string
  readonly displayName: string
  readonly password: string
}

function refuseFaultyPassword(admin: FirstAdmin): void {
  const fault = passwordFault(admin.password, admin)
  if (fault !== null)
    throw new AppError('unprocessable', `The password cannot be taken. ${fault}`, {
      issues: [{ field: 'password', message: fault }],
    })
}

/** Makes the first admin with the one-time code, and signs them in. Answers the secret of the session. */
export async function completeSetUp(
  input: FirstAdmin & { readonly code: string },
  caller: Caller,
  now = new Date(),
): Promise<{ secret: string; userId: string }> {
  await takeFromBudget('sign-in-address', caller.address)
  const db = await getDatabase()
  const codeHash = hashSecret(input.code)
  const refused = new AppError(
    'not-found',
    'This set-up code was used, has run out or was replaced. Start the server again: it prints a new one while there is no admin.',
    { issues: [{ field: 'code', message: 'Not a code that still works.' }] },
  )
  const code = await selectOneTimeCode(db, codeHash, now)
  if (code === null || code.purpose !== 'set-up') {
    logSecurityEvent('set-up-code-refused', { network: networkOf(caller.address) })
    throw refused
  }
  refuseFaultyPassword(input)
  const passwordHash = await hashPassword(input.password)
  const userId = randomUUID()
  await db.transaction(async (tx) => {
    if (!(await consumeOneTimeCode(tx, codeHash, now))) throw refused
    if ((await selectWorkingAdmins(tx)).length > 0) throw refused
    const made = await insertUser(tx, {
      id: userId,
      email: input.email,
      displayName: input.displayName,
      role: 'admin',
      passwordHash,
      passwordScheme: PASSWORD_SCHEME,
    })
    if (!made)
      throw new AppError('conflict', `There is an account for ${input.email} already. Use another address.`, {
        issues: [{ field: 'email', message: 'There is an account with this e-mail address already.' }],
      })
    await insertAuditEntry(tx, {
      actor: ownActor({ ...input, id: userId, role: 'admin' }, 'set-up'),
      action: 'make-first-admin',
      entity: 'user',
      entityId: userId,
      after: { email: input.email, displayName: input.displayName, role: 'admin' },
    })
  })
  const account = await selectAccountByEmail(db, input.email)
  if (account === null) throw refused
  return { secret: await startSession(account, caller, now), userId }
}

/**
 * Makes an admin from the command line, or gives an admin who is locked out a new password. Whoever may run the command
 * on the data folder owns the data; the database's own lock keeps it away from a running server.
 */
export async function makeAdminByCommand(admin: FirstAdmin): Promise<'made' | 'renewed'> {
  refuseFaultyPassword(admin)
  const passwordHash = await hashPassword(admin.password)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const account = await selectAccountByEmail(tx, admin.email)
    const userId = account?.id ?? randomUUID()
    if (account === null)
      await insertUser(tx, {
        id: userId,
        email: admin.email,
        displayName: admin.displayName,
        role: 'admin',
        passwordHash,
        passwordScheme: PASSWORD_SCHEME,
      })
    else {
      if (account.role !== 'admin' || account.disabledAt !== null)
        throw new AppError(
          'conflict',
          `${admin.email} is an account that is not an admin’s, or is closed. Use another address.`,
        )
      await updatePassword(tx, userId, passwordHash, PASSWORD_SCHEME)
    }
    await insertAuditEntry(tx, {
      actor: ownActor({ ...admin, id: userId, role: 'admin' }, 'command'),
      action: account === null ? 'make-admin-by-command' : 'renew-admin-by-command',
      entity: 'user',
      entityId: userId,
      after: { email: admin.email, role: 'admin' },
    })
    return account === null ? 'made' : 'renewed'
  })
}
