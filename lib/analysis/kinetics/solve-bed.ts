import { AnalysisError } from '../analysis-error'

const MAXIMUM_STEPS = 2_000

/**
 * Conversion at the end of a plug-flow bed, by integrating the rate along it.
 *
 * dX/d(W/F_A0) = r(X), X(0) = 0
 *
 * Dormand-Prince pair of orders 5 and 4 with step control. Isothermal, isobaric; any rate law of one conversion.
 * Source: Dormand and Prince, J. Comput. Appl. Math. 6 (1980) 19.
 *
 * @param rateAt - rate of consumption of the key reactant at a conversion [mol kg-1 s-1]
 * @param contactTimeKgSPerMol - W/F_A0 [kg s mol-1] >= 0
 * @param tolerance - error of the conversion per step, relative to the conversion reached [-]
 * @returns conversion at the end of the bed [-]
 * @throws {AnalysisError} no-convergence when the rate is not finite or the steps become too small, as at exhaustion with an order below 1
 */
export function solveBed(
  rateAt: (conversion: number) => number,
  contactTimeKgSPerMol: number,
  tolerance = 1e-11,
): number {
  let at = 0
  let x = 0
  let step = contactTimeKgSPerMol
  let k1 = rateAt(0)
  for (let count = 0; at < contactTimeKgSPerMol; count += 1) {
    if (count > MAXIMUM_STEPS || !Number.isFinite(k1))
      throw new AnalysisError('no-convergence', 'The bed cannot be solved to its end with this rate law.', {
        conversion: x,
      })
    const h = Math.min(step, contactTimeKgSPerMol - at)
    const k2 = rateAt(x + h * (k1 / 5))
    const k3 = rateAt(x + h * ((3 / 40) * k1 + (9 / 40) * k2))
    const k4 = rateAt(x + h * ((44 / 45) * k1 - (56 / 15) * k2 + (32 / 9) * k3))
    const k5 = rateAt(x + h * ((19372 / 6561) * k1 - (25360 / 2187) * k2 + (64448 / 6561) * k3 - (212 / 729) * k4))
    const k6 = rateAt(
      x + h * ((9017 / 3168) * k1 - (355 / 33) * k2 + (46732 / 5247) * k3 + (49 / 176) * k4 - (5103 / 18656) * k5),
    )
    const next = x + h * ((35 / 384) * k1 + (500 / 1113) * k3 + (125 / 192) * k4 - (2187 / 6784) * k5 + (11 / 84) * k6)
    const k7 = rateAt(next)
    const error = Math.abs(
      h *
        ((71 / 57600) * k1 - (71 / 16695) * k3 + (71 / 1920) * k4 - (17253 / 339200) * k5 + (22 / 525) * k6 - k7 / 40),
    )
    const allowed = tolerance * Math.max(Math.abs(next), 1e-12)
    if (error <= allowed) {
      at = h === contactTimeKgSPerMol - at ? contactTimeKgSPerMol : at + h
      x = next
      k1 = k7
    }
    // error goes with the fifth power of the step; the fifth root is taken twice as a square root, which errs on the small side
    const ratio = error > 0 ? Math.sqrt(Math.sqrt(allowed / error)) : 5
    step = Number.isFinite(ratio) ? h * Math.min(5, Math.max(0.2, 0.9 * ratio)) : h / 5
  }
  return x
}
