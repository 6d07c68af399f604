import { describe, expect, it } from 'vitest'
import { binomialRegion } from '@/tests/study/binomial-region'
import { studyAll } from '@/tests/study/coverage-study'

describe('exact binomial region', () => {
  it('is as R 4.2.2 has it: qbinom(c(.0005, .9995), n, .95)', () => {
    expect(binomialRegion(1_000, 0.95)).toEqual({ low: 926, high: 971 })
    expect(binomialRegion(20_000, 0.95)).toEqual({ low: 18_897, high: 19_100 })
    expect(binomialRegion(1_000, 0.05)).toEqual({ low: 29, high: 74 })
  })
})

/** The small version of the study; `npm run study:coverage` runs 20,000 fits of each. */
describe('intervals and tests keep what they state, 1,000 simulated fits each', () => {
  const tallies = studyAll(1_000)
  it.each(tallies)('$estimator: $quantity', ({ hits, low, high }) => {
    expect(hits).toBeGreaterThanOrEqual(low)
    expect(hits).toBeLessThanOrEqual(high)
  })
})
