import ln from '@stdlib/math-base-special-ln'
import log1p from '@stdlib/math-base-special-log1p'
import pow from '@stdlib/math-base-special-pow'
import { AnalysisError } from '../analysis-error'
import { integrate } from './integrate'

/**
 * What a plug-flow bed has done by a given conversion: k τ′ C_A0^(n−1) for rate k C_A^n.
 *
 * I_n(X, ε) = ∫₀^X [(1 + ε x)/(1 − x)]^n dx
 *
 * Closed for n = 0, 1, 2 and for ε = 0; adaptive quadrature otherwise. Isothermal, isobaric, ideal gas, one reaction; ε = y_A0 Σν/|ν_A|.
 * The rate constant is per kilogram on concentrations, m^(3n) mol^(1−n) kg⁻¹ s⁻¹, with τ′ = W C_A0/F_A0.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapters 5 and 18.
 *
 * @param order - reaction order n [-]
 * @param conversion - X [-], below 1 and at or above 0; exactly 1 for orders below 1
 * @param expansion - ε [-] above −1
 * @returns I_n [-]
 * @throws {AnalysisError} out-of-range when conversion or expansion is not possible
 * @example n = 1, X = 0.3, ε = 0.5: 0.385012415908
 */
export function plugFlowIntegral(order: number, conversion: number, expansion = 0): number {
  requireConversion(conversion, order)
  requireExpansion(expansion, conversion)
  if (order === 0) return conversion
  const rest = -log1p(-conversion)
  if (order === 1) return (1 + expansion) * rest - expansion * conversion
  if (order === 2)
    return (
      -2 * expansion * (1 + expansion) * rest +
      expansion * expansion * conversion +
      ((1 + expansion) * (1 + expansion) * conversion) / (1 - conversion)
    )
  if (expansion === 0) return (pow(1 - conversion, 1 - order) - 1) / (order - 1)
  return integrate((x) => pow((1 + expansion * x) / (1 - x), order), 0, conversion)
}

/**
 * What a gradientless reactor does at a given outlet conversion: k τ′ C_A0^(n−1) for rate k C_A^n.
 *
 * X [(1 + ε X)/(1 − X)]^n
 *
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapters 5 and 18.
 *
 * @param order - reaction order n [-]
 * @param conversion - X at the outlet [-], 0 to below 1
 * @param expansion - ε [-] above −1
 * @returns k τ′ C_A0^(n−1) [-]
 * @throws {AnalysisError} out-of-range when conversion or expansion is not possible
 * @example n = 1, X = 0.3, ε = 0.5: 0.492857142857
 */
export function stirredTankIntegral(order: number, conversion: number, expansion = 0): number {
  // a gradientless reactor works at its outlet: at full conversion only an order of zero still has a rate
  requireConversion(conversion, order === 0 ? 0 : 1)
  requireExpansion(expansion, conversion)
  return conversion * pow((1 + expansion * conversion) / (1 - conversion), order)
}

/**
 * What a batch at constant volume has done: k m_c t for rate k C^n.
 *
 * n = 0: C₀ − C; ½: 2(√C₀ − √C); 1: ln(C₀/C); 2: 1/C − 1/C₀; else (C^(1−n) − C₀^(1−n))/(n − 1)
 *
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 3.
 *
 * @param order - reaction order n [-]
 * @param startMolPerM3 - concentration at the start [mol m-3] > 0
 * @param nowMolPerM3 - concentration now [mol m-3], above 0; also 0 for orders below 1
 * @returns k m_c t [(mol m-3)^(1−n)]
 * @throws {AnalysisError} not-positive when a concentration is not possible
 */
export function batchIntegral(order: number, startMolPerM3: number, nowMolPerM3: number): number {
  const isPossible = Number.isFinite(startMolPerM3) && startMolPerM3 > 0 && Number.isFinite(nowMolPerM3)
  if (!isPossible || !(nowMolPerM3 > 0 || (nowMolPerM3 === 0 && order < 1)))
    throw new AnalysisError('not-positive', 'Concentrations must be above zero.', { startMolPerM3, nowMolPerM3 })
  if (order === 1) return ln(startMolPerM3 / nowMolPerM3)
  return (pow(nowMolPerM3, 1 - order) - pow(startMolPerM3, 1 - order)) / (order - 1)
}

