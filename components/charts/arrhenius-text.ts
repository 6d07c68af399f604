import { formatFixed } from '@/components/numbers/format-fixed'
import { halfWidth } from '@/components/numbers/half-width'
import { practicalUnits } from '@/components/numbers/practical-units'
import { estimateAsText } from '@/lib/domain/format-estimate'
import { type ArrheniusSeries } from './arrhenius-chart-option'
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
    return `${entry.code}: ${ea} from ${used} holds, ${celsius(entry.fit.lowestTemperatureK, 0)} to ${celsius(entry.fit.highestTemperatureK, 0)} °C${out > 0 ? `, ${out} left out` : ''}`
  })
  return `Lines: ${sentences.join('; ')} (± of the line alone). Bars are one standard uncertainty; bands are pointwise and hold own scatter only; hollow points are not in the line.`
}

function mapHalf(half: number | null): number | null {
  return half === null ? null : practicalUnits.activationEnergy.differenceFromSi(half)
}

/** The plotted numbers. */
export function arrheniusTable(series: readonly ArrheniusSeries[], quantity: string): ChartTable {
  return {
    columns: ['Sample', 'Run', 'Hold', 'T / °C', '1000 K/T', quantity, 'u', 'residual', 'in the line'],
    rows: series.flatMap((entry) =>
      entry.fit.points.map((point) => [
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
    ),
  }
}
