'use client'

import dynamic from 'next/dynamic'

/** The grid is loaded in the browser only: on the server its library would write a style attribute, which the content policy blocks. */
export const RankingGrid = dynamic(() => import('./ranking-grid').then((module) => module.RankingGrid), {
  ssr: false,
  loading: () => (
    <p role="status" className="px-4 py-6 text-ink-3 sm:px-6">
      Laying out the table…
    </p>
  ),
})
