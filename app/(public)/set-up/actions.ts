'use server'

import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { type FormState } from '@/components/ui/form-state'
import { assertActionFromHere } from '@/lib/access/actor'
import { completeSetUp } from '@/lib/access/set-up'
import { callerFrom } from '@/lib/access/sign-in'
import { rememberDevice, writeSessionSecret } from '@/lib/auth/session'
import { answerAction, textFields } from '@/lib/domain/action-answer'
import { setUpSchema } from '@/lib/domain/person'

export async function setUpAction(_previous: FormState, data: FormData): Promise<FormState> {
  const answer = await answerAction(async () => {
    await assertActionFromHere()
    const input = setUpSchema.parse(textFields(data, ['code', 'email', 'displayName', 'password']))
    const { secret, userId } = await completeSetUp(input, callerFrom(await headers()))
    await writeSessionSecret(secret)
    await rememberDevice(userId)
    return ''
  })
  if (!answer.ok) return answer
  redirect('/')
}
