import ln from '@stdlib/math-base-special-ln'
import { type ArrheniusSeries, type RankedValue } from '@/components/charts/arrhenius-chart-option'
import { type RankingGridRow } from '@/components/grids/ranking-grid-row'
import { practicalUnits } from '@/components/numbers/practical-units'
import { type NamedFit } from '@/components/run/fit-table'
import { type RankingRow } from '@/lib/domain/ranking'

export type PlottedQuantity = 'rate' | 'turnover-frequency'

/** ln of the step from a rate per kilogram to one per site: the same at every temperature, read off at the reference. */
function siteShift(entry: RankingGridRow): number | null {
  const rate = entry.row.rateMolPerKgS?.value
  const turnover = entry.row.turnoverFrequencyPerS?.value
  if (rate === undefined || turnover === undefined || !(rate > 0) || !(turnover > 0)) return null
  return ln(turnover / rate)
}

/** Where a sample is ranked, in the unit of the plot. */
function rankedValue({ row }: RankingGridRow, quantity: PlottedQuantity): RankedValue | null {
  const isRate = quantity === 'rate'
  const estimate = isRate ? row.rateMolPerKgS : row.turnoverFrequencyPerS
  const interval = isRate ? row.rateInterval : row.turnoverFrequencyInterval
  if (!row.fit || estimate === null || !(estimate.value > 0)) return null
  const toPlot = (value: number) => (isRate ? practicalUnits.lnRate.fromSi(ln(value)) : ln(value))
  return {
    temperatureK: row.fit.referenceTemperatureK,
    ln: toPlot(estimate.value),
    interval: interval !== null && interval[0] > 0 ? [toPlot(interval[0]), toPlot(interval[1])] : null,
  }
}

/** Lines to draw for the chosen samples, one a run where a sample has several; a sample without a site count has none per site. */
export function arrheniusSeries(
  rows: readonly RankingGridRow[],
  sampleIds: readonly string[],
  quantity: PlottedQuantity,
): ArrheniusSeries[] {
  return rows.flatMap((entry) => {
    const { fit, runFits, sampleCode, sampleId } = entry.row
    if (!fit || !sampleIds.includes(sampleId)) return []
    const shift =
      quantity === fit.quantity
        ? quantity === 'rate'
          ? practicalUnits.lnRate.fromSi(0)
          : 0
        : quantity === 'turnover-frequency'
          ? siteShift(entry)
          : null
    if (shift === null) return []
    if (runFits.length < 2) return [{ code: sampleCode, symbol: entry.symbol, fit, shift }]
    const ranked = rankedValue(entry, quantity)
    return runFits.map((runFit, place) => ({
      code: sampleCode,
      symbol: entry.symbol,
      fit: runFit,
      shift,
      run: { code: runFit.runCodes.join(', '), place },
      ...(place === 0 && ranked !== null ? { ranked } : {}),
    }))
  })
}

/** The same lines for a table: each run's own, and the sample's as it is ranked. */
export function namedFits(row: RankingRow): NamedFit[] {
  if (!row.fit) return []
  if (row.runFits.length < 2) return [{ name: row.sampleCode, fit: row.fit, about: row.cautions }]
  return [
    ...row.runFits.map((fit) => ({ name: `${row.sampleCode} ${fit.runCodes.join(', ')}`, fit })),
    { name: `${row.sampleCode}, all its runs`, fit: row.fit, about: row.cautions },
  ]
}
