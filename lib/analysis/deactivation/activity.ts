import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import log1p from '@stdlib/math-base-special-log1p'
import pow from '@stdlib/math-base-special-pow'
import { AnalysisError } from '../analysis-error'

/** Law of decay: order of the decay in the activity, and whether an activity remains for ever. */
export interface DecayLaw {
  readonly order: 0 | 1 | 2 | 3
  /** only for orders 1 and 2 */
  readonly hasResidual: boolean
}

/**
 * Activity after a time on stream.
 *
 * −da/dt = k_d a^m: 1 − k_d t; exp(−k_d t); 1/(1 + k_d t); (1 + 2 k_d t)^(−½). With a residue −da/dt = k_d (a − a_ss)^m:
 * a_ss + (1 − a_ss) exp(−k_d t); a_ss + (1 − a_ss)/(1 + (1 − a_ss) k_d t)
 *
 * Decay that does not depend on composition. Of order 0 the activity is 0 once it is used up.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 21; Fuentes, Appl. Catal. 15 (1985) 33 (residue).
 *
 * @param law - order and residue [-]
 * @param rateConstantPerS - k_d [s-1] >= 0
 * @param timeS - time on stream [s] >= 0
 * @param residual - a_ss [-], 0 to 1; counted only when the law has one
 * @returns activity, 1 at time zero [-]
 * @throws {AnalysisError} out-of-range for a residue with order 0 or 3
 */
export function activity(law: DecayLaw, rateConstantPerS: number, timeS: number, residual = 0): number {
  const kt = rateConstantPerS * timeS
  if (law.hasResidual) {
    if (law.order === 1) return residual + (1 - residual) * exp(-kt)
    if (law.order === 2) return residual + (1 - residual) / (1 + (1 - residual) * kt)
    throw new AnalysisError('out-of-range', 'A residual activity is only defined here for decay of order 1 or 2.', {
      order: law.order,
    })
  }
  if (law.order === 0) return Math.max(0, 1 - kt)
  if (law.order === 1) return exp(-kt)
  if (law.order === 2) return 1 / (1 + kt)
  return pow(1 + 2 * kt, -0.5)
}

/**
 * Activity from conversions of a first-order reaction: the decay acts on the rate constant and not on the conversion.
 *
 * Plug flow: ln(1 − X)/ln(1 − X₀); stirred: [X/(1 − X)]/[X₀/(1 − X₀)]
 *
 * At complete conversion nothing can be said, however constant the conversion looks.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 21.
 *
 * @param conversion - X now [-], below 1
 * @param startConversion - X at the start [-], between 0 and 1
 * @param reactor - kind of reactor [-]
 * @returns activity [-]
 * @throws {AnalysisError} out-of-range when a conversion is at or past 1, or the first is not above 0
 */
export function activityFromConversion(
  conversion: number,
  startConversion: number,
  reactor: 'plug-flow' | 'stirred-tank',
): number {
  if (!(conversion < 1) || !(startConversion > 0 && startConversion < 1))
    throw new AnalysisError(
      'out-of-range',
      'Conversions must lie below 1, the first above 0: at full conversion decay does not show.',
      {
        conversion,
        startConversion,
      },
    )
  if (reactor === 'plug-flow') return log1p(-conversion) / log1p(-startConversion)
  return conversion / (1 - conversion) / (startConversion / (1 - startConversion))
}

/** A return to the reference condition. */
export interface Bracket {
  readonly timeS: number
  readonly rate: number
  readonly relativeStandardUncertainty: number
}

/** Activity at a time between two returns to the reference condition. */
export interface BracketedActivity {
  /** relative to the first bracket */
  readonly activity: number
  readonly relativeStandardUncertainty: number
  /** true outside the brackets, where nothing bounds the activity */
  readonly isExtrapolated: boolean
}

/**
 * Activity between returns to a reference condition, relative to the first.
 *
 * ln a(t) straight between neighbouring brackets; outside, for at most one window, the line of the nearest pair
 *
 * Uncertainty: both neighbours and the first bracket, taken as independent. The interpolated activity assumes steady loss between returns.
 * Source: common practice (bracketing); propagation JCGM 100:2008, equation 10.
 *
 * @param brackets - at least 2 returns in time order: time [s], rate [any] > 0, relative standard uncertainty [-]
 * @param timeS - when the activity is wanted [s]
 * @returns activity [-] with relative standard uncertainty [-]
 * @throws {AnalysisError} too-few-points | not-finite | not-positive for a rate not above zero | out-of-range when not in time order, or more than one window outside
 */
export function bracketedActivity(brackets: readonly Bracket[], timeS: number): BracketedActivity {
  const first = brackets[0]
  if (first === undefined || brackets.length < 2)
    throw new AnalysisError('too-few-points', 'Bracketing needs at least two returns.')
  if (
    !Number.isFinite(timeS) ||
    brackets.some((bracket) => !Number.isFinite(bracket.timeS) || !Number.isFinite(bracket.rate))
  )
    throw new AnalysisError('not-finite', 'Times and rates of the returns must be finite numbers.')
  for (const [i, bracket] of brackets.entries()) {
    if (!(bracket.rate > 0))
      throw new AnalysisError('not-positive', 'The rate at a return must be above zero.', { index: i })
    if (i > 0 && !(bracket.timeS > (brackets[i - 1]?.timeS ?? NaN)))
      throw new AnalysisError('out-of-range', 'Returns must stand in time order.', { index: i })
  }
  const next = Math.min(
    Math.max(
      brackets.findIndex((bracket) => bracket.timeS >= timeS),
      1,
    ),
    brackets.length - 1,
  )
  const index = timeS > (brackets[brackets.length - 1]?.timeS ?? NaN) ? brackets.length - 1 : next
  const [before, after] = [brackets[index - 1] ?? first, brackets[index] ?? first]
  const share = (timeS - before.timeS) / (after.timeS - before.timeS)
  if (!(share >= -1 && share <= 2))
    throw new AnalysisError(
      'out-of-range',
      'This time lies more than one window outside the returns; nothing bounds the activity there.',
      {
        timeS,
      },
    )
  const lnActivity = (1 - share) * ln(before.rate / first.rate) + share * ln(after.rate / first.rate)
  // weights of each bracket in ln a: the first enters with −1, and may itself be the one before
  const weight = new Map<Bracket, number>()
  for (const [bracket, value] of [
    [before, 1 - share],
    [after, share],
    [first, -1],
  ] as const)
    weight.set(bracket, (weight.get(bracket) ?? 0) + value)
  let variance = 0
  for (const [bracket, value] of weight) {
    const part = value * bracket.relativeStandardUncertainty
    variance += part * part
  }
  return {
    activity: exp(lnActivity),
    relativeStandardUncertainty: Math.sqrt(variance),
    isExtrapolated: share < 0 || share > 1,
  }
}
