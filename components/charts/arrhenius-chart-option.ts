import { type CustomSeriesOption, type LineSeriesOption, type ScatterSeriesOption } from 'echarts/charts'
import { lineAt } from '@/lib/analysis/arrhenius/line-at'
import { type ArrheniusFit, type FitPoint } from '@/lib/analysis/reduction/run-reduction'
import { formatFixed } from '@/components/numbers/format-fixed'
import { practicalUnits } from '@/components/numbers/practical-units'
import { type ChartOption } from './chart-option'
import { tickText } from './tick-text'
import { chartSymbol, type SampleSymbol } from './sample-symbols'
import { temperColour, type TemperWindow } from './temper-scale'
import { type ThemeColours } from './theme-colours'

/** A sample's number at the reference temperature as it is ranked, where its runs are drawn one by one. */
export interface RankedValue {
  readonly temperatureK: number
  /** in the unit of the plot */
  readonly ln: number
  /** with the errors that all points share and the spread between packed beds; null where none is known */
  readonly interval: readonly [number, number] | null
}

/** One line as drawn: of a sample, or of one run of a sample that has several. */
export interface ArrheniusSeries {
  readonly code: string
  readonly symbol: SampleSymbol
  readonly fit: ArrheniusFit
  /** added to ln rate: the step from a rate per gram to one per site, or from SI to the practical unit */
  readonly shift: number
  /** set where the sample is drawn run by run */
  readonly run?: { readonly code: string; readonly place: number }
  /** with the first run of a sample */
  readonly ranked?: RankedValue
}

/** Name of a line, its own among all that are drawn. */
export const lineName = (entry: ArrheniusSeries) => (entry.run ? `${entry.code} ${entry.run.code}` : entry.code)

/** Runs of a sample have its shape; their lines differ in the stroke, and each has its label. */
const STROKES = ['solid', [7, 3], [2, 3], [9, 3, 2, 3]] as const
const strokeOf = (entry: ArrheniusSeries) => {
  const stroke = STROKES[(entry.run?.place ?? 0) % STROKES.length] ?? 'solid'
  return typeof stroke === 'string' ? stroke : [...stroke]
}

export interface ArrheniusOptionInput {
  readonly series: readonly ArrheniusSeries[]
  readonly window: TemperWindow
  readonly colours: ThemeColours
  /** narrow panel beside the grid: fewer ticks */
  readonly isCompact: boolean
  /** drawn as a dashed line when given */
  readonly referenceTemperatureK: number | null
}

const BAND_STEPS = 40
/** height of the whole picture, as its frame has it [px] */
const HEIGHT_PX = { compact: 410, full: 560 } as const
/** room above the plot, and under it beside the strip of residuals [px] */
const TOP_PX = 26
const FOOT_PX = 66
/** room beyond the outermost points, in 1000/T */
const OVERHANG = 0.008

const abscissa = (temperatureK: number) => 1_000 / temperatureK

interface Bounds {
  readonly low: number
  readonly high: number
}

function boundsOf(values: readonly number[], share: number, least: number): Bounds {
  const low = values.reduce((a, b) => Math.min(a, b), Infinity)
  const high = values.reduce((a, b) => Math.max(a, b), -Infinity)
  if (!Number.isFinite(low) || !Number.isFinite(high)) return { low: 0, high: 1 }
  const margin = Math.max(least, (high - low) * share)
  return { low: low - margin, high: high + margin }
}

/** Ticks of a round step (1, 2 or 5 and a power of ten) inside the bounds, at most `count`. */
export function roundTicks(low: number, high: number, count: number): number[] {
  const rough = (high - low) / Math.max(1, count)
  const power = 10 ** Math.floor(Math.log10(rough))
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= rough) ?? rough
  const first = Math.ceil(low / step - 1e-9)
  const last = Math.floor(high / step + 1e-9)
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => (first + index) * step)
}

const isUsable = (point: FitPoint) => Number.isFinite(point.lnRate) && point.temperatureK > 0

