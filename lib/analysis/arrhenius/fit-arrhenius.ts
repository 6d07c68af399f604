import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { AnalysisError } from '../analysis-error'
import { type Caution } from '../caution'
import { raiseCaution } from '../cautions'
import { type Estimate } from '../estimate'
import { numberText } from '../number-text'
import { type ArrheniusFit, type FitPoint } from '../reduction/run-reduction'
import { type GroupedLine } from '../statistics/grouped-line'
import { fitQuadratic } from '../statistics/quadratic'
import { studentTQuantile } from '../statistics/student-t'
import { intervalOf } from '../total-uncertainty'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { arrheniusWorkings } from './arrhenius-workings'
import { fitWithErrorModel, type ModelledLine } from './error-model'

/** One hold as the line sees it. */
export interface ArrheniusPoint {
  readonly runCode: string
  readonly holdNumber: number
  readonly temperatureK: Estimate
  /** rate or turnover frequency; its random part is that of the injections, pooled over the run */
  readonly quantity: Estimate
  readonly isUsed: boolean
  /** why it is not used, in words */
  readonly reason: string
}

export interface ArrheniusRequest {
  readonly quantity: 'rate' | 'turnover-frequency'
  /** in any order */
  readonly points: readonly ArrheniusPoint[]
  readonly referenceTemperatureK: number
  readonly confidenceLevel: number
  /** whose line it is, for the working: a run's or a sample's code */
  readonly subject: string
  /** variance of ln rate between runs of a sample, for weighing their levels; it is not put into the uncertainties of the line */
  readonly betweenRunVariance?: number
}

/** Bed temperatures closer than this are the same temperature. */
const SAME_TEMPERATURE_K = 1.5
/** Five steady temperatures for a line to lean on, three for any uncertainty: common practice. */
const WANTED_TEMPERATURES = 5
const NEEDED_TEMPERATURES = 3
const WANTED_SPAN_PER_K = 1.5e-4
const WANTED_RATIO = 10
/** Part of the range in 1/T that the reference may lie outside the data. */
const EXTRAPOLATION_SHARE = 0.1

interface Prepared {
  readonly point: ArrheniusPoint
  readonly x: number
  readonly y: number
  readonly relativeUncertainty: number | null
}

function prepare(request: ArrheniusRequest): Prepared[] {
  const prepared: Prepared[] = []
  for (const point of request.points) {
    const { temperatureK, quantity } = point
    if (!Number.isFinite(temperatureK.value) || !Number.isFinite(quantity.value)) {
      if (!point.isUsed) continue
      throw new AnalysisError(
        'not-finite',
        `Hold ${point.holdNumber} of ${point.runCode} has no finite temperature and rate.`,
        {
          holdNumber: point.holdNumber,
        },
      )
    }
    if (!(temperatureK.value > 0) || !(quantity.value > 0)) {
      if (!point.isUsed) continue
      throw new AnalysisError(
        'not-positive',
        `Hold ${point.holdNumber} of ${point.runCode} has temperature ${temperatureK.value} K and rate ${quantity.value}; a logarithm needs both above zero.`,
        { holdNumber: point.holdNumber },
      )
    }
    const u = quantity.randomStandardUncertainty
    prepared.push({
      point,
      x: 1 / temperatureK.value,
      y: ln(quantity.value),
      relativeUncertainty: u === null || !(u > 0) ? null : u / quantity.value,
    })
  }
  // one order whatever order they came in, so that the sums have the same bits
  return prepared.sort((a, b) =>
    a.point.runCode === b.point.runCode
      ? a.point.holdNumber - b.point.holdNumber || a.x - b.x || a.y - b.y
      : a.point.runCode < b.point.runCode
        ? -1
        : 1,
  )
}

function countDistinct(temperatures: readonly number[]): number {
  let count = 0
  let last = Number.NEGATIVE_INFINITY
  for (const temperature of [...temperatures].sort((a, b) => a - b)) {
    if (temperature - last > SAME_TEMPERATURE_K) {
      count++
      last = temperature
    }
  }
  return count
}

