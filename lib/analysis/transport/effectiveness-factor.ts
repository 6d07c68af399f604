import exp from '@stdlib/math-base-special-exp'
import tanh from '@stdlib/math-base-special-tanh'
import coth from '@stdlib/math-base-special-coth'
import { AnalysisError } from '../analysis-error'

/**
 * Effectiveness factor of a sphere, first order.
 *
 * η = (3/φ²)(φ coth φ − 1), φ = R √(k‴/D_e)
 *
 * Isothermal sphere, no film resistance.
 * Source: Thiele, Ind. Eng. Chem. 31 (1939) 916; Froment and Bischoff, Chemical Reactor Analysis and Design, 2nd edition, section 3.6.
 *
 * @param thieleModulus - φ on the radius [-] >= 0
 * @returns effectiveness factor [-], 0 to 1
 * @throws {AnalysisError} not-positive when the modulus is negative or not a number
 * @example φ = 1 gives 0.939106
 */
export function sphereEffectiveness(thieleModulus: number): number {
  requireModulus(thieleModulus)
  const square = thieleModulus * thieleModulus
  // the difference of φ coth φ and 1 loses all digits for small φ: series to φ⁶
  if (thieleModulus < 0.05) return 1 - square / 15 + (2 * square * square) / 315 - (square * square * square) / 1_575
  return (3 / square) * (thieleModulus * coth(thieleModulus) - 1)
}

/**
 * Effectiveness factor of a slab, first order.
 *
 * η = tanh φ / φ, φ = L √(k‴/D_e), L half the thickness when both faces are open
 *
 * Isothermal slab, no film resistance.
 * Source: Thiele, Ind. Eng. Chem. 31 (1939) 916.
 *
 * @param thieleModulus - φ on the length from the face to the closed middle [-] >= 0
 * @returns effectiveness factor [-], 0 to 1
 * @throws {AnalysisError} not-positive when the modulus is negative or not a number
 * @example φ = 3 gives 0.331685
 */
export function slabEffectiveness(thieleModulus: number): number {
  requireModulus(thieleModulus)
  return thieleModulus < 1e-4 ? 1 - (thieleModulus * thieleModulus) / 3 : tanh(thieleModulus) / thieleModulus
}

/**
 * Concentration inside a slab over that at its face, first order.
 *
 * C/C_s = cosh(φ x/L) / cosh φ, x from the closed middle
 *
 * Source: Thiele, Ind. Eng. Chem. 31 (1939) 916.
 *
 * @param thieleModulus - φ on the length from the face to the closed middle [-] >= 0
 * @param position - x/L, 0 in the middle and 1 at the face [-]
 * @returns concentration ratio [-]
 */
export function slabConcentrationRatio(thieleModulus: number, position: number): number {
  requireModulus(thieleModulus)
  // written with falling exponentials, so that large moduli do not overflow
  const rise = exp(thieleModulus * (position - 1))
  return (rise * (1 + exp(-2 * thieleModulus * position))) / (1 + exp(-2 * thieleModulus))
}

/**
 * Thiele modulus of any order on the length L = V_p/S_p, made so that η → 1/φ at large values.
 *
 * φ_L = L √((n + 1) k‴ C_s^(n−1) / (2 D_e)), with k‴ C_s^(n−1) passed as one rate constant
 *
 * Power law with n > −1.
 * Source: Bischoff, AIChE J. 11 (1965) 351.
 *
 * @param lengthM - volume over outer surface of the particle [m] >= 0
 * @param order - reaction order [-] > −1
 * @param rateConstantPerS - k‴ C_s^(n−1) per particle volume [s-1] >= 0
 * @param effectiveDiffusivityM2PerS - effective diffusivity [m2 s-1] > 0
 * @returns modulus [-]
 */
export function generalThieleModulus(
  lengthM: number,
  order: number,
  rateConstantPerS: number,
  effectiveDiffusivityM2PerS: number,
): number {
  return lengthM * Math.sqrt(((order + 1) * rateConstantPerS) / (2 * effectiveDiffusivityM2PerS))
}

