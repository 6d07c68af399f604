import { notFound } from 'next/navigation'
import { ReactionForm } from '@/components/forms/reaction-form'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { can } from '@/lib/policy/can'
import { createReactionAction } from '../actions'

export const metadata = { title: 'New reaction' }

export default async function NewReactionPage() {
  const actor = await requireActor()
  if (!can.makeReaction(actor)) notFound()
  return (
    <>
      <PageHead title="New reaction" />
      <PageBody isNarrow>
        <ReactionForm reaction={null} action={createReactionAction} />
      </PageBody>
    </>
  )
}
