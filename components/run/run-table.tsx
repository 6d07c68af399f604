import { type Route } from 'next'
import Link from 'next/link'
import { DataTable } from '@/components/ui/data-table'
import { Moment } from '@/components/ui/moment'
import { Tag, type TagKind } from '@/components/ui/tag'
import { type RunSummary } from '@/lib/domain/run'

function stateTag(run: RunSummary): { kind: TagKind; words: string } {
  if (run.decision === 'counts') return { kind: 'sound', words: 'counts' }
  if (run.decision === 'repeat') return { kind: 'doubt', words: 'repeat' }
  if (run.decision === 'set-aside') return { kind: 'plain', words: 'set aside' }
  return { kind: 'plain', words: run.state.replace('-', ' ') }
}

/** Runs, one a row. */
export function RunTable({ runs, hasCampaign }: { runs: readonly RunSummary[]; hasCampaign: boolean }) {
  return (
    <DataTable
      caption="Runs"
      rows={runs}
      rowKey={(run) => run.id}
      empty="No run has been logged yet."
      columns={[
        {
          key: 'code',
          head: 'Run',
          isRowHead: true,
          cell: (run) => (
            <Link href={`/runs/${run.id}` as Route} className="inline-block min-h-6 font-semibold touch:min-h-11">
              {run.code}
            </Link>
          ),
        },
        ...(hasCampaign
          ? [
              {
                key: 'campaign',
                head: 'Campaign',
                cell: (run: RunSummary) => (
                  <Link href={`/campaigns/${run.campaignId}` as Route}>{run.campaignCode}</Link>
                ),
              },
            ]
          : []),
        {
          key: 'sample',
          head: 'Sample',
          cell: (run) => (
            <>
              {run.sampleCode} <span className="text-ink-3">{run.sampleName}</span>
            </>
          ),
        },
        { key: 'kind', head: 'Kind', cell: (run) => run.kind },
        { key: 'rig', head: 'Rig', cell: (run) => `${run.rigCode}, ${run.channel}` },
        { key: 'loading', head: 'Loading', cell: (run) => run.loadingCode },
        { key: 'started', head: 'Started', cell: (run) => <Moment at={run.startedAt} /> },
        { key: 'files', head: 'Files', isNumber: true, cell: (run) => run.fileCount },
        {
          key: 'state',
          head: 'State',
          cell: (run) => {
            const tag = stateTag(run)
            return <Tag kind={tag.kind}>{tag.words}</Tag>
          },
        },
        { key: 'by', head: 'Logged by', cell: (run) => run.createdByName },
      ]}
    />
  )
}
