'use client'

import { useQuery } from '@tanstack/react-query'
import { savedGridState, type SavedGridState } from '@/components/grids/saved-grid-state'
import Link from 'next/link'
import { type Route } from 'next'
import { useCallback, useMemo, useRef, useState } from 'react'
import { type Working } from '@/lib/analysis/working'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { ArrheniusChart } from '@/components/charts/arrhenius-chart'
import { temperWindow } from '@/components/charts/temper-scale'
import { RankingGrid } from '@/components/grids/ranking-grid-loader'
import { type RankingPermissions } from '@/components/grids/ranking-columns'
import { rankingGridRows } from '@/components/grids/ranking-grid-row'
import { formatFixed } from '@/components/numbers/format-fixed'
import { rankingKeys, rankingQuery, rankingQueryString } from '@/components/server-state/ranking'
import { savePreference } from '@/components/server-state/save-preference'
import { useMediaQuery } from '@/components/ui/use-media-query'
import { WorkingPanel } from '@/components/working/working-panel'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { arrheniusSeries } from './arrhenius-series'
import { CellConflict } from './cell-conflict'
import { RANKING_COLUMNS_PREFERENCE } from './ranking-columns-preference'
import { useCellChanges, type ChangeCampaignSample } from './use-cell-changes'
import { useRankingView } from './use-ranking-view'

interface RankingWorkspaceProps {
  readonly campaignId: string
  readonly permissions: RankingPermissions
  /** as stored for this person; read by the grid */
  readonly savedState: unknown
  readonly changeCell: ChangeCampaignSample
}

const FIRST_SHOWN = 4

const isDrawable = (row: RankingRow) => row.fit !== null && row.rank !== null

function basisWords(ranking: Ranking): string {
  const celsius = formatFixed(ranking.referenceTemperatureK - 273.15, 1).replace('.0', '')
  return `${ranking.rankedBy === 'turnover-frequency' ? 'TOF' : 'rate per gram'} at ${celsius} °C`
}

