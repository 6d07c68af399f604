import 'server-only'
import { createHmac, timingSafeEqual } from 'node:crypto'
import { type z } from 'zod'
import { AppError } from '../domain/errors'
import { environment } from '../environment'

const SIGNATURE_BYTES = 16

function signatureOf(list: string, payload: string): Buffer {
  return createHmac('sha256', environment.PEPPER)
    .update(`list-cursor\n${list}\n${payload}`)
    .digest()
    .subarray(0, SIGNATURE_BYTES)
}

/** Where a list goes on, as text to be handed back; of no use with another list. */
export function sealCursor(list: string, key: unknown): string {
  const payload = Buffer.from(JSON.stringify(key), 'utf8').toString('base64url')
  return `${payload}.${signatureOf(list, payload).toString('base64url')}`
}

export function openCursor<T extends z.ZodType>(list: string, cursor: string, schema: T): z.output<T> {
  const [payload = '', signature = ''] = cursor.split('.')
  const given = Buffer.from(signature, 'base64url')
  const expected = signatureOf(list, payload)
  if (given.length !== expected.length || !timingSafeEqual(given, expected))
    throw new AppError('invalid', 'This cursor was not given out by this list. Start again without one.', {
      issues: [{ field: 'cursor', message: 'not a cursor of this list' }],
    })
  return schema.parse(JSON.parse(Buffer.from(payload, 'base64url').toString('utf8')))
}
