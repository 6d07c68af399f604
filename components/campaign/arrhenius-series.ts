import ln from '@stdlib/math-base-special-ln'
import { type ArrheniusSeries } from '@/components/charts/arrhenius-chart-option'
import { type RankingGridRow } from '@/components/grids/ranking-grid-row'
import { practicalUnits } from '@/components/numbers/practical-units'

export type PlottedQuantity = 'rate' | 'turnover-frequency'

/** ln of the step from a rate per kilogram to one per site: the same at every temperature, read off at the reference. */
function siteShift(entry: RankingGridRow): number | null {
  const rate = entry.row.rateMolPerKgS?.value
  const turnover = entry.row.turnoverFrequencyPerS?.value
  if (rate === undefined || turnover === undefined || !(rate > 0) || !(turnover > 0)) return null
  return ln(turnover / rate)
}

/** Lines to draw for the chosen samples; a sample without a site count has none per site. */
export function arrheniusSeries(
  rows: readonly RankingGridRow[],
  sampleIds: readonly string[],
  quantity: PlottedQuantity,
): ArrheniusSeries[] {
  return rows.flatMap((entry) => {
    const { fit, sampleCode, sampleId } = entry.row
    if (!fit || !sampleIds.includes(sampleId)) return []
    const shift =
      quantity === fit.quantity
        ? quantity === 'rate'
          ? practicalUnits.lnRate.fromSi(0)
          : 0
        : quantity === 'turnover-frequency'
          ? siteShift(entry)
          : null
    return shift === null ? [] : [{ code: sampleCode, symbol: entry.symbol, fit, shift }]
  })
}
