import { showOrNotFound } from '@/app/_show-or-not-found'
import { EditionTable } from '@/components/edition/edition-table'
import { EditionsTable } from '@/components/edition/editions-table'
import { PasswordField } from '@/components/forms/password-field'
import { ActionForm } from '@/components/ui/action-form'
import { DataTable } from '@/components/ui/data-table'
import { Fold } from '@/components/ui/fold'
import { Notice } from '@/components/ui/notice'
import { PageBody } from '@/components/ui/page-body'
import { Section } from '@/components/ui/section'
import { TextArea } from '@/components/ui/text-area'
import { requireActor } from '@/lib/access/actor'
import { listEditions, proposeEdition } from '@/lib/access/editions'
import { type EditionProposal } from '@/lib/domain/edition'
import { can } from '@/lib/policy/can'
import { publishAction } from './actions'

export const metadata = { title: 'Editions' }

function Proposal({ campaignId, proposal }: { campaignId: string; proposal: EditionProposal }) {
  const ranked = proposal.ranking.rows.filter((row) => row.rank !== null).length
  return (
    <Section
      title={`Publish edition ${String(proposal.number)}`}
      note="Publishing freezes the table below with its method, its workings and the bytes it rests on. It is never changed; a correction is the next edition."
    >
      {proposal.refusal !== '' ? (
        <Notice>{proposal.refusal}</Notice>
      ) : (
        <>
          <p className="mt-0">
            {ranked} {ranked === 1 ? 'sample' : 'samples'} ranked from {proposal.runs.length} decided{' '}
            {proposal.runs.length === 1 ? 'run' : 'runs'} under method {proposal.ranking.methodNumber}. Remarks and
            shortlist marks go with the table. Guests of the campaign can read and download it.
          </p>
          {proposal.leftOut.length === 0 ? null : (
            <Fold label={`${String(proposal.leftOut.length)} runs are not in it`}>
              <DataTable
                caption="Runs that are not in the edition"
                rows={proposal.leftOut}
                rowKey={(row) => row.runCode}
                columns={[
                  { key: 'run', head: 'Run', isRowHead: true, cell: (row) => row.runCode },
                  { key: 'sample', head: 'Sample', cell: (row) => row.sampleCode },
                  { key: 'why', head: 'Why', cell: (row) => row.reason },
                ]}
              />
            </Fold>
          )}
          <Fold label="The table as it would be frozen">
            <EditionTable ranking={proposal.ranking} caption={`Edition ${String(proposal.number)} as it would be`} />
          </Fold>
          <ActionForm
            action={publishAction.bind(null, { campaignId, contentSha256: proposal.contentSha256 })}
            submitLabel={`Publish edition ${String(proposal.number)}`}
            busyLabel="Publishing"
            className="mt-3 max-w-xl"
          >
            <TextArea
              name="statement"
              label="What your signature means"
              hint="For example: reviewed, and released to the project partners."
              maxLength={1000}
              rows={2}
              required
            />
            <PasswordField name="password" label="Password" autoComplete="current-password" />
          </ActionForm>
        </>
      )}
    </Section>
  )
}

export default async function EditionsPage({ params }: { params: Promise<{ campaignId: string }> }) {
  const actor = await requireActor()
  const { campaignId } = await params
  const editions = await showOrNotFound(listEditions(actor, campaignId))
  const proposal = can.publish(actor, campaignId) ? await showOrNotFound(proposeEdition(actor, campaignId)) : null
  return (
    <PageBody>
      <Section title="Editions" note="Published, frozen, numbered states of the ranking. Each keeps its address.">
        <EditionsTable
          editions={editions}
          caption="Editions of the campaign, newest first"
          empty="None has been published yet."
        />
      </Section>
      {proposal === null ? null : <Proposal campaignId={campaignId} proposal={proposal} />}
    </PageBody>
  )
}
