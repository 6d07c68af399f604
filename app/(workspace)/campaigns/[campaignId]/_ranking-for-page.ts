import 'server-only'
import { dehydrate, QueryClient, type DehydratedState } from '@tanstack/react-query'
import { rankingViewFromParams } from '@/components/campaign/ranking-view-params'
import { rankingKeys } from '@/components/server-state/ranking'
import { getRanking } from '@/lib/access/results'
import { type Actor } from '@/lib/domain/role'

type SearchParams = Readonly<Record<string, string | string[] | undefined>>

/** The ranking that the address asks for, under the key that the page's parts look for. */
export async function rankingForPage(
  actor: Actor,
  campaignId: string,
  searchParams: SearchParams,
): Promise<DehydratedState> {
  const view = rankingViewFromParams({
    get: (name) => {
      const value = searchParams[name]
      return typeof value === 'string' ? value : null
    },
  })
  const ranking = await getRanking(actor, campaignId, {
    includeProvisional: view.includeProvisional,
    ...(view.referenceTemperatureK === null ? {} : { referenceTemperatureK: view.referenceTemperatureK }),
  })
  const client = new QueryClient()
  client.setQueryData(rankingKeys.view(campaignId, view), ranking)
  return dehydrate(client)
}
