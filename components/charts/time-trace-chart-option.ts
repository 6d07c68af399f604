import { type RunTrace } from '@/lib/domain/run-result'
import { type Hold, type InjectionUse } from '@/lib/analysis/reduction/run-reduction'
import { formatFixed } from '@/components/numbers/format-fixed'
import { roundTicks } from './arrhenius-chart-option'
import { type ChartOption } from './chart-option'
import { tickText } from './tick-text'
import { temperColour, type TemperWindow } from './temper-scale'
import { type ThemeColours } from './theme-colours'

/** Fixed room around the plot, so that what is laid over it (hold edges) needs no talk with the canvas. */
export const timeTraceMargins = { left: 44, right: 52, top: 14, bottom: 28 } as const

export interface TimeTraceInput {
  readonly trace: RunTrace
  readonly holds: readonly Hold[]
  readonly injections: readonly InjectionUse[]
  readonly window: TemperWindow
  readonly colours: ThemeColours
  readonly isCompact: boolean
}

/** Seconds that the time axis starts and ends at. */
export function timeTraceSpan(trace: RunTrace): { startS: number; endS: number } {
  const startS = trace.timeS[0] ?? 0
  const endS = trace.timeS[trace.timeS.length - 1] ?? startS + 3_600
  return { startS, endS: Math.max(endS, startS + 60) }
}

const celsius = (temperatureK: number) => temperatureK - 273.15

/** Axis window of the bed temperature: the holds and a little room; the way up from ambient is cut off at the floor, as drawn. */
function temperatureAxis(input: TimeTraceInput): { min: number; max: number; isCut: boolean } {
  const held = input.holds.filter((hold) => hold.kind === 'reactor').map((hold) => celsius(hold.setTemperatureK))
  const all = input.trace.bedTemperatureK.flatMap((value) => (value === null ? [] : [celsius(value)]))
  const values = held.length > 0 ? held : all
  const low = values.reduce((a, b) => Math.min(a, b), Infinity)
  const high = [...values, ...all].reduce((a, b) => Math.max(a, b), -Infinity)
  if (!Number.isFinite(low)) return { min: 0, max: 100, isCut: false }
  const room = Math.max(8, (high - low) * 0.2)
  const min = Math.floor((low - room) / 5) * 5
  return {
    min,
    max: Math.ceil((high + room * 0.8) / 5) * 5,
    isCut: all.some((value) => value < min),
  }
}

function injectionLines(injection: InjectionUse): string[] {
  const head = `injection ${injection.number}, row ${injection.sourceRow}`
  const conversion =
    injection.conversion === null ? [] : [`conversion ${formatFixed(injection.conversion * 100, 3)} %, product route`]
  const uses = {
    point: `used in hold ${injection.holdNumber ?? '–'}`,
    inlet: 'taken as inlet',
    'left-out': 'left out',
    unassigned: 'in no hold',
  } as const
  return [
    head,
    ...conversion,
    injection.reason === '' ? uses[injection.use] : `${uses[injection.use]}: ${injection.reason}`,
  ]
}

