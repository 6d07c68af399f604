import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import pow from '@stdlib/math-base-special-pow'
import { AnalysisError } from '../analysis-error'
import { type Species } from '../reduction/run-input'
import { coverageFactor } from '../statistics/student-t'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { aicc } from './aicc'
import { fitNonlinear, type NonlinearFit, type NonlinearModel } from './levenberg-marquardt'
import { profileInterval, type ProfileInterval } from './profile-interval'

/** r = k Π p_i^(a_i) (1 − Q/K_eq)/(1 + Σ K_j p_j)^m */
export interface LangmuirHinshelwoodLaw {
  /** powers of the driving force */
  readonly drivingOrders: Readonly<Record<Species, number>>
  /** species that adsorb and hold the reaction back */
  readonly adsorbed: readonly Species[]
  /** power of the denominator: sites in the slow step */
  readonly denominatorPower: 1 | 2 | 3
  /** reaction quotient and equilibrium constant in the unit of the pressures; null for an irreversible step */
  readonly equilibrium: { readonly orders: Readonly<Record<Species, number>>; readonly constant: number } | null
}

/** One rate. */
export interface LangmuirHinshelwoodPoint {
  readonly rate: number
  /** one unit for all, as the equilibrium constant */
  readonly pressures: Readonly<Record<Species, number>>
  /** for fits over several temperatures */
  readonly temperatureK?: number
  readonly standardUncertainty?: number
}

/** One fitted constant; all are positive by construction. */
export interface LangmuirHinshelwoodConstant {
  readonly name: string
  readonly value: number
  /** of the logarithm, Wald; mean little for constants hard to tell apart */
  readonly logarithmStandardError: number | null
  /** follows the true shape of the sum of squares; an end of null means the data set no bound */
  readonly profile: ProfileInterval
  /** reaction or adsorption energy with its standard error, for fits over temperatures [J mol-1] */
  readonly energyJPerMol: number | null
  readonly energyStandardError: number | null
}

/** A fitted saturation law. */
export interface LangmuirHinshelwoodFit {
  /** rate constant first, then one adsorption constant a species, at the reference temperature where there is one */
  readonly constants: readonly LangmuirHinshelwoodConstant[]
  readonly referenceTemperatureK: number | null
  readonly residualSumOfSquares: number
  readonly residualStandardDeviation: number | null
  readonly degreesOfFreedom: number
  readonly aicc: number | null
  /** doubts about what the data can tell, in words */
  readonly remarks: readonly string[]
  readonly fit: NonlinearFit
}

/** Correlation of two estimates from which they count as one. */
const HIGH_CORRELATION = 0.98

/**
 * Saturation (Langmuir-Hinshelwood) rate law by nonlinear least squares in the rate.
 *
 * r = k Π p_i^(a_i) (1 − Q/K_eq)/(1 + Σ K_j p_j)^m, fitted in ln k and ln K_j; over temperatures ln k − (E/R)(1/T − 1/T_ref) and likewise for each K_j
 *
 * Positive constants by construction. Linearised fits are biased and only serve as starts. Several starts are tried and the best kept.
 * Source: Hougen and Watson, Chemical Process Principles, 1947, part 3; Bates and Watts, Nonlinear Regression Analysis, 1988; Kittrell, Adv. Chem.
 * Eng. 8 (1970) 97.
 *
 * @param points - rates [any] > 0 in the mean, pressures [one unit], temperatures [K], standard uncertainties [unit of the rate] (equal ones when any is missing)
 * @param law - driving force and denominator [-]
 * @param confidenceLevel - for the profile intervals, between 0 and 1 [-]
 * @returns constants with profile intervals [units of rate and pressure]; n − p degrees of freedom
 * @throws {AnalysisError} too-few-points | no-convergence when no start settles
 */
