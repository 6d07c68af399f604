import { notFound } from 'next/navigation'
import { RigForm } from '@/components/forms/rig-form'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { can } from '@/lib/policy/can'
import { createRigAction } from '../actions'

export const metadata = { title: 'New rig' }

export default async function NewRigPage() {
  const actor = await requireActor()
  if (!can.manageRigs(actor)) notFound()
  return (
    <>
      <PageHead title="New rig" />
      <PageBody isNarrow>
        <RigForm rig={null} action={createRigAction} />
      </PageBody>
    </>
  )
}
