'use server'

import { revalidatePath } from 'next/cache'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { addMember, changeMember, removeMember } from '@/lib/access/campaigns'
import { answerAction } from '@/lib/domain/action-answer'
import { newMemberSchema } from '@/lib/domain/campaign'
import { FormReader } from '@/lib/domain/form-reader'
import { campaignRoles } from '@/lib/domain/role'
import { idSchema } from '@/lib/domain/text'

export async function addMemberAction(campaignId: string, _previous: FormState, data: FormData): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const userId = form.required('userId', 'Choose a person.')
    const role = form.choice('role', campaignRoles, 'Choose a role.')
    form.finish()
    const member = await addMember(actor, idSchema.parse(campaignId), newMemberSchema.parse({ userId, role }))
    revalidatePath('/campaigns/[campaignId]/people', 'page')
    return `${member.displayName} is now ${role} of this campaign.`
  })
}

export async function changeMemberAction(
  key: { readonly campaignId: string; readonly userId: string },
  _previous: FormState,
  data: FormData,
): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const form = new FormReader(data)
    const [campaignId, userId] = [idSchema.parse(key.campaignId), idSchema.parse(key.userId)]
    if (form.text('role') === 'none') await removeMember(actor, campaignId, userId)
    else {
      const role = form.choice('role', campaignRoles, 'Choose a role.')
      form.finish()
      await changeMember(actor, campaignId, userId, role)
    }
    revalidatePath('/campaigns/[campaignId]/people', 'page')
    return 'Saved.'
  })
}
