'use client'

import { type Column, type GridApi } from 'ag-grid-community'
import { type RankingGridRow } from './ranking-grid-row'

/** A column that is not in sight, by name. */
export interface FarColumn {
  readonly colId: string
  readonly name: string
}
export interface FarColumns {
  readonly left: readonly FarColumn[]
  readonly right: readonly FarColumn[]
}
export const noFarColumns: FarColumns = { left: [], right: [] }

/** Part of a column that may be cut off before it counts as out of sight [px]. */
const TOLERANCE = 6

/** Columns to both sides of what is in sight, in the order in which one would come to them. */
export function farColumns(
  columns: readonly { readonly colId: string; readonly name: string; readonly left: number; readonly width: number }[],
  view: { readonly left: number; readonly right: number },
): FarColumns {
  const named = ({ colId, name }: FarColumn): FarColumn => ({ colId, name })
  return {
    left: columns.filter((column) => column.left < view.left - TOLERANCE).map(named),
    right: columns.filter((column) => column.left + column.width > view.right + TOLERANCE).map(named),
  }
}

/** The same, asked of the grid. */
export function farColumnsOf(api: GridApi<RankingGridRow>): FarColumns {
  const columns = api.getDisplayedCenterColumns().map((column: Column) => ({
    colId: column.getColId(),
    name: api.getDisplayNameForColumn(column, 'header'),
    left: column.getLeft() ?? 0,
    width: column.getActualWidth(),
  }))
  return farColumns(columns, api.getHorizontalPixelRange())
}

const button =
  'min-h-6 min-w-0 max-w-full cursor-pointer truncate text-accent underline-offset-4 hover:underline touch:min-h-11'
const names = (columns: readonly FarColumn[]) => columns.map((column) => column.name).join(', ')

/** What the table has beyond its edges, in words, and a way there. Nothing where all of it is in sight. */
export function BeyondView({
  far,
  onShow,
}: {
  far: FarColumns
  onShow: (colId: string, side: 'start' | 'end') => void
}) {
  const [nextRight] = far.right
  const nextLeft = far.left.at(-1)
  if (nextRight === undefined && nextLeft === undefined) return null
  return (
    <p className="m-0 flex min-w-0 flex-wrap items-center gap-x-4 px-4 pb-1 text-[12.5px] text-ink-2 sm:px-6 print:hidden">
      {nextLeft === undefined ? null : (
        <button type="button" className={button} title={names(far.left)} onClick={() => onShow(nextLeft.colId, 'end')}>
          {far.left.length} to the left: {names(far.left)}
        </button>
      )}
      {nextRight === undefined ? null : (
        <button
          type="button"
          className={`${button} ml-auto`}
          title={names(far.right)}
          onClick={() => onShow(nextRight.colId, 'start')}
        >
          {far.right.length} to the right: {names(far.right)}
        </button>
      )}
    </p>
  )
}
