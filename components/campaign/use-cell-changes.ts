'use client'

import { useQueryClient, type QueryKey } from '@tanstack/react-query'
import { useCallback, useState } from 'react'
import { type RankingCellChange } from '@/components/grids/ranking-cell-change'
import { rankingKeys } from '@/components/server-state/ranking'
import { type CampaignSampleChange } from '@/lib/domain/campaign'
import { type ActionResult } from '@/lib/domain/errors'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { type CellTrouble } from './cell-conflict'

/** Writes cells of one sample in one campaign; answers the new version. */
export type ChangeCampaignSample = (
  campaignId: string,
  sampleId: string,
  change: CampaignSampleChange,
) => Promise<ActionResult<{ version: number }>>

interface CellChanges {
  readonly trouble: CellTrouble | null
  readonly change: (row: RankingRow, change: RankingCellChange) => void
  readonly keepTheirs: () => void
  readonly writeMine: () => void
}

/** A cell change is shown at once and sent; a refusal restores what is stored, a change by someone else shows both. */
export function useCellChanges(campaignId: string, viewKey: QueryKey, write: ChangeCampaignSample): CellChanges {
  const client = useQueryClient()
  const [trouble, setTrouble] = useState<CellTrouble | null>(null)

  const patch = useCallback(
    (sampleId: string, content: Partial<RankingRow>) => {
      client.setQueriesData<Ranking>({ queryKey: rankingKeys.campaign(campaignId) }, (ranking) =>
        ranking
          ? { ...ranking, rows: ranking.rows.map((row) => (row.sampleId === sampleId ? { ...row, ...content } : row)) }
          : ranking,
      )
    },
    [client, campaignId],
  )

  const send = useCallback(
    async (row: RankingRow, change: RankingCellChange) => {
      setTrouble(null)
      const before = { remark: row.remark, isShortlisted: row.isShortlisted, priority: row.priority }
      patch(row.sampleId, withoutUndefined(change))
      let answer: ActionResult<{ version: number }>
      try {
        answer = await write(campaignId, row.sampleId, { ...change, version: row.version })
      } catch (error) {
        patch(row.sampleId, before)
        const reason = error instanceof Error ? error.message : 'no answer'
        setTrouble({ row, change, message: `not stored, the server could not be reached (${reason}).`, theirs: null })
        return
      }
      if (answer.ok) {
        patch(row.sampleId, { version: answer.value.version })
        return
      }
      patch(row.sampleId, before)
      await client.invalidateQueries({ queryKey: rankingKeys.campaign(campaignId) })
      const now = client.getQueryData<Ranking>(viewKey)?.rows.find((entry) => entry.sampleId === row.sampleId)
      setTrouble({ row, change, message: answer.message, theirs: answer.code === 'stale' ? (now ?? null) : null })
    },
    [campaignId, client, patch, viewKey, write],
  )

  return {
    trouble,
    change: (row, change) => void send(row, change),
    keepTheirs: () => setTrouble(null),
    writeMine: () => {
      if (trouble?.theirs) void send(trouble.theirs, trouble.change)
    },
  }
}

function withoutUndefined(change: RankingCellChange): Partial<RankingRow> {
  return {
    ...(change.remark === undefined ? {} : { remark: change.remark }),
    ...(change.isShortlisted === undefined ? {} : { isShortlisted: change.isShortlisted }),
    ...(change.priority === undefined ? {} : { priority: change.priority }),
  }
}
