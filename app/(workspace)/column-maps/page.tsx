import { showOrNotFound } from '@/app/_show-or-not-found'
import { DataTable } from '@/components/ui/data-table'
import { EmptyState } from '@/components/ui/empty-state'
import { Fold } from '@/components/ui/fold'
import { Moment } from '@/components/ui/moment'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listColumnMaps } from '@/lib/access/column-maps'
import { listRigs } from '@/lib/access/rigs'

export const metadata = { title: 'Column maps' }

export default async function ColumnMapsPage() {
  const actor = await requireActor()
  const [maps, rigs] = await showOrNotFound(Promise.all([listColumnMaps(actor), listRigs(actor)]))
  const rigOf = (id: string) => rigs.find((rig) => rig.id === id)?.code ?? ''
  return (
    <>
      <PageHead
        title="Column maps"
        meta="What the columns of one instrument’s files mean. A map is made when a file is confirmed, and answers the next file with the same columns."
      />
      <PageBody>
        {maps.length === 0 ? (
          <EmptyState title="No column map yet">
            Add a file to a run, say what its columns mean and confirm: the map is kept for that instrument.
          </EmptyState>
        ) : (
          <DataTable
            caption="Column maps"
            rows={maps}
            rowKey={(row) => row.id}
            columns={[
              {
                key: 'rig',
                head: 'Rig',
                isRowHead: true,
                className: 'whitespace-nowrap',
                cell: (row) => rigOf(row.rigId),
              },
              { key: 'instrument', head: 'Instrument', cell: (row) => row.instrument },
              { key: 'number', head: 'Version', isNumber: true, cell: (row) => row.number },
              {
                key: 'columns',
                head: 'Columns',
                cell: (row) => (
                  <Fold
                    label={`${row.specification.columns.filter((column) => column.meaning !== 'ignore').length} read of ${row.specification.columns.length}`}
                  >
                    <DataTable
                      caption={`Columns of ${row.instrument}, version ${row.number}`}
                      rows={row.specification.columns}
                      rowKey={(column) => String(column.index)}
                      columns={[
                        { key: 'header', head: 'In the file', isRowHead: true, cell: (column) => column.header },
                        { key: 'meaning', head: 'Meaning', cell: (column) => column.meaning.replaceAll('-', ' ') },
                        { key: 'unit', head: 'Unit', cell: (column) => column.unit },
                        { key: 'species', head: 'Species', cell: (column) => column.species ?? '' },
                      ]}
                    />
                  </Fold>
                ),
              },
              { key: 'at', head: 'Made', cell: (row) => <Moment at={row.createdAt} /> },
            ]}
          />
        )}
      </PageBody>
    </>
  )
}
