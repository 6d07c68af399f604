import { RunsTable } from '@/components/run/runs-table'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { requireActor } from '@/lib/access/actor'
import { listRigs } from '@/lib/access/rigs'
import { listRuns } from '@/lib/access/runs'

export const metadata = { title: 'Runs' }

export default async function RunsPage() {
  const actor = await requireActor()
  const [runs, rigs] = await showOrNotFound(Promise.all([listRuns(actor), listRigs(actor)]))
  const zones = new Map(rigs.map((rig) => [rig.id, rig.timeZone]))
  return (
    <>
      <PageHead
        title="Runs"
        meta="Of all campaigns you are a member of, latest first."
        actions={<LinkButton href="/runs/new">Log a run</LinkButton>}
      />
      <PageBody>
        <RunsTable
          runs={runs}
          timeZoneOf={(run) => zones.get(run.rigId) ?? 'UTC'}
          empty="No run yet. Log the first one; its files come right after."
        />
      </PageBody>
    </>
  )
}
