'use client'

import { Button } from '@/components/ui/button'
import { type RankingCellChange } from '@/components/grids/ranking-cell-change'
import { type RankingRow } from '@/lib/domain/ranking'

/** A cell that could not be written, or that somebody else wrote first. */
export interface CellTrouble {
  readonly row: RankingRow
  readonly change: RankingCellChange
  readonly message: string
  /** the row as it stands on the server now; null when the change was refused outright */
  readonly theirs: RankingRow | null
}

/** A writable cell's content in words. */
function words(change: RankingCellChange): string {
  if (change.remark !== undefined) return change.remark === '' ? 'no remark' : `“${change.remark}”`
  if (change.isShortlisted !== undefined) return change.isShortlisted ? 'shortlisted' : 'not shortlisted'
  return change.priority === null || change.priority === undefined ? 'no priority' : `priority ${change.priority}`
}

/** What the row has where the change would write. */
function standing(row: RankingRow, change: RankingCellChange): RankingCellChange {
  if (change.remark !== undefined) return { remark: row.remark }
  if (change.isShortlisted !== undefined) return { isShortlisted: row.isShortlisted }
  return { priority: row.priority }
}

interface CellConflictProps {
  readonly trouble: CellTrouble
  readonly onKeepTheirs: () => void
  readonly onWriteMine: () => void
}

/** Both values side by side when two people wrote the same cell, or the sentence of a refusal. */
export function CellConflict({ trouble, onKeepTheirs, onWriteMine }: CellConflictProps) {
  return (
    <div role="alert" className="mx-4 my-2 rounded bg-fault-wash px-3 py-2 text-fault sm:mx-6">
      {trouble.theirs ? (
        <>
          <p className="m-0">
            <b className="font-semibold">{trouble.row.sampleCode} was changed by someone else</b> while you wrote. There
            it is now {words(standing(trouble.theirs, trouble.change))}; you wrote {words(trouble.change)}.
          </p>
          <p className="mt-2 mb-0 flex flex-wrap gap-2">
            <Button onClick={onKeepTheirs}>Keep theirs</Button>
            <Button onClick={onWriteMine}>Write mine</Button>
          </p>
        </>
      ) : (
        <p className="m-0 flex flex-wrap items-center gap-3">
          <span>
            {trouble.row.sampleCode}: {trouble.message} The cell shows what is stored.
          </span>
          <Button onClick={onKeepTheirs}>Understood</Button>
        </p>
      )}
    </div>
  )
}
