'use client'

import {
  type CellClickedEvent,
  type CellEditRequestEvent,
  type CellKeyDownEvent,
  type ColDef,
  type FullWidthCellKeyDownEvent,
  type GridApi,
  type GridState,
  type RowSelectionOptions,
  type SelectionChangedEvent,
  type StateUpdatedEvent,
} from 'ag-grid-community'
import { AgGridReact } from 'ag-grid-react'
import { useMemo, useRef, useState } from 'react'
import { type TemperWindow } from '@/components/charts/temper-scale'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { type Working } from '@/lib/analysis/working'
import { BeyondView, farColumnsOf, noFarColumns } from './beyond-view'
import { GridProvider, gridTheme } from './grid-provider'
import { derivedWorking } from './derived-working'
import { documentNonce } from './document-nonce'
import { intervalScale } from './interval-scale'
import { type RankingCellContext } from './ranking-cells'
import { cellChange, type RankingCellChange } from './ranking-cell-change'
import { buildRankingColumns, workingKeyOf, type RankingPermissions } from './ranking-columns'
import { rankingGridRows, type RankingGridRow } from './ranking-grid-row'

interface RankingGridProps {
  readonly ranking: Ranking
  readonly permissions: RankingPermissions
  readonly window: TemperWindow
  readonly selectedSampleIds: readonly string[]
  readonly onSelectionChange: (sampleIds: string[]) => void
  readonly onOpenWorking: (row: RankingRow, working: Working) => void
  readonly onChangeCell: (row: RankingRow, change: RankingCellChange) => void
  /** column order, widths and sort as the person left them */
  readonly savedState: GridState | null
  readonly onStateChange: (state: GridState) => void
  readonly hasFilterRow: boolean
  readonly isNarrow: boolean
}

const rowSelection: RowSelectionOptions<RankingGridRow> = {
  mode: 'multiRow',
  checkboxes: true,
  headerCheckbox: false,
  enableClickSelection: false,
  isRowSelectable: (node) => node.data?.row.fit != null,
}
const selectionColumnDef = { width: 30, pinned: 'left', resizable: false, headerName: '' } as const
/** Filters stand in a row of their own, shown on request: a filter button in each header leaves no room for the unit. */
const columnDefaults: ColDef<RankingGridRow> = {
  resizable: true,
  sortable: true,
  suppressHeaderFilterButton: true,
  minWidth: 48,
  cellClassRules: {
    'has-working': (parameters) =>
      parameters.colDef.colId !== undefined &&
      workingOf(parameters.context?.ranking, parameters.data?.row, parameters.colDef.colId) !== null,
  },
}
/** above this many rows the grid scrolls inside a fixed height, so that not every row is in the page at once */
const ROWS_SHOWN_WHOLE = 40
const runHref = (runId: string) => `/runs/${runId}`

/** The derivation of the number in this cell, where the result carries one. */
function workingOf(ranking: Ranking | undefined, row: RankingRow | undefined, colId: string): Working | null {
  if (!ranking || !row) return null
  const key = workingKeyOf(colId)
  return row.workings[key] ?? row.fit?.workings[key] ?? derivedWorking(ranking, row, colId)
}

/** Of what was left on a wide screen a narrow one takes the sort: its own columns are pinned and ordered for its width. */
function startingState(saved: GridState | null, isNarrow: boolean): GridState {
  if (!saved || !isNarrow) return saved ?? {}
  return saved.sort ? { sort: saved.sort } : {}
}

/** Widths are kept once the person set one: kept unasked, they would hold a table to the widths of the day it was first sorted. */
function savable(state: GridState, hasSetWidth: boolean): GridState {
  const { columnOrder, columnSizing, columnVisibility, columnPinning, sort } = state
  return {
    ...(columnOrder ? { columnOrder } : {}),
    ...(columnSizing && hasSetWidth ? { columnSizing } : {}),
    ...(columnVisibility ? { columnVisibility } : {}),
    ...(columnPinning ? { columnPinning } : {}),
    ...(sort ? { sort } : {}),
  }
}

