import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { testEquivalence } from '@/lib/analysis/comparison/equivalence'
import { compareUnequalPairs } from '@/lib/analysis/comparison/games-howell'
import { closeTo } from '../kinetics/close-to'

// reference values: R 4.2.2, tests/reference/games-howell.R
describe('Games-Howell on the R data set PlantGrowth', () => {
  const sets = [
    [4.17, 5.58, 5.18, 6.11, 4.5, 4.61, 5.17, 4.53, 5.33, 5.14],
    [4.81, 4.17, 4.41, 3.59, 5.87, 3.83, 6.03, 4.89, 4.32, 4.69],
    [6.31, 5.12, 5.54, 5.5, 5.37, 5.29, 4.92, 6.15, 5.8, 5.26],
  ].map((values) => {
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length
    const variance = values.reduce((sum, value) => sum + (value - mean) * (value - mean), 0) / 9
    return { mean, standardUncertainty: Math.sqrt(variance / 10), degreesOfFreedom: 9 }
  })
  it('three pairs', () => {
    const pairs = compareUnequalPairs(sets)
    const expected = [
      [0.371, 0.47455492219398, 0.801087501501755],
      [-0.494, 0.112889176854217, 0.594554433333154],
      [-0.865, 0.0237034547392031, 0.7514870066828049],
    ] as const
    for (const [i, [difference, p, reach]] of expected.entries()) {
      closeTo(pairs[i]?.difference, difference, 1e-12)
      closeTo(pairs[i]?.pValue, p, 1e-6)
      closeTo((pairs[i]?.high ?? NaN) - (pairs[i]?.difference ?? NaN), reach, 1e-6)
    }
  })
  it('refuses results without uncertainty', () => {
    expect(() => compareUnequalPairs(sets.slice(0, 1))).toThrow(AnalysisError)
    expect(() => compareUnequalPairs([...sets, { mean: 1, standardUncertainty: 0, degreesOfFreedom: 3 }])).toThrow(
      AnalysisError,
    )
  })
})

describe('equivalence', () => {
  const first = { value: 100, standardUncertainty: 1, degreesOfFreedom: 6 }
  const second = { value: 101, standardUncertainty: 1.2, degreesOfFreedom: 5 }
  it('intervals as computed apart', () => {
    const test = testEquivalence(first, second, 5)
    closeTo(test.standardError, 1.56204993518133)
    closeTo(test.degreesOfFreedom, 10.24034492248418)
    closeTo(test.interval[0], -3.82442709572154)
    closeTo(test.interval[1], 1.82442709572154)
    closeTo(test.differenceInterval[0], -4.46942319333102)
    expect(test.verdict).toBe('equivalent')
  })
  it('not significant is not the same as equal', () => {
    expect(testEquivalence(first, second, 2).verdict).toBe('cannot-tell')
    expect(testEquivalence({ ...first, value: 90 }, second, 2).verdict).toBe('different')
    expect(testEquivalence({ ...first, value: 97 }, second, 8).verdict).toBe('different-but-within-margin')
  })
})