export function fitLangmuirHinshelwood(
  points: readonly LangmuirHinshelwoodPoint[],
  law: LangmuirHinshelwoodLaw,
  confidenceLevel = 0.95,
): LangmuirHinshelwoodFit {
  const temperatures = points.map((point) => point.temperatureK ?? null)
  const isOverTemperature = temperatures.every((t) => t !== null) && new Set(temperatures).size > 1
  const inverse = temperatures.map((t) => (t === null ? 0 : 1 / t))
  const centre = inverse.reduce((sum, value) => sum + value, 0) / inverse.length
  const names = ['k', ...law.adsorbed.map((species) => `K(${species})`)]
  const count = names.length * (isOverTemperature ? 2 : 1)
  if (points.length <= count)
    throw new AnalysisError('too-few-points', `This law needs ${String(count + 1)} points.`, { count: points.length })
  const model = modelOf(points, law, isOverTemperature ? inverse.map((value) => value - centre) : null)
  const rates = points.map((point) => point.rate)
  const uncertainties = points.flatMap((point) =>
    point.standardUncertainty === undefined ? [] : [point.standardUncertainty],
  )
  const weights = uncertainties.length === points.length ? uncertainties.map((u) => 1 / (u * u)) : null
  const fit = bestOf(startsFor(points, law, isOverTemperature), model, rates, weights)
  const t = coverageFactor(confidenceLevel, fit.degreesOfFreedom)
  const constants = names.map((name, j): LangmuirHinshelwoodConstant => {
    const logged = profileInterval(model, rates, fit, j, t, weights)
    const energyIndex = names.length + j
    return {
      name,
      value: exp(fit.parameters[j] ?? NaN),
      logarithmStandardError: fit.standardErrors[j] ?? null,
      profile: {
        low: logged.low === null ? null : exp(logged.low),
        high: logged.high === null ? null : exp(logged.high),
      },
      energyJPerMol: isOverTemperature ? (fit.parameters[energyIndex] ?? NaN) * ENERGY_SCALE : null,
      energyStandardError: isOverTemperature ? scaled(fit.standardErrors[energyIndex]) : null,
    }
  })
  return {
    constants,
    referenceTemperatureK: isOverTemperature ? 1 / centre : null,
    residualSumOfSquares: fit.residualSumOfSquares,
    residualStandardDeviation: fit.residualStandardDeviation,
    degreesOfFreedom: fit.degreesOfFreedom,
    aicc: aicc(fit.residualSumOfSquares, points.length, count + 1),
    remarks: remarksOn(fit, constants, names),
    fit,
  }
}

/**
 * Whether adsorption parameters are physically possible.
 *
 * 0 < −ΔS < S_gas; 10 ≤ −ΔS ≤ 12.2 − 0.0014 ΔH, entropies in cal mol⁻¹ K⁻¹, ΔH in cal mol⁻¹
 *
 * The first rule is strict, the second a guideline.
 * Source: Boudart, Mears and Vannice, Ind. Chim. Belge 32 (1967) 281; Vannice et al., J. Catal. 56 (1979) 358.
 *
 * @param adsorptionEnthalpyJPerMol - ΔH of adsorption, negative [J mol-1]
 * @param adsorptionEntropyJPerMolK - ΔS of adsorption [J mol-1 K-1]
 * @param gasEntropyJPerMolK - standard entropy of the gas [J mol-1 K-1]
 * @returns which rules hold [-]
 */
export function adsorptionPlausibility(
  adsorptionEnthalpyJPerMol: number,
  adsorptionEntropyJPerMolK: number,
  gasEntropyJPerMolK: number,
): {
  readonly isExothermic: boolean
  readonly losesEntropy: boolean
  readonly keepsWithinGasEntropy: boolean
  readonly isWithinGuideline: boolean
} {
  const loss = -adsorptionEntropyJPerMolK
  const lossCal = loss / 4.184
  const limitCal = 12.2 - 0.0014 * (adsorptionEnthalpyJPerMol / 4.184)
  return {
    isExothermic: adsorptionEnthalpyJPerMol < 0,
    losesEntropy: loss > 0,
    keepsWithinGasEntropy: loss < gasEntropyJPerMolK,
    isWithinGuideline: lossCal >= 10 && lossCal <= limitCal,
  }
}

/** Energies are fitted in units of this, so that all parameters have a size near ten [J mol-1]. */
const ENERGY_SCALE = 10_000

function modelOf(
  points: readonly LangmuirHinshelwoodPoint[],
  law: LangmuirHinshelwoodLaw,
  inverse: readonly number[] | null,
): NonlinearModel {
  const driving = points.map((point) => drivingForce(point.pressures, law))
  const size = law.adsorbed.length + 1
  const logsAt = (parameters: readonly number[], i: number): number[] =>
    Array.from({ length: size }, (_unused, j) => {
      const energy = inverse === null ? 0 : ((parameters[size + j] ?? NaN) * ENERGY_SCALE) / GAS_CONSTANT_J_PER_MOL_K
      return (parameters[j] ?? NaN) - energy * (inverse?.[i] ?? 0)
    })
  const at = (parameters: readonly number[], i: number) => {
    const logs = logsAt(parameters, i)
    const shares = law.adsorbed.map((species, j) => exp(logs[j + 1] ?? NaN) * (points[i]?.pressures[species] ?? NaN))
    const sum = 1 + shares.reduce((total, share) => total + share, 0)
    return { rate: (exp(logs[0] ?? NaN) * (driving[i] ?? NaN)) / pow(sum, law.denominatorPower), shares, sum }
  }
  return {
    values: (parameters) => points.map((_unused, i) => at(parameters, i).rate),
    jacobian: (parameters) =>
      points.map((_unused, i) => {
        const { rate, shares, sum } = at(parameters, i)
        const logarithmic = [rate, ...shares.map((share) => (-law.denominatorPower * rate * share) / sum)]
        const factor = inverse === null ? 0 : -(ENERGY_SCALE / GAS_CONSTANT_J_PER_MOL_K) * (inverse[i] ?? NaN)
        return inverse === null ? logarithmic : [...logarithmic, ...logarithmic.map((value) => value * factor)]
      }),
  }
}

