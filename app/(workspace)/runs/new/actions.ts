'use server'

import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { removeDraft } from '@/lib/access/drafts'
import { onceForKey } from '@/lib/access/idempotency'
import { createRun } from '@/lib/access/runs'
import { answerAction } from '@/lib/domain/action-answer'
import { AppError } from '@/lib/domain/errors'
import { readRunForm } from '@/lib/domain/read-run-form'
import { type RunFormValues, runFormValuesSchema } from '@/lib/domain/run-form'
import { runFormChoices } from './_choices'

/** Logs the run as typed. The server reads the text itself; what the browser understood is not relied on. */
export async function logRunAction(typed: RunFormValues): Promise<FormState> {
  const answer = await answerAction(async () => {
    const actor = await requireActor()
    const values = runFormValuesSchema.parse(typed)
    const { run, issues } = readRunForm(values, await runFormChoices(actor))
    if (run === null) throw new AppError('invalid', 'Not logged yet: some fields need a look.', { issues })
    // the key of the try, not what was typed, decides: a form sent twice over a bad connection logs one run
    const kept = await onceForKey(actor, values.key, { method: 'POST', path: '/runs/new', body: '' }, async () => {
      const made = await createRun(actor, run)
      return { status: 201, body: made.id, headers: {} }
    })
    await removeDraft(actor, 'log-run')
    return typeof kept.body === 'string' ? kept.body : ''
  })
  if (!answer.ok) return answer
  redirect(routeOf(`/runs/${answer.value}/intake`))
}
