import { describe, expect, it } from 'vitest'
import { compareAllSlopes } from '@/lib/analysis/ranking/compare-all-slopes'
import { estimateOf } from '../../../support/example-fit'

const slope = (name: string, value: number, u: number | null) => ({
  name,
  activationEnergyJPerMol: estimateOf(value, u, { 'thermocouple:rig-b': value * 0.001 }, null),
})

describe('compareAllSlopes', () => {
  it('takes every pair once and adjusts p by Holm', () => {
    const pairs = compareAllSlopes([slope('A', 80_000, 300), slope('B', 80_900, 300), slope('C', 90_000, 300)], 0.95)
    expect(pairs.map((pair) => pair.first + pair.second)).toEqual(['AB', 'AC', 'BC'])
    // shared: 0.1 % of each, so only 0.9 J/mol of it is left in A against B; z = 900 / sqrt(2 * 300^2 + 0.9^2) = 2.12131
    // R 4.2.2: 2 * pnorm(-2.121319) = 0.03389; the two others are below 1e-90, so Holm leaves the largest p as it is
    expect(pairs[0]?.found.pValue).toBeCloseTo(0.03389, 4)
    expect(pairs[0]?.adjustedPValue).toBeCloseTo(pairs[0]?.found.pValue ?? NaN, 12)
    expect(pairs[2]?.adjustedPValue).toBeCloseTo(2 * (pairs[2]?.found.pValue ?? NaN), 12)
  })
  it('leaves out what has no scatter to judge by', () => {
    expect(compareAllSlopes([slope('A', 80_000, null), slope('B', 81_000, 300)], 0.95)).toEqual([])
    expect(compareAllSlopes([], 0.95)).toEqual([])
  })
})
