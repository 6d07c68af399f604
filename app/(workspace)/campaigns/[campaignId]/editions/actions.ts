'use server'

import { revalidatePath } from 'next/cache'
import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { publishEdition, withdrawEdition } from '@/lib/access/editions'
import { answerAction, textFields } from '@/lib/domain/action-answer'
import { editionWithdrawalSchema, publicationSchema } from '@/lib/domain/edition'
import { type ActionResult } from '@/lib/domain/errors'
import { idSchema } from '@/lib/domain/text'

/** Publishes the proposal that was looked at, under the lead's password. */
export async function publishAction(
  key: { readonly campaignId: string; readonly contentSha256: string },
  _previous: FormState,
  data: FormData,
): Promise<FormState> {
  const answer = await answerAction(async () => {
    const actor = await requireActor()
    const campaignId = idSchema.parse(key.campaignId)
    const input = publicationSchema.parse({
      ...textFields(data, ['statement', 'password']),
      contentSha256: key.contentSha256,
    })
    const edition = await publishEdition(actor, campaignId, input)
    return `/campaigns/${campaignId}/editions/${String(edition.number)}`
  })
  if (!answer.ok) return answer
  revalidatePath('/', 'layout')
  redirect(routeOf(answer.value))
}

export async function withdrawAction(
  campaignId: string,
  number: number,
  reason: string,
): Promise<ActionResult<string>> {
  const actor = await requireActor()
  const answer = await answerAction(async () => {
    const input = editionWithdrawalSchema.parse({ reason })
    await withdrawEdition(actor, idSchema.parse(campaignId), Number(number), input.reason)
    return `Edition ${String(number)} is withdrawn.`
  })
  if (answer.ok) revalidatePath('/', 'layout')
  return answer
}
