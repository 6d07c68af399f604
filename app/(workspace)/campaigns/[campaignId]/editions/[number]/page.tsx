import { type Metadata } from 'next'
import { notFound } from 'next/navigation'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { EditionTable } from '@/components/edition/edition-table'
import { WithdrawButton } from '@/components/edition/withdraw-button'
import { DataTable } from '@/components/ui/data-table'
import { Facts } from '@/components/ui/facts'
import { Moment } from '@/components/ui/moment'
import { Notice } from '@/components/ui/notice'
import { PageBody } from '@/components/ui/page-body'
import { Section } from '@/components/ui/section'
import { requireActor } from '@/lib/access/actor'
import { getEdition } from '@/lib/access/editions'
import { can } from '@/lib/policy/can'
import { withdrawAction } from '../actions'

interface Props {
  readonly params: Promise<{ campaignId: string; number: string }>
}

async function editionOf({ params }: Props) {
  const actor = await requireActor()
  const { campaignId, number } = await params
  if (!/^[1-9]\d{0,6}$/.test(number)) notFound()
  return { actor, edition: await showOrNotFound(getEdition(actor, campaignId, Number(number))) }
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { edition } = await editionOf(props)
  return { title: `${edition.content.ranking.campaignCode}, edition ${String(edition.number)}` }
}

export default async function EditionPage(props: Props) {
  const { actor, edition } = await editionOf(props)
  const { ranking, runs, laboratory } = edition.content
  const api = `/api/v1/campaigns/${edition.campaignId}/editions/${String(edition.number)}`
  return (
    <PageBody>
      <Section
        title={`${ranking.campaignName}, edition ${String(edition.number)}`}
        note={`${laboratory === '' ? '' : `${laboratory}. `}Numbers with half of their ${String(Math.round(ranking.confidenceLevel * 1000) / 10)} % interval.`}
        actions={
          <span className="flex flex-wrap items-center gap-3">
            <a href={`${api}/ranking.csv`}>CSV</a>
            <a href={`${api}/ranking.xlsx`}>XLSX</a>
            <a href={api}>JSON</a>
            {edition.withdrawnAt === null && can.publish(actor, edition.campaignId) ? (
              <WithdrawButton
                number={edition.number}
                withdraw={withdrawAction.bind(null, edition.campaignId, edition.number)}
              />
            ) : null}
          </span>
        }
      >
        {edition.withdrawnAt === null ? null : (
          <Notice kind="fault" className="mb-3" title="Withdrawn.">
            <Moment at={edition.withdrawnAt} />, {edition.withdrawnByName}: {edition.withdrawnReason}
          </Notice>
        )}
        {edition.isIntact ? null : (
          <Notice kind="fault" className="mb-3" title="The content does not have the hash it was published under.">
            Something outside the product changed it. Rely on nothing below, and tell an admin.
          </Notice>
        )}
        <EditionTable ranking={ranking} caption={`Ranking of edition ${String(edition.number)}`} />
        <p className="max-w-prose text-[13px] text-ink-2">{ranking.summary}</p>
      </Section>
      <Section title="How it stands">
        <Facts
          items={[
            { label: 'Published', value: <Moment at={edition.publishedAt} /> },
            { label: 'Signed by', value: edition.publishedByName },
            { label: 'The signature means', value: edition.statement },
            { label: 'Method', value: String(edition.methodNumber) },
            {
              label: 'Ranked by',
              value: `${ranking.rankedBy === 'rate' ? 'rate' : 'turnover frequency'} at ${(ranking.referenceTemperatureK - 273.15).toFixed(1)} °C`,
            },
            { label: 'Draws and seed', value: `${ranking.draws.toLocaleString('en')}, ${String(ranking.seed)}` },
            { label: 'Engine', value: edition.engineId },
            {
              label: 'SHA-256 of the content',
              value: (
                <>
                  <code className="break-all">{edition.contentSha256}</code>
                  {edition.isIntact ? ' (it still has it)' : null}
                </>
              ),
            },
          ]}
        />
      </Section>
      <Section title="Rests on" note="The decided runs and the bytes of their files.">
        <DataTable
          caption="Runs and files of the edition"
          rows={runs.flatMap((run) =>
            (run.files.length === 0 ? [null] : run.files).map((file, index) => ({ run, file, index })),
          )}
          rowKey={({ run, index }) => `${run.runId} ${String(index)}`}
          columns={[
            { key: 'run', head: 'Run', isRowHead: true, cell: ({ run }) => run.runCode },
            { key: 'sample', head: 'Sample', cell: ({ run }) => run.sampleCode },
            { key: 'decision', head: 'Decision', cell: ({ run }) => run.decision.replace('-', ' ') },
            { key: 'why', head: 'Why', cell: ({ run }) => run.decisionReason },
            { key: 'file', head: 'File', cell: ({ file }) => file?.fileName ?? '' },
            {
              key: 'hash',
              head: 'SHA-256',
              cell: ({ file }) => <code className="text-[12px] break-all">{file?.sha256 ?? ''}</code>,
            },
          ]}
        />
      </Section>
    </PageBody>
  )
}
