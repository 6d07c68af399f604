import { type Metadata } from 'next'
import { notFound } from 'next/navigation'
import { randomUUID } from 'node:crypto'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { RunForm } from '@/components/forms/run-form'
import { requireActor } from '@/lib/access/actor'
import { getDraft } from '@/lib/access/drafts'
import { getRun } from '@/lib/access/runs'
import { formOfRun, runFormValuesSchema } from '@/lib/domain/run-form'
import { can } from '@/lib/policy/can'
import { runFormChoices } from '../../new/_choices'
import { correctRunAction } from './actions'

interface Props {
  readonly params: Promise<{ runId: string }>
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const actor = await requireActor()
  const run = await showOrNotFound(getRun(actor, (await params).runId))
  return { title: `Correct ${run.code}` }
}

export default async function CorrectRunPage({ params }: Props) {
  const actor = await requireActor()
  const run = await showOrNotFound(getRun(actor, (await params).runId))
  if (!can.editRun(actor, run)) notFound()
  const draftName = `correct-run-${run.id}`
  const [choices, draft] = await Promise.all([runFormChoices(actor), getDraft(actor, draftName)])
  const timeZone = choices.rigs.find(({ id }) => id === run.rigId)?.timeZone ?? 'UTC'
  const kept = runFormValuesSchema.safeParse(draft?.content)
  return (
    <RunForm
      choices={choices}
      initial={kept.success ? kept.data : formOfRun(run, timeZone, randomUUID())}
      isDraft={kept.success}
      now={new Date().toISOString()}
      save={correctRunAction.bind(null, run.id, { run: run.version, bed: run.loading.version })}
      draftName={draftName}
      corrects={{
        code: run.code,
        place: `${run.sampleCode} in ${run.rigCode}, channel ${run.channel}`,
        href: `/runs/${run.id}`,
      }}
    />
  )
}
