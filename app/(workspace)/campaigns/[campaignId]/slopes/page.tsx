import { HydrationBoundary } from '@tanstack/react-query'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { SlopesWorkspace } from '@/components/campaign/slopes-workspace'
import { requireActor } from '@/lib/access/actor'
import { rankingForPage } from '../_ranking-for-page'

export const metadata = { title: 'Slopes' }

interface SlopesPageProps {
  readonly params: Promise<{ campaignId: string }>
  readonly searchParams: Promise<Record<string, string | string[] | undefined>>
}

export default async function SlopesPage({ params, searchParams }: SlopesPageProps) {
  const actor = await requireActor()
  const { campaignId } = await params
  const state = await showOrNotFound(rankingForPage(actor, campaignId, await searchParams))
  return (
    <HydrationBoundary state={state}>
      <SlopesWorkspace campaignId={campaignId} />
    </HydrationBoundary>
  )
}
