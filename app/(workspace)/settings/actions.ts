'use server'

import { revalidatePath } from 'next/cache'
import { headers } from 'next/headers'
import { type SecretState } from '@/components/forms/secret-form'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { endOtherSessions, endSession } from '@/lib/access/sessions'
import { callerFrom } from '@/lib/access/sign-in'
import { createToken, revokeToken } from '@/lib/access/tokens'
import { changePassword, changeProfile } from '@/lib/access/users'
import { writeSessionSecret } from '@/lib/auth/session'
import { answerAction, textFields } from '@/lib/domain/action-answer'
import { newTokenSchema, passwordChangeSchema, profileChangeSchema } from '@/lib/domain/person'

export async function changeProfileAction(_previous: FormState, data: FormData): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    await changeProfile(actor, profileChangeSchema.parse(textFields(data, ['displayName'])))
    return 'Saved.'
  })
  if (answer.ok) revalidatePath('/', 'layout')
  return answer
}

/** Ends every session with the old password and goes on in a new one. */
export async function changePasswordAction(_previous: FormState, data: FormData): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    const input = passwordChangeSchema.parse(textFields(data, ['currentPassword', 'newPassword']))
    const { secret, endedSessions } = await changePassword(actor, input, callerFrom(await headers()))
    await writeSessionSecret(secret)
    return endedSessions === 0
      ? 'The password is changed.'
      : `The password is changed, and ${endedSessions} other ${endedSessions === 1 ? 'session has' : 'sessions have'} ended.`
  })
  if (answer.ok) revalidatePath('/settings')
  return answer
}

export async function endSessionAction(_previous: FormState, data: FormData): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    await endSession(actor, textFields(data, ['ref']).ref)
    return 'The session has ended.'
  })
  revalidatePath('/settings')
  return answer
}

export async function endOtherSessionsAction(_previous: FormState): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    await endOtherSessions(actor)
    return 'All other sessions have ended.'
  })
  revalidatePath('/settings')
  return answer
}

export async function createTokenAction(_previous: SecretState, data: FormData): Promise<SecretState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    const { name, validDays, campaignId } = textFields(data, ['name', 'validDays', 'campaignId'])
    const token = await createToken(
      actor,
      newTokenSchema.parse({
        name,
        scopes: data.getAll('scopes'),
        validDays: Number(validDays),
        campaignId: campaignId === '' ? null : campaignId,
      }),
    )
    return {
      title: `The token for ${token.name}.`,
      note: 'Copy it now; it is not shown again. Send it as “Authorization: Bearer …”.',
      secret: token.secret,
    }
  })
  if (answer.ok) revalidatePath('/settings')
  return answer
}

export async function revokeTokenAction(_previous: FormState, data: FormData): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    await revokeToken(actor, textFields(data, ['tokenId']).tokenId)
    return 'The token no longer works.'
  })
  revalidatePath('/settings')
  return answer
}
