'use server'

import { revalidatePath } from 'next/cache'
import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { changeReaction, createReaction } from '@/lib/access/reactions'
import { answerAction } from '@/lib/domain/action-answer'
import { FormReader } from '@/lib/domain/form-reader'
import { newReactionSchema, reactionChangeSchema } from '@/lib/domain/reaction'
import { readReaction } from './_read-reaction'

export async function createReactionAction(_previous: FormState, data: FormData): Promise<FormState> {
  const answer = await answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const code = form.required('code', 'Give a short code, for example METH.')
    const record = readReaction(form)
    form.finish()
    return (await createReaction(actor, newReactionSchema.parse({ code, ...record }))).id
  })
  if (!answer.ok) return answer
  redirect(routeOf(`/reactions/${answer.value}`))
}

export async function changeReactionAction(
  key: { readonly id: string; readonly version: number },
  _previous: FormState,
  data: FormData,
): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const record = readReaction(form)
    form.finish()
    await changeReaction(actor, key.id, reactionChangeSchema.parse(record), key.version)
    revalidatePath('/reactions/[reactionId]', 'page')
    return 'Saved. Results that rest on this reaction follow.'
  })
}
