import Link from 'next/link'
import { DataTable } from '@/components/ui/data-table'
import { Tag } from '@/components/ui/tag'
import { formatInstant } from '@/lib/domain/format-instant'
import { type RunSummary } from '@/lib/domain/run'

/** State of a run in one word: open, handed in, or what was decided. */
export function RunStateTag({ run }: { readonly run: Pick<RunSummary, 'state' | 'decision'> }) {
  if (run.state === 'open') return <Tag>open</Tag>
  if (run.decision === 'counts') return <Tag kind="sound">counts</Tag>
  if (run.decision === 'repeat') return <Tag kind="doubt">repeat</Tag>
  if (run.decision === 'set-aside') return <Tag kind="fault">set aside</Tag>
  return <Tag kind="doubt">handed in</Tag>
}

/** Runs, newest first, each with its state. */
export function RunsTable({
  runs,
  timeZoneOf,
  empty,
  caption = 'Runs',
}: {
  readonly runs: readonly RunSummary[]
  /** zone of the clock that the run's start is read on */
  readonly timeZoneOf: (run: RunSummary) => string
  readonly empty: string
  readonly caption?: string
}) {
  return (
    <DataTable
      caption={caption}
      rows={runs}
      rowKey={(run) => run.id}
      empty={empty}
      columns={[
        { key: 'code', head: 'Run', isRowHead: true, cell: (run) => <Link href={`/runs/${run.id}`}>{run.code}</Link> },
        { key: 'state', head: 'State', cell: (run) => <RunStateTag run={run} /> },
        {
          key: 'sample',
          head: 'Sample',
          cell: (run) => (
            <>
              <Link href={`/samples/${run.sampleId}`} className="underline underline-offset-2">
                {run.sampleCode}
              </Link>{' '}
              <span className="text-ink-2">{run.kind === 'catalyst' ? run.sampleName : run.kind}</span>
            </>
          ),
        },
        { key: 'rig', head: 'Rig', cell: (run) => `${run.rigCode}, ${run.channel}` },
        {
          key: 'start',
          head: 'Start',
          className: 'whitespace-nowrap',
          cell: (run) => <time dateTime={run.startedAt}>{formatInstant(run.startedAt, timeZoneOf(run))}</time>,
        },
        {
          key: 'campaign',
          head: 'Campaign',
          cell: (run) => <Link href={`/campaigns/${run.campaignId}`}>{run.campaignCode}</Link>,
        },
        { key: 'files', head: 'Files', isNumber: true, cell: (run) => String(run.fileCount) },
        { key: 'by', head: 'Logged by', cell: (run) => run.createdByName },
      ]}
    />
  )
}
