'use server'

import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { assertActionFromHere } from '@/lib/access/actor'
import { callerFrom, signIn, signOut } from '@/lib/access/sign-in'
import { safeNextPath } from '@/lib/auth/next-path'
import { readKnownPeople, readSessionSecret, rememberDevice, writeSessionSecret } from '@/lib/auth/session'
import { answerAction, textFields } from '@/lib/domain/action-answer'
import { signInSchema } from '@/lib/domain/person'

/** Opens a new session; one that the browser held before ends, so that nobody goes on in a session somebody else prepared. */
export async function signInAction(_previous: FormState, data: FormData): Promise<FormState> {
  const answer = await answerAction(async () => {
    await assertActionFromHere()
    const credentials = signInSchema.parse(textFields(data, ['email', 'password']))
    const before = await readSessionSecret()
    const { secret, userId } = await signIn(credentials, callerFrom(await headers(), await readKnownPeople()))
    if (before !== null) await signOut(before)
    await writeSessionSecret(secret)
    await rememberDevice(userId)
    return ''
  })
  if (!answer.ok) return answer
  redirect(routeOf(safeNextPath(data.get('next'))))
}
