'use client'

import { useQuery } from '@tanstack/react-query'
import { useMemo, useState } from 'react'
import { ArrheniusChart } from '@/components/charts/arrhenius-chart'
import { temperWindow } from '@/components/charts/temper-scale'
import { rankingGridRows } from '@/components/grids/ranking-grid-row'
import { FitTable } from '@/components/run/fit-table'
import { QueryProvider } from '@/components/server-state/query-provider'
import { rankingQuery } from '@/components/server-state/ranking'
import { WorkingPanel } from '@/components/working/working-panel'
import { type Working } from '@/lib/analysis/working'
import { arrheniusSeries, namedFits } from './arrhenius-series'

interface SampleLinesProps {
  readonly sampleId: string
  readonly campaigns: readonly { readonly id: string; readonly name: string }[]
}

const METHOD_VIEW = { referenceTemperatureK: null, includeProvisional: true }

function LinesInCampaign({
  sampleId,
  campaign,
}: {
  sampleId: string
  campaign: SampleLinesProps['campaigns'][number]
}) {
  const { data: ranking, error } = useQuery(rankingQuery(campaign.id, METHOD_VIEW))
  const [working, setWorking] = useState<Working | null>(null)
  const rows = useMemo(() => (ranking ? rankingGridRows(ranking.rows) : []), [ranking])
  const series = useMemo(() => arrheniusSeries(rows, [sampleId], 'rate'), [rows, sampleId])
  const window = useMemo(() => temperWindow(ranking?.holdTemperaturesK ?? []), [ranking])
  const row = rows.find((entry) => entry.row.sampleId === sampleId)?.row
  if (!ranking)
    return (
      <p role={error ? 'alert' : 'status'} className="text-ink-2">
        {error ? `The lines could not be fetched: ${error.message}` : 'Fitting the lines…'}
      </p>
    )
  const leftOut = row?.runs.filter((run) => !run.isIncluded) ?? []
  const list =
    leftOut.length === 0 ? null : (
      <p className="mt-1 mb-0 text-[12.5px] text-ink-3">
        Not in the line: {leftOut.map((run) => `${run.code}, ${run.reason.replace(/\.$/, '')}`).join('; ')}.
      </p>
    )
  if (!row?.fit)
    return (
      <>
        <p className="m-0 text-ink-2">No line in this campaign yet.</p>
        {list}
      </>
    )
  return (
    <>
      <FitTable
        caption={`Arrhenius lines in ${campaign.name}`}
        fits={namedFits(row)}
        onOpen={(fit, key) => setWorking(fit.workings[key] ?? null)}
      />
      {list}
      <div className="mt-3 grid grid-cols-[minmax(0,1fr)] gap-6 lg:grid-cols-[minmax(0,560px)_minmax(0,1fr)]">
        <ArrheniusChart
          series={series}
          window={window}
          quantity="rate"
          isCompact
          referenceTemperatureK={ranking.referenceTemperatureK}
        />
        {working ? <WorkingPanel working={working} takesFocus onClose={() => setWorking(null)} /> : null}
      </div>
    </>
  )
}

/** Lines of one sample in each campaign it is tested in: run by run, with the value it is ranked by. */
export function SampleLines({ sampleId, campaigns }: SampleLinesProps) {
  return (
    <QueryProvider>
      {campaigns.map((campaign) => (
        <div key={campaign.id}>
          {campaigns.length > 1 ? <h3 className="mt-3 mb-1">{campaign.name}</h3> : null}
          <LinesInCampaign sampleId={sampleId} campaign={campaign} />
        </div>
      ))}
    </QueryProvider>
  )
}