/** The ranking of a campaign: grid on the left, slopes or a working on the right. */
export function RankingWorkspace(props: RankingWorkspaceProps) {
  const { campaignId } = props
  const [view, setView] = useRankingView()
  const { data: ranking, error, isFetching, refetch } = useQuery(rankingQuery(campaignId, view))
  const [chosen, setChosen] = useState<readonly string[] | null>(null)
  const savedState = useMemo(() => savedGridState(props.savedState), [props.savedState])
  const [hasFilterRow, setHasFilterRow] = useState(false)
  const isNarrow = useMediaQuery('(max-width: 760px)')
  const [opened, setOpened] = useState<{ row: RankingRow; working: Working } | null>(null)
  const openedFrom = useRef<Element | null>(null)
  const cells = useCellChanges(campaignId, rankingKeys.view(campaignId, view), props.changeCell)
  const onStateChange = useCallback(
    (state: SavedGridState) => void savePreference(RANKING_COLUMNS_PREFERENCE, state),
    [],
  )

  const rows = useMemo(() => (ranking ? rankingGridRows(ranking.rows) : []), [ranking])
  const window = useMemo(
    () => temperWindow(ranking ? [...ranking.holdTemperaturesK, ranking.referenceTemperatureK] : []),
    [ranking],
  )
  const selected = useMemo(
    () =>
      chosen ??
      rows
        .filter((entry) => isDrawable(entry.row))
        .slice(0, FIRST_SHOWN)
        .map((entry) => entry.row.sampleId),
    [chosen, rows],
  )
  const series = useMemo(() => arrheniusSeries(rows, selected, 'rate'), [rows, selected])

  const closeWorking = () => {
    setOpened(null)
    // back to the cell it was opened from
    if (openedFrom.current instanceof HTMLElement) openedFrom.current.focus()
  }
  if (!ranking && error) {
    const isOwnView = view.referenceTemperatureK === null && view.includeProvisional
    return (
      <div className="max-w-prose px-4 py-6 sm:px-6">
        <Notice kind="fault" isLive title="The ranking could not be fetched.">
          {error.message}
        </Notice>
        <p className="mt-3 mb-0 flex flex-wrap gap-2">
          <Button onClick={() => void refetch()} disabled={isFetching}>
            {isFetching ? 'Trying…' : 'Try again'}
          </Button>
          {isOwnView ? null : (
            <Button onClick={() => setView({ referenceTemperatureK: null, includeProvisional: true })}>
              Back to the campaign’s own view
            </Button>
          )}
        </p>
      </div>
    )
  }
  if (!ranking) {
    return (
      <p className="px-4 py-6 sm:px-6" role="status">
        Computing the ranking…
      </p>
    )
  }
  if (ranking.rows.length === 0) {
    return (
      <div className="max-w-prose px-4 py-8 sm:px-6">
        <h2>Nothing to rank yet</h2>
        <p>
          A sample appears here with its first run. Log a run, add the rig’s log and the analyser’s file, and its
          points, line and place follow by themselves.
        </p>
        <Link href={'/runs/new' as Route} className="text-accent">
          Log a run
        </Link>
      </div>
    )
  }
  const query = rankingQueryString(view)
  const drawableCount = rows.filter((entry) => entry.row.fit !== null).length
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] xl:grid-cols-[minmax(0,1fr)_364px]">
      <section aria-label="Ranking" className="min-w-0 border-line xl:border-r">
        <div className="flex flex-wrap items-center gap-x-4 gap-y-1 px-4 py-2 sm:px-6">
          <span>
            Ranked by <b className="font-semibold">{basisWords(ranking)}</b>, feed composition
          </span>
          <span className="text-[12.5px] text-ink-3">
            {ranking.draws.toLocaleString('en')} draws; ± is half of the {Math.round(ranking.confidenceLevel * 100)} %
            interval
          </span>
          {view.referenceTemperatureK === null ? null : (
            <button
              type="button"
              className="min-h-6 text-[12.5px] text-accent underline"
              onClick={() => setView({ ...view, referenceTemperatureK: null })}
            >
              Back to the method’s temperature
            </button>
          )}
          <span className="ml-auto flex flex-wrap items-center gap-x-4 gap-y-1 text-[12.5px] print:hidden">
            <label className="flex min-h-6 items-center gap-1.5">
              <input
                type="checkbox"
                className="size-4 accent-accent"
                checked={view.includeProvisional}
                onChange={(event) => setView({ ...view, includeProvisional: event.target.checked })}
              />
              with undecided runs
            </label>
            <label className="flex min-h-6 items-center gap-1.5">
              <input
                type="checkbox"
                className="size-4 accent-accent"
                checked={hasFilterRow}
                onChange={(event) => setHasFilterRow(event.target.checked)}
              />
              filters
            </label>
            <span>
              Download{' '}
              <a
                href={`/api/v1/campaigns/${campaignId}/ranking.csv?${query}`}
                download
                className="inline-flex min-h-6 items-center px-0.5"
              >
                CSV
              </a>{' '}
              <a
                href={`/api/v1/campaigns/${campaignId}/ranking.xlsx?${query}`}
                download
                className="inline-flex min-h-6 items-center px-0.5"
              >
                XLSX
              </a>
            </span>
          </span>
        </div>
        <p className="sr-only" role="status">
          {isFetching ? 'The ranking is being recomputed' : `Ranked by ${basisWords(ranking)}`}
        </p>
        {error ? (
          <p role="alert" className="mx-4 my-2 rounded bg-fault-wash px-3 py-2 text-fault sm:mx-6">
            The newest ranking could not be fetched ({error.message}); what is shown was fetched before.
          </p>
        ) : null}
        {cells.trouble ? (
          <CellConflict trouble={cells.trouble} onKeepTheirs={cells.keepTheirs} onWriteMine={cells.writeMine} />
        ) : null}
        <div className={isFetching ? 'opacity-70' : ''}>
          <RankingGrid
            key={isNarrow ? 'narrow' : 'wide'}
            ranking={ranking}
            permissions={props.permissions}
            window={window}
            selectedSampleIds={selected}
            onSelectionChange={setChosen}
            onOpenWorking={(row, working) => {
              openedFrom.current = document.activeElement
              setOpened({ row, working })
            }}
            onChangeCell={cells.change}
            savedState={savedState}
            onStateChange={onStateChange}
            hasFilterRow={hasFilterRow}
            isNarrow={isNarrow}
          />
        </div>
      </section>
      <aside aria-label={opened ? 'Working' : 'Slopes'} className="min-w-0 px-4 pt-2.5 pb-6 xl:px-[18px]">
        {opened ? (
          <>
            <p className="m-0 text-[12.5px] text-ink-3">
              {opened.row.sampleCode}, {opened.row.sampleName}
            </p>
            <WorkingPanel working={opened.working} takesFocus onClose={closeWorking} />
          </>
        ) : (
          <>
            <h2 className="m-0 flex items-baseline gap-2.5">
              Slopes{' '}
              <span className="text-[13px] font-normal text-ink-3">
                {new Set(series.map((entry) => entry.code)).size} of {drawableCount} selected
              </span>
              <Link
                href={`/campaigns/${campaignId}/slopes` as Route}
                className="ml-auto font-ui text-[13px] font-normal"
              >
                Open
              </Link>
            </h2>
            {series.length === 0 ? (
              <p className="text-ink-2">
                {drawableCount === 0
                  ? 'No sample has a line yet.'
                  : 'No sample is selected. Tick one in the table and its line is drawn here.'}
              </p>
            ) : (
              <ArrheniusChart
                series={series}
                window={window}
                quantity="rate"
                isCompact
                referenceTemperatureK={ranking.referenceTemperatureK}
              />
            )}
          </>
        )}
        {ranking.summary === '' ? null : <p className="mt-3 mb-0 rounded bg-well px-3 py-2.5">{ranking.summary}</p>}
      </aside>
    </div>
  )
}