/** Words of one point's tooltip. */
function pointLines(entry: ArrheniusSeries, point: FitPoint): string[] {
  const lines = [
    `${entry.code}, ${point.runCode}, hold ${point.holdNumber}`,
    `${formatFixed(practicalUnits.temperature.fromSi(point.temperatureK), 2)} °C, 1000 K/T ${formatFixed(abscissa(point.temperatureK), 4)}`,
    `ln ${formatFixed(point.lnRate + entry.shift, 4)} ± ${formatFixed(point.lnRateStandardUncertainty, 4)}`,
    `residual ${formatFixed(point.residual, 4)}`,
  ]
  return point.isUsed ? lines : [...lines, `not in the line: ${point.reason}`]
}

function pointData(entry: ArrheniusSeries, input: ArrheniusOptionInput, y: (point: FitPoint) => number) {
  return entry.fit.points.filter(isUsable).map((point) => ({
    value: [abscissa(point.temperatureK), y(point)],
    lines: pointLines(entry, point),
    runCode: point.runCode,
    itemStyle: {
      color: point.isUsed ? temperColour(point.temperatureK, input.window, input.colours.temper) : input.colours.paper,
      borderColor: point.isUsed ? input.colours.ink : input.colours.ink2,
      borderWidth: 1.1,
      opacity: 1,
    },
  }))
}

function scatter(
  entry: ArrheniusSeries,
  input: ArrheniusOptionInput,
  options: { y: (point: FitPoint) => number; size: number; axis: number; id: string },
): ScatterSeriesOption {
  return {
    type: 'scatter',
    id: `${options.id}-${lineName(entry)}`,
    name: lineName(entry),
    xAxisIndex: options.axis,
    yAxisIndex: options.axis === 0 ? 0 : 1,
    symbol: chartSymbol(entry.symbol),
    symbolSize: options.size,
    data: pointData(entry, input, options.y),
    z: 5,
  }
}

/** A vertical bar of one standard uncertainty each way. */
function errorBars(
  entry: ArrheniusSeries,
  input: ArrheniusOptionInput,
  options: { y: (point: FitPoint) => number; axis: number; id: string },
): CustomSeriesOption {
  return {
    type: 'custom',
    id: `${options.id}-${lineName(entry)}`,
    name: lineName(entry),
    xAxisIndex: options.axis,
    yAxisIndex: options.axis === 0 ? 0 : 1,
    silent: true,
    clip: true,
    data: entry.fit.points
      .filter(isUsable)
      .map((point) => [
        abscissa(point.temperatureK),
        options.y(point) - point.lnRateStandardUncertainty,
        options.y(point) + point.lnRateStandardUncertainty,
      ]),
    renderItem: (_, api) => {
      const [x = 0, low = 0] = api.coord([api.value(0), api.value(1)])
      const [, high = 0] = api.coord([api.value(0), api.value(2)])
      return {
        type: 'line',
        shape: { x1: x, y1: low, x2: x, y2: high },
        style: { stroke: input.colours.ink, lineWidth: 1.2 },
      }
    },
    z: 4,
  }
}

/** Abscissas along the line, a little beyond the outermost points. */
function lineAbscissas(fit: ArrheniusFit): number[] {
  const xs = fit.points.filter(isUsable).map((point) => abscissa(point.temperatureK))
  const { low, high } = boundsOf(xs, 0, OVERHANG)
  return Array.from({ length: BAND_STEPS + 1 }, (_, step) => low + ((high - low) * step) / BAND_STEPS)
}

function band(entry: ArrheniusSeries, input: ArrheniusOptionInput): CustomSeriesOption | null {
  const edges = lineAbscissas(entry.fit).map((x) => ({ x, interval: lineAt(entry.fit, 1_000 / x).interval }))
  if (edges.some((edge) => edge.interval === null)) return null
  const upper = edges.map((edge) => [edge.x, (edge.interval?.[1] ?? 0) + entry.shift])
  const lower = edges.map((edge) => [edge.x, (edge.interval?.[0] ?? 0) + entry.shift]).reverse()
  const outline = [...upper, ...lower]
  return {
    type: 'custom',
    id: `band-${lineName(entry)}`,
    name: lineName(entry),
    silent: true,
    clip: true,
    data: [outline[0] ?? [0, 0]],
    renderItem: (_, api) => ({
      type: 'polygon',
      shape: {
        points: outline.map((corner) => {
          const [x = 0, y = 0] = api.coord(corner)
          return [x, y]
        }),
      },
      style: { fill: input.colours.ink, opacity: 0.11 },
    }),
    z: 1,
  }
}

