'use client'

import { useQuery } from '@tanstack/react-query'
import { useMemo, useState } from 'react'
import { type Working } from '@/lib/analysis/working'
import { ArrheniusChart } from '@/components/charts/arrhenius-chart'
import { SampleSymbolMark } from '@/components/charts/sample-symbol-mark'
import { temperWindow } from '@/components/charts/temper-scale'
import { rankingGridRows } from '@/components/grids/ranking-grid-row'
import { FitTable } from '@/components/run/fit-table'
import { rankingQuery } from '@/components/server-state/ranking'
import { WorkingPanel } from '@/components/working/working-panel'
import { arrheniusSeries, namedFits, type PlottedQuantity } from './arrhenius-series'
import { Comparison } from './comparison'
import { SlopePairs } from './slope-pairs'
import { useRankingView } from './use-ranking-view'

const quantities: readonly { readonly value: PlottedQuantity; readonly label: string }[] = [
  { value: 'rate', label: 'rate per gram' },
  { value: 'turnover-frequency', label: 'turnover frequency' },
]

/** The lines of a campaign's samples: the plot, what each rests on, and two of them compared. */
export function SlopesWorkspace({ campaignId }: { campaignId: string }) {
  const [view] = useRankingView()
  const { data: ranking, error } = useQuery(rankingQuery(campaignId, view))
  const [quantity, setQuantity] = useState<PlottedQuantity>('rate')
  const [hidden, setHidden] = useState<readonly string[]>([])
  const [working, setWorking] = useState<Working | null>(null)
  const rows = useMemo(
    () => (ranking ? rankingGridRows(ranking.rows).filter((entry) => entry.row.fit !== null) : []),
    [ranking],
  )
  const window = useMemo(
    () => temperWindow(ranking ? [...ranking.holdTemperaturesK, ranking.referenceTemperatureK] : []),
    [ranking],
  )
  const shownIds = useMemo(
    () => rows.map((entry) => entry.row.sampleId).filter((id) => !hidden.includes(id)),
    [rows, hidden],
  )
  const series = useMemo(() => arrheniusSeries(rows, shownIds, quantity), [rows, shownIds, quantity])
  const fits = useMemo(
    () => rows.flatMap(({ row }) => (shownIds.includes(row.sampleId) ? namedFits(row) : [])),
    [rows, shownIds],
  )
  const ranked = useMemo(() => rows.map((entry) => entry.row), [rows])
  if (!ranking) {
    return (
      <p className="px-4 py-6 sm:px-6" role={error ? 'alert' : 'status'}>
        {error ? `The lines could not be fetched: ${error.message}` : 'Fitting the lines…'}
      </p>
    )
  }
  if (rows.length === 0) {
    return (
      <div className="max-w-prose px-4 py-8 sm:px-6">
        <h2>No line yet</h2>
        <p className="text-ink-2">A sample has a line once a run of it has points at two temperatures or more.</p>
      </div>
    )
  }
  const toggle = (sampleId: string) =>
    setHidden(hidden.includes(sampleId) ? hidden.filter((id) => id !== sampleId) : [...hidden, sampleId])
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] xl:grid-cols-[minmax(0,1fr)_380px]">
      <div className="min-w-0 px-4 py-3 sm:px-6">
        <fieldset className="m-0 flex flex-wrap gap-x-4 gap-y-1 border-0 p-0 print:hidden">
          <legend className="sr-only">Samples in the plot</legend>
          {rows.map((entry) => (
            <label key={entry.row.sampleId} className="flex min-h-6 items-center gap-1.5 touch:min-h-11">
              <input
                type="checkbox"
                className="size-4 accent-accent"
                checked={!hidden.includes(entry.row.sampleId)}
                onChange={() => toggle(entry.row.sampleId)}
              />
              <SampleSymbolMark symbol={entry.symbol} />
              {entry.row.sampleCode}
            </label>
          ))}
        </fieldset>
        <fieldset className="m-0 mt-1 flex flex-wrap gap-x-4 border-0 p-0 print:hidden">
          <legend className="sr-only">Quantity</legend>
          {quantities.map((choice) => (
            <label key={choice.value} className="flex min-h-6 items-center gap-1.5 touch:min-h-11">
              <input
                type="radio"
                name="quantity"
                className="accent-accent"
                checked={quantity === choice.value}
                onChange={() => setQuantity(choice.value)}
              />
              {choice.label}
            </label>
          ))}
        </fieldset>
        <div className="mt-2">
          {series.length === 0 ? (
            <p className="text-ink-2">
              {quantity === 'turnover-frequency' && shownIds.length > 0
                ? 'None of the selected samples has a site count, so there is no turnover frequency to draw.'
                : 'No sample is selected. Tick one above and its line is drawn here.'}
            </p>
          ) : (
            <ArrheniusChart
              series={series}
              window={window}
              quantity={quantity}
              referenceTemperatureK={ranking.referenceTemperatureK}
            />
          )}
        </div>
        <h2 className="mt-5 mb-0">Lines</h2>
        <FitTable caption="Arrhenius lines" fits={fits} onOpen={(fit, key) => setWorking(fit.workings[key] ?? null)} />
        <h2 className="mt-5 mb-1">Compare two samples</h2>
        <Comparison ranking={ranking} rows={ranked} />
        <h2 className="mt-5 mb-1">All pairs</h2>
        <SlopePairs rows={ranked} confidenceLevel={ranking.confidenceLevel} />
      </div>
      <aside aria-label="Working" className="min-w-0 border-line px-4 py-3.5 max-xl:border-t sm:px-5 xl:border-l">
        {working ? (
          <WorkingPanel working={working} takesFocus onClose={() => setWorking(null)} />
        ) : (
          <p className="m-0 text-ink-3">Pick an activation energy or ln A in the table to see how it came about.</p>
        )}
      </aside>
    </div>
  )
}
