import 'server-only'
import { z } from 'zod'
import { getDatabase } from '../../db/client'
import { deleteDraft, upsertDraft } from '../../db/mutations/people'
import { selectDraft } from '../../db/queries/people'
import { AppError } from '../domain/errors'
import { type Actor } from '../domain/role'
import { authorise } from './authorise'

const MAXIMUM_BYTES = 64_000
export const draftNameSchema = z.string().regex(/^[a-z][a-z0-9-]{0,79}$/)

export interface Draft {
  readonly content: unknown
  readonly savedAt: string
}

function formNamed(form: string): string {
  const parsed = draftNameSchema.safeParse(form)
  if (!parsed.success)
    throw new AppError('invalid', 'A draft is named in small letters, digits and hyphens, as in log-run.')
  return parsed.data
}

/** What the actor typed into a form and has not sent; null for nothing. */
export async function getDraft(actor: Actor, form: string): Promise<Draft | null> {
  authorise(actor.tokenScopes === null, 'Drafts belong to a person at a screen.')
  const draft = await selectDraft(await getDatabase(), actor.userId, formNamed(form))
  return draft === null ? null : { content: draft.content, savedAt: draft.updatedAt.toISOString() }
}

/** Keeps what the actor has typed so far, in place of what was kept before. */
export async function saveDraft(actor: Actor, form: string, content: unknown, now = new Date()): Promise<Draft> {
  authorise(actor.tokenScopes === null, 'Drafts belong to a person at a screen.')
  const name = formNamed(form)
  if (Buffer.byteLength(JSON.stringify(content ?? null), 'utf8') > MAXIMUM_BYTES)
    throw new AppError('too-large', `A draft may have ${MAXIMUM_BYTES} bytes. Send the form, or shorten the notes.`)
  const db = await getDatabase()
  await db.transaction((tx) => upsertDraft(tx, actor.userId, name, content ?? null, now))
  return { content, savedAt: now.toISOString() }
}

/** Forgets a draft, once the form was sent or emptied. */
export async function removeDraft(actor: Actor, form: string): Promise<void> {
  authorise(actor.tokenScopes === null, 'Drafts belong to a person at a screen.')
  await deleteDraft(await getDatabase(), actor.userId, formNamed(form))
}