/** Height that a label beside the plot takes [px]. */
const LABEL_ROOM = 14

/**
 * How far each label is moved down from the end of its line so that none lies on another [px]: pushed down in the order of the ends, and back up
 * where the last would leave the plot.
 */
export function labelShifts(
  ends: readonly { readonly name: string; readonly y: number }[],
  bounds: Bounds,
  heightPx: number,
): Map<string, number> {
  const placed = ends
    .map(({ name, y }) => ({ name, at: ((bounds.high - y) / (bounds.high - bounds.low)) * heightPx }))
    .sort((a, b) => a.at - b.at)
    .map((end) => ({ ...end, to: end.at }))
  placed.forEach((end, index) => {
    const above = placed[index - 1]
    if (above) end.to = Math.max(end.to, above.to + LABEL_ROOM)
  })
  let floor = heightPx
  for (const end of [...placed].reverse()) {
    end.to = Math.min(end.to, floor)
    floor = end.to - LABEL_ROOM
  }
  return new Map(placed.map(({ name, at, to }) => [name, to - at]))
}

const lineEnds = (fit: ArrheniusFit): readonly [number, number] => {
  const xs = lineAbscissas(fit)
  return [xs[0] ?? 0, xs[xs.length - 1] ?? 0]
}
const heightAt = (entry: ArrheniusSeries, x: number) => lineAt(entry.fit, 1_000 / x).lnRate + entry.shift

function line(entry: ArrheniusSeries, input: ArrheniusOptionInput, labelShift: number): LineSeriesOption {
  const ends = lineEnds(entry.fit)
  return {
    type: 'line',
    id: `line-${lineName(entry)}`,
    name: lineName(entry),
    silent: true,
    symbol: 'none',
    lineStyle: { color: input.colours.ink2, width: 1.1, type: strokeOf(entry) },
    data: ends.map((x) => [x, heightAt(entry, x)]),
    endLabel: {
      show: true,
      // of a sample drawn run by run the code stands at its own mark, since both have no room beside the plot
      formatter: entry.run?.code ?? entry.code,
      color: entry.run ? input.colours.ink2 : input.colours.ink,
      fontWeight: entry.run ? 400 : 600,
      fontFamily: input.colours.fontFamily,
      fontSize: 12,
      distance: 6,
      offset: [0, labelShift],
    },
    z: 3,
  }
}

/** The value a sample of several runs is ranked by: its shape, empty, on the reference temperature, with the whole interval. */
function rankedMark(entry: ArrheniusSeries, input: ArrheniusOptionInput): (ScatterSeriesOption | CustomSeriesOption)[] {
  const { ranked, code } = entry
  if (ranked === undefined) return []
  const x = abscissa(ranked.temperatureK)
  const { interval } = ranked
  const mark = [
    {
      value: [x, ranked.ln],
      lines: [
        `${code} as ranked, all its runs`,
        `${formatFixed(practicalUnits.temperature.fromSi(ranked.temperatureK), 1)} °C`,
        `ln ${formatFixed(ranked.ln, 4)}${interval === null ? '' : `, ${formatFixed(interval[0], 4)} to ${formatFixed(interval[1], 4)}`}`,
      ],
      itemStyle: { color: 'transparent', borderColor: input.colours.accent, borderWidth: 1.8, opacity: 1 },
    },
  ]
  return [
    ...(interval === null
      ? []
      : [
          {
            type: 'custom' as const,
            id: `ranked-bar-${code}`,
            name: code,
            silent: true,
            clip: true,
            data: [[x, interval[0], interval[1]]],
            renderItem: ((_, api) => {
              const [px = 0, low = 0] = api.coord([api.value(0), api.value(1)])
              const [, high = 0] = api.coord([api.value(0), api.value(2)])
              const stroke = { stroke: input.colours.accent, lineWidth: 1.6 }
              return {
                type: 'group',
                children: [
                  { type: 'line', shape: { x1: px, y1: low, x2: px, y2: high }, style: stroke },
                  { type: 'line', shape: { x1: px - 5, y1: low, x2: px + 5, y2: low }, style: stroke },
                  { type: 'line', shape: { x1: px - 5, y1: high, x2: px + 5, y2: high }, style: stroke },
                ],
              }
            }) satisfies CustomSeriesOption['renderItem'],
            z: 6,
          },
        ]),
    {
      type: 'scatter',
      id: `ranked-${code}`,
      name: code,
      symbol: chartSymbol(entry.symbol),
      symbolSize: input.isCompact ? 13 : 15,
      data: mark,
      label: {
        show: true,
        formatter: code,
        position: 'left',
        distance: 5,
        offset: [0, 9],
        color: input.colours.ink,
        fontWeight: 600,
        fontFamily: input.colours.fontFamily,
        fontSize: 12,
        textBorderColor: input.colours.paper,
        textBorderWidth: 3,
      },
      z: 7,
    },
  ]
}