// Injections' errors with the random error of the bed temperature folded in by effective variance, once the slope is roughly known.
function effectiveErrors(used: readonly Prepared[], slope: number): number[] | null {
  const errors: number[] = []
  for (const { x, relativeUncertainty, point } of used) {
    if (relativeUncertainty === null) return null
    const temperature = slope * (point.temperatureK.randomStandardUncertainty ?? 0) * x * x
    errors.push(Math.sqrt(relativeUncertainty * relativeUncertainty + temperature * temperature))
  }
  return errors
}

// Degrees of freedom of the injections: those of each run's pooled variance, added over runs.
function injectionDegreesOfFreedom(used: readonly Prepared[]): number | null {
  const perRun = new Map<string, number>()
  for (const { point } of used) {
    const nu = point.quantity.degreesOfFreedom
    if (nu === null) return null
    perRun.set(point.runCode, Math.max(nu, perRun.get(point.runCode) ?? 0))
  }
  let total = 0
  for (const nu of perRun.values()) total += nu
  return total
}

// The line's level over all runs, as weights on the runs' own levels.
function levelWeights(line: GroupedLine, betweenRunVariance: number): number[] {
  if (line.groups.length === 1) return [1]
  const precision = line.groups.map((group) => 1 / (1 / group.sumOfWeights + betweenRunVariance))
  let total = 0
  for (const value of precision) total += value
  return precision.map((value) => value / total)
}

/** How the line's slope and level move for given changes of the points' ln rate. */
interface LinearResponse {
  readonly slope: (changes: readonly number[]) => number
  readonly centre: (changes: readonly number[]) => number
}

function linearResponse(
  used: readonly Prepared[],
  groupOf: readonly number[],
  model: ModelledLine,
  shares: readonly number[],
): LinearResponse {
  const { line, sigma } = model
  const weight = (i: number): number => {
    const s = sigma[i] ?? 0
    return s > 0 ? 1 / (s * s) : 1
  }
  return {
    slope: (changes) => {
      let total = 0
      used.forEach(({ x }, i) => {
        total += weight(i) * (x - (line.groups[groupOf[i] ?? 0]?.centreX ?? 0)) * (changes[i] ?? 0)
      })
      return total / line.sumOfSquaresX
    },
    centre: (changes) => {
      let total = 0
      used.forEach((_, i) => {
        const group = groupOf[i] ?? 0
        total += ((shares[group] ?? 0) * weight(i) * (changes[i] ?? 0)) / (line.groups[group]?.sumOfWeights ?? 1)
      })
      return total
    },
  }
}

// Shared source → change of each point's ln rate on the line, for plus one standard uncertainty of the source.
function sharedChanges(used: readonly Prepared[], slope: number): ReadonlyMap<string, readonly number[]> {
  const ids = new Set<string>()
  for (const { point } of used) {
    for (const id of Object.keys(point.quantity.sharedEffects)) ids.add(id)
    for (const id of Object.keys(point.temperatureK.sharedEffects)) ids.add(id)
  }
  const changes = new Map<string, readonly number[]>()
  for (const id of [...ids].sort()) {
    changes.set(
      id,
      used.map(({ x, point }) => {
        const own = (point.quantity.sharedEffects[id] ?? 0) / point.quantity.value
        // a bed that is really hotter moves the point along 1/T: to first order as if ln rate had moved by slope x dT/T^2
        return own + slope * (point.temperatureK.sharedEffects[id] ?? 0) * x * x
      }),
    )
  }
  return changes
}

