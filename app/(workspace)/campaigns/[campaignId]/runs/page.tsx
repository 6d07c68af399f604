import { routeOf } from '@/app/_route-of'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { RunsTable } from '@/components/run/runs-table'
import { LinkButton } from '@/components/ui/link-button'
import { requireActor } from '@/lib/access/actor'
import { listRigs } from '@/lib/access/rigs'
import { listRuns } from '@/lib/access/runs'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Runs' }

export default async function CampaignRunsPage({ params }: { params: Promise<{ campaignId: string }> }) {
  const actor = await requireActor()
  const { campaignId } = await params
  const [runs, rigs] = await showOrNotFound(Promise.all([listRuns(actor, { campaignId }), listRigs(actor)]))
  const zones = new Map(rigs.map((rig) => [rig.id, rig.timeZone]))
  const byCode = [...runs].sort((a, b) => a.code.localeCompare(b.code, 'en', { numeric: true }))
  return (
    <div className="px-4 py-3 sm:px-6">
      {can.addRun(actor, campaignId) ? (
        <p className="mt-0 mb-3">
          <LinkButton href={routeOf('/runs/new')}>Log a run</LinkButton>
        </p>
      ) : null}
      <RunsTable
        runs={byCode}
        timeZoneOf={(run) => zones.get(run.rigId) ?? 'UTC'}
        empty="No run has been logged in this campaign yet."
      />
    </div>
  )
}
