import { type RunTrace } from '@/lib/domain/run-result'
import { type Hold, type InjectionUse } from '@/lib/analysis/reduction/run-reduction'
import { formatFixed } from '@/components/numbers/format-fixed'
import { type ChartTable } from './chart-frame'
import { timeTraceSpan } from './time-trace-chart-option'

/** What the trace shows, in sentences. */
export function timeTraceSummary(trace: RunTrace, holds: readonly Hold[], injections: readonly InjectionUse[]): string {
  const { startS, endS } = timeTraceSpan(trace)
  const reactor = holds.filter((hold) => hold.kind === 'reactor')
  const temperatures = reactor.map((hold) => hold.setTemperatureK - 273.15)
  const leftOut = injections.filter((injection) => injection.use === 'left-out').length
  const range =
    temperatures.length === 0
      ? 'no hold through the reactor was found'
      : `${reactor.length} holds from ${formatFixed(Math.min(...temperatures), 0)} to ${formatFixed(Math.max(...temperatures), 0)} °C`
  return `${formatFixed((endS - startS) / 3_600, 1)} h of log, ${range}, ${injections.length} injections, ${leftOut} left out (hollow). Bed temperature against the left axis, conversion by products against the right.`
}

/** Holds and injections in time order, as a table. */
export function timeTraceTable(
  trace: RunTrace,
  holds: readonly Hold[],
  injections: readonly InjectionUse[],
): ChartTable {
  const { startS } = timeTraceSpan(trace)
  const hours = (atS: number) => formatFixed((atS - startS) / 3_600, 3)
  const rows = [
    ...holds.map((hold) => ({
      atS: hold.startS,
      cells: [
        hold.kind === 'bypass' ? 'bypass' : `hold ${hold.number}`,
        hours(hold.startS),
        hours(hold.endS),
        formatFixed(hold.setTemperatureK - 273.15, 1),
        '',
        hold.isEdited ? 'window moved by a person' : '',
      ],
    })),
    ...injections.map((injection) => ({
      atS: injection.timeS,
      cells: [
        `injection ${injection.number}`,
        hours(injection.timeS),
        '',
        '',
        injection.conversion === null ? '' : formatFixed(injection.conversion * 100, 3),
        injection.reason === '' ? injection.use : `${injection.use}: ${injection.reason}`,
      ],
    })),
  ].sort((a, b) => a.atS - b.atS)
  return {
    columns: ['What', 'from / h', 'to / h', 'set / °C', 'conversion / %', 'use'],
    rows: rows.map((row) => row.cells),
  }
}
