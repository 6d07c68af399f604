import { HydrationBoundary } from '@tanstack/react-query'
import { type Metadata } from 'next'
import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { RANKING_COLUMNS_PREFERENCE } from '@/components/campaign/ranking-columns-preference'
import { RankingWorkspace } from '@/components/campaign/ranking-workspace'
import { requireActor } from '@/lib/access/actor'
import { getCampaign } from '@/lib/access/campaigns'
import { getPreference } from '@/lib/access/preferences'
import { type Actor } from '@/lib/domain/role'
import { can } from '@/lib/policy/can'
import { rankingForPage } from './_ranking-for-page'
import { changeCampaignSampleAction } from './actions'

interface RankingPageProps {
  readonly params: Promise<{ campaignId: string }>
  readonly searchParams: Promise<Record<string, string | string[] | undefined>>
}

/** A guest reads editions, and this is where their link to the campaign leads. */
function sendGuestOn(actor: Actor, campaignId: string): void {
  if (!can.readCampaign(actor, campaignId) && can.readEditions(actor, campaignId))
    redirect(routeOf(`/campaigns/${campaignId}/editions`))
}

export async function generateMetadata({ params }: RankingPageProps): Promise<Metadata> {
  const actor = await requireActor()
  const { campaignId } = await params
  sendGuestOn(actor, campaignId)
  const campaign = await showOrNotFound(getCampaign(actor, campaignId))
  return { title: campaign.name }
}

export default async function RankingPage({ params, searchParams }: RankingPageProps) {
  const actor = await requireActor()
  const { campaignId } = await params
  sendGuestOn(actor, campaignId)
  const [state, saved] = await showOrNotFound(
    Promise.all([
      rankingForPage(actor, campaignId, await searchParams),
      getPreference(actor, RANKING_COLUMNS_PREFERENCE),
    ]),
  )
  return (
    <HydrationBoundary state={state}>
      <RankingWorkspace
        campaignId={campaignId}
        permissions={{
          canRemark: can.remark(actor, campaignId),
          canShortlist: can.shortlist(actor, campaignId),
          canDecide: can.decide(actor, campaignId),
        }}
        savedState={saved}
        changeCell={changeCampaignSampleAction}
      />
    </HydrationBoundary>
  )
}
