import { type CampaignSampleChange } from '@/lib/domain/campaign'

/** The cells that people write; the version goes with them. */
export type RankingCellChange = Omit<CampaignSampleChange, 'version'>

/** What an edited cell asks to be changed; null when the value is none that may be stored. */
export function cellChange(colId: string, value: unknown): RankingCellChange | null {
  if (colId === 'remark') return { remark: typeof value === 'string' ? value.trim().slice(0, 500) : '' }
  if (colId === 'isShortlisted') return { isShortlisted: value === true }
  if (colId === 'priority') {
    if (value === null || value === undefined || value === '') return { priority: null }
    const priority = Number(value)
    return Number.isInteger(priority) && priority >= 1 && priority <= 9 ? { priority } : null
  }
  return null
}