/**
 * The Arrhenius plot as a chart option: ln of the quantity against 1000 K/T, temperature in °C on top, residuals in a strip below.
 * Points are coloured by temperature and shaped by sample, hollow when not in the line; bars are one standard uncertainty; bands are pointwise.
 * A sample of several runs has a line a run, and an empty mark where it is ranked.
 */
export function buildArrheniusOption(input: ArrheniusOptionInput): ChartOption {
  const { colours, series } = input
  const all = series.flatMap((entry) =>
    entry.fit.points.filter(isUsable).map((point) => ({
      x: abscissa(point.temperatureK),
      y: point.lnRate + entry.shift,
      residual: point.residual,
      u: point.lnRateStandardUncertainty,
    })),
  )
  const x = boundsOf(
    all.map((point) => point.x),
    0.05,
    0.012,
  )
  const y = boundsOf(
    [
      ...all.flatMap((point) => [point.y - point.u, point.y + point.u]),
      ...series.flatMap(({ ranked }) => (ranked ? (ranked.interval ?? [ranked.ln]) : [])),
    ],
    0.06,
    0.1,
  )
  const residualRoom = all.reduce((most, point) => Math.max(most, Math.abs(point.residual) + point.u), 0.004) * 1.15
  const residualLabel = roundTicks(0, residualRoom, 2).at(-1) ?? residualRoom
  const residualDecimals = Math.max(2, -Math.floor(Math.log10(residualLabel)))
  const celsius = roundTicks(1_000 / x.high - 273.15, 1_000 / x.low - 273.15, input.isCompact ? 8 : 14)
  const celsiusTicks = celsius.map((value) => abscissa(value + 273.15))
  const axisText = { color: colours.ink2, fontFamily: colours.fontFamily, fontSize: 12 }
  const rule = { show: true, lineStyle: { color: colours.lineStrong } }
  // an axis stays at the edge of its grid, wherever zero lies
  const edge = { ...rule, onZero: false }
  const hair = { show: true, lineStyle: { color: colours.line } }
  const none = { show: false }
  const left = 52
  const right = 62
  const strip = input.isCompact ? 46 : 74
  const shifts = labelShifts(
    series.map((entry) => ({ name: lineName(entry), y: heightAt(entry, lineEnds(entry.fit)[1]) })),
    y,
    (input.isCompact ? HEIGHT_PX.compact : HEIGHT_PX.full) - TOP_PX - strip - FOOT_PX,
  )
  const xTicks = roundTicks(x.low, x.high, input.isCompact ? 6 : 12)
  const xDecimals = (xTicks[1] ?? 1) - (xTicks[0] ?? 0) < 0.0099 ? 3 : 2
  const reference =
    input.referenceTemperatureK !== null &&
    abscissa(input.referenceTemperatureK) > x.low &&
    abscissa(input.referenceTemperatureK) < x.high
      ? abscissa(input.referenceTemperatureK)
      : null
  return {
    animation: false,
    textStyle: { fontFamily: colours.fontFamily },
    grid: [
      { left, right, top: TOP_PX, bottom: strip + FOOT_PX, containLabel: false },
      { left, right, height: strip, bottom: 14, containLabel: false },
    ],
    tooltip: { trigger: 'item' },
    xAxis: [
      {
        type: 'value',
        gridIndex: 0,
        min: x.low,
        max: x.high,
        axisLine: edge,
        splitLine: none,
        axisTick: { ...rule, customValues: xTicks },
        axisLabel: {
          ...axisText,
          customValues: xTicks,
          hideOverlap: true,
          formatter: (value: number) => formatFixed(value, xDecimals),
        },
        name: '1000 K / T',
        nameLocation: 'end',
        nameGap: 0,
        nameTextStyle: { ...axisText, align: 'right', verticalAlign: 'top', padding: [24, 0, 0, 0] },
      },
      {
        type: 'value',
        gridIndex: 1,
        min: x.low,
        max: x.high,
        axisLine: none,
        splitLine: none,
        axisTick: none,
        axisLabel: none,
      },
      {
        type: 'value',
        gridIndex: 0,
        position: 'top',
        min: x.low,
        max: x.high,
        axisLine: edge,
        splitLine: none,
        axisTick: { ...rule, customValues: celsiusTicks },
        axisLabel: {
          ...axisText,
          customValues: celsiusTicks,
          hideOverlap: true,
          formatter: (value: number) => String(Math.round(1_000 / value - 273.15)),
        },
        name: '°C',
        nameLocation: 'end',
        nameGap: 8,
        nameTextStyle: { ...axisText, align: 'left', verticalAlign: 'bottom', padding: [0, 0, 8, 0] },
      },
    ],
    yAxis: [
      {
        type: 'value',
        gridIndex: 0,
        min: y.low,
        max: y.high,
        axisLine: none,
        axisTick: none,
        splitLine: hair,
        axisLabel: {
          ...axisText,
          showMinLabel: false,
          showMaxLabel: false,
          formatter: tickText,
        },
      },
      {
        type: 'value',
        gridIndex: 1,
        min: -residualRoom,
        max: residualRoom,
        axisLine: none,
        axisTick: none,
        splitLine: none,
        axisLabel: {
          ...axisText,
          customValues: input.isCompact ? [0, residualLabel] : [-residualLabel, 0, residualLabel],
          formatter: (value: number) => (value === 0 ? 'resid.' : formatFixed(value, residualDecimals)),
        },
      },
    ],
    series: [
      ...series.flatMap((entry) => {
        const wash = band(entry, input)
        const height = (point: FitPoint) => point.lnRate + entry.shift
        const residual = (point: FitPoint) => point.residual
        return [
          ...(wash ? [wash] : []),
          line(entry, input, shifts.get(lineName(entry)) ?? 0),
          errorBars(entry, input, { y: height, axis: 0, id: 'bar' }),
          scatter(entry, input, { y: height, size: input.isCompact ? 9 : 11, axis: 0, id: 'point' }),
          errorBars(entry, input, { y: residual, axis: 1, id: 'residual-bar' }),
          scatter(entry, input, { y: residual, size: input.isCompact ? 6 : 8, axis: 1, id: 'residual' }),
          ...rankedMark(entry, input),
        ]
      }),
      {
        type: 'line',
        id: 'zero',
        xAxisIndex: 1,
        yAxisIndex: 1,
        silent: true,
        symbol: 'none',
        lineStyle: { color: colours.lineStrong, width: 1 },
        data: [
          [x.low, 0],
          [x.high, 0],
        ],
        z: 2,
      },
      ...(reference === null
        ? []
        : [
            {
              type: 'line' as const,
              id: 'reference',
              silent: true,
              symbol: 'none',
              lineStyle: { color: colours.lineStrong, width: 1, type: 'dashed' as const },
              data: [
                [reference, y.low],
                [reference, y.high],
              ],
              z: 1,
            },
          ]),
    ],
  }
}
