import { type GridState } from 'ag-grid-community'

/** Column order, widths and sort of a grid, as kept for a person. A filter is of the moment: kept, it would hide rows from somebody who forgot it. */
export type SavedGridState = GridState

const PARTS = ['columnOrder', 'columnSizing', 'columnVisibility', 'columnPinning', 'sort'] as const

/**
 * A stored state read back. It is the person's own and was written by the grid itself, but it may come from an older release: only the
 * parts known here are taken, and the grid ignores columns that are gone.
 */
export function savedGridState(content: unknown): SavedGridState | null {
  if (typeof content !== 'object' || content === null) return null
  const entries = Object.entries(content).filter(
    ([key, value]) => PARTS.some((part) => part === key) && typeof value === 'object' && value !== null,
  )
  return entries.length === 0 ? null : Object.fromEntries(entries)
}
