import { studentTQuantile } from './student-t'
import { type WeightedLine } from './weighted-line'

/** How far each point lies from a line and how much it pulls on it. A value is null where it is undefined (leverage 1, no scatter). */
export interface ResidualDiagnostics {
  readonly leverage: readonly number[]
  readonly internallyStudentised: readonly (number | null)[]
  readonly externallyStudentised: readonly (number | null)[]
  readonly cookDistance: readonly (number | null)[]
  /** abs(externally studentised) beyond this is an outlier at the 5 % level for all points together (Bonferroni); null below 4 points */
  readonly outlierLimit: number | null
}

/** Leverage this close to one leaves no residual to judge. */
const FULL_LEVERAGE = 1 - 1e-10

/**
 * Leverage, studentised residuals and Cook's distance of every point of a line.
 *
 * r = e sqrt(w) / (s sqrt(1 - h)); t = r sqrt((n - p - 1) / (n - p - r^2)); D = r^2 h / (p (1 - h)); p = 2.
 * Source: R. D. Cook, S. Weisberg, Residuals and Influence in Regression, 1982, sections 2.2 and 3.1.
 *
 * @param line - a fitted line [-]
 * @returns one entry a point, in the order of the points; null where undefined [-]
 */
export function diagnoseResiduals(line: WeightedLine): ResidualDiagnostics {
  const parameters = 2
  const s = line.residualStandardDeviation
  const internal = line.residuals.map((residual, i): number | null => {
    const h = line.leverage[i] ?? 1
    if (s === null || !(s > 0) || h > FULL_LEVERAGE) return null
    return (residual * Math.sqrt(line.weights[i] ?? 1)) / (s * Math.sqrt(1 - h))
  })
  const nu = line.degreesOfFreedom
  const external = internal.map((r): number | null => {
    if (r === null || nu < 2) return null
    const rest = nu - r * r
    return rest > 1e-12 * nu ? r * Math.sqrt((nu - 1) / rest) : null
  })
  const cook = internal.map((r, i): number | null => {
    const h = line.leverage[i] ?? 1
    return r === null ? null : (r * r * h) / (parameters * (1 - h))
  })
  return {
    leverage: line.leverage,
    internallyStudentised: internal,
    externallyStudentised: external,
    cookDistance: cook,
    outlierLimit: nu >= 2 ? studentTQuantile(1 - 0.05 / (2 * line.count), nu - 1) : null,
  }
}
