import { describe, expect, it } from 'vitest'
import { buildTimeTraceOption } from '@/components/charts/time-trace-chart-option'
import { timeTraceSummary, timeTraceTable } from '@/components/charts/time-trace-text'
import { temperWindow } from '@/components/charts/temper-scale'
import { lightColours } from '@/components/charts/theme-colours'
import { exampleRunResult } from '../../../support/example-run-result'

const result = exampleRunResult()
const { trace, reduction } = result
if (!trace || !reduction) throw new Error('the example has both')
const input = {
  trace,
  holds: reduction.holds,
  injections: reduction.injections,
  window: temperWindow([488.15, 548.15]),
  colours: lightColours,
  isCompact: false,
}
const option = buildTimeTraceOption(input)
const drawn = Array.isArray(option.series) ? option.series : []
const dataOf = (id: string): unknown[] => {
  const data = drawn.find((entry) => entry.id === id)?.data
  return Array.isArray(data) ? data : []
}

describe('time trace', () => {
  it('washes every hold and the bypass', () => {
    const line = drawn.find((entry) => entry.id === 'bed-temperature')
    expect(line).toMatchObject({ markArea: { data: expect.any(Array) } })
    const areas = line?.type === 'line' ? line.markArea?.data : undefined
    expect(areas).toHaveLength(9)
    expect(areas?.[1]).toMatchObject([{ name: 'hold 1' }, {}])
  })
  it('fills the injections that count and leaves the others hollow, with why', () => {
    const points = dataOf('injections')
    expect(points).toHaveLength(40)
    expect(points[0]).toMatchObject({
      itemStyle: { color: lightColours.paper },
      lines: expect.arrayContaining(['left out: first injection after the ramp']),
    })
    expect(points[1]).toMatchObject({ itemStyle: { color: lightColours.ink } })
  })
  it('keeps the line inside its axis while the bed is still cold', () => {
    const axis = Array.isArray(option.yAxis) ? option.yAxis[0] : undefined
    const floor = Number(axis && 'min' in axis ? axis.min : NaN)
    expect(dataOf('bed-temperature')[0]).toEqual([0, floor])
  })
  it('breaks the line where the log has a gap', () => {
    const gap = buildTimeTraceOption({
      ...input,
      trace: { timeS: [0, 60, 120], bedTemperatureK: [500, null, 500], setTemperatureK: null },
    })
    const series = Array.isArray(gap.series) ? gap.series : []
    expect(series[0]).toMatchObject({
      data: [
        [0, expect.any(Number)],
        [60 / 3_600, '-'],
        [120 / 3_600, expect.any(Number)],
      ],
    })
  })
  it('says the same in words and as a table', () => {
    expect(timeTraceSummary(trace, reduction.holds, reduction.injections)).toContain(
      '8 holds from 215 to 275 °C, 40 injections, 8 left out',
    )
    expect(timeTraceTable(trace, reduction.holds, reduction.injections).rows).toHaveLength(49)
  })
})