function fitPoints(
  all: readonly Prepared[],
  used: readonly Prepared[],
  model: ModelledLine,
  valueAt: (x: number, runCode: string) => number,
): FitPoint[] {
  const s =
    model.line.degreesOfFreedom > 0 ? Math.sqrt(model.line.residualSumOfSquares / model.line.degreesOfFreedom) : 0
  const nu = model.line.degreesOfFreedom
  const position = new Map(used.map((entry, i) => [entry, i]))
  return all.map((entry): FitPoint => {
    const i = position.get(entry)
    const fitted = valueAt(entry.x, entry.point.runCode)
    const base = {
      holdNumber: entry.point.holdNumber,
      runCode: entry.point.runCode,
      temperatureK: entry.point.temperatureK.value,
      lnRate: entry.y,
      fitted,
      residual: entry.y - fitted,
      reason: entry.point.reason,
    }
    const tau = model.betweenHoldStandardDeviation
    if (i === undefined) {
      const own = entry.relativeUncertainty ?? 0
      return {
        ...base,
        lnRateStandardUncertainty: Math.sqrt(own * own + tau * tau),
        leverage: null,
        studentisedResidual: null,
        cookDistance: null,
        isUsed: false,
      }
    }
    const h = model.line.leverage[i] ?? 1
    const sigma = model.sigma[i] ?? 0
    const parameters = used.length - nu
    const internal =
      s > 0 && sigma > 0 && h < 1 - 1e-10 ? (model.line.residuals[i] ?? 0) / sigma / (s * Math.sqrt(1 - h)) : null
    const rest = internal === null ? 0 : nu - internal * internal
    return {
      ...base,
      residual: model.line.residuals[i] ?? base.residual,
      lnRateStandardUncertainty: sigma,
      leverage: h,
      studentisedResidual:
        internal === null || nu < 2 || rest <= 1e-12 * nu ? null : internal * Math.sqrt((nu - 1) / rest),
      cookDistance: internal === null ? null : (internal * internal * h) / (parameters * (1 - h)),
      isUsed: true,
    }
  })
}

function lineCautions(
  request: ArrheniusRequest,
  points: readonly FitPoint[],
  facts: {
    readonly distinct: number
    readonly low: number
    readonly high: number
    readonly isExtrapolated: boolean
    readonly model: ModelledLine
    readonly curvature: ArrheniusFit['curvature']
    readonly meanInjectionError: number | null
  },
): Caution[] {
  const cautions: Caution[] = []
  const { distinct, low, high, model, curvature } = facts
  if (distinct < NEEDED_TEMPERATURES) {
    cautions.push(raiseCaution('too-few-temperatures', { value: distinct, limit: NEEDED_TEMPERATURES }))
  } else if (distinct < WANTED_TEMPERATURES) {
    cautions.push(raiseCaution('few-temperatures', { value: distinct, limit: WANTED_TEMPERATURES }))
  }
  const used = points.filter((point) => point.isUsed)
  let least = Number.POSITIVE_INFINITY
  let most = Number.NEGATIVE_INFINITY
  for (const point of used) {
    least = Math.min(least, point.lnRate)
    most = Math.max(most, point.lnRate)
  }
  const span = 1 / low - 1 / high
  if (span < WANTED_SPAN_PER_K && most - least < ln(WANTED_RATIO)) {
    cautions.push(
      raiseCaution('small-span', {
        value: span,
        limit: WANTED_SPAN_PER_K,
        more: { spanK: high - low, ratio: exp(most - least) },
      }),
    )
  }
  if (facts.isExtrapolated) {
    cautions.push(
      raiseCaution('reference-extrapolated', {
        value: request.referenceTemperatureK,
        limit: null,
        more: { low, high },
      }),
    )
  }
  if (curvature !== null && curvature.pValue < 0.05) {
    cautions.push(
      raiseCaution(curvature.pValue < 0.01 ? 'line-bends' : 'line-may-bend', {
        value: curvature.pValue,
        limit: curvature.pValue < 0.01 ? 0.01 : 0.05,
        more: { cold: curvature.activationEnergyColdJPerMol, hot: curvature.activationEnergyHotJPerMol },
      }),
    )
  }
  const nu = model.line.degreesOfFreedom
  const limit = nu >= 2 ? studentTQuantile(1 - 0.05 / (2 * used.length), nu - 1) : null
  for (const point of used) {
    if (limit !== null && point.studentisedResidual !== null && Math.abs(point.studentisedResidual) > limit) {
      cautions.push(
        raiseCaution('outlying-point', { value: point.studentisedResidual, limit, holdNumber: point.holdNumber }),
      )
    }
    if (point.cookDistance !== null && point.cookDistance > 1) {
      cautions.push(
        raiseCaution('pulling-point', { value: point.cookDistance, limit: 1, holdNumber: point.holdNumber }),
      )
    }
  }
  if (model.betweenHoldStandardDeviation > 0 && facts.meanInjectionError !== null) {
    cautions.push(
      raiseCaution('scatter-between-holds', {
        value: model.betweenHoldStandardDeviation,
        limit: null,
        more: { injections: facts.meanInjectionError },
      }),
    )
  }
  return cautions
}

