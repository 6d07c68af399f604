import Link from 'next/link'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { DataTable } from '@/components/ui/data-table'
import { EmptyState } from '@/components/ui/empty-state'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listReactions } from '@/lib/access/reactions'
import { equationText } from '@/lib/domain/read-equation'
import { speciesText } from '@/lib/domain/species-text'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Reactions' }

export default async function ReactionsPage() {
  const actor = await requireActor()
  const reactions = await showOrNotFound(listReactions(actor))
  const add = can.makeReaction(actor) ? (
    <LinkButton href="/reactions/new" kind={reactions.length === 0 ? 'main' : 'plain'}>
      New reaction
    </LinkButton>
  ) : null
  return (
    <>
      <PageHead
        title="Reactions"
        meta="Stoichiometry and key reactant: what conversion and selectivity mean."
        actions={reactions.length === 0 ? null : add}
      />
      <PageBody>
        {reactions.length === 0 ? (
          <EmptyState title="No reaction yet" action={add}>
            {can.makeReaction(actor)
              ? 'Write the reaction that your samples are tested in, side reactions included. Everything else builds on it.'
              : 'A researcher, lead or admin writes the first one.'}
          </EmptyState>
        ) : (
          <DataTable
            caption="Reactions"
            rows={reactions}
            rowKey={(row) => row.id}
            columns={[
              {
                key: 'code',
                head: 'Code',
                isRowHead: true,
                cell: (row) => <Link href={`/reactions/${row.id}`}>{row.code}</Link>,
              },
              { key: 'name', head: 'Name', cell: (row) => row.name },
              { key: 'key', head: 'Key reactant', cell: (row) => speciesText(row.keyReactant) },
              {
                key: 'steps',
                head: 'Steps',
                cell: (row) => (
                  <ol>
                    {row.steps.map((step, position) => (
                      <li key={position}>{equationText(step)}</li>
                    ))}
                  </ol>
                ),
              },
            ]}
          />
        )}
      </PageBody>
    </>
  )
}
