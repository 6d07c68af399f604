import { type Metadata } from 'next'
import Link from 'next/link'
import { routeOf } from '@/app/_route-of'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { IntakeWorkspace } from '@/components/forms/intake/intake-workspace'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listValidCalibrations } from '@/lib/access/calibrations'
import { getCampaign } from '@/lib/access/campaigns'
import { getReaction } from '@/lib/access/reactions'
import { getRun } from '@/lib/access/runs'
import { listUploads } from '@/lib/access/uploads'
import { can } from '@/lib/policy/can'

interface IntakePageProps {
  readonly params: Promise<{ runId: string }>
}

export async function generateMetadata({ params }: IntakePageProps): Promise<Metadata> {
  const actor = await requireActor()
  const run = await showOrNotFound(getRun(actor, (await params).runId))
  return { title: `Files of ${run.code}` }
}

export default async function IntakePage({ params }: IntakePageProps) {
  const actor = await requireActor()
  const { runId } = await params
  const run = await showOrNotFound(getRun(actor, runId))
  const canAddFiles = can.addFiles(actor, run)
  const [uploads, campaign] = await showOrNotFound(
    Promise.all([listUploads(actor, runId), getCampaign(actor, run.campaignId)]),
  )
  // what campaigns share is not for guests, who add no files either
  const [reaction, calibrations] = canAddFiles
    ? await Promise.all([
        getReaction(actor, campaign.reactionId),
        listValidCalibrations(actor, new Date(run.startedAt), run.rigId),
      ])
    : [null, null]
  const species = new Set([
    ...run.feed.map((entry) => entry.species),
    ...(reaction?.steps ?? []).flatMap((step) => Object.keys(step)),
  ])
  return (
    <>
      <PageHead
        title={`Files of ${run.code}`}
        of={`on ${run.sampleCode}, ${run.sampleName}`}
        meta={
          <>
            <Link href={routeOf(`/campaigns/${run.campaignId}`)}>{run.campaignCode}</Link> · {run.rigCode}, channel{' '}
            {run.channel} · <Link href={routeOf(`/runs/${run.id}`)}>the run</Link>
          </>
        }
      />
      <PageBody>
        <IntakeWorkspace
          runId={run.id}
          runHref={`/runs/${run.id}`}
          initial={uploads}
          species={[...species].sort()}
          canAddFiles={canAddFiles}
          isAnalyserCalibrated={calibrations?.some((one) => one.kind === 'response-factors') ?? true}
        />
      </PageBody>
    </>
  )
}
