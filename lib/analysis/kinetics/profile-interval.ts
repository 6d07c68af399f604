import { AnalysisError } from '../analysis-error'
import { fitNonlinear, type NonlinearFit, type NonlinearModel } from './levenberg-marquardt'

/** Ends of a profile interval. */
export interface ProfileInterval {
  /** null where the sum of squares never rises enough on that side: the data set no bound */
  readonly low: number | null
  readonly high: number | null
}

const WIDEST_SEARCH = 1e4
const TOLERANCE = 1e-9

/**
 * Profile-likelihood interval of one parameter of a nonlinear fit.
 *
 * The parameter is held at a value and all others are fitted again; the ends are where (S − S_min)/s² = t²
 *
 * Follows the true shape of the sum of squares, so it does not reach across values that cannot be (as a Wald interval does) and shows when the
 * data set no bound.
 * Source: Bates and Watts, Nonlinear Regression Analysis and Its Applications, 1988, chapter 6.
 *
 * @param model - as fitted [any]
 * @param y - measured values [any]
 * @param fit - the fit [any]
 * @param index - which parameter, from 0 [-]
 * @param tQuantile - t quantile for the interval at the fit's degrees of freedom [-]
 * @param weights - as in the fit [1/unit of y squared, or -]
 * @returns both ends [unit of the parameter]
 * @throws {AnalysisError} out-of-range for an unknown parameter | too-few-points at zero degrees of freedom
 */
export function profileInterval(
  model: NonlinearModel,
  y: readonly number[],
  fit: NonlinearFit,
  index: number,
  tQuantile: number,
  weights: readonly number[] | null = null,
): ProfileInterval {
  const best = fit.parameters[index]
  const s = fit.residualStandardDeviation
  if (best === undefined) throw new AnalysisError('out-of-range', `There is no parameter ${String(index)}.`)
  if (s === null) throw new AnalysisError('too-few-points', 'Without degrees of freedom there is no interval.')
  const wald = fit.standardErrors[index]
  const reach = wald !== null && wald !== undefined && wald > 0 && Number.isFinite(wald) ? wald : Math.abs(best) || 1
  // signed root of the rise of the sum of squares, in standard deviations
  const rise = (
    value: number,
    warm: readonly number[],
  ): { readonly t: number; readonly others: readonly number[] } | null => {
    try {
      const held = fitNonlinear(holding(model, index, value), y, warm, weights)
      return {
        t: Math.sqrt(Math.max(0, held.residualSumOfSquares - fit.residualSumOfSquares)) / s,
        others: held.parameters,
      }
    } catch (error) {
      if (error instanceof AnalysisError) return null
      throw error
    }
  }
  const others = fit.parameters.filter((_unused, j) => j !== index)
  return { low: endOf(-1, best, reach, others, rise, tQuantile), high: endOf(1, best, reach, others, rise, tQuantile) }
}

function endOf(
  side: -1 | 1,
  best: number,
  reach: number,
  others: readonly number[],
  rise: (value: number, warm: readonly number[]) => { readonly t: number; readonly others: readonly number[] } | null,
  wanted: number,
): number | null {
  let inner = 0
  let warm = others
  let outer = wanted
  for (;;) {
    const next = rise(best + side * outer * reach, warm)
    if (next === null || outer > WIDEST_SEARCH) return null
    if (next.t >= wanted) break
    inner = outer
    warm = next.others
    outer *= 1.5
  }
  // the rise is monotone on each side of the minimum: bisection
  for (let i = 0; i < 200 && outer - inner > TOLERANCE * outer; i += 1) {
    const middle = (inner + outer) / 2
    const next = rise(best + side * middle * reach, warm)
    if (next === null) return null
    if (next.t >= wanted) outer = middle
    else {
      inner = middle
      warm = next.others
    }
  }
  return best + (side * (inner + outer) * reach) / 2
}

// The same model with one parameter held: the others keep their order.
function holding(model: NonlinearModel, index: number, value: number): NonlinearModel {
  const whole = (others: readonly number[]) => [...others.slice(0, index), value, ...others.slice(index)]
  const { jacobian, typicalSizes } = model
  return {
    values: (others) => model.values(whole(others)),
    ...(typicalSizes === undefined ? {} : { typicalSizes: typicalSizes.filter((_unused, j) => j !== index) }),
    ...(jacobian === undefined
      ? {}
      : { jacobian: (others) => jacobian(whole(others)).map((row) => row.filter((_unused, j) => j !== index)) }),
  }
}
