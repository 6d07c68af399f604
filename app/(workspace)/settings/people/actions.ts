'use server'

import { revalidatePath } from 'next/cache'
import { type SecretState } from '@/components/forms/secret-form'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { endSessionsOf } from '@/lib/access/sessions'
import { changePerson, createPerson, inviteAgain } from '@/lib/access/users'
import { answerAction, textFields } from '@/lib/domain/action-answer'
import { newPersonSchema, personChangeSchema, type Invitation } from '@/lib/domain/person'

function shown(invitation: Invitation) {
  return {
    title: `The invitation for ${invitation.email}.`,
    note: 'Pass this link on yourself, now; it is not shown again. It works once, for a week.',
    secret: invitation.url,
  }
}

export async function createPersonAction(_previous: SecretState, data: FormData): Promise<SecretState> {
  const actor = await requireActor()
  const answer = await answerAction(async () =>
    shown(await createPerson(actor, newPersonSchema.parse(textFields(data, ['email', 'displayName', 'role'])))),
  )
  if (answer.ok) revalidatePath('/settings/people')
  return answer
}

export async function inviteAgainAction(_previous: SecretState, data: FormData): Promise<SecretState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => shown(await inviteAgain(actor, textFields(data, ['userId']).userId)))
  if (answer.ok) revalidatePath('/settings/people')
  return answer
}

export async function changeRoleAction(_previous: FormState, data: FormData): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    const { userId, role, version } = textFields(data, ['userId', 'role', 'version'])
    await changePerson(actor, userId, personChangeSchema.parse({ role, version: Number(version) }))
    return 'The role is changed; the person signs in again.'
  })
  revalidatePath('/settings/people')
  return answer
}

export async function openOrCloseAction(_previous: FormState, data: FormData): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    const { userId, isDisabled, version } = textFields(data, ['userId', 'isDisabled', 'version'])
    const change = personChangeSchema.parse({ isDisabled: isDisabled === 'yes', version: Number(version) })
    await changePerson(actor, userId, change)
    return change.isDisabled === true ? 'The account is closed.' : 'The account is open again.'
  })
  revalidatePath('/settings/people')
  return answer
}

export async function endSessionsOfAction(_previous: FormState, data: FormData): Promise<FormState> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    await endSessionsOf(actor, textFields(data, ['userId']).userId)
    return 'All sessions of this person have ended.'
  })
  revalidatePath('/settings/people')
  return answer
}
