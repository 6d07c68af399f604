import { type ReactNode, Suspense } from 'react'
import { routeOf } from '@/app/_route-of'
import { CampaignRuler } from '@/components/campaign/campaign-ruler'
import { QueryProvider } from '@/components/server-state/query-provider'
import { PageHead } from '@/components/ui/page-head'
import { TabLinks } from '@/components/ui/tab-links'
import { requireActor } from '@/lib/access/actor'
import { getCampaign } from '@/lib/access/campaigns'
import { type CampaignSummary } from '@/lib/domain/campaign'
import { appErrorOf } from '@/lib/domain/errors'
import { type Actor } from '@/lib/domain/role'
import { can } from '@/lib/policy/can'

interface CampaignLayoutProps {
  readonly children: ReactNode
  readonly params: Promise<{ campaignId: string }>
}

const counted = (count: number, one: string, many = `${one}s`) => `${count} ${count === 1 ? one : many}`

function metaOf(campaign: CampaignSummary): string {
  return [
    campaign.laboratory,
    campaign.methodNumber === null ? '' : `method ${campaign.methodNumber}`,
    `${counted(campaign.sampleCount, 'sample')}, ${counted(campaign.runCount, 'run')}${
      campaign.waitingCount > 0 ? `, ${campaign.waitingCount} waiting for a decision` : ''
    }`,
    campaign.closedAt === null ? '' : 'closed',
  ]
    .filter((part) => part !== '')
    .join(' · ')
}

function tabsOf(actor: Actor, campaignId: string) {
  const base = `/campaigns/${campaignId}`
  return [
    { href: routeOf(base), label: 'Ranking' },
    { href: routeOf(`${base}/slopes`), label: 'Slopes' },
    { href: routeOf(`${base}/runs`), label: 'Runs' },
    { href: routeOf(`${base}/editions`), label: 'Editions' },
    { href: routeOf(`${base}/method`), label: 'Method' },
    { href: routeOf(`${base}/people`), label: 'People' },
    ...(can.readHistory(actor, campaignId) ? [{ href: routeOf(`${base}/history`), label: 'History' }] : []),
  ]
}

/** Null for somebody who does not work in the campaign: the page below says what they see instead. */
async function campaignFor(actor: Actor, campaignId: string): Promise<CampaignSummary | null> {
  try {
    return await getCampaign(actor, campaignId)
  } catch (error) {
    if (appErrorOf(error)?.code === 'not-found') return null
    throw error
  }
}

/** Title, ruler and tabs of one campaign. It guards nothing: each page asks for its own rights. */
export default async function CampaignLayout({ children, params }: CampaignLayoutProps) {
  const actor = await requireActor()
  const { campaignId } = await params
  const campaign = await campaignFor(actor, campaignId)
  if (campaign === null) return children
  return (
    <QueryProvider>
      <PageHead title={campaign.name} meta={metaOf(campaign)} />
      <div className="px-4 sm:px-6">
        <Suspense fallback={<div className="h-[62px]" />}>
          <CampaignRuler campaignId={campaignId} />
        </Suspense>
      </div>
      <TabLinks label="Campaign" items={tabsOf(actor, campaignId)} />
      {children}
    </QueryProvider>
  )
}
