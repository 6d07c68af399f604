'use server'

import { revalidatePath } from 'next/cache'
import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { changeRig, createRig } from '@/lib/access/rigs'
import { answerAction } from '@/lib/domain/action-answer'
import { FormReader } from '@/lib/domain/form-reader'
import { newRigSchema, rigChangeSchema } from '@/lib/domain/rig'
import { readRig } from './_read-rig'

export async function createRigAction(_previous: FormState, data: FormData): Promise<FormState> {
  const answer = await answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const code = form.required('code', 'Give the code that stands on the rig, for example Rig B.')
    const record = readRig(form)
    form.finish()
    return (await createRig(actor, newRigSchema.parse({ code, ...record }))).id
  })
  if (!answer.ok) return answer
  redirect(routeOf(`/rigs/${answer.value}`))
}

export async function changeRigAction(
  key: { readonly id: string; readonly version: number },
  _previous: FormState,
  data: FormData,
): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const record = readRig(form)
    form.finish()
    await changeRig(actor, key.id, rigChangeSchema.parse(record), key.version)
    revalidatePath('/rigs/[rigId]', 'page')
    return 'Saved.'
  })
}
