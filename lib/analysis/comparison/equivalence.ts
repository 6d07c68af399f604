import { coverageFactor, studentTQuantile } from '../statistics/student-t'
import { combineUncertainty, type UncertaintyPart } from '../statistics/welch'

/** Whether two results are the same for practical purposes. */
export interface EquivalenceTest {
  readonly difference: number
  readonly standardError: number
  readonly degreesOfFreedom: number | null
  /** two-sided interval of the difference at 1 − 2α: inside the margin means equivalent at level α */
  readonly interval: readonly [number, number]
  /** two-sided interval at 1 − α, without 0 in it when they differ */
  readonly differenceInterval: readonly [number, number]
  readonly margin: number
  readonly verdict: 'equivalent' | 'different' | 'different-but-within-margin' | 'cannot-tell'
}

/** Usual margins: what counts as the same in practice. Source: common practice. */
export const EQUIVALENCE_MARGIN = { lnRate: 0.1, activationEnergyJPerMol: 5_000 } as const

/**
 * Equivalence by two one-sided tests.
 *
 * equivalent when d ± t(1 − α; ν) SE lies within ± margin; different when d ± t(1 − α/2; ν) SE leaves out 0; Welch ν
 *
 * A difference that is not significant is not equality: with wide errors the answer is that it cannot be told.
 * Source: Schuirmann, J. Pharmacokinet. Biopharm. 15 (1987) 657.
 *
 * @param first - value [any] with standard uncertainty [same unit] and degrees of freedom [-]
 * @param second - likewise [same unit]
 * @param margin - largest difference that does not matter [same unit] > 0
 * @param level - α, between 0 and 0.5 [-]
 * @returns difference with intervals [same unit] and Welch degrees of freedom
 */
export function testEquivalence(
  first: UncertaintyPart & ValuePart,
  second: UncertaintyPart & ValuePart,
  margin: number,
  level = 0.05,
): EquivalenceTest {
  const { standardUncertainty: error, degreesOfFreedom } = combineUncertainty([first, second])
  const difference = first.value - second.value
  const oneSided = studentTQuantile(1 - level, degreesOfFreedom) * error
  const twoSided = coverageFactor(1 - level, degreesOfFreedom) * error
  const interval = [difference - oneSided, difference + oneSided] as const
  const differenceInterval = [difference - twoSided, difference + twoSided] as const
  const isEquivalent = interval[0] > -margin && interval[1] < margin
  const isDifferent = differenceInterval[0] > 0 || differenceInterval[1] < 0
  const verdict = isEquivalent
    ? isDifferent
      ? 'different-but-within-margin'
      : 'equivalent'
    : isDifferent
      ? 'different'
      : 'cannot-tell'
  return { difference, standardError: error, degreesOfFreedom, interval, differenceInterval, margin, verdict }
}

/** The value an uncertainty belongs to. */
export interface ValuePart {
  readonly value: number
}
