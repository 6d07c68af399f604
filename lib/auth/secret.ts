import 'server-only'
import { createHash, randomBytes } from 'node:crypto'

/** 256 random bits as text, with what they are for in front. The only form of a session, token or one-time code that leaves us. */
export function makeSecret(prefix: 'ik_' | 'code_' | '' = ''): string {
  return prefix + randomBytes(32).toString('base64url')
}

/** What is stored of a secret. A fast hash is right here: there is nothing to guess in 256 random bits. */
export function hashSecret(secret: string): string {
  return createHash('sha256').update(secret, 'utf8').digest('hex')
}
