import { DataTable } from '@/components/ui/data-table'
import { Tag } from '@/components/ui/tag'
import { type Problem } from '@/lib/domain/intake'

const SHOWN = 200

/** Faults of a file by row and column, with what was expected. */
export function ProblemList({ problems }: { readonly problems: readonly Problem[] }) {
  if (problems.length === 0) return <p className="m-0 text-ink-2">No problems: every row was read.</p>
  return (
    <>
      <DataTable
        caption="Problems by row and column"
        rows={problems.slice(0, SHOWN)}
        rowKey={(row) => `${row.code} ${row.line ?? ''} ${row.column ?? ''} ${row.found} ${row.sentence}`}
        columns={[
          { key: 'line', head: 'Row', isNumber: true, cell: (row) => row.line ?? 'file' },
          { key: 'column', head: 'Column', cell: (row) => row.column ?? '' },
          { key: 'found', head: 'Found', cell: (row) => <span className="break-all">{row.found}</span> },
          { key: 'expected', head: 'Expected', cell: (row) => row.expected },
          {
            key: 'sentence',
            head: 'What to do',
            isRowHead: true,
            cell: (row) => (
              <>
                <Tag kind={row.severity === 'fatal' ? 'fault' : row.severity === 'problem' ? 'doubt' : 'plain'}>
                  {row.severity === 'fatal' ? 'stops the reading' : row.severity}
                </Tag>{' '}
                {row.sentence}
              </>
            ),
          },
        ]}
      />
      {problems.length > SHOWN ? (
        <p className="text-ink-2">
          {SHOWN} of {problems.length} are shown; the rest are of the same kinds.
        </p>
      ) : null}
    </>
  )
}
