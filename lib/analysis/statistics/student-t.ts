import normalCdf from '@stdlib/stats-base-dists-normal-cdf'
import normalQuantile from '@stdlib/stats-base-dists-normal-quantile'
import tCdf from '@stdlib/stats-base-dists-t-cdf'
import tQuantile from '@stdlib/stats-base-dists-t-quantile'
import { AnalysisError } from '../analysis-error'

function checkDegreesOfFreedom(degreesOfFreedom: number | null): void {
  if (degreesOfFreedom !== null && !(degreesOfFreedom > 0)) {
    throw new AnalysisError('out-of-range', `Degrees of freedom must be positive, not ${degreesOfFreedom}.`, {
      degreesOfFreedom,
    })
  }
}

/**
 * Quantile of Student's t, or of the standard normal where the degrees of freedom are infinite.
 *
 * Source: W. S. Gosset, Biometrika 6 (1908) 1; doi:10.1093/biomet/6.1.1.
 *
 * @param probability - lower-tail probability, between 0 and 1 [-]
 * @param degreesOfFreedom - positive, whole or fractional; null stands for infinite [-]
 * @returns the quantile [-]
 * @throws {AnalysisError} out-of-range
 */
export function studentTQuantile(probability: number, degreesOfFreedom: number | null): number {
  checkDegreesOfFreedom(degreesOfFreedom)
  if (!(probability > 0 && probability < 1)) {
    throw new AnalysisError('out-of-range', `A probability lies between 0 and 1, not at ${probability}.`, {
      probability,
    })
  }
  return degreesOfFreedom === null ? normalQuantile(probability, 0, 1) : tQuantile(probability, degreesOfFreedom)
}

/**
 * Factor by which a standard uncertainty is multiplied for a two-sided interval.
 *
 * k = t((1 + level) / 2; nu)
 * Source: JCGM 100:2008, G.3.2.
 *
 * @param confidenceLevel - between 0 and 1 [-]
 * @param degreesOfFreedom - positive; null stands for infinite [-]
 * @returns the coverage factor [-]
 * @throws {AnalysisError} out-of-range
 */
export function coverageFactor(confidenceLevel: number, degreesOfFreedom: number | null): number {
  return studentTQuantile((1 + confidenceLevel) / 2, degreesOfFreedom)
}

/**
 * Two-sided probability of a t statistic at least as far from zero.
 *
 * p = 2 P(T < -abs(t)), taken from the lower tail so that small values keep their digits.
 * Source: W. S. Gosset, Biometrika 6 (1908) 1; doi:10.1093/biomet/6.1.1.
 *
 * @param statistic - the t value [-]
 * @param degreesOfFreedom - positive; null stands for infinite [-]
 * @returns the p-value [-]
 * @throws {AnalysisError} out-of-range
 */
export function twoSidedTProbability(statistic: number, degreesOfFreedom: number | null): number {
  checkDegreesOfFreedom(degreesOfFreedom)
  const distance = -Math.abs(statistic)
  return 2 * (degreesOfFreedom === null ? normalCdf(distance, 0, 1) : tCdf(distance, degreesOfFreedom))
}