function testCurvature(used: readonly Prepared[], model: ModelledLine): ArrheniusFit['curvature'] {
  if (model.line.groups.length > 1 || used.length < 4) return null
  const sigma = model.sigma
  const weights = sigma.every((value) => value > 0) ? sigma.map((value) => 1 / (value * value)) : null
  const x = used.map((entry) => entry.x)
  const quadratic = fitQuadratic(
    x,
    used.map((entry) => entry.y),
    weights,
  )
  if (quadratic === null || quadratic.pValue === null) return null
  const energyAt = (place: number): number =>
    -GAS_CONSTANT_J_PER_MOL_K * (quadratic.slope + 2 * quadratic.curvature * (place - quadratic.centreX))
  return {
    pValue: quadratic.pValue,
    activationEnergyColdJPerMol: energyAt(Math.max(...x)),
    activationEnergyHotJPerMol: energyAt(Math.min(...x)),
  }
}

/**
 * Arrhenius line of the rates at several temperatures, with every uncertainty in parts.
 *
 * ln r = ln r_c - (Ea / R)(1/T - 1/T_c); Ea = -R b; ln A = ln r_c + Ea / (R T_c); T_c the weighted harmonic mean, where ln r_c and Ea are uncorrelated.
 * Var(b) = 1 / Sxx and Var(ln r_c) = 1 / sum w with w = 1/sigma^2 of the error model (`fitWithErrorModel`). Every shared error is carried through the
 * line's own linear response: one common to all temperatures moves ln A alone; the thermocouple's moves Ea by about 2 dT/T.
 * Several runs share one slope, each with its own level. Assumes one kinetic regime over the range (the curvature test looks for the contrary).
 * Source: M. Schwaab, J. C. Pinto, Chem. Eng. Sci. 62 (2007) 2750, doi:10.1016/j.ces.2007.02.020 (centring); N. R. Draper, H. Smith, Applied
 * Regression Analysis, 3rd edition, 1998, chapters 1 and 9 (line); JCGM 100:2008 (parts).
 *
 * @param request - at least 2 used points at 2 or more temperatures [K; mol kg-1 s-1 or s-1]
 * @returns the line with diagnostics, cautions and workings; uncertainties are null for two points [J mol-1; ln of the SI unit of the quantity]
 * @throws {AnalysisError} too-few-points | no-spread-in-temperature | not-finite | not-positive
 */
