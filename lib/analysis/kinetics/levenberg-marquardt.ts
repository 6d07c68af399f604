import { AnalysisError } from '../analysis-error'
import { inverseNormal, solveTurned, turnSystem } from './householder'
import { numericalJacobian } from './numerical-jacobian'

/** What is fitted: values at given parameters, and where known their derivatives. */
export interface NonlinearModel {
  readonly values: (parameters: readonly number[]) => readonly number[]
  /** a row a value, a column a parameter; numerical derivatives of high accuracy without it */
  readonly jacobian?: (parameters: readonly number[]) => readonly (readonly number[])[]
  /** size of each parameter, for numerical derivatives of one that is or passes near zero */
  readonly typicalSizes?: readonly number[]
}

/** Nonlinear least-squares fit. */
export interface NonlinearFit {
  readonly parameters: readonly number[]
  /** scaled by the residual standard deviation; null at zero degrees of freedom, or when the design cannot tell the parameters apart */
  readonly standardErrors: readonly (number | null)[]
  /** inverse of JᵀWJ; null when the design cannot tell the parameters apart */
  readonly unscaledCovariance: readonly (readonly number[])[] | null
  readonly correlation: readonly (readonly number[])[] | null
  readonly fitted: readonly number[]
  readonly residuals: readonly number[]
  readonly residualSumOfSquares: number
  readonly degreesOfFreedom: number
  readonly residualStandardDeviation: number | null
  readonly iterations: number
}

const MAXIMUM_ITERATIONS = 500
const STEP_TOLERANCE = 1e-13
const REDUCTION_TOLERANCE = 1e-15
const PERFECT_FIT = 1e-20

/**
 * Nonlinear least squares by Levenberg and Marquardt.
 *
 * Minimises Σ w (y − f(p))²; steps from [J; √λ D] by Householder reflections, D the running largest lengths of the columns of J, λ by Nielsen.
 *
 * Finds a minimum near the start: start values matter. Standard errors are Wald errors from the curvature at the minimum and mean little where
 * parameters are hard to tell apart; use profile intervals there.
 * Source: Levenberg 1944; Marquardt, J. Soc. Ind. Appl. Math. 11 (1963) 431; Nielsen, IMM-REP-1999-05; Moré, Lect. Notes Math. 630 (1978) 105.
 *
 * @param model - values and derivatives [any]
 * @param y - measured values [any]
 * @param start - start values, one a parameter [any]
 * @param weights - positive, 1/σ² or relative; null for equal weights [1/unit of y squared, or -]
 * @returns parameters with Wald standard errors, n − p degrees of freedom [unit of each parameter]
 * @throws {AnalysisError} too-few-points | lengths-differ | not-finite at the start | not-positive for a weight | no-convergence
 */
export function fitNonlinear(
  model: NonlinearModel,
  y: readonly number[],
  start: readonly number[],
  weights: readonly number[] | null = null,
): NonlinearFit {
  if (y.length < start.length)
    throw new AnalysisError(
      'too-few-points',
      `${String(y.length)} points cannot settle ${String(start.length)} parameters.`,
    )
  if (weights !== null && (weights.length !== y.length || weights.some((w) => !(w > 0))))
    throw new AnalysisError('not-positive', 'There must be one weight above zero for each value.')
  const roots = y.map((_unused, i) => Math.sqrt(weights?.[i] ?? 1))
  const jacobianAt =
    model.jacobian ??
    ((parameters: readonly number[]) => numericalJacobian(model.values, parameters, model.typicalSizes ?? null))
  const residualsAt = (parameters: readonly number[]): number[] => {
    const values = model.values(parameters)
    if (values.length !== y.length)
      throw new AnalysisError('lengths-differ', 'The model gives another number of values.')
    return y.map((value, i) => (value - (values[i] ?? NaN)) * (roots[i] ?? NaN))
  }
  let parameters = [...start]
  let residuals = residualsAt(parameters)
  let cost = sumOfSquares(residuals)
  if (!Number.isFinite(cost))
    throw new AnalysisError('not-finite', 'The model has no value at the start values.', { start: [...start] })
  const size = y.reduce((sum, value, i) => sum + value * value * (roots[i] ?? NaN) * (roots[i] ?? NaN), 0)
  let jacobian = weigh(jacobianAt(parameters), roots)
  const scale = columnLengths(jacobian).map((length) => (length > 0 ? length : 1))
  let damping = 1e-3
  let growth = 2
  let iterations = 0
  for (; iterations < MAXIMUM_ITERATIONS; iterations += 1) {
    const step = dampedStep(jacobian, residuals, scale, damping)
    if (step === null) {
      damping *= 10
      continue
    }
    const trial = parameters.map((p, j) => p + (step[j] ?? 0))
    const isSmall = step.every((value, j) => Math.abs(value) <= STEP_TOLERANCE * (Math.abs(parameters[j] ?? 0) + 1e-12))
    const trialResiduals = residualsAt(trial)
    const trialCost = sumOfSquares(trialResiduals)
    const predicted = predictedReduction(jacobian, residuals, step, cost)
    const gain = predicted > 0 ? (cost - trialCost) / predicted : trialCost < cost ? 1 : -1
    if (trialCost <= cost && Number.isFinite(trialCost)) {
      // data without scatter: below this the sum of squares is rounding and falls for ever
      const isPerfect = trialCost <= PERFECT_FIT * size
      const isFlat = cost - trialCost <= REDUCTION_TOLERANCE * cost
      parameters = trial
      residuals = trialResiduals
      cost = trialCost
      if (
        isSmall ||
        isPerfect ||
        (isFlat &&
          damping < 1e-6 &&
          step.every((value, j) => Math.abs(value) <= 1e-9 * (Math.abs(parameters[j] ?? 0) + 1e-12)))
      )
        break
      jacobian = weigh(jacobianAt(parameters), roots)
      for (const [j, length] of columnLengths(jacobian).entries()) scale[j] = Math.max(scale[j] ?? 1, length)
      const reach = 2 * gain - 1
      damping = Math.max(1e-16, damping * Math.max(1 / 3, 1 - reach * reach * reach))
      growth = 2
    } else {
      if (isSmall || damping > 1e40) break
      damping *= growth
      growth *= 2
    }
  }
  if (iterations >= MAXIMUM_ITERATIONS)
    throw new AnalysisError('no-convergence', 'The fit does not settle from these start values; try others.', {
      start: [...start],
    })
  return summarise(weigh(jacobianAt(parameters), roots), parameters, residuals, roots, y, cost, iterations)
}

