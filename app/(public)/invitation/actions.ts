'use server'

import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { type FormState } from '@/components/ui/form-state'
import { assertActionFromHere } from '@/lib/access/actor'
import { callerFrom } from '@/lib/access/sign-in'
import { acceptInvitation } from '@/lib/access/users'
import { rememberDevice, writeSessionSecret } from '@/lib/auth/session'
import { answerAction, textFields } from '@/lib/domain/action-answer'
import { acceptInvitationSchema } from '@/lib/domain/person'

export async function acceptInvitationAction(_previous: FormState, data: FormData): Promise<FormState> {
  const answer = await answerAction(async () => {
    await assertActionFromHere()
    const input = acceptInvitationSchema.parse(textFields(data, ['code', 'password']))
    const { secret, userId } = await acceptInvitation(input, callerFrom(await headers()))
    await writeSessionSecret(secret)
    await rememberDevice(userId)
    return ''
  })
  if (!answer.ok) return answer
  redirect('/')
}