/** The run over time as a chart option: bed temperature in temper colours, holds as washes, injections against the right axis, hollow when left out. */
export function buildTimeTraceOption(input: TimeTraceInput): ChartOption {
  const { colours, trace } = input
  const { startS, endS } = timeTraceSpan(trace)
  const hours = (timeS: number) => (timeS - startS) / 3_600
  const axis = temperatureAxis(input)
  const text = { color: colours.ink2, fontFamily: colours.fontFamily, fontSize: 12 }
  const end = hours(endS)
  const ticks = roundTicks(0, end, input.isCompact ? 5 : 12)
  const highestConversion = input.injections.reduce((most, entry) => Math.max(most, entry.conversion ?? 0), 0)
  const conversionTop = highestConversion > 0 ? highestConversion * 100 * 1.35 : 1
  const conversionTicks = roundTicks(0, conversionTop, 4)
  const temperatureTicks = roundTicks(axis.min, axis.max, 5).filter((tick) => tick > axis.min)
  const none = { show: false }
  const rule = { show: true, lineStyle: { color: colours.lineStrong } }
  return {
    animation: false,
    textStyle: { fontFamily: colours.fontFamily },
    grid: { ...timeTraceMargins, containLabel: false },
    tooltip: { trigger: 'item' },
    visualMap: {
      type: 'continuous',
      show: false,
      seriesIndex: 0,
      dimension: 1,
      min: celsius(input.window.lowK),
      max: celsius(input.window.highK),
      inRange: { color: [...colours.temper] },
    },
    xAxis: {
      type: 'value',
      min: 0,
      max: end,
      axisLine: { ...rule, onZero: false },
      splitLine: none,
      axisTick: { ...rule, customValues: ticks },
      axisLabel: {
        ...text,
        customValues: ticks,
        formatter: (value: number) => (value === 0 ? '0 h' : tickText(value)),
      },
    },
    yAxis: [
      {
        type: 'value',
        min: axis.min,
        max: axis.max,
        axisLine: none,
        axisTick: { ...none, customValues: temperatureTicks },
        splitLine: { show: true, lineStyle: { color: colours.line } },
        axisLabel: {
          ...text,
          customValues: temperatureTicks,
          formatter: (value: number) =>
            value === temperatureTicks[temperatureTicks.length - 1] ? `${tickText(value)} °C` : tickText(value),
        },
        interval: (temperatureTicks[1] ?? 20) - (temperatureTicks[0] ?? 0),
      },
      {
        type: 'value',
        min: 0,
        max: conversionTop,
        position: 'right',
        axisLine: none,
        axisTick: none,
        splitLine: none,
        axisLabel: {
          ...text,
          customValues: conversionTicks,
          formatter: (value: number) => `${tickText(value)} %`,
        },
      },
    ],
    series: [
      {
        type: 'line',
        id: 'bed-temperature',
        name: 'bed temperature',
        silent: true,
        symbol: 'none',
        clip: true,
        // below the floor of the axis the line runs along it rather than out of the picture
        data: trace.timeS.map((timeS, index) => {
          const value = trace.bedTemperatureK[index]
          return [hours(timeS), value === null || value === undefined ? '-' : Math.max(axis.min, celsius(value))]
        }),
        lineStyle: { width: 2.4, cap: 'round', join: 'round' },
        z: 4,
        markArea: {
          silent: true,
          label: { ...text, fontSize: 11, position: 'insideTop', distance: 5 },
          data: input.holds.map((hold) => [
            {
              name: hold.kind === 'bypass' ? 'bypass' : input.isCompact ? String(hold.number) : `hold ${hold.number}`,
              xAxis: hours(hold.startS),
              itemStyle: {
                color:
                  hold.kind === 'bypass'
                    ? 'transparent'
                    : temperColour(hold.setTemperatureK, input.window, colours.temper),
                opacity: 0.17,
              },
            },
            { xAxis: hours(hold.endS) },
          ]),
        },
      },
      {
        type: 'scatter',
        id: 'injections',
        name: 'conversion',
        yAxisIndex: 1,
        symbol: 'circle',
        symbolSize: input.isCompact ? 5 : 7,
        data: input.injections
          .filter((injection) => injection.conversion !== null)
          .map((injection) => ({
            value: [hours(injection.timeS), (injection.conversion ?? 0) * 100],
            lines: injectionLines(injection),
            injectionTimeS: injection.timeS,
            itemStyle: {
              color: injection.use === 'point' ? colours.ink : colours.paper,
              borderColor: colours.ink,
              borderWidth: 1.2,
              opacity: 1,
            },
          })),
        z: 6,
      },
      {
        type: 'scatter',
        id: 'inlet',
        name: 'inlet injections',
        yAxisIndex: 1,
        symbol: 'rect',
        symbolSize: [2, 9],
        symbolOffset: [0, -5],
        data: input.injections
          .filter((injection) => injection.conversion === null)
          .map((injection) => ({
            value: [hours(injection.timeS), 0],
            lines: injectionLines(injection),
            injectionTimeS: injection.timeS,
            itemStyle: { color: injection.use === 'left-out' ? colours.lineStrong : colours.ink2 },
          })),
        z: 5,
      },
    ],
  }
}
