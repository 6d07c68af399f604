'use client'

import { useQuery } from '@tanstack/react-query'
import { usePathname } from 'next/navigation'
import { useMemo, useSyncExternalStore } from 'react'
import { Ruler } from '@/components/charts/ruler'
import { temperWindow } from '@/components/charts/temper-scale'
import { rankingQuery } from '@/components/server-state/ranking'
import { useRankingView } from './use-ranking-view'

const neverChanges = () => () => {}

/** The ruler under the campaign's title, on every one of its pages; the reference can be moved where something follows it. */
export function CampaignRuler({ campaignId }: { campaignId: string }) {
  const [view, setView] = useRankingView()
  const path = usePathname()
  const { data } = useQuery(rankingQuery(campaignId, view))
  // the layout is rendered before the page below has brought the ranking; the first pass in the browser must look the same
  const isInBrowser = useSyncExternalStore(
    neverChanges,
    () => true,
    () => false,
  )
  const window = useMemo(
    () => temperWindow(data ? [...data.holdTemperaturesK, data.referenceTemperatureK] : []),
    [data],
  )
  const follows = path.endsWith(`/campaigns/${campaignId}`) || path.endsWith('/slopes')
  if (!data || !isInBrowser) return <div className="h-[62px]" />
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
