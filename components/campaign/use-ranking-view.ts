'use client'

import { useSearchParams } from 'next/navigation'
import { useCallback, useMemo } from 'react'
import { type RankingView } from '@/components/server-state/ranking'
import { paramsWithRankingView, rankingViewFromParams } from './ranking-view-params'

/** The view in the address, and a way to change it without asking the server for the page again. */
export function useRankingView(): readonly [RankingView, (view: RankingView) => void] {
  const parameters = useSearchParams()
  const view = useMemo(() => rankingViewFromParams(parameters), [parameters])
  const setView = useCallback(
    (next: RankingView) => {
      const query = paramsWithRankingView(new URLSearchParams(parameters), next).toString()
      window.history.replaceState(null, '', query === '' ? window.location.pathname : `?${query}`)
    },
    [parameters],
  )
  return [view, setView]
}