function drivingForce(pressures: Readonly<Record<Species, number>>, law: LangmuirHinshelwoodLaw): number {
  const product = (orders: Readonly<Record<Species, number>>) => {
    let value = 1
    for (const species of Object.keys(orders).sort()) value *= pow(pressures[species] ?? NaN, orders[species] ?? 0)
    return value
  }
  const forward = product(law.drivingOrders)
  return law.equilibrium === null ? forward : forward * (1 - product(law.equilibrium.orders) / law.equilibrium.constant)
}

// Weak, middling and strong adsorption of each species; k from the mean of rate over driving force.
function startsFor(
  points: readonly LangmuirHinshelwoodPoint[],
  law: LangmuirHinshelwoodLaw,
  isOverTemperature: boolean,
): number[][] {
  const typical = law.adsorbed.map((species) => {
    const mean = points.reduce((sum, point) => sum + (point.pressures[species] ?? NaN), 0) / points.length
    return mean > 0 ? mean : 1
  })
  const levels = law.adsorbed.length > 3 ? [0.3] : [0.1, 1, 10]
  let combinations: number[][] = [[]]
  for (const pressure of typical)
    combinations = combinations.flatMap((head) => levels.map((level) => [...head, ln(level / pressure)]))
  return combinations.map((logs) => {
    let ratio = 0
    let counted = 0
    for (const point of points) {
      const sum =
        1 +
        law.adsorbed.reduce((total, species, j) => total + exp(logs[j] ?? NaN) * (point.pressures[species] ?? NaN), 0)
      const k = (point.rate * pow(sum, law.denominatorPower)) / drivingForce(point.pressures, law)
      if (k > 0 && Number.isFinite(k)) {
        ratio += ln(k)
        counted += 1
      }
    }
    const start = [counted > 0 ? ratio / counted : 0, ...logs]
    return isOverTemperature ? [...start, 8, ...law.adsorbed.map(() => -3)] : start
  })
}

function bestOf(
  starts: readonly (readonly number[])[],
  model: NonlinearModel,
  rates: readonly number[],
  weights: readonly number[] | null,
): NonlinearFit {
  let best: NonlinearFit | null = null
  for (const start of starts)
    try {
      const fit = fitNonlinear(model, rates, start, weights)
      if (best === null || fit.residualSumOfSquares < best.residualSumOfSquares) best = fit
    } catch (error) {
      if (!(error instanceof AnalysisError)) throw error
    }
  if (best === null) throw new AnalysisError('no-convergence', 'The saturation law does not settle on these rates.')
  return best
}

function remarksOn(
  fit: NonlinearFit,
  constants: readonly LangmuirHinshelwoodConstant[],
  names: readonly string[],
): string[] {
  const open = constants.filter(({ profile }) => profile.low === null || profile.high === null)
  const remarks = open.map(({ name, profile }) => {
    const side =
      profile.low === null && profile.high === null
        ? 'on either side'
        : profile.low === null
          ? 'from below'
          : 'from above'
    return `The data set no bound on ${name} ${side}: it cannot be identified from them.`
  })
  if (fit.correlation === null) return [...remarks, 'The design cannot tell the constants apart.']
  for (const [i, first] of names.entries())
    for (const [j, second] of names.entries()) {
      const r = fit.correlation[i]?.[j] ?? 0
      if (j > i && Math.abs(r) > HIGH_CORRELATION)
        remarks.push(
          `${first} and ${second} move together (correlation ${r.toFixed(3)}); only a combination of them is known.`,
        )
    }
  return remarks
}

function scaled(value: number | null | undefined): number | null {
  return value === null || value === undefined ? null : value * ENERGY_SCALE
}
