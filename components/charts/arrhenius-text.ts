import { formatFixed } from '@/components/numbers/format-fixed'
import { halfWidth } from '@/components/numbers/half-width'
import { practicalUnits } from '@/components/numbers/practical-units'
import { estimateAsText } from '@/lib/domain/format-estimate'
import { lineName, type ArrheniusSeries, type RankedValue } from './arrhenius-chart-option'
import { type ChartTable } from './chart-frame'

const celsius = (temperatureK: number, decimals: number) =>
  formatFixed(practicalUnits.temperature.fromSi(temperatureK), decimals)

/** What the plot shows, in sentences. */
export function arrheniusSummary(series: readonly ArrheniusSeries[]): string {
  if (series.length === 0) return 'No sample is selected.'
  const sentences = series.map((entry) => {
    const ea = estimateAsText(
      practicalUnits.activationEnergy.fromSi(entry.fit.activationEnergyJPerMol.value),
      mapHalf(halfWidth(entry.fit.intervals.activationEnergyJPerMol)),
      'kJ mol⁻¹',
    )
    const used = entry.fit.points.filter((point) => point.isUsed).length
    const out = entry.fit.points.length - used
    return `${lineName(entry)}: ${ea} from ${used} holds, ${celsius(entry.fit.lowestTemperatureK, 0)} to ${celsius(entry.fit.highestTemperatureK, 0)} °C${out > 0 ? `, ${out} left out` : ''}`
  })
  const severalRuns = series.flatMap((entry) => (entry.ranked ? [entry.code] : []))
  const ranked =
    severalRuns.length === 0
      ? ''
      : ` ${severalRuns.join(', ')} ${severalRuns.length === 1 ? 'has' : 'have'} a line for each run; the empty mark is the sample’s value as it is ranked: all its runs on one common slope, each with its own level, and its bar is the whole interval with shared errors and the spread between packed beds.`
  return `Lines: ${sentences.join('; ')} (± of the line alone).${ranked} Bars of points are one standard uncertainty; bands are pointwise and hold own scatter only; hollow points are not in the line.`
}

function mapHalf(half: number | null): number | null {
  return half === null ? null : practicalUnits.activationEnergy.differenceFromSi(half)
}

/** The sample's value as it is ranked: its uncertainty is the whole one, given as the interval. */
function rankedRow(code: string, ranked: RankedValue): string[] {
  const { interval } = ranked
  return [
    code,
    'all, as ranked',
    '',
    celsius(ranked.temperatureK, 2),
    formatFixed(1_000 / ranked.temperatureK, 4),
    formatFixed(ranked.ln, 4),
    interval === null ? 'cannot tell' : `${formatFixed(interval[0], 4)} to ${formatFixed(interval[1], 4)}`,
    '',
    'value of the ranking',
  ]
}

/** The plotted numbers. */
export function arrheniusTable(series: readonly ArrheniusSeries[], quantity: string): ChartTable {
  return {
    columns: ['Sample', 'Run', 'Hold', 'T / °C', '1000 K/T', quantity, 'u', 'residual', 'in the line'],
    rows: series.flatMap((entry) => [
      ...entry.fit.points.map((point) => [
        entry.code,
        point.runCode,
        String(point.holdNumber),
        celsius(point.temperatureK, 2),
        formatFixed(1_000 / point.temperatureK, 4),
        formatFixed(point.lnRate + entry.shift, 4),
        formatFixed(point.lnRateStandardUncertainty, 4),
        formatFixed(point.residual, 4),
        point.isUsed ? 'yes' : `no: ${point.reason}`,
      ]),
      ...(entry.ranked ? [rankedRow(entry.code, entry.ranked)] : []),
    ]),
  }
}
