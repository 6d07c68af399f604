import Link from 'next/link'
import { type Route } from 'next'
import { DataTable } from '@/components/ui/data-table'
import { type CampaignSummary } from '@/lib/domain/campaign'

/** Campaigns with what waits in them and the reader's part. */
export function CampaignsTable({
  campaigns,
  caption,
}: {
  readonly campaigns: readonly CampaignSummary[]
  readonly caption: string
}) {
  return (
    <DataTable
      caption={caption}
      rows={campaigns}
      rowKey={(row) => row.id}
      columns={[
        {
          key: 'name',
          head: 'Campaign',
          isRowHead: true,
          cell: (row) => <Link href={`/campaigns/${row.id}` as Route}>{row.name}</Link>,
        },
        { key: 'code', head: 'Code', className: 'whitespace-nowrap', cell: (row) => row.code },
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
  )
}
