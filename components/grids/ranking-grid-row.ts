import { symbolOf, type SampleSymbol } from '@/components/charts/sample-symbols'
import { type RankingRow } from '@/lib/domain/ranking'

/** A row of the grid: the sample and its shape in the plot. */
export interface RankingGridRow {
  readonly row: RankingRow
  readonly symbol: SampleSymbol
}

/** Rows in rank order, unranked ones last; shapes go by sample code, so that a sample keeps its shape when ranks change. */
export function rankingGridRows(rows: readonly RankingRow[]): RankingGridRow[] {
  const byCode = [...rows].sort((a, b) => a.sampleCode.localeCompare(b.sampleCode, 'en', { numeric: true }))
  const catalysts = byCode.filter((row) => row.kind === 'catalyst')
  const symbols = new Map(catalysts.map((row, index) => [row.sampleId, symbolOf(index)]))
  return byCode
    .map((row) => ({ row, symbol: symbols.get(row.sampleId) ?? symbolOf(catalysts.length) }))
    .sort((a, b) => (a.row.rank ?? Infinity) - (b.row.rank ?? Infinity))
}
