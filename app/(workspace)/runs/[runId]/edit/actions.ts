'use server'

import { redirect } from 'next/navigation'
import { z } from 'zod'
import { routeOf } from '@/app/_route-of'
import { type FormState } from '@/components/ui/form-state'
import { requireActor } from '@/lib/access/actor'
import { removeDraft } from '@/lib/access/drafts'
import { correctRun, getRun } from '@/lib/access/runs'
import { answerAction } from '@/lib/domain/action-answer'
import { AppError } from '@/lib/domain/errors'
import { readRunForm } from '@/lib/domain/read-run-form'
import { correctionsOf } from '@/lib/domain/run-corrections'
import { formOfRun, type RunFormValues, runFormValuesSchema } from '@/lib/domain/run-form'
import { idSchema } from '@/lib/domain/text'
import { runFormChoices } from '../../new/_choices'

const versionsSchema = z.strictObject({ run: z.int(), bed: z.int() })

/** Takes the corrections as typed, against the version of the run they were made from. */
export async function correctRunAction(
  runId: string,
  versions: { readonly run: number; readonly bed: number },
  typed: RunFormValues,
): Promise<FormState> {
  const answer = await answerAction(async () => {
    const actor = await requireActor()
    const id = idSchema.parse(runId)
    const run = await getRun(actor, id)
    const values = runFormValuesSchema.parse(typed)
    const choices = await runFormChoices(actor)
    const timeZone = choices.rigs.find((rig) => rig.id === run.rigId)?.timeZone ?? 'UTC'
    const opened = readRunForm(formOfRun(run, timeZone, values.key), choices)
    const wanted = readRunForm(
      { ...values, campaignId: run.campaignId, rigId: run.rigId, channel: run.channel },
      choices,
    )
    if (wanted.run === null)
      throw new AppError('invalid', 'Not saved yet: some fields need a look.', { issues: wanted.issues })
    await correctRun(actor, id, correctionsOf(opened.run, wanted.run), versionsSchema.parse(versions))
    await removeDraft(actor, `correct-run-${id}`)
    return id
  })
  if (!answer.ok) return answer
  redirect(routeOf(`/runs/${answer.value}`))
}
