import { notFound } from 'next/navigation'
import { SampleForm } from '@/components/forms/sample-form'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listCampaigns } from '@/lib/access/campaigns'
import { can } from '@/lib/policy/can'
import { createSampleAction } from '../actions'

export const metadata = { title: 'New sample' }

export default async function NewSamplePage() {
  const actor = await requireActor()
  if (!can.addSample(actor)) notFound()
  const campaigns = (await listCampaigns(actor)).filter(
    ({ id, closedAt }) => closedAt === null && can.addSampleToCampaign(actor, id),
  )
  return (
    <>
      <PageHead title="New sample" />
      <PageBody isNarrow>
        <SampleForm sample={null} campaigns={campaigns} action={createSampleAction} />
      </PageBody>
    </>
  )
}
