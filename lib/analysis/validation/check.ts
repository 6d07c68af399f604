/** One number of a check: what it must be and how the shipped code computes it. */
export interface CheckItem {
  readonly quantity: string
  readonly unit: string
  readonly expected: number
  /** largest relative difference */
  readonly tolerance: number
  readonly compute: () => number | null | undefined
}

/** A published or independently computed case that the engine must reproduce. */
export interface Check {
  readonly id: string
  readonly title: string
  readonly source: string
  /** whether the source's own page was read, or its numbers recalled and trusted only because the recomputation lands on them */
  readonly provenance: 'read' | 'recalled' | 'computed'
  /** what the source prints, and why ours may differ from it */
  readonly published: string
  readonly items: readonly CheckItem[]
}

/** One number after computing. */
export interface CheckResult {
  readonly quantity: string
  readonly unit: string
  readonly expected: number
  /** null when the code gave no number */
  readonly obtained: number | null
  /** absolute where the expected value is zero; null without a number */
  readonly relativeError: number | null
  readonly tolerance: number
  readonly passes: boolean
}

/** One check after computing. */
export interface CheckReport {
  readonly id: string
  readonly title: string
  readonly source: string
  readonly provenance: Check['provenance']
  readonly published: string
  readonly results: readonly CheckResult[]
  readonly passes: boolean
}

/**
 * Computes all numbers of the checks with the code as it is shipped.
 *
 * Relative error |obtained/expected − 1|; a number passes within its tolerance. A computation that throws counts as no number.
 * Source: references stand with each check.
 *
 * @param checks - checks to compute [-]
 * @returns one report a check, in the order given [-]
 */
export function runChecks(checks: readonly Check[]): CheckReport[] {
  return checks.map(({ items, ...check }) => {
    const results = items.map(({ compute, ...item }): CheckResult => {
      const obtained = valueOf(compute)
      const relativeError =
        obtained === null ? null : item.expected === 0 ? Math.abs(obtained) : Math.abs(obtained / item.expected - 1)
      return { ...item, obtained, relativeError, passes: relativeError !== null && relativeError <= item.tolerance }
    })
    return { ...check, results, passes: results.every(({ passes }) => passes) }
  })
}

// One broken computation must not hide the others: it shows as a number that was not obtained.
function valueOf(compute: CheckItem['compute']): number | null {
  try {
    const value = compute()
    return value !== null && value !== undefined && Number.isFinite(value) ? value : null
  } catch {
    return null
  }
}

/** Relative tolerance of closed forms and linear fits. */
export const CLOSED_FORM = 1e-8
/** Relative tolerance of iterated nonlinear fits. */
export const ITERATED = 1e-6

/**
 * One number of a check.
 *
 * @param quantity - what it is, in words [-]
 * @param unit - its unit [-]
 * @param expected - independent value [unit]
 * @param compute - how the shipped code gets it [unit]
 * @param tolerance - largest relative difference [-]
 * @returns the item [-]
 */
export function item(
  quantity: string,
  unit: string,
  expected: number,
  compute: CheckItem['compute'],
  tolerance: number = CLOSED_FORM,
): CheckItem {
  return { quantity, unit, expected, tolerance, compute }
}

/**
 * A value computed once, at first use.
 *
 * @param compute - how [any]
 * @returns a function that gives the value [any]
 */
export function once<T>(compute: () => T): () => T {
  let stored: { readonly value: T } | null = null
  return () => {
    stored ??= { value: compute() }
    return stored.value
  }
}