/** The ranking as a grid: sorted, filtered, written in by those who may, each computed number opening its working. */
export function RankingGrid(props: RankingGridProps) {
  const { ranking, permissions, onOpenWorking, onChangeCell, onStateChange, onSelectionChange } = props
  const rows = useMemo(() => rankingGridRows(ranking.rows), [ranking.rows])
  const [styleNonce] = useState(documentNonce)
  const scale = useMemo(
    () =>
      intervalScale(
        ranking.rows.map((row) => {
          if (row.activationEnergyInterval) {
            return [row.activationEnergyInterval[0] / 1_000, row.activationEnergyInterval[1] / 1_000]
          }
          const value = row.activationEnergyJPerMol?.value
          return value === undefined ? null : [value / 1_000, value / 1_000]
        }),
        80,
      ),
    [ranking.rows],
  )
  const columns = useMemo(
    () => buildRankingColumns(ranking, permissions, scale, props.isNarrow),
    [ranking, permissions, scale, props.isNarrow],
  )
  const defaultColDef = useMemo(() => ({ ...columnDefaults, floatingFilter: props.hasFilterRow }), [props.hasFilterRow])
  const context = useMemo<RankingCellContext>(
    () => ({
      ranking,
      rankedCount: ranking.rows.filter((row) => row.rank !== null).length,
      scale,
      window: props.window,
      canDecide: permissions.canDecide,
      runHref,
    }),
    [ranking, scale, props.window, permissions.canDecide],
  )
  // read once: afterwards the grid itself is the place where the state lives
  const [initialState] = useState<GridState>(() => ({
    ...startingState(props.savedState, props.isNarrow),
    rowSelection: [...props.selectedSampleIds],
    partialColumnState: true,
  }))
  const saving = useRef<ReturnType<typeof setTimeout> | null>(null)

  const openWorking = (event: CellClickedEvent<RankingGridRow> | CellKeyDownEvent<RankingGridRow>) => {
    const row = event.data?.row
    const working = workingOf(ranking, row, event.column.getColId())
    if (row && working) onOpenWorking(row, working)
  }
  const onCellKeyDown = (event: CellKeyDownEvent<RankingGridRow> | FullWidthCellKeyDownEvent<RankingGridRow>) => {
    if (!('column' in event)) return
    const key = event.event instanceof KeyboardEvent ? event.event.key : ''
    if (key === 'Enter' && event.column.getColDef().editable !== true) openWorking(event)
  }
  const onCellEditRequest = (event: CellEditRequestEvent<RankingGridRow>) => {
    const change = cellChange(event.column.getColId(), event.newValue)
    if (event.data && change) onChangeCell(event.data.row, change)
  }
  const onStateUpdated = (event: StateUpdatedEvent<RankingGridRow>) => {
    if (props.isNarrow) return
    if (event.sources.every((source) => ['gridInitializing', 'rowSelection', 'focusedCell', 'scroll'].includes(source)))
      return
    if (saving.current) clearTimeout(saving.current)
    saving.current = setTimeout(() => onStateChange(savable(event.state, hasSetWidth.current)), 800)
  }
  const hasSetWidth = useRef(props.savedState?.columnSizing !== undefined)
  const grid = useRef<GridApi<RankingGridRow> | null>(null)
  const [far, setFar] = useState(noFarColumns)
  const lookAround = (event: { readonly api: GridApi<RankingGridRow> }) => {
    grid.current = event.api
    const found = farColumnsOf(event.api)
    // scrolling asks at every step; the words change only where a column comes in or goes out
    setFar((before) => (JSON.stringify(before) === JSON.stringify(found) ? before : found))
  }
  const [shownOf, setShownOf] = useState<number | null>(null)
  const isWhole = rows.length <= ROWS_SHOWN_WHOLE
  return (
    <GridProvider>
      {shownOf === null ? null : (
        <p role="status" className="m-0 flex flex-wrap items-center gap-x-3 px-4 pb-1 text-[13px] sm:px-6 print:hidden">
          Filters show {shownOf} of {rows.length} samples.
          <button
            type="button"
            className="min-h-6 cursor-pointer text-accent underline underline-offset-2 touch:min-h-11"
            onClick={() => grid.current?.setFilterModel(null)}
          >
            Show all
          </button>
        </p>
      )}
      <BeyondView far={far} onShow={(colId, side) => grid.current?.ensureColumnVisible(colId, side)} />
      <div className={isWhole ? 'ranking-grid w-full' : 'ranking-grid h-[70vh] w-full'}>
        <AgGridReact<RankingGridRow>
          theme={gridTheme}
          {...(styleNonce === undefined ? {} : { styleNonce })}
          rowData={rows}
          columnDefs={columns}
          defaultColDef={defaultColDef}
          context={context}
          getRowId={(parameters) => parameters.data.row.sampleId}
          domLayout={isWhole ? 'autoHeight' : 'normal'}
          rowSelection={rowSelection}
          selectionColumnDef={selectionColumnDef}
          initialState={initialState}
          readOnlyEdit
          singleClickEdit={false}
          stopEditingWhenCellsLoseFocus
          enableCellTextSelection={false}
          suppressMovableColumns={false}
          animateRows={false}
          alwaysShowHorizontalScroll
          tooltipShowDelay={400}
          overlayNoRowsTemplate="No sample has been tested in this campaign yet."
          onCellClicked={openWorking}
          onCellKeyDown={onCellKeyDown}
          onCellEditRequest={onCellEditRequest}
          onStateUpdated={onStateUpdated}
          onGridReady={lookAround}
          onFirstDataRendered={lookAround}
          onGridSizeChanged={lookAround}
          onBodyScroll={lookAround}
          onColumnResized={(event) => {
            if (event.source === 'uiColumnResized') hasSetWidth.current = true
            lookAround(event)
          }}
          onDisplayedColumnsChanged={lookAround}
          onFilterChanged={({ api }) => setShownOf(api.isAnyFilterPresent() ? api.getDisplayedRowCount() : null)}
          onSelectionChanged={(event: SelectionChangedEvent<RankingGridRow>) =>
            onSelectionChange(event.api.getSelectedRows().map((entry) => entry.row.sampleId))
          }
        />
      </div>
    </GridProvider>
  )
}
