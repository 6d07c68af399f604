'use server'

import { revalidatePath } from 'next/cache'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { getCurrentMethod, saveMethod } from '@/lib/access/campaigns'
import { answerAction } from '@/lib/domain/action-answer'
import { FormReader } from '@/lib/domain/form-reader'
import { newMethodSchema } from '@/lib/domain/method'
import { methodFields, methodFieldValue, readOrders } from '@/lib/domain/method-fields'
import { idSchema } from '@/lib/domain/text'

export async function saveMethodAction(
  key: { readonly campaignId: string; readonly basedOn: number; readonly stepCount: number },
  _previous: FormState,
  data: FormData,
): Promise<FormState> {
  return answerAction(async () => {
    const actor = await requireActor()
    const campaignId = idSchema.parse(key.campaignId)
    const form = new FormReader(data)
    const { settings: before } = await getCurrentMethod(actor, campaignId)
    const settings: Record<string, unknown> = { ...before }
    for (const field of methodFields) {
      if (field.kind === 'flag') settings[field.key] = form.isChecked(field.key)
      else if (field.kind === 'species') settings[field.key] = form.orNull(field.key)
      else if (field.kind === 'species-list')
        settings[field.key] = form
          .text(field.key)
          .split(/[\s,;]+/)
          .filter((entry) => entry !== '')
      else if (field.kind === 'choice') settings[field.key] = form.text(field.key)
      else settings[field.key] = methodFieldValue(field, form.number(field.key, `${field.label}: give a number.`))
    }
    settings['rateOrders'] = Array.from({ length: Math.min(6, Math.max(0, Number(key.stepCount))) }, (_, step) => {
      const orders = readOrders(form.text(`orders.${step}`))
      if (orders === null)
        form.fault(`orders.${step}`, 'Write species and order in turn, apart by commas: CO2 0.15, H2 0.4.')
      return orders ?? {}
    })
    const reason = form.required('reason', 'Say why the method changes.')
    form.finish()
    const saved = await saveMethod(actor, campaignId, newMethodSchema.parse({ settings, reason }), key.basedOn)
    revalidatePath('/campaigns/[campaignId]', 'layout')
    return `Saved as method ${saved.number}. The results follow at once.`
  })
}
