import { createElement, type ReactElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { derivedWorking } from '@/components/grids/derived-working'
import { intervalScale } from '@/components/grids/interval-scale'
import {
  buildRankingColumns,
  compareNumbers,
  formatProbability,
  selectivitySpecies,
  workingKeyOf,
} from '@/components/grids/ranking-columns'
import { QuantityCell } from '@/components/grids/ranking-cells'
import { cellChange } from '@/components/grids/ranking-cell-change'
import { rankingGridRows } from '@/components/grids/ranking-grid-row'
import { savedGridState } from '@/components/grids/saved-grid-state'
import { exampleRanking } from '../../../support/example-ranking'

const ranking = exampleRanking()
const none = { canRemark: false, canShortlist: false, canDecide: false }
const leaves = (permissions: typeof none) =>
  buildRankingColumns(ranking, permissions, null, false).flatMap((column) =>
    'children' in column ? column.children.flatMap((child) => ('children' in child ? [] : [child])) : [column],
  )

describe('ranking columns', () => {
  it('have all that the ranking states, each under its own key', () => {
    const ids = leaves(none).map((column) => column.colId)
    expect(new Set(ids).size).toBe(ids.length)
    for (const id of [
      'rank',
      'rankInterval',
      'sample',
      'turnoverFrequencyPerS',
      'probabilityBest',
      'rateMolPerKgS',
      'activationEnergyJPerMol',
      'activationEnergyInterval',
      'lnPreExponential',
      'temperatureForConversionK',
      'selectivity.CH4',
      'selectivity.CO',
      'carbonBalance',
      'decayPerH',
      'distinctTemperatures',
      'span',
      'cautions',
      'decision',
      'isShortlisted',
      'priority',
      'remark',
    ]) {
      expect(ids).toContain(id)
    }
  })
  it('let a cell be written by those who may', () => {
    const editable = (permissions: typeof none) =>
      leaves(permissions)
        .filter((column) => column.editable === true)
        .map((column) => column.colId)
    expect(editable(none)).toEqual([])
    expect(editable({ ...none, canRemark: true })).toEqual(['remark'])
    expect(editable({ canRemark: true, canShortlist: true, canDecide: true })).toEqual([
      'isShortlisted',
      'priority',
      'remark',
    ])
  })
  it('put missing numbers last whichever way they are sorted', () => {
    const up = [3, null, 1].sort((a, b) => compareNumbers(a, b, undefined, undefined, false))
    expect(up).toEqual([1, 3, null])
    // the grid turns the sign round for a descending sort
    const down = [3, null, 1].sort((a, b) => -compareNumbers(a, b, undefined, undefined, true))
    expect(down).toEqual([3, 1, null])
  })
  it('name the selectivities by amount, and the working of a derived column', () => {
    expect(selectivitySpecies(ranking.rows)).toEqual(['CH4', 'CO'])
    expect(workingKeyOf('activationEnergyInterval')).toBe('activationEnergyJPerMol')
    expect(workingKeyOf('selectivity.CH4')).toBe('selectivity.CH4')
    expect(workingKeyOf('carbonBalance')).toBe('carbonBalance')
  })
  it('do not claim certainty from draws', () => {
    expect(formatProbability(0.9998)).toBe('> 0.99')
    expect(formatProbability(0)).toBe('< 0.01')
    expect(formatProbability(0.5)).toBe('0.50')
    expect(formatProbability(null)).toBe('–')
  })
})

describe('working of a number that follows from the whole ranking', () => {
  it('says how ranks were drawn', () => {
    const row = ranking.rows[1]
    if (!row) throw new Error('the example has it')
    const working = derivedWorking(ranking, row, 'probabilityBest')
    expect(working?.title).toBe('Rank of CQ-106')
    expect(working?.symbols.find((symbol) => symbol.symbol === 'N')?.value).toBe(20_000)
    expect(working?.result.value).toBe(2)
  })
  it('says why a number is missing, where one was asked for', () => {
    const [row, blank] = [ranking.rows[0], ranking.rows[7]]
    if (!row || !blank) throw new Error('the example has them')
    const without = {
      ...row,
      decayPerH: null,
      cannotTell: { decayPerH: 'no hold of R-0001 returns.', selectivity: 'x.' },
    }
    const working = derivedWorking(ranking, without, 'decayPerH')
    expect(working?.title).toBe(`Loss of activity of ${row.sampleCode}`)
    expect(working?.notes).toEqual(['Cannot tell: no hold of R-0001 returns.'])
    expect(working?.result.value).toBeNull()
    // one reason for all species
    expect(derivedWorking(ranking, without, 'selectivity.CH4')?.notes).toEqual(['Cannot tell: x.'])
    expect(derivedWorking(ranking, row, 'decayPerH')).toBeNull()
    expect(derivedWorking(ranking, blank, 'activationEnergyJPerMol')).toBeNull()
    expect(derivedWorking(ranking, row, 'remark')).toBeNull()
  })
})

describe('cell of a number', () => {
  const textOf = (props: Parameters<typeof QuantityCell>[0]) =>
    renderToStaticMarkup(createElement(QuantityCell, props)).replace(/<[^>]+>/g, '')
  it('carries its uncertainty, or says that none can be told and why', () => {
    expect(textOf({ value: 1.0123, half: 0.018 })).toBe('1.012 ± 0.018')
    expect(textOf({ value: 1.0123, half: null, why: 'one injection.' })).toBe(
      '1.012 ± ?, the uncertainty cannot be told: one injection.',
    )
    expect(textOf({ value: 100, half: 0 })).toBe('100.0 ± 0')
    expect(textOf({ value: null, half: null, why: 'no hold returns.' })).toBe('cannot tell: no hold returns.')
    expect(textOf({ value: null, half: null, why: 'a blank.', isBlank: true })).toBe('–')
  })
  it('is what every computed column of the table shows: a value, half its interval, in the unit of the header', () => {
    const row = rankingGridRows(ranking.rows)[0]
    const cell = (colId: string) => {
      const column = leaves(none).find((candidate) => candidate.colId === colId)
      const { valueGetter, cellRenderer } = column ?? {}
      if (typeof valueGetter !== 'function' || typeof cellRenderer !== 'function') throw new Error(colId)
      const given = { data: row, value: undefined as unknown } as never
      const value: unknown = valueGetter(given)
      const element: unknown = (cellRenderer as (given: unknown) => unknown)({ data: row, value })
      return renderToStaticMarkup(element as ReactElement).replace(/<[^>]+>/g, '')
    }
    // the example: 530.2 K from 528.2 to 532.2; 0.952 from 0.944 to 0.960; 1.00 from 0.984 to 1.016; 0.001 from -0.0016 to 0.0036
    expect(cell('temperatureForConversionK')).toBe('257.1 ± 2.0')
    expect(cell('selectivity.CH4')).toBe('95.20 ± 0.80')
    expect(cell('carbonBalance')).toBe('1.000 ± 0.016')
    expect(cell('decayPerH')).toBe('0.10 ± 0.26')
  })
})

describe('what an edited cell asks for', () => {
  it('takes what may be stored and nothing else', () => {
    expect(cellChange('remark', '  again  ')).toEqual({ remark: 'again' })
    expect(cellChange('remark', null)).toEqual({ remark: '' })
    expect(cellChange('isShortlisted', true)).toEqual({ isShortlisted: true })
    expect(cellChange('priority', 3)).toEqual({ priority: 3 })
    expect(cellChange('priority', null)).toEqual({ priority: null })
    expect(cellChange('priority', 12)).toBeNull()
    expect(cellChange('priority', 1.5)).toBeNull()
    expect(cellChange('rank', 1)).toBeNull()
  })
})

describe('rows', () => {
  it('come in rank order with the unranked last, and keep their shape when ranks change', () => {
    const rows = rankingGridRows(ranking.rows)
    expect(rows.map((entry) => entry.row.rank)).toEqual([1, 2, 3, 4, 5, 6, 7, null])
    const turned = rankingGridRows(
      ranking.rows.map((row) => ({ ...row, rank: row.rank === null ? null : 8 - row.rank })),
    )
    for (const entry of rows) {
      expect(turned.find((other) => other.row.sampleId === entry.row.sampleId)?.symbol).toBe(entry.symbol)
    }
  })
})

describe('interval scale', () => {
  it('holds every interval', () => {
    const scale = intervalScale([[70, 74], null, [97, 101]], 112)
    expect(scale?.toX(70)).toBeGreaterThanOrEqual(5)
    expect(scale?.toX(101)).toBeLessThanOrEqual(107)
    expect(scale?.ticks).toEqual([70, 80, 90, 100])
    expect(intervalScale([null], 112)).toBeNull()
  })
})

describe('saved state', () => {
  it('takes no filter: rows hidden by one that is forgotten would be missed', () => {
    expect(savedGridState({ filter: { filterModel: { ea: { type: 'equals', filter: 84 } } } })).toBeNull()
  })
  it('takes the parts it knows', () => {
    expect(savedGridState({ sort: { sortModel: [] }, rowSelection: ['x'], filter: null })).toEqual({
      sort: { sortModel: [] },
    })
    expect(savedGridState('nonsense')).toBeNull()
    expect(savedGridState(null)).toBeNull()
  })
})
