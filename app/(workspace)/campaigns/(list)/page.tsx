import Link from 'next/link'
import { routeOf } from '@/app/_route-of'
import { DataTable } from '@/components/ui/data-table'
import { EmptyState } from '@/components/ui/empty-state'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listCampaigns } from '@/lib/access/campaigns'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Campaigns' }

export default async function CampaignsPage() {
  const actor = await requireActor()
  const campaigns = await listCampaigns(actor)
  const add = can.makeCampaign(actor) ? (
    <LinkButton href="/campaigns/new" kind={campaigns.length === 0 ? 'main' : 'plain'}>
      New campaign
    </LinkButton>
  ) : null
  return (
    <>
      <PageHead title="Campaigns" actions={campaigns.length === 0 ? null : add} />
      <PageBody>
        {campaigns.length === 0 ? (
          <EmptyState title="No campaign that you are a member of" action={add}>
            A campaign compares samples in one reaction under one method. A lead makes it and asks people in.
          </EmptyState>
        ) : (
          <DataTable
            caption="Campaigns"
            rows={campaigns}
            rowKey={(row) => row.id}
            columns={[
              { key: 'code', head: 'Code', className: 'whitespace-nowrap', cell: (row) => row.code },
              {
                key: 'name',
                head: 'Campaign',
                isRowHead: true,
                cell: (row) => <Link href={routeOf(`/campaigns/${row.id}`)}>{row.name}</Link>,
              },
              { key: 'laboratory', head: 'Laboratory', cell: (row) => row.laboratory },
              { key: 'samples', head: 'Samples', isNumber: true, cell: (row) => row.sampleCount },
              { key: 'runs', head: 'Runs', isNumber: true, cell: (row) => row.runCount },
              {
                key: 'waiting',
                head: 'Waiting',
                unit: 'for a decision',
                isNumber: true,
                cell: (row) => row.waitingCount,
              },
              { key: 'role', head: 'My part', cell: (row) => row.myRole },
              { key: 'state', head: 'State', cell: (row) => (row.closedAt === null ? 'open' : 'closed') },
            ]}
          />
        )}
      </PageBody>
    </>
  )
}
