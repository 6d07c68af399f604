import { showOrNotFound } from '@/app/_show-or-not-found'
import { actionWords } from '@/components/campaign/action-words'
import { DataTable } from '@/components/ui/data-table'
import { Moment } from '@/components/ui/moment'
import { PageBody } from '@/components/ui/page-body'
import { Section } from '@/components/ui/section'
import { requireActor } from '@/lib/access/actor'
import { listHistory } from '@/lib/access/history'

export const metadata = { title: 'History' }

function changeText(before: unknown, after: unknown): string {
  const text = (value: unknown) =>
    value === null || value === undefined
      ? ''
      : typeof value === 'object'
        ? Object.entries(value)
            .map(([name, entry]) => `${name} ${typeof entry === 'object' ? JSON.stringify(entry) : String(entry)}`)
            .join(', ')
        : String(value)
  const [was, is] = [text(before), text(after)]
  return was === '' ? is : is === '' ? `was ${was}` : `${was} → ${is}`
}

export default async function HistoryPage({ params }: { params: Promise<{ campaignId: string }> }) {
  const actor = await requireActor()
  const { campaignId } = await params
  const entries = await showOrNotFound(listHistory(actor, campaignId))
  return (
    <PageBody>
      <Section
        title="History"
        note="Written in the same transaction as each change; the database refuses to alter or delete an entry."
      >
        <DataTable
          caption="History of the campaign, latest first"
          rows={entries}
          rowKey={(row) => String(row.seq)}
          columns={[
            { key: 'at', head: 'When', className: 'whitespace-nowrap', cell: (row) => <Moment at={row.at} /> },
            { key: 'who', head: 'Who', isRowHead: true, cell: (row) => row.actorName },
            { key: 'what', head: 'What', className: 'whitespace-nowrap', cell: (row) => actionWords(row.action) },
            {
              key: 'change',
              head: 'Change',
              cell: (row) => (
                <span className="line-clamp-2 max-w-[60ch] break-words text-[13px] text-ink-2">
                  {changeText(row.before, row.after)}
                </span>
              ),
            },
            { key: 'why', head: 'Why', cell: (row) => row.reason },
          ]}
        />
      </Section>
    </PageBody>
  )
}
