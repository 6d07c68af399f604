import { describe, expect, it } from 'vitest'
import { buildArrheniusOption, roundTicks } from '@/components/charts/arrhenius-chart-option'
import { arrheniusSummary, arrheniusTable } from '@/components/charts/arrhenius-text'
import { temperWindow } from '@/components/charts/temper-scale'
import { lightColours } from '@/components/charts/theme-colours'
import { arrheniusSeries } from '@/components/campaign/arrhenius-series'
import { rankingGridRows } from '@/components/grids/ranking-grid-row'
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

describe('roundTicks', () => {
  it('has round steps inside the bounds', () => {
    expect(roundTicks(208, 298, 9)).toEqual([210, 220, 230, 240, 250, 260, 270, 280, 290])
    expect(roundTicks(-1.4, 2.8, 4)).toEqual([0, 2])
    expect(roundTicks(0, 6, 3)).toEqual([0, 2, 4, 6])
  })
})