/**
 * Thiele modulus and effectiveness factor of a sphere from its observed rate, first order.
 *
 * φ² η(φ) = 3 (φ coth φ − 1) = Φ, Φ = r‴_obs R² / (D_e C_s)
 *
 * Source: Weisz and Prater, Adv. Catal. 6 (1954) 143.
 *
 * @param observedModulus - Φ, Weisz-Prater modulus on the radius [-] >= 0
 * @returns φ [-] and η [-]
 * @throws {AnalysisError} not-positive when the modulus is negative or not a number
 * @example Φ = 0.767 gives η = 0.95
 */
export function effectivenessFromObserved(observedModulus: number): {
  readonly thieleModulus: number
  readonly effectiveness: number
} {
  requireModulus(observedModulus)
  // φ² ≥ Φ and, from φ coth φ ≥ φ, φ ≤ 1 + Φ/3: bisection between these cannot miss
  let low = Math.sqrt(observedModulus)
  let high = Math.max(1 + observedModulus / 3, low)
  for (let i = 0; i < 200 && high - low > 1e-15 * high; i += 1) {
    const middle = (low + high) / 2
    if (middle * middle * sphereEffectiveness(middle) < observedModulus) low = middle
    else high = middle
  }
  const thieleModulus = (low + high) / 2
  return { thieleModulus, effectiveness: sphereEffectiveness(thieleModulus) }
}

/**
 * Thiele modulus of a sphere at which the effectiveness has a given value, first order.
 *
 * Source: as {@link sphereEffectiveness}.
 *
 * @param effectiveness - η [-] between 0 and 1
 * @returns φ on the radius [-]
 * @throws {AnalysisError} out-of-range when η is not between 0 and 1
 * @example η = 0.95 at φ = 0.8985868791
 */
export function thieleModulusAt(effectiveness: number): number {
  if (!(effectiveness > 0 && effectiveness < 1))
    throw new AnalysisError('out-of-range', 'An effectiveness factor lies between 0 and 1.', { effectiveness })
  let low = 0
  let high = 3 / effectiveness + 1
  for (let i = 0; i < 200 && high - low > 1e-15 * high; i += 1) {
    const middle = (low + high) / 2
    if (sphereEffectiveness(middle) > effectiveness) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/**
 * Thiele moduli of two spheres of one catalyst from the ratio of their rates.
 *
 * φ₁ = (R₁/R₂) φ₂ and r₁/r₂ = η(φ₁)/η(φ₂), solved for φ₂; first order, no film resistance
 *
 * Source: Fogler, Elements of Chemical Reaction Engineering, 4th edition, example 12-3.
 *
 * @param radiusRatio - R₁/R₂, larger over smaller [-] > 1
 * @param rateRatio - r₁/r₂, rate of the larger over rate of the smaller [-], between 1/radiusRatio and 1
 * @returns moduli and effectiveness factors of both [-]; null where the ratio lies outside what diffusion can do (1 or above: no limitation; 1/radiusRatio or below: full limitation in both or another cause)
 */
export function thieleModuliOfTwoSizes(
  radiusRatio: number,
  rateRatio: number,
): {
  readonly larger: { readonly thieleModulus: number; readonly effectiveness: number }
  readonly smaller: { readonly thieleModulus: number; readonly effectiveness: number }
} | null {
  if (!(radiusRatio > 1) || !(rateRatio < 1) || !(rateRatio > 1 / radiusRatio)) return null
  const ratioAt = (modulus: number) => sphereEffectiveness(radiusRatio * modulus) / sphereEffectiveness(modulus)
  let low = 0
  let high = 1
  while (ratioAt(high) > rateRatio && high < 1e6) high *= 2
  if (high >= 1e6) return null
  for (let i = 0; i < 200 && high - low > 1e-15 * high; i += 1) {
    const middle = (low + high) / 2
    if (ratioAt(middle) > rateRatio) low = middle
    else high = middle
  }
  const smaller = (low + high) / 2
  const larger = radiusRatio * smaller
  return {
    larger: { thieleModulus: larger, effectiveness: sphereEffectiveness(larger) },
    smaller: { thieleModulus: smaller, effectiveness: sphereEffectiveness(smaller) },
  }
}

function requireModulus(value: number): void {
  if (!(value >= 0) || !Number.isFinite(value))
    throw new AnalysisError('not-positive', 'A modulus must be a number, zero or more.', { value })
}
