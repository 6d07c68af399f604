import { routeOf } from '@/app/_route-of'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { RunTable } from '@/components/run/run-table'
import { LinkButton } from '@/components/ui/link-button'
import { requireActor } from '@/lib/access/actor'
import { listRuns } from '@/lib/access/runs'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Runs' }

export default async function CampaignRunsPage({ params }: { params: Promise<{ campaignId: string }> }) {
  const actor = await requireActor()
  const { campaignId } = await params
  const runs = await showOrNotFound(listRuns(actor, { campaignId }))
  const byCode = [...runs].sort((a, b) => a.code.localeCompare(b.code, 'en', { numeric: true }))
  return (
    <div className="px-4 py-3 sm:px-6">
      {can.addRun(actor, campaignId) ? (
        <p className="mt-0 mb-3">
          <LinkButton href={routeOf('/runs/new')}>Log a run</LinkButton>
        </p>
      ) : null}
      <RunTable runs={byCode} hasCampaign={false} />
    </div>
  )
}
