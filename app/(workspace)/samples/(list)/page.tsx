import Link from 'next/link'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { DataTable } from '@/components/ui/data-table'
import { EmptyState } from '@/components/ui/empty-state'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listSamples } from '@/lib/access/samples'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Samples' }

export default async function SamplesPage() {
  const actor = await requireActor()
  const samples = await showOrNotFound(listSamples(actor))
  const add = can.addSample(actor) ? (
    <LinkButton href="/samples/new" kind={samples.length === 0 ? 'main' : 'plain'}>
      New sample
    </LinkButton>
  ) : null
  return (
    <>
      <PageHead
        title="Samples"
        meta="What is tested, with lots and site counts."
        actions={samples.length === 0 ? null : add}
      />
      <PageBody>
        {samples.length === 0 ? (
          <EmptyState title="No sample yet" action={add}>
            A sample is one material. Its lots, site counts and all its runs are kept with it, across campaigns.
          </EmptyState>
        ) : (
          <DataTable
            caption="Samples"
            rows={samples}
            rowKey={(row) => row.id}
            columns={[
              {
                key: 'code',
                head: 'Code',
                isRowHead: true,
                className: 'whitespace-nowrap',
                cell: (row) => <Link href={`/samples/${row.id}`}>{row.code}</Link>,
              },
              { key: 'name', head: 'Name', cell: (row) => row.name },
              { key: 'composition', head: 'Composition', cell: (row) => row.composition },
              { key: 'metal', head: 'Active metal', cell: (row) => row.activeMetal ?? '' },
              {
                key: 'content',
                head: 'Metal',
                unit: 'wt%',
                isNumber: true,
                cell: (row) =>
                  row.metalMassFraction === null
                    ? ''
                    : formatQuantity(row.metalMassFraction, 'fraction', { unit: '%', significantDigits: 3 }).replace(
                        ' %',
                        '',
                      ),
              },
            ]}
          />
        )}
      </PageBody>
    </>
  )
}
