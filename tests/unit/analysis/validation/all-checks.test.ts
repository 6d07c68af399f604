import { describe, expect, it } from 'vitest'
import { ALL_CHECKS } from '@/lib/analysis/validation/all-checks'
import { item, runChecks } from '@/lib/analysis/validation/check'

describe.each(ALL_CHECKS)('$id $title ($source, $provenance)', (check) => {
  const [report] = runChecks([check])
  it.each(report?.results ?? [])('$quantity is $expected $unit', ({ obtained, relativeError, tolerance }) => {
    expect(relativeError, `obtained ${String(obtained)}`).not.toBeNull()
    expect(relativeError ?? NaN, `obtained ${String(obtained)}`).toBeLessThanOrEqual(tolerance)
  })
})

describe('the list itself', () => {
  it('has each number once, and each check a source and numbers', () => {
    const ids = ALL_CHECKS.map(({ id }) => id)
    expect(new Set(ids).size).toBe(ids.length)
    for (const check of ALL_CHECKS) {
      expect(check.items.length, check.id).toBeGreaterThan(0)
      expect(check.source, check.id).not.toBe('')
    }
  })
  it('shows a broken computation as a number that was not obtained', () => {
    const broken = item('broken', '1', 1, () => {
      throw new Error('no')
    })
    const wrong = item('wrong', '1', 1, () => 1.1)
    const zero = item('zero', '1', 0, () => 1e-12)
    const [report] = runChecks([
      { id: 'X', title: '', source: '', provenance: 'computed', published: '', items: [broken, wrong, zero] },
    ])
    expect(report?.passes).toBe(false)
    expect(report?.results.map(({ passes }) => passes)).toEqual([false, false, true])
    expect(report?.results[0]?.obtained).toBeNull()
  })
})
