import 'server-only'
import { z } from 'zod'
import { getDatabase } from '../../db/client'
import { upsertPreference } from '../../db/mutations/people'
import { selectPreference } from '../../db/queries/people'
import { AppError } from '../domain/errors'
import { type Actor } from '../domain/role'
import { authorise } from './authorise'

const MAXIMUM_BYTES = 32_000
export const preferenceNameSchema = z
  .string()
  .regex(/^[a-z][a-z0-9-]*(?:[.:][A-Za-z0-9-]{1,64}){0,2}$/)
  .max(120)

function keyNamed(key: string): string {
  const parsed = preferenceNameSchema.safeParse(key)
  if (!parsed.success)
    throw new AppError(
      'invalid',
      'A preference is named like ranking-columns:campaign, in small letters, digits and hyphens.',
    )
  return parsed.data
}

/** How the actor wants something shown, such as the columns of a grid; null if nothing was kept. */
export async function getPreference(actor: Actor, key: string): Promise<unknown> {
  authorise(actor.tokenScopes === null, 'Preferences belong to a person at a screen.')
  const preference = await selectPreference(await getDatabase(), actor.userId, keyNamed(key))
  return preference?.content ?? null
}

export async function savePreference(actor: Actor, key: string, content: unknown, now = new Date()): Promise<void> {
  authorise(actor.tokenScopes === null, 'Preferences belong to a person at a screen.')
  const name = keyNamed(key)
  if (Buffer.byteLength(JSON.stringify(content ?? null), 'utf8') > MAXIMUM_BYTES)
    throw new AppError('too-large', `A preference may have ${MAXIMUM_BYTES} bytes.`)
  const db = await getDatabase()
  await db.transaction((tx) => upsertPreference(tx, actor.userId, name, content ?? null, now))
}
