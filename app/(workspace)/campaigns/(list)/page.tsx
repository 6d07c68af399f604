import { CampaignsTable } from '@/components/campaign/campaigns-table'
import { EmptyState } from '@/components/ui/empty-state'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { requireActor } from '@/lib/access/actor'
import { listCampaigns } from '@/lib/access/campaigns'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Campaigns' }

export default async function CampaignsPage() {
  const actor = await requireActor()
  const campaigns = await listCampaigns(actor)
  const add = can.makeCampaign(actor) ? (
    <LinkButton href="/campaigns/new" kind={campaigns.length === 0 ? 'main' : 'plain'}>
      New campaign
    </LinkButton>
  ) : null
  return (
    <>
      <PageHead title="Campaigns" actions={campaigns.length === 0 ? null : add} />
      <PageBody>
        {campaigns.length === 0 ? (
          <EmptyState title="No campaign that you are a member of" action={add}>
            A campaign compares samples in one reaction under one method. A lead makes it and asks people in.
          </EmptyState>
        ) : (
          <CampaignsTable campaigns={campaigns} caption="Campaigns" />
        )}
      </PageBody>
    </>
  )
}
