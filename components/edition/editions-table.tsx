import { type Route } from 'next'
import Link from 'next/link'
import { DataTable } from '@/components/ui/data-table'
import { Moment } from '@/components/ui/moment'
import { Tag } from '@/components/ui/tag'
import { type EditionSummary } from '@/lib/domain/edition'

type Row = EditionSummary & { readonly campaignCode: string; readonly campaignName: string }

/** Published editions, newest first. */
export function EditionsTable({
  editions,
  caption,
  empty,
  hasCampaign = false,
}: {
  readonly editions: readonly Row[]
  readonly caption: string
  readonly empty: string
  readonly hasCampaign?: boolean
}) {
  return (
    <DataTable
      caption={caption}
      rows={editions}
      rowKey={(row) => row.id}
      empty={empty}
      columns={[
        {
          key: 'number',
          head: 'Edition',
          isRowHead: true,
          cell: (row) => (
            <Link href={`/campaigns/${row.campaignId}/editions/${String(row.number)}` as Route}>
              {hasCampaign ? `${row.campaignName}, edition ${String(row.number)}` : `Edition ${String(row.number)}`}
            </Link>
          ),
        },
        { key: 'at', head: 'Published', cell: (row) => <Moment at={row.publishedAt} /> },
        { key: 'by', head: 'Signed by', cell: (row) => row.publishedByName },
        { key: 'method', head: 'Method', isNumber: true, cell: (row) => row.methodNumber },
        { key: 'runs', head: 'Runs', isNumber: true, cell: (row) => row.runCount },
        {
          key: 'state',
          head: 'State',
          cell: (row) =>
            row.withdrawnAt === null ? <Tag kind="sound">stands</Tag> : <Tag kind="fault">withdrawn</Tag>,
        },
      ]}
    />
  )
}
