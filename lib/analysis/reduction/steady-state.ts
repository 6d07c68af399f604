import { studentTQuantile } from '../statistics/student-t'
import { fitWeightedLine } from '../statistics/weighted-line'
import { type Point } from './run-reduction'

const SECONDS_PER_HOUR = 3_600
/** Two one-sided tests at 5 %: the 90 % interval must lie within the limits. */
const ONE_SIDED = 0.95

/**
 * Whether a hold was steady: yes, no, or it cannot be told.
 *
 * Relative drift b / mean of the conversion against time; steady where its 90 % interval lies within +-limit, drifting where it lies outside,
 * else "cannot tell" (a test that fails to find a drift proves nothing). The scatter of one injection is that pooled over the run.
 * Source: S. Wellek, Testing Statistical Hypotheses of Equivalence and Noninferiority, 2nd edition, 2010, chapter 3; doi:10.1201/EBK1439808184.
 *
 * @param timeS - times of the injections [s]
 * @param value - what they say; needs a mean above zero [-]
 * @param scatter - relative standard deviation of one injection; null where not known [-]
 * @param degreesOfFreedom - of the scatter; null stands for infinite [-]
 * @param limitPerH - relative drift that is still steady [h-1]
 * @returns the answer with drift and its 90 % interval; nulls with fewer than three injections [h-1]
 */
export function judgeSteadiness(
  timeS: readonly number[],
  value: readonly number[],
  scatter: number | null,
  degreesOfFreedom: number | null,
  limitPerH: number,
): Point['steadyState'] {
  const unknown = { answer: 'cannot-tell', driftPerH: null, lowPerH: null, highPerH: null } as const
  if (timeS.length < 3 || scatter === null || !(scatter > 0)) return unknown
  const start = timeS[0] ?? 0
  const hours = timeS.map((time) => (time - start) / SECONDS_PER_HOUR)
  if (new Set(hours).size < 2) return unknown
  const line = fitWeightedLine(hours, value, null)
  if (!(line.centreValue > 0)) return unknown
  const driftPerH = line.slope / line.centreValue
  const reach = studentTQuantile(ONE_SIDED, degreesOfFreedom) * (scatter / Math.sqrt(line.sumOfSquaresX))
  const lowPerH = driftPerH - reach
  const highPerH = driftPerH + reach
  const answer =
    lowPerH >= -limitPerH && highPerH <= limitPerH
      ? 'steady'
      : lowPerH > limitPerH || highPerH < -limitPerH
        ? 'drifting'
        : 'cannot-tell'
  return { answer, driftPerH, lowPerH, highPerH }
}
