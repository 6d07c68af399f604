import Link from 'next/link'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { DataTable } from '@/components/ui/data-table'
import { EmptyState } from '@/components/ui/empty-state'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listRigs } from '@/lib/access/rigs'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Rigs' }

export default async function RigsPage() {
  const actor = await requireActor()
  const rigs = await showOrNotFound(listRigs(actor))
  const add = can.manageRigs(actor) ? (
    <LinkButton href="/rigs/new" kind={rigs.length === 0 ? 'main' : 'plain'}>
      New rig
    </LinkButton>
  ) : null
  return (
    <>
      <PageHead
        title="Rigs"
        meta={
          <>
            Channels, clocks and limits. <Link href="/column-maps">Column maps</Link> say what the columns of a rig’s
            files mean.
          </>
        }
        actions={rigs.length === 0 ? null : add}
      />
      <PageBody>
        {rigs.length === 0 ? (
          <EmptyState title="No rig yet" action={add}>
            {can.manageRigs(actor)
              ? 'Enter the test rigs, with the zone of their clocks, their limits and the state their flow controllers count at.'
              : 'An admin enters the rigs.'}
          </EmptyState>
        ) : (
          <DataTable
            caption="Rigs"
            rows={rigs}
            rowKey={(row) => row.id}
            columns={[
              {
                key: 'code',
                head: 'Code',
                isRowHead: true,
                cell: (row) => <Link href={`/rigs/${row.id}`}>{row.code}</Link>,
              },
              { key: 'name', head: 'Name', cell: (row) => row.name },
              { key: 'kind', head: 'Reactor', cell: (row) => row.reactorKind.replace('-', ' ') },
              { key: 'channels', head: 'Channels', cell: (row) => row.channels.map(({ code }) => code).join(', ') },
              { key: 'zone', head: 'Clock', cell: (row) => row.timeZone },
              {
                key: 'pressure',
                head: 'At most',
                unit: 'bar absolute',
                isNumber: true,
                cell: (row) =>
                  row.maximumPressurePa === null
                    ? 'not entered'
                    : formatQuantity(row.maximumPressurePa, 'pressure').replace(' bar', ''),
              },
              {
                key: 'temperature',
                head: 'At most',
                unit: '°C',
                isNumber: true,
                cell: (row) =>
                  row.maximumTemperatureK === null ? 'not entered' : (row.maximumTemperatureK - 273.15).toFixed(0),
              },
            ]}
          />
        )}
      </PageBody>
    </>
  )
}
