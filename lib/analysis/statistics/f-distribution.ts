import fCdf from '@stdlib/stats-base-dists-f-cdf'
import fQuantile from '@stdlib/stats-base-dists-f-quantile'
import chiSquaredQuantile from '@stdlib/stats-base-dists-chisquare-quantile'
import { AnalysisError } from '../analysis-error'

/**
 * Probability of an F statistic at least this large.
 *
 * P(F(nu1, nu2) > f) = P(F(nu2, nu1) < 1/f): the lower tail of the reciprocal keeps its digits where one minus the other would lose them.
 * Source: N. L. Johnson, S. Kotz, N. Balakrishnan, Continuous Univariate Distributions, vol. 2, 2nd edition, 1995, chapter 27.
 *
 * @param statistic - not negative [-]
 * @param numeratorDegreesOfFreedom - positive [-]
 * @param denominatorDegreesOfFreedom - positive [-]
 * @returns the p-value [-]
 * @throws {AnalysisError} out-of-range
 */
export function upperFProbability(
  statistic: number,
  numeratorDegreesOfFreedom: number,
  denominatorDegreesOfFreedom: number,
): number {
  if (!(statistic >= 0) || !(numeratorDegreesOfFreedom > 0) || !(denominatorDegreesOfFreedom > 0)) {
    throw new AnalysisError(
      'out-of-range',
      'An F test needs a statistic of zero or more and positive degrees of freedom.',
      {
        statistic,
        numeratorDegreesOfFreedom,
        denominatorDegreesOfFreedom,
      },
    )
  }
  if (statistic === 0) return 1
  return fCdf(1 / statistic, denominatorDegreesOfFreedom, numeratorDegreesOfFreedom)
}

/**
 * Quantile of the F distribution.
 *
 * With infinite denominator degrees of freedom it is the chi-squared quantile over its degrees of freedom.
 * Source: N. L. Johnson, S. Kotz, N. Balakrishnan, Continuous Univariate Distributions, vol. 2, 2nd edition, 1995, chapter 27.
 *
 * @param probability - lower-tail probability, between 0 and 1 [-]
 * @param numeratorDegreesOfFreedom - positive [-]
 * @param denominatorDegreesOfFreedom - positive; null stands for infinite [-]
 * @returns the quantile [-]
 * @throws {AnalysisError} out-of-range
 */
export function fDistributionQuantile(
  probability: number,
  numeratorDegreesOfFreedom: number,
  denominatorDegreesOfFreedom: number | null,
): number {
  if (
    !(probability > 0 && probability < 1) ||
    !(numeratorDegreesOfFreedom > 0) ||
    (denominatorDegreesOfFreedom !== null && !(denominatorDegreesOfFreedom > 0))
  ) {
    throw new AnalysisError(
      'out-of-range',
      'An F quantile needs a probability between 0 and 1 and positive degrees of freedom.',
      {
        probability,
        numeratorDegreesOfFreedom,
        denominatorDegreesOfFreedom,
      },
    )
  }
  if (denominatorDegreesOfFreedom === null) {
    return chiSquaredQuantile(probability, numeratorDegreesOfFreedom) / numeratorDegreesOfFreedom
  }
  return fQuantile(probability, numeratorDegreesOfFreedom, denominatorDegreesOfFreedom)
}
