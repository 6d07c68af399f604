import { routeOf } from '@/app/_route-of'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { IntakeWorkspace } from '@/components/forms/intake/intake-workspace'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { getCampaign } from '@/lib/access/campaigns'
import { getReaction } from '@/lib/access/reactions'
import { getRun } from '@/lib/access/runs'
import { listUploads } from '@/lib/access/uploads'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Add files' }

export default async function IntakePage({ params }: { params: Promise<{ runId: string }> }) {
  const actor = await requireActor()
  const { runId } = await params
  const run = await showOrNotFound(getRun(actor, runId))
  const [uploads, campaign] = await Promise.all([listUploads(actor, runId), getCampaign(actor, run.campaignId)])
  const reaction = await getReaction(actor, campaign.reactionId)
  const species = [
    ...new Set([...run.feed.map((entry) => entry.species), ...reaction.steps.flatMap((step) => Object.keys(step))]),
  ]
  return (
    <>
      <PageHead
        title={`Files of ${run.code}`}
        of={`${run.sampleCode} on ${run.rigCode}`}
        actions={<LinkButton href={routeOf(`/runs/${run.id}`)}>Back to the run</LinkButton>}
      />
      <PageBody>
        <IntakeWorkspace runId={run.id} initial={uploads} species={species} mayChange={can.addFiles(actor, run)} />
      </PageBody>
    </>
  )
}
