import { expect } from 'vitest'

/** Relative agreement, with both numbers in the message. */
export function closeTo(value: number | null | undefined, expected: number, tolerance = 1e-8): void {
  const difference = expected === 0 ? Math.abs(value ?? NaN) : Math.abs((value ?? NaN) / expected - 1)
  expect(difference, `${String(value)} against ${String(expected)}`).toBeLessThanOrEqual(tolerance)
}
