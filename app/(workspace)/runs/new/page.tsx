import { randomUUID } from 'node:crypto'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { RunForm } from '@/components/forms/run-form'
import { EmptyState } from '@/components/ui/empty-state'
import { LinkButton } from '@/components/ui/link-button'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { getDraft } from '@/lib/access/drafts'
import { openRunForm, runFormValuesSchema } from '@/lib/domain/run-form'
import { logRunAction } from './actions'
import { runFormChoices } from './_choices'

export const metadata = { title: 'Log a run' }

interface Props {
  searchParams: Promise<{ campaign?: string | string[]; rig?: string | string[] }>
}

export default async function LogRunPage({ searchParams }: Props) {
  const actor = await requireActor()
  const [choices, draft, asked] = await Promise.all([
    showOrNotFound(runFormChoices(actor)),
    getDraft(actor, 'log-run'),
    searchParams,
  ])
  const missing = [
    choices.rigs.length === 0 ? 'a rig' : '',
    choices.campaigns.length === 0 ? 'a campaign that you work in' : '',
    choices.samples.length === 0 ? 'a sample' : '',
  ].filter((text) => text !== '')
  if (missing.length > 0)
    return (
      <>
        <PageHead title="Log a run" />
        <div className="px-4 sm:px-6">
          <EmptyState
            title={`Before a run can be logged: ${missing.join(', ')}`}
            action={
              <LinkButton href="/" kind="main">
                See the steps
              </LinkButton>
            }
          >
            The start page has the order to set things up in, with who can do each step.
          </EmptyState>
        </div>
      </>
    )
  const kept = runFormValuesSchema.safeParse(draft?.content)
  const now = new Date()
  const rigId = typeof asked.rig === 'string' ? asked.rig : (choices.lastRuns[0]?.rigId ?? '')
  const campaignId = typeof asked.campaign === 'string' ? asked.campaign : ''
  return (
    <RunForm
      choices={choices}
      initial={kept.success ? kept.data : openRunForm(choices, rigId, campaignId, randomUUID(), now)}
      isDraft={kept.success}
      now={now.toISOString()}
      save={logRunAction}
    />
  )
}