function summarise(
  jacobian: readonly (readonly number[])[],
  parameters: readonly number[],
  weightedResiduals: readonly number[],
  roots: readonly number[],
  y: readonly number[],
  cost: number,
  iterations: number,
): NonlinearFit {
  const degreesOfFreedom = y.length - parameters.length
  const s = degreesOfFreedom > 0 ? Math.sqrt(cost / degreesOfFreedom) : null
  let covariance: number[][] | null = null
  try {
    covariance = inverseNormal(turnSystem(jacobian, weightedResiduals))
  } catch (error) {
    // parameters that the data do not tell apart have no standard errors; the minimum itself stands
    if (!(error instanceof AnalysisError)) throw error
  }
  const errors = parameters.map((_unused, j) => (covariance === null ? null : Math.sqrt(covariance[j]?.[j] ?? NaN)))
  const residuals = weightedResiduals.map((value, i) => value / (roots[i] ?? NaN))
  return {
    parameters,
    standardErrors: errors.map((value) => (value === null || s === null ? null : s * value)),
    unscaledCovariance: covariance,
    correlation:
      covariance?.map((row, i) => row.map((value, j) => value / ((errors[i] ?? NaN) * (errors[j] ?? NaN)))) ?? null,
    fitted: y.map((value, i) => value - (residuals[i] ?? NaN)),
    residuals,
    residualSumOfSquares: cost,
    degreesOfFreedom,
    residualStandardDeviation: s,
    iterations,
  }
}

function dampedStep(
  jacobian: readonly (readonly number[])[],
  residuals: readonly number[],
  scale: readonly number[],
  damping: number,
): number[] | null {
  const root = Math.sqrt(damping)
  const extra = scale.map((length, j) => scale.map((_unused, k) => (k === j ? root * length : 0)))
  try {
    return solveTurned(turnSystem([...jacobian, ...extra], [...residuals, ...scale.map(() => 0)]))
  } catch (error) {
    if (error instanceof AnalysisError) return null
    throw error
  }
}

function predictedReduction(
  jacobian: readonly (readonly number[])[],
  residuals: readonly number[],
  step: readonly number[],
  cost: number,
): number {
  let after = 0
  for (const [i, row] of jacobian.entries()) {
    const value = (residuals[i] ?? NaN) - row.reduce((sum, entry, j) => sum + entry * (step[j] ?? NaN), 0)
    after += value * value
  }
  return cost - after
}

function weigh(jacobian: readonly (readonly number[])[], roots: readonly number[]): number[][] {
  return jacobian.map((row, i) => row.map((value) => value * (roots[i] ?? NaN)))
}

function columnLengths(rows: readonly (readonly number[])[]): number[] {
  const columns = rows[0]?.length ?? 0
  return Array.from({ length: columns }, (_unused, j) =>
    Math.sqrt(rows.reduce((sum, row) => sum + (row[j] ?? NaN) * (row[j] ?? NaN), 0)),
  )
}

function sumOfSquares(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value * value, 0)
}