export function fitArrhenius(request: ArrheniusRequest): ArrheniusFit {
  const all = prepare(request)
  const used = all.filter((entry) => entry.point.isUsed)
  if (used.length < 2) {
    throw new AnalysisError('too-few-points', `${request.subject} has ${used.length} usable points; a line needs 2.`, {
      count: used.length,
    })
  }
  const temperatures = used.map((entry) => entry.point.temperatureK.value)
  const distinct = countDistinct(temperatures)
  const runCodes = [...new Set(used.map((entry) => entry.point.runCode))]
  const groupOf = used.map((entry) => runCodes.indexOf(entry.point.runCode))
  if (distinct < 2) {
    throw new AnalysisError(
      'no-spread-in-temperature',
      `${request.subject} has all its points at ${numberText(temperatures[0] ?? 0, 4)} K; a line needs two temperatures.`,
      { count: used.length },
    )
  }
  const x = used.map((entry) => entry.x)
  const y = used.map((entry) => entry.y)
  const injections = injectionDegreesOfFreedom(used)
  const first = fitWithErrorModel(x, y, effectiveErrors(used, 0), injections, groupOf)
  const errors = effectiveErrors(used, first.line.slope)
  const model = fitWithErrorModel(x, y, errors, injections, groupOf)
  const { line } = model

  const shares = levelWeights(line, request.betweenRunVariance ?? 0)
  let centreX = 0
  let centreValue = 0
  let centreVariance = 0
  line.groups.forEach((group, i) => {
    const share = shares[i] ?? 0
    centreX += share * group.centreX
    centreValue += share * group.centreValue
    centreVariance += (share * share) / group.sumOfWeights
  })
  const isExact = model.sigma.every((value) => value === 0)
  const isKnown = model.degreesOfFreedom !== null
  const slopeVariance = isExact ? 0 : 1 / line.sumOfSquaresX
  const levelVariance = isExact ? 0 : centreVariance
  const degreesOfFreedom = model.degreesOfFreedom === 'infinite' ? null : model.degreesOfFreedom

  const response = linearResponse(used, groupOf, model, shares)
  const changes = sharedChanges(used, line.slope)
  const estimate = (value: number, variance: number, effect: (slope: number, level: number) => number): Estimate => {
    const sharedEffects: Record<string, number> = {}
    for (const [id, change] of changes) sharedEffects[id] = effect(response.slope(change), response.centre(change))
    return { value, randomStandardUncertainty: isKnown ? Math.sqrt(variance) : null, degreesOfFreedom, sharedEffects }
  }
  const R = GAS_CONSTANT_J_PER_MOL_K
  const atPlace = (place: number): Estimate => {
    const distance = place - centreX
    return estimate(
      centreValue + line.slope * distance,
      levelVariance + distance * distance * slopeVariance,
      (slope, level) => level + slope * distance,
    )
  }
  const activationEnergy = estimate(-R * line.slope, R * R * slopeVariance, (slope) => -R * slope)
  const lnPreExponential = atPlace(0)
  const referenceX = 1 / request.referenceTemperatureK
  const atReference = atPlace(referenceX)
  const low = Math.min(...temperatures)
  const high = Math.max(...temperatures)
  const margin = EXTRAPOLATION_SHARE * (1 / low - 1 / high)
  const isExtrapolated = referenceX > 1 / low + margin || referenceX < 1 / high - margin
  const valueAt = (place: number, runCode: string): number => {
    const group = line.groups[runCodes.indexOf(runCode)]
    return group === undefined
      ? centreValue + line.slope * (place - centreX)
      : group.centreValue + line.slope * (place - group.centreX)
  }
  const points = fitPoints(all, used, model, valueAt)
  const curvature = testCurvature(used, model)
  const meanInjectionError =
    errors === null ? null : Math.sqrt(errors.reduce((total, value) => total + value * value, 0) / errors.length)
  let squares = 0
  for (const residual of line.residuals) squares += residual * residual
  const fit: ArrheniusFit = {
    quantity: request.quantity,
    runCodes,
    activationEnergyJPerMol: activationEnergy,
    lnPreExponential,
    centreTemperatureK: 1 / centreX,
    lnRateAtCentre: atPlace(centreX),
    lnRateAtReference: atReference,
    referenceTemperatureK: request.referenceTemperatureK,
    isReferenceExtrapolated: isExtrapolated,
    covarianceLnAEa: isKnown ? R * centreX * slopeVariance : null,
    confidenceLevel: request.confidenceLevel,
    intervals: {
      activationEnergyJPerMol: intervalOf(activationEnergy, request.confidenceLevel),
      lnPreExponential: intervalOf(lnPreExponential, request.confidenceLevel),
      lnRateAtReference: intervalOf(atReference, request.confidenceLevel),
    },
    residualStandardDeviation: line.degreesOfFreedom > 0 ? Math.sqrt(squares / line.degreesOfFreedom) : null,
    betweenHoldStandardDeviation: isKnown ? model.betweenHoldStandardDeviation : null,
    chiSquared: model.chiSquared,
    degreesOfFreedom: line.degreesOfFreedom,
    distinctTemperatures: distinct,
    lowestTemperatureK: low,
    highestTemperatureK: high,
    curvature,
    points,
    cautions: lineCautions(request, points, {
      distinct,
      low,
      high,
      isExtrapolated,
      model,
      curvature,
      meanInjectionError,
    }),
    workings: {},
  }
  return { ...fit, workings: arrheniusWorkings(fit, request.subject, meanInjectionError) }
}
