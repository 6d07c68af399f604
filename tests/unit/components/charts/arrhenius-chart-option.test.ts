import { describe, expect, it } from 'vitest'
import { buildArrheniusOption, labelShifts, lineName, roundTicks } from '@/components/charts/arrhenius-chart-option'
import { arrheniusSummary, arrheniusTable } from '@/components/charts/arrhenius-text'
import { temperWindow } from '@/components/charts/temper-scale'
import { lightColours } from '@/components/charts/theme-colours'
import { arrheniusSeries } from '@/components/campaign/arrhenius-series'
import { rankingGridRows } from '@/components/grids/ranking-grid-row'
import { estimateOf, exampleFit } from '../../../support/example-fit'
import { exampleRanking } from '../../../support/example-ranking'

const ranking = exampleRanking()
const rows = rankingGridRows(ranking.rows)
const ids = ['sample-CQ-104', 'sample-CQ-103']
const series = arrheniusSeries(rows, ids, 'rate')
const option = buildArrheniusOption({
  series,
  window: temperWindow(ranking.holdTemperaturesK),
  colours: lightColours,
  isCompact: false,
  referenceTemperatureK: 523.15,
})
const drawn = Array.isArray(option.series) ? option.series : []
const seriesById = (id: string) => drawn.find((entry) => entry.id === id)
const dataOf = (id: string): unknown[] => {
  const data = seriesById(id)?.data
  return Array.isArray(data) ? data : []
}

