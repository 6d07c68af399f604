import 'server-only'
import { hashSecret, makeSecret } from './secret'

const TOKEN = /^ik_[A-Za-z0-9_-]{43}$/

/** A new API token: the secret to show once, and its hash to keep. */
export function makeApiToken(): { secret: string; secretHash: string } {
  const secret = makeSecret('ik_')
  return { secret, secretHash: hashSecret(secret) }
}

/** Hash of a well-formed token, or null. */
export function hashApiToken(secret: string): string | null {
  return TOKEN.test(secret) ? hashSecret(secret) : null
}

/** What an Authorization header carries: nothing, a bearer token, or something that is neither. */
export function bearerToken(
  headers: Headers,
): { kind: 'none' } | { kind: 'token'; secret: string } | { kind: 'other' } {
  const header = headers.get('authorization')
  if (header === null) return { kind: 'none' }
  const match = /^Bearer ([\x21-\x7e]{1,200})$/i.exec(header)
  return match?.[1] === undefined ? { kind: 'other' } : { kind: 'token', secret: match[1] }
}
