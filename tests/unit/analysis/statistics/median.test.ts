import { describe, expect, it } from 'vitest'
import { median } from '@/lib/analysis/statistics/median'

// R 4.2.2: set.seed(4); round(rnorm(12), 3); median(x); median(x[1:11])
const drawn = [0.217, -0.542, 0.891, 0.596, 1.636, 0.689, -1.281, -0.213, 1.897, 1.777, 0.567, 0.016]

describe('median', () => {
  it('is that of R, for an even and an odd number', () => {
    expect(median(drawn)).toBeCloseTo(0.5815, 14)
    expect(median(drawn.slice(0, 11))).toBe(0.596)
  })

  it('is found among equal, rising and falling values', () => {
    expect(median([2, 2, 2, 1, 2, 3, 2])).toBe(2)
    expect(median([1, 2, 3, 4, 5, 6])).toBe(3.5)
    expect(median([6, 5, 4, 3, 2, 1])).toBe(3.5)
    expect(median([7])).toBe(7)
  })

  it('passes over what is no finite number and leaves the values as they are', () => {
    const values = Object.freeze([Number.NaN, 9, Number.POSITIVE_INFINITY, 1, 4])
    expect(median(values)).toBe(4)
    expect(median([])).toBeNaN()
    expect(median([Number.NaN])).toBeNaN()
  })
})