/**
 * What a plug-flow bed has done for a reversible first-order reaction: k_f τ′.
 *
 * −X_e ln(1 − X/X_e)
 *
 * A = R, no R fed, no expansion.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapters 3 and 5.
 *
 * @param conversion - X [-], 0 to below the equilibrium conversion
 * @param equilibriumConversion - X_e [-], above 0 and at most 1
 * @returns k_f τ′ [-]
 * @throws {AnalysisError} out-of-range when the conversion is at or past equilibrium
 */
export function reversiblePlugFlowIntegral(conversion: number, equilibriumConversion: number): number {
  if (
    !(equilibriumConversion > 0 && equilibriumConversion <= 1) ||
    !(conversion < equilibriumConversion) ||
    !Number.isFinite(conversion)
  )
    throw new AnalysisError('out-of-range', 'The conversion must lie below the equilibrium conversion.', {
      conversion,
      equilibriumConversion,
    })
  return -equilibriumConversion * log1p(-conversion / equilibriumConversion)
}

/**
 * Contact time a plug-flow bed needs for any rate law of one conversion.
 *
 * W/F_A0 = ∫₀^X dX/r(X)
 *
 * Isothermal, isobaric; several reactants enter through r(X).
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, equation 18.13.
 *
 * @param rateAt - rate of consumption of the key reactant at a conversion [mol kg-1 s-1], above 0 over the range
 * @param conversion - X [-]
 * @returns W/F_A0 [kg s mol-1]
 * @throws {AnalysisError} not-positive when the rate is not above zero within the range | no-convergence when the integral does not converge
 */
export function plugFlowContactTime(rateAt: (conversion: number) => number, conversion: number): number {
  return integrate(
    (x) => {
      const rate = rateAt(x)
      if (!(rate > 0))
        throw new AnalysisError('not-positive', `The rate is not above zero at conversion ${String(x)}.`, {
          conversion: x,
          rate,
        })
      return 1 / rate
    },
    0,
    conversion,
  )
}

/**
 * Relative standard uncertainty of a first-order plug-flow rate constant.
 *
 * u(k)/k = √{[u(X)/((1 − X)(−ln(1 − X)))]² + u_r²(F) + u_r²(W)}
 *
 * Source: JCGM 100:2008, equation 10, on k = −(F/W) ln(1 − X).
 *
 * @param conversion - X [-] between 0 and 1
 * @param conversionStandardUncertainty - u(X) [-]
 * @param flowRelative - relative standard uncertainty of the flow [-]
 * @param massRelative - relative standard uncertainty of the catalyst mass [-]
 * @returns relative standard uncertainty [-]
 * @throws {AnalysisError} out-of-range when X is not between 0 and 1
 */
export function firstOrderRelativeUncertainty(
  conversion: number,
  conversionStandardUncertainty: number,
  flowRelative: number,
  massRelative: number,
): number {
  if (!(conversion > 0 && conversion < 1))
    throw new AnalysisError('out-of-range', 'The conversion lies between 0 and 1.', { conversion })
  const own = conversionStandardUncertainty / ((1 - conversion) * -log1p(-conversion))
  return Math.sqrt(own * own + flowRelative * flowRelative + massRelative * massRelative)
}

function requireConversion(conversion: number, order: number): void {
  const isExhausted = conversion === 1 && order < 1
  if (!(conversion >= 0 && conversion < 1) && !isExhausted)
    throw new AnalysisError('out-of-range', 'The conversion must be 0 or more and below 1.', { conversion, order })
}

function requireExpansion(expansion: number, conversion: number): void {
  if (!Number.isFinite(expansion) || !(expansion > -1) || !(1 + expansion * conversion > 0))
    throw new AnalysisError('out-of-range', 'The expansion must be above −1.', { expansion })
}
