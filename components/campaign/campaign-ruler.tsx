'use client'

import { useQuery } from '@tanstack/react-query'
import { usePathname } from 'next/navigation'
import { useMemo, useSyncExternalStore } from 'react'
import { Ruler } from '@/components/charts/ruler'
import { temperWindow } from '@/components/charts/temper-scale'
import { rankingQuery } from '@/components/server-state/ranking'
import { useRankingView } from './use-ranking-view'

const neverChanges = () => () => {}
const room = <div className="h-[62px]" />

/**
 * The ruler under the campaign's title, on every one of its pages; the reference can be moved where something follows it.
 * It asks for the ranking only once the page below has brought its own: a question asked before would keep that answer out.
 */
export function CampaignRuler({ campaignId }: { campaignId: string }) {
  const isInBrowser = useSyncExternalStore(
    neverChanges,
    () => true,
    () => false,
  )
  return isInBrowser ? <RulerOfRanking campaignId={campaignId} /> : room
}

function RulerOfRanking({ campaignId }: { campaignId: string }) {
  const [view, setView] = useRankingView()
  const path = usePathname()
  const { data } = useQuery(rankingQuery(campaignId, view))
  const window = useMemo(
    () => temperWindow(data ? [...data.holdTemperaturesK, data.referenceTemperatureK] : []),
    [data],
  )
  const follows = path.endsWith(`/campaigns/${campaignId}`) || path.endsWith('/slopes')
  if (!data) return room
  if (data.holdTemperaturesK.length === 0) return null
  const own = data.methodReferenceTemperatureK ?? null
  return (
    <Ruler
      window={window}
      holdTemperaturesK={data.holdTemperaturesK}
      referenceTemperatureK={view.referenceTemperatureK ?? data.referenceTemperatureK}
      {...(follows
        ? {
            onReferenceChange: (temperatureK: number) =>
              setView({
                ...view,
                referenceTemperatureK: own !== null && Math.abs(temperatureK - own) < 0.005 ? null : temperatureK,
              }),
          }
        : {})}
    />
  )
}
