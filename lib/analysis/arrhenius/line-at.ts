import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { type ArrheniusFit } from '../reduction/run-reduction'
import { coverageFactor } from '../statistics/student-t'

/** The fitted line at one temperature. */
export interface LineAt {
  readonly lnRate: number
  /** of the line, own scatter only; null where two points leave no scatter to judge by */
  readonly standardError: number | null
  /** pointwise interval at the fit's confidence level; null with it */
  readonly interval: readonly [number, number] | null
}

/**
 * Fitted ln rate at a temperature, with the pointwise confidence interval of the line.
 *
 * ln r(T) = ln r_c − (Ea/R) d, with d = 1/T − 1/T_c;
 * u²(ln r(T)) = u²(ln r_c) + (d/R)² u²(Ea) − 2 (d/R) u(ln r_c, Ea), where u(ln r_c, Ea) = u(ln A, Ea) − u²(Ea)/(R T_c).
 * Own scatter only: errors that all points share move the line as a whole and are not in the band.
 * Source: Draper, Smith, Applied Regression Analysis, 3rd ed., 1998, section 3.1 (variance of a fitted value).
 *
 * @param fit - line, centred at its harmonic mean temperature [-]
 * @param temperatureK - where the line is read [K], above 0
 * @returns ln rate in the SI unit of the fitted quantity [-], its standard error and interval with the degrees of freedom of the line's own scatter
 */
export function lineAt(fit: ArrheniusFit, temperatureK: number): LineAt {
  const d = 1 / temperatureK - 1 / fit.centreTemperatureK
  const slope = fit.activationEnergyJPerMol.value / GAS_CONSTANT_J_PER_MOL_K
  const lnRate = fit.lnRateAtCentre.value - slope * d
  const centreError = fit.lnRateAtCentre.randomStandardUncertainty
  const slopeError = fit.activationEnergyJPerMol.randomStandardUncertainty
  if (centreError === null || slopeError === null) return { lnRate, standardError: null, interval: null }
  const step = d / GAS_CONSTANT_J_PER_MOL_K
  const covariance =
    fit.covarianceLnAEa === null
      ? 0
      : fit.covarianceLnAEa - (slopeError * slopeError) / (GAS_CONSTANT_J_PER_MOL_K * fit.centreTemperatureK)
  // a covariance that is zero but for rounding may pull the sum below zero by a few last digits
  const variance = Math.max(
    0,
    centreError * centreError + step * step * slopeError * slopeError - 2 * step * covariance,
  )
  const standardError = Math.sqrt(variance)
  const { degreesOfFreedom } = fit.activationEnergyJPerMol
  if (degreesOfFreedom !== null && !(degreesOfFreedom > 0)) return { lnRate, standardError, interval: null }
  const quantile = coverageFactor(fit.confidenceLevel, degreesOfFreedom)
  return { lnRate, standardError, interval: [lnRate - quantile * standardError, lnRate + quantile * standardError] }
}