describe('Arrhenius plot', () => {
  it('draws points, bars, line, band and residuals of each sample', () => {
    for (const code of ['CQ-104', 'CQ-103']) {
      for (const part of ['band', 'line', 'bar', 'point', 'residual-bar', 'residual']) {
        expect(seriesById(`${part}-${code}`), `${part}-${code}`).toBeDefined()
      }
    }
  })
  it('puts 1000/T across and ln of the rate in µmol g⁻¹ s⁻¹ up', () => {
    // first point of CQ-104: 488.17 K, ln -0.104 in the practical unit
    expect(dataOf('point-CQ-104')[0]).toMatchObject({ value: [1_000 / 488.17, expect.closeTo(-0.104, 9)] })
  })
  it('keeps an excluded point in sight, hollow, with its reason', () => {
    expect(dataOf('point-CQ-103')).toHaveLength(7)
    expect(dataOf('point-CQ-103')[2]).toMatchObject({
      itemStyle: { color: lightColours.paper },
      lines: expect.arrayContaining([expect.stringContaining('left out by M. Reed')]),
    })
  })
  it('states values in a summary and in a table', () => {
    expect(arrheniusSummary(series)).toContain('CQ-103')
    expect(arrheniusSummary(series)).toContain('1 left out')
    const table = arrheniusTable(series, 'ln r')
    expect(table.rows).toHaveLength(14)
    expect(table.rows.every((row) => row.length === table.columns.length)).toBe(true)
  })
  it('draws per site with the step from rate to TOF, and nothing for a sample without sites', () => {
    const perSite = arrheniusSeries(rows, ids, 'turnover-frequency')
    expect(perSite).toHaveLength(2)
    const row = rows.find((entry) => entry.row.sampleId === 'sample-CQ-104')?.row
    const atReference = row?.fit?.lnRateAtReference.value ?? NaN
    expect(atReference + (perSite[0]?.shift ?? NaN)).toBeCloseTo(Math.log(row?.turnoverFrequencyPerS?.value ?? NaN), 9)
    expect(arrheniusSeries(rows, ['sample-blank'], 'rate')).toEqual([])
  })
  it('draws a sample of several runs run by run, each with its own line and label, and marks where it is ranked', () => {
    const [first, second] = [
      exampleFit('R-0001', [500, 510, 520, 530], [-8, -7.6, -7.2, -6.9]),
      exampleFit('R-0002', [500, 510, 520, 530], [-7.9, -7.45, -7.1, -6.7]),
    ]
    const severalRuns = rows.map((entry) =>
      entry.row.sampleCode === 'CQ-104'
        ? {
            ...entry,
            row: {
              ...entry.row,
              runFits: [first, second],
              rateMolPerKgS: { ...(entry.row.rateMolPerKgS ?? estimateOf(1, 0)), value: 8e-4 },
              rateInterval: [7e-4, 9e-4] as const,
            },
          }
        : entry,
    )
    const lines = arrheniusSeries(severalRuns, ids, 'rate')
    expect(lines.map(lineName)).toEqual(['CQ-104 R-0001', 'CQ-104 R-0002', 'CQ-103'])
    const severalOption = buildArrheniusOption({
      series: lines,
      window: temperWindow(ranking.holdTemperaturesK),
      colours: lightColours,
      isCompact: true,
      referenceTemperatureK: 523.15,
    })
    const parts = Array.isArray(severalOption.series) ? severalOption.series : []
    const part = (id: string) => parts.find((entry) => entry.id === id)
    for (const run of ['R-0001', 'R-0002'])
      for (const kind of ['band', 'line', 'bar', 'point', 'residual'])
        expect(part(`${kind}-CQ-104 ${run}`), `${kind} of ${run}`).toBeDefined()
    expect(part('line-CQ-104')).toBeUndefined()
    // one shape a sample, another stroke a run
    expect(part('point-CQ-104 R-0001')).toHaveProperty(
      'symbol',
      (part('point-CQ-104 R-0002') as { symbol?: unknown }).symbol,
    )
    expect(part('line-CQ-104 R-0001')).toHaveProperty('lineStyle.type', 'solid')
    expect(part('line-CQ-104 R-0002')).toHaveProperty('lineStyle.type', [7, 3])
    expect(part('line-CQ-104 R-0002')).toHaveProperty('endLabel.formatter', 'R-0002')
    // 8e-4 mol/(kg s) are 0.8 µmol/(g s)
    expect(part('ranked-CQ-104')).toHaveProperty('data.0.value', [1_000 / 523.15, expect.closeTo(Math.log(0.8), 12)])
    expect(part('ranked-CQ-104')).toHaveProperty('label.formatter', 'CQ-104')
    expect(part('ranked-bar-CQ-104')).toHaveProperty('data.0', [
      1_000 / 523.15,
      expect.closeTo(Math.log(0.7), 12),
      expect.closeTo(Math.log(0.9), 12),
    ])
    expect(arrheniusSummary(lines)).toContain('CQ-104 has a line for each run')
    const { rows: cells } = arrheniusTable(lines, 'ln r')
    expect(cells).toHaveLength(4 + 1 + 4 + 7)
    expect(cells[4]?.slice(0, 2)).toEqual(['CQ-104', 'all, as ranked'])
    expect(cells[4]?.[6]).toBe('−0.3567 to −0.1054')
  })
  it('draws an empty plot without failing', () => {
    const empty = buildArrheniusOption({
      series: [],
      window: temperWindow([]),
      colours: lightColours,
      isCompact: true,
      referenceTemperatureK: null,
    })
    expect(empty.series).toBeDefined()
  })
})

describe('labels beside the plot', () => {
  const bounds = { low: 0, high: 10 }
  it('stay where the lines end when there is room, and are pushed apart where there is none', () => {
    // 100 px for 10 units: ends at 20, 50 and 52 px; the last goes to 64
    const ends = [
      { name: 'b', y: 5 },
      { name: 'a', y: 8 },
      { name: 'c', y: 4.8 },
    ]
    expect([...labelShifts(ends, bounds, 100)]).toEqual([
      ['a', 0],
      ['b', 0],
      ['c', 12],
    ])
  })
  it('do not leave the plot at its foot', () => {
    // ends at 98 and 99 px: the lower label stops at 100, the upper at 86
    const shifts = labelShifts(
      [
        { name: 'a', y: 0.2 },
        { name: 'b', y: 0.1 },
      ],
      bounds,
      100,
    )
    expect(shifts.get('a')).toBeCloseTo(-12, 9)
    expect(shifts.get('b')).toBeCloseTo(1, 9)
  })
})

describe('roundTicks', () => {
  it('has round steps inside the bounds', () => {
    expect(roundTicks(208, 298, 9)).toEqual([210, 220, 230, 240, 250, 260, 270, 280, 290])
    expect(roundTicks(-1.4, 2.8, 4)).toEqual([0, 2])
    expect(roundTicks(0, 6, 3)).toEqual([0, 2, 4, 6])
  })
})
