import 'server-only'
import { createHmac } from 'node:crypto'
import { environment } from '../environment'
import { MAXIMUM_PASSWORD_BYTES } from './password-fault'
import { compareInThread, hashInThread } from './password-threads'

/** Name of the scheme below; stored with each hash, so that a later scheme can renew it at sign-in. */
export const PASSWORD_SCHEME = 'b1'
const COST = 12
/** A hash that no password fits, of the same cost: an unknown name takes as long as a wrong password. */
const NOBODYS_HASH = '$2b$12$......................MOkuLHXJtTxQk/VQWumSSPWH/Ls7Gh6'

/**
 * What bcrypt sees: 64 ASCII characters whatever the password, so that neither its 72-byte limit nor a zero byte cuts
 * anything off, and a stolen table is worth nothing without the pepper. NFC makes one password of its two typed forms.
 */
export function preparePassword(password: string, pepper: string): string {
  return createHmac('sha384', pepper).update(password.normalize('NFC'), 'utf8').digest('base64')
}

export async function hashPassword(password: string): Promise<string> {
  return hashInThread(preparePassword(password, environment.PEPPER), COST)
}

/** Whether the password fits; with no hash (nobody of that name) it takes the same time and is false. */
export async function verifyPassword(password: string, hash: string | null): Promise<boolean> {
  const isTooLong = Buffer.byteLength(password, 'utf8') > MAXIMUM_PASSWORD_BYTES
  const fits = await compareInThread(
    preparePassword(isTooLong ? '' : password, environment.PEPPER),
    hash ?? NOBODYS_HASH,
  )
  return fits && hash !== null && !isTooLong
}
