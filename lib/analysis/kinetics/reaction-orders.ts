import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { type Species } from '../reduction/run-input'
import { coverageFactor, twoSidedTProbability } from '../statistics/student-t'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { fitLinearModel, type LinearModelFit, varianceInflation } from './linear-model'

/** One rate at one composition. */
export interface OrderPoint {
  readonly ratePositive: number
  readonly pressuresPa: Readonly<Record<Species, number>>
  /** needed for the global fit */
  readonly temperatureK?: number
}

/** One fitted order. */
export interface FittedOrder {
  readonly species: Species
  readonly order: number
  readonly standardError: number | null
  readonly interval: readonly [number, number] | null
  /** probability of a distance from the nearest whole number at least this large; null without degrees of freedom */
  readonly wholeNumberPValue: number | null
  /** variance inflation; above 10 the design cannot tell this order from the others; null when fully dependent */
  readonly inflation: number | null
  readonly levels: number
  readonly span: number
}

/** Orders by log-log regression. */
export interface OrderFit {
  readonly orders: readonly FittedOrder[]
  readonly lnRateConstant: number
  readonly lnRateConstantStandardError: number | null
  /** only from the global fit [J mol-1] */
  readonly activationEnergyJPerMol: number | null
  readonly activationEnergyStandardError: number | null
  readonly referenceTemperatureK: number | null
  readonly degreesOfFreedom: number
  readonly residualStandardDeviation: number | null
  readonly fit: LinearModelFit
  /** doubts about the design, in words */
  readonly remarks: readonly string[]
}

/** Levels of each pressure and their span that a dependable order wants. Source: common practice. */
export const ORDER_DESIGN = { levels: 4, span: 4, inflation: 10 } as const

/**
 * Reaction orders from rates at one temperature.
 *
 * ln r = ln k + Σ a_i ln p_i
 *
 * Differential rates at mean pressures. Collinear designs and narrow ranges are named in the remarks.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 3; Marquardt, Technometrics 12 (1970) 591.
 *
 * @param points - rate [any] > 0 and pressures [one unit for all] > 0 of each species with an order
 * @param species - species whose orders are wanted, at least 1 [-]
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns orders [-] and ln k in the units put in; n − p degrees of freedom
 * @throws {AnalysisError} not-positive | too-few-points | collinear-design
 */
export function fitReactionOrders(
  points: readonly OrderPoint[],
  species: readonly Species[],
  confidenceLevel = 0.95,
): OrderFit {
  return fitOrders(points, species, null, confidenceLevel)
}

/**
 * Power law with Arrhenius temperature dependence over runs of any temperature and composition.
 *
 * ln r = ln k_ref − (Ea/R)(1/T − 1/T_ref) + Σ a_i ln p_i, T_ref the harmonic mean temperature of the points
 *
 * Orders that do not change with temperature.
 * Source: Froment and Bischoff, Chemical Reactor Analysis and Design, 2nd edition, section 2.6; centring: Schwaab and Pinto, Chem. Eng. Sci. 62 (2007) 2750.
 *
 * @param points - rate [any] > 0, temperature [K] > 0 and pressures [one unit for all] > 0
 * @param species - species whose orders are wanted [-]
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns orders [-], Ea [J mol-1] and ln k at the reference temperature; n − p degrees of freedom
 * @throws {AnalysisError} not-positive | too-few-points | collinear-design
 */
export function fitGlobalPowerLaw(
  points: readonly OrderPoint[],
  species: readonly Species[],
  confidenceLevel = 0.95,
): OrderFit {
  const inverse = points.map((point) => {
    if (!((point.temperatureK ?? NaN) > 0))
      throw new AnalysisError('not-positive', 'Each point needs a temperature above zero.')
    return 1 / (point.temperatureK ?? NaN)
  })
  const centre = inverse.reduce((sum, value) => sum + value, 0) / inverse.length
  return fitOrders(points, species, centre, confidenceLevel)
}

function fitOrders(
  points: readonly OrderPoint[],
  species: readonly Species[],
  centre: number | null,
  confidenceLevel: number,
): OrderFit {
  const logs = points.map((point) =>
    species.map((name) => {
      const p = point.pressuresPa[name] ?? NaN
      if (!(p > 0))
        throw new AnalysisError('not-positive', `Each point needs a pressure of ${name} above zero.`, { species: name })
      return ln(p)
    }),
  )
  const y = points.map((point) => {
    if (!(point.ratePositive > 0))
      throw new AnalysisError('not-positive', 'Rates must be above zero for a fit of logarithms.')
    return ln(point.ratePositive)
  })
  const energyColumn = (point: OrderPoint) =>
    centre === null ? [] : [-(1 / (point.temperatureK ?? NaN) - centre) / GAS_CONSTANT_J_PER_MOL_K]
  const fit = fitLinearModel(
    points.map((point, i) => [1, ...energyColumn(point), ...(logs[i] ?? [])]),
    y,
  )
  const offset = centre === null ? 1 : 2
  const inflation = varianceInflation(points.map((point, i) => [...energyColumn(point), ...(logs[i] ?? [])]))
  const t = fit.degreesOfFreedom > 0 ? coverageFactor(confidenceLevel, fit.degreesOfFreedom) : null
  const orders = species.map((name, j): FittedOrder => {
    const order = fit.coefficients[offset + j] ?? NaN
    const standardError = fit.standardErrors[offset + j] ?? null
    const values = [...new Set(logs.map((row) => Math.round((row[j] ?? NaN) * 1e4)))].sort((a, b) => a - b)
    const distance = order - Math.round(order)
    return {
      species: name,
      order,
      standardError,
      interval: standardError === null || t === null ? null : [order - t * standardError, order + t * standardError],
      wholeNumberPValue:
        standardError === null || !(standardError > 0)
          ? null
          : twoSidedTProbability(distance / standardError, fit.degreesOfFreedom),
      inflation: inflation[offset - 1 + j] ?? null,
      levels: values.length,
      span:
        Math.max(...points.map((point) => point.pressuresPa[name] ?? NaN)) /
        Math.min(...points.map((point) => point.pressuresPa[name] ?? NaN)),
    }
  })
  return {
    orders,
    lnRateConstant: fit.coefficients[0] ?? NaN,
    lnRateConstantStandardError: fit.standardErrors[0] ?? null,
    activationEnergyJPerMol: centre === null ? null : (fit.coefficients[1] ?? NaN),
    activationEnergyStandardError: centre === null ? null : (fit.standardErrors[1] ?? null),
    referenceTemperatureK: centre === null ? null : 1 / centre,
    degreesOfFreedom: fit.degreesOfFreedom,
    residualStandardDeviation: fit.residualStandardDeviation,
    fit,
    remarks: orders.flatMap(remarksOn),
  }
}

function remarksOn(order: FittedOrder): string[] {
  const remarks: string[] = []
  if (order.levels < ORDER_DESIGN.levels)
    remarks.push(
      `${order.species} has ${String(order.levels)} levels; ${String(ORDER_DESIGN.levels)} or more are wanted for an order.`,
    )
  if (order.span < ORDER_DESIGN.span)
    remarks.push(
      `${order.species} spans a factor of ${order.span.toPrecision(2)}; ${String(ORDER_DESIGN.span)} or more is wanted for an order.`,
    )
  if (order.inflation === null || order.inflation > ORDER_DESIGN.inflation)
    remarks.push(
      `${order.species} changes together with another variable, so its order cannot be told apart from that one.`,
    )
  return remarks
}
