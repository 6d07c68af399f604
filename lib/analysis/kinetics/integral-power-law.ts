import exp from '@stdlib/math-base-special-exp'
import { AnalysisError } from '../analysis-error'
import { type Species } from '../reduction/run-input'
import { coverageFactor } from '../statistics/student-t'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { fitNonlinear, type NonlinearFit } from './levenberg-marquardt'
import { type FeedComposition, partialPressures, powerLawTerm } from './power-law'
import { solveBed } from './solve-bed'

/** One steady measurement on a plug-flow bed. */
export interface BedPoint {
  readonly temperatureK: number
  readonly feed: FeedComposition
  /** W/F_A0 [kg s mol-1] */
  readonly contactTimeKgSPerMol: number
  readonly conversion: number
  readonly conversionStandardUncertainty: number
}

/** Where an integral fit starts, best the result of a differential one. */
export interface IntegralStart {
  readonly lnRateConstant: number
  readonly activationEnergyJPerMol: number
}

/** Power law fitted by solving the bed. */
export interface IntegralPowerLaw {
  /** at the reference temperature and reference pressures [mol kg-1 s-1] */
  readonly lnRateConstant: number
  readonly lnRateConstantStandardError: number | null
  readonly activationEnergyJPerMol: number
  readonly activationEnergyStandardError: number | null
  readonly activationEnergyInterval: readonly [number, number] | null
  readonly orders: readonly {
    readonly species: Species
    readonly order: number
    readonly standardError: number | null
  }[]
  readonly referenceTemperatureK: number
  readonly degreesOfFreedom: number
  /** near 1 when the stated uncertainties of the conversions are right; null without degrees of freedom */
  readonly reducedChiSquared: number | null
  readonly fit: NonlinearFit
}

/** Energies are fitted in units of this, so that all parameters have a similar size [J mol-1]. */
const ENERGY_SCALE = 10_000

/**
 * Power law with Arrhenius temperature dependence from conversions of any size, by solving the plug-flow bed for every point.
 *
 * dX/d(W/F_A0) = exp[ln k_ref − (Ea/R)(1/T − 1/T_ref)] Π (p_i(X)/p_i,ref)^(a_i), fitted to X with weights 1/u²(X)
 *
 * Isothermal, isobaric, one reaction, no return. Orders given in `fixedOrders` are held; those in `freeOrders` are fitted.
 * Source: Levenspiel, Chemical Reaction Engineering, 3rd edition, chapter 18; Froment and Bischoff, 2nd edition, section 2.6.
 *
 * @param points - temperature [K], feed [Pa, -], contact time [kg s mol-1], conversion and its standard uncertainty [-] > 0
 * @param fixedOrders - orders held, by species [-]
 * @param freeOrders - species whose orders are fitted, starting from the value in `fixedOrders` or 0 [-]
 * @param referencePa - pressures at which the rate constant is stated, by species [Pa]
 * @param start - ln rate constant [-] and Ea [J mol-1] to start from
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns ln k [-], Ea [J mol-1] and orders [-] with standard errors; n − p degrees of freedom
 * @throws {AnalysisError} too-few-points | not-positive for an uncertainty not above zero | no-convergence
 */
export function fitIntegralPowerLaw(
  points: readonly BedPoint[],
  fixedOrders: Readonly<Record<Species, number>>,
  freeOrders: readonly Species[],
  referencePa: Readonly<Record<Species, number>>,
  start: IntegralStart,
  confidenceLevel = 0.95,
): IntegralPowerLaw {
  if (points.some((point) => !(point.conversionStandardUncertainty > 0)))
    throw new AnalysisError('not-positive', 'Each conversion needs an uncertainty above zero.')
  const centre = points.reduce((sum, { temperatureK }) => sum + 1 / temperatureK, 0) / points.length
  const conversionsAt = (parameters: readonly number[]): number[] => {
    const [lnK = NaN, energy = NaN] = parameters
    const orders = {
      ...fixedOrders,
      ...Object.fromEntries(freeOrders.map((species, j) => [species, parameters[2 + j] ?? NaN])),
    }
    return points.map(({ temperatureK, feed, contactTimeKgSPerMol }) => {
      const k = exp(lnK - ((energy * ENERGY_SCALE) / GAS_CONSTANT_J_PER_MOL_K) * (1 / temperatureK - centre))
      try {
        return solveBed((x) => k * termOrZero(feed, x, orders, referencePa), contactTimeKgSPerMol)
      } catch (error) {
        // a trial step past exhaustion has no conversion: the fit takes a shorter one
        if (error instanceof AnalysisError) return NaN
        throw error
      }
    })
  }
  const fit = fitNonlinear(
    { values: conversionsAt, typicalSizes: [1, 1, ...freeOrders.map(() => 1)] },
    points.map(({ conversion }) => conversion),
    [
      start.lnRateConstant,
      start.activationEnergyJPerMol / ENERGY_SCALE,
      ...freeOrders.map((species) => fixedOrders[species] ?? 0),
    ],
    points.map(({ conversionStandardUncertainty: u }) => 1 / (u * u)),
  )
  const energy = (fit.parameters[1] ?? NaN) * ENERGY_SCALE
  const energyError =
    fit.standardErrors[1] === null || fit.standardErrors[1] === undefined ? null : fit.standardErrors[1] * ENERGY_SCALE
  const reach = energyError === null ? null : coverageFactor(confidenceLevel, fit.degreesOfFreedom) * energyError
  return {
    lnRateConstant: fit.parameters[0] ?? NaN,
    lnRateConstantStandardError: fit.standardErrors[0] ?? null,
    activationEnergyJPerMol: energy,
    activationEnergyStandardError: energyError,
    activationEnergyInterval: reach === null ? null : [energy - reach, energy + reach],
    orders: freeOrders.map((species, j) => ({
      species,
      order: fit.parameters[2 + j] ?? NaN,
      standardError: fit.standardErrors[2 + j] ?? null,
    })),
    referenceTemperatureK: 1 / centre,
    degreesOfFreedom: fit.degreesOfFreedom,
    reducedChiSquared: fit.degreesOfFreedom > 0 ? fit.residualSumOfSquares / fit.degreesOfFreedom : null,
    fit,
  }
}

// A reactant that is used up stops the reaction: trial parameters may run a bed to exhaustion on the way to the answer.
function termOrZero(
  feed: FeedComposition,
  conversion: number,
  orders: Readonly<Record<Species, number>>,
  referencePa: Readonly<Record<Species, number>>,
): number {
  const pressures = partialPressures(feed, conversion)
  const isUsedUp = Object.entries(orders).some(
    ([species, order]) => order !== 0 && (feed.stoichiometry[species] ?? 0) < 0 && !((pressures[species] ?? 0) > 0),
  )
  return isUsedUp ? 0 : powerLawTerm(pressures, orders, referencePa)
}
