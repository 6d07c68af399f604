import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { type Ranking } from '@/lib/domain/ranking'
import { fetchJson } from './fetch-json'

/** How a ranking is asked for. */
export interface RankingView {
  /** null for the method's own */
  readonly referenceTemperatureK: number | null
  readonly includeProvisional: boolean
}

export const rankingKeys = {
  campaign: (campaignId: string) => ['ranking', campaignId] as const,
  view: (campaignId: string, view: RankingView) =>
    [...rankingKeys.campaign(campaignId), view.referenceTemperatureK, view.includeProvisional] as const,
}

/** Query string of a view, for the data and for the downloads. */
export function rankingQueryString(view: RankingView): string {
  const parameters = new URLSearchParams()
  if (view.referenceTemperatureK !== null) parameters.set('referenceTemperatureK', String(view.referenceTemperatureK))
  parameters.set('provisional', view.includeProvisional ? '1' : '0')
  return parameters.toString()
}

/** The live ranking of a campaign. The last one stays on screen while another view is fetched. */
export function rankingQuery(campaignId: string, view: RankingView) {
  return queryOptions({
    queryKey: rankingKeys.view(campaignId, view),
    queryFn: ({ signal }) =>
      fetchJson<Ranking>(
        `/api/v1/campaigns/${encodeURIComponent(campaignId)}/ranking?${rankingQueryString(view)}`,
        signal,
      ),
    placeholderData: keepPreviousData,
    staleTime: 15_000,
  })
}
