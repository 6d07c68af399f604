import { twoSidedTProbability } from './student-t'

/** One independent part of an uncertainty. */
export interface UncertaintyPart {
  readonly standardUncertainty: number
  /** null stands for infinite */
  readonly degreesOfFreedom: number | null
}

/**
 * Effective degrees of freedom of a sum of independent parts.
 *
 * nu = (sum u^2)^2 / sum(u^4 / nu_i)
 * Source: B. L. Welch, Biometrika 34 (1947) 28, doi:10.1093/biomet/34.1-2.28; JCGM 100:2008, G.4.1.
 *
 * @param parts - standard uncertainties with degrees of freedom [one unit for all]
 * @returns combined standard uncertainty and degrees of freedom, null for infinite [same unit; -]
 */
export function combineUncertainty(parts: readonly UncertaintyPart[]): {
  readonly standardUncertainty: number
  readonly degreesOfFreedom: number | null
} {
  let variance = 0
  let weighted = 0
  for (const part of parts) {
    const square = part.standardUncertainty * part.standardUncertainty
    variance += square
    if (part.degreesOfFreedom !== null) weighted += (square * square) / part.degreesOfFreedom
  }
  return {
    standardUncertainty: Math.sqrt(variance),
    degreesOfFreedom: weighted > 0 ? (variance * variance) / weighted : null,
  }
}

export interface WelchTest {
  readonly difference: number
  readonly standardError: number
  readonly t: number | null
  readonly degreesOfFreedom: number | null
  readonly pValue: number | null
}

/**
 * Difference of two independent estimates whose variances need not be equal.
 *
 * t = (a - b) / sqrt(u_a^2 + u_b^2), degrees of freedom after Welch and Satterthwaite.
 * Source: B. L. Welch, Biometrika 34 (1947) 28; doi:10.1093/biomet/34.1-2.28.
 *
 * @param first - value, standard uncertainty and degrees of freedom [any unit]
 * @param second - the same of the other [same unit]
 * @returns difference, its standard error and the test; t and p are null where both uncertainties are zero [same unit]
 */
export function testDifference(
  first: UncertaintyPart & { readonly value: number },
  second: UncertaintyPart & { readonly value: number },
): WelchTest {
  const combined = combineUncertainty([first, second])
  const difference = first.value - second.value
  const t = combined.standardUncertainty > 0 ? difference / combined.standardUncertainty : null
  return {
    difference,
    standardError: combined.standardUncertainty,
    t,
    degreesOfFreedom: combined.degreesOfFreedom,
    pValue: t === null ? null : twoSidedTProbability(t, combined.degreesOfFreedom),
  }
}
