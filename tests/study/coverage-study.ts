import { type ArrheniusPoint, fitArrhenius } from '@/lib/analysis/arrhenius/fit-arrhenius'
import { lineAt } from '@/lib/analysis/arrhenius/line-at'
import { fitDecayCorrectedArrhenius } from '@/lib/analysis/deactivation/decay-corrected-arrhenius'
import { plugFlowIntegral } from '@/lib/analysis/kinetics/reactor-integral'
import { fitGlobalPowerLaw } from '@/lib/analysis/kinetics/reaction-orders'
import { pointwiseBand } from '@/lib/analysis/statistics/bands'
import { testLackOfFit } from '@/lib/analysis/statistics/lack-of-fit'
import { poolVariance } from '@/lib/analysis/statistics/pooled-variance'
import { fitQuadratic } from '@/lib/analysis/statistics/quadratic'
import { createRandomStream, type RandomStream } from '@/lib/analysis/statistics/random'
import { diagnoseResiduals } from '@/lib/analysis/statistics/residuals'
import { coverageFactor, twoSidedTProbability } from '@/lib/analysis/statistics/student-t'
import { fitWeightedLine, type WeightedLine } from '@/lib/analysis/statistics/weighted-line'
import { GAS_CONSTANT_J_PER_MOL_K as R } from '@/lib/analysis/units/constants'
import { binomialRegion } from './binomial-region'

/** One tally of the study. */
export interface Tally {
  readonly estimator: string
  readonly quantity: string
  /** 0.95 for intervals, 0.05 for tests */
  readonly nominal: number
  readonly count: number
  readonly hits: number
  readonly low: number
  readonly high: number
  readonly passes: boolean
}

const EA = 85_000
const T_REF = 520
const T_RATE = 500
const LN_REF = -6
const HOLDS = [490, 500, 510, 520, 530, 540, 550, 510] as const
const truth = (temperatureK: number) => LN_REF - (EA / R) * (1 / temperatureK - 1 / T_REF)

/** Counts how often each answer held. A trial gives one record of answers. */
function tally(
  estimator: string,
  count: number,
  seed: number,
  nominal: Readonly<Record<string, number>>,
  trial: (stream: RandomStream) => Readonly<Record<string, boolean>>,
): Tally[] {
  const stream = createRandomStream(seed)
  const hits = new Map<string, number>(Object.keys(nominal).map((quantity) => [quantity, 0]))
  for (let i = 0; i < count; i += 1) {
    const answers = trial(stream)
    for (const quantity of hits.keys())
      if (answers[quantity] === true) hits.set(quantity, (hits.get(quantity) ?? 0) + 1)
  }
  return Object.entries(nominal).map(([quantity, probability]) => {
    const { low, high } = binomialRegion(count, probability)
    const found = hits.get(quantity) ?? 0
    return {
      estimator,
      quantity,
      nominal: probability,
      count,
      hits: found,
      low,
      high,
      passes: found >= low && found <= high,
    }
  })
}

const INTERVALS = {
  'activation energy': 0.95,
  'ln k at the reference temperature': 0.95,
  'ln rate at another temperature': 0.95,
} as const

function lineAnswers(line: WeightedLine): Record<string, boolean> {
  const t = coverageFactor(0.95, line.degreesOfFreedom)
  const inside = (temperatureK: number) => {
    const band = pointwiseBand(line, 1 / temperatureK, 0.95)
    return band.low <= truth(temperatureK) && truth(temperatureK) <= band.high
  }
  return {
    'activation energy': Math.abs(-R * line.slope - EA) <= t * R * (line.scaled?.slope ?? 0),
    'ln k at the reference temperature': inside(T_REF),
    'ln rate at another temperature': inside(T_RATE),
  }
}

/** Ordinary least squares of ln k, equal errors, with its tests at 5 %. */
export function studyOrdinary(count: number, seed: number): Tally[] {
  const temperatures = [490, 500, 510, 520, 530, 540, 550, 490, 500, 510, 520, 530, 540, 550]
  const x = temperatures.map((t) => 1 / t)
  return tally(
    'ordinary least squares',
    count,
    seed,
    { ...INTERVALS, curvature: 0.05, 'lack of fit': 0.05, outlier: 0.05 },
    (stream) => {
      const y = temperatures.map((t) => truth(t) + 0.05 * stream.nextNormal())
      const line = fitWeightedLine(x, y, null)
      const parabola = fitQuadratic(x, y, null)
      const f =
        parabola === null
          ? 0
          : (line.residualSumOfSquares - parabola.residualSumOfSquares) /
            (parabola.residualSumOfSquares / parabola.degreesOfFreedom)
      const { externallyStudentised, outlierLimit } = diagnoseResiduals(line)
      return {
        ...lineAnswers(line),
        curvature: twoSidedTProbability(Math.sqrt(Math.max(0, f)), parabola?.degreesOfFreedom ?? 1) < 0.05,
        'lack of fit': (testLackOfFit(x, y, line.fitted, 2)?.pValue ?? 1) < 0.05,
        outlier: externallyStudentised.some((value) => Math.abs(value ?? 0) > (outlierLimit ?? Infinity)),
      }
    },
  )
}

/**
 * The product's default: raw injections, their variance pooled over the run, a between-hold term where the residuals ask for it.
 * `between` is the true scatter between holds in units of the uncertainty of a hold's mean.
 */
export function studyDefaultErrorModel(between: number, count: number, seed: number): Tally[] {
  const injection = 0.02
  const name = `default error model, between holds ${String(between)} u`
  return tally(name, count, seed, INTERVALS, (stream) => {
    const groups = HOLDS.map((temperatureK) => {
      const size = 3 + (stream.nextInteger() % 3)
      const own = ((between * injection) / 2) * stream.nextNormal()
      const rates = Array.from(
        { length: size },
        () => Math.exp(truth(temperatureK) + own) * (1 + injection * stream.nextNormal()),
      )
      const value = rates.reduce((sum, rate) => sum + rate, 0) / size
      return { temperatureK, size, value, relative: rates.map((rate) => rate / value) }
    })
    const pooled = poolVariance(groups.map(({ relative }) => relative))
    const points = groups.map(({ temperatureK, size, value }, i): ArrheniusPoint => ({
      runCode: 'R',
      holdNumber: i + 1,
      temperatureK: { value: temperatureK, randomStandardUncertainty: 0, degreesOfFreedom: null, sharedEffects: {} },
      quantity: {
        value,
        randomStandardUncertainty: value * Math.sqrt((pooled?.variance ?? NaN) / size),
        degreesOfFreedom: pooled?.degreesOfFreedom ?? null,
        sharedEffects: {},
      },
      isUsed: true,
      reason: '',
    }))
    const fit = fitArrhenius({
      quantity: 'rate',
      points,
      referenceTemperatureK: T_REF,
      confidenceLevel: 0.95,
      subject: 'R',
    })
    const holds = (interval: readonly [number, number] | null, value: number) =>
      interval !== null && interval[0] <= value && value <= interval[1]
    return {
      'activation energy': holds(fit.intervals.activationEnergyJPerMol, EA),
      'ln k at the reference temperature': holds(fit.intervals.lnRateAtReference, LN_REF),
      'ln rate at another temperature': holds(lineAt(fit, T_RATE).interval, truth(T_RATE)),
    }
  })
}

/** Temperature and first-order decay fitted together, with a series that goes up and comes back. */
export function studyDecayCorrected(count: number, seed: number): Tally[] {
  const decay = 0.03 / 3_600
  const series = [490, 510, 530, 550, 540, 520, 500, 490]
  return tally(
    'decay-corrected line',
    count,
    seed,
    { 'activation energy': 0.95, 'decay constant': 0.95, 'ln k of the fresh catalyst': 0.95 },
    (stream) => {
      const fit = fitDecayCorrectedArrhenius(
        series.map((temperatureK, i) => ({
          temperatureK,
          timeS: 3_600 * i,
          rate: Math.exp(truth(temperatureK) - decay * 3_600 * i + 0.02 * stream.nextNormal()),
        })),
      )
      const t = coverageFactor(0.95, fit.degreesOfFreedom)
      return {
        'activation energy': Math.abs(fit.activationEnergyJPerMol - EA) <= t * (fit.activationEnergyStandardError ?? 0),
        'decay constant': Math.abs(fit.decayPerS - decay) <= t * (fit.decayStandardError ?? 0),
        'ln k of the fresh catalyst':
          Math.abs(fit.lnRateAtCentre - truth(fit.centreTemperatureK)) <= t * (fit.lnRateAtCentreStandardError ?? 0),
      }
    },
  )
}

/** First order with expansion by the plug-flow integral, conversions of 2 to 60 % with a constant relative error. */
export function studyIntegral(count: number, seed: number): Tally[] {
  const expansion = 0.5
  const error = 0.01
  const temperatures = [480, 495, 510, 525, 540, 555]
  // conversion at which the integral is k τ′, by bisection
  const conversions = temperatures.map((temperatureK) => {
    const wanted = 100 * Math.exp(truth(temperatureK))
    let low = 0
    let high = 1 - 1e-12
    for (let i = 0; i < 80; i += 1) {
      const middle = (low + high) / 2
      if (plugFlowIntegral(1, middle, expansion) < wanted) low = middle
      else high = middle
    }
    return (low + high) / 2
  })
  return tally('integral first order with expansion', count, seed, INTERVALS, (stream) => {
    const seen = conversions.map((x) => x * (1 + error * stream.nextNormal()))
    const integrals = seen.map((x) => plugFlowIntegral(1, x, expansion))
    // u(ln I) = u(X) (dI/dX)/I, dI/dX = (1 + εX)/(1 − X)
    const weights = seen.map((x, i) => {
      const u = (error * x * (1 + expansion * x)) / (1 - x) / (integrals[i] ?? NaN)
      return 1 / (u * u)
    })
    return lineAnswers(
      fitWeightedLine(
        temperatures.map((t) => 1 / t),
        integrals.map((value) => Math.log(value / 100)),
        weights,
      ),
    )
  })
}

/** Global power law in temperature and two pressures. */
export function studyGlobalPowerLaw(count: number, seed: number): Tally[] {
  const orders = { A: 0.3, B: 0.6 }
  const design = [490, 510, 530, 550].flatMap((temperatureK) =>
    [
      [10, 40],
      [10, 80],
      [20, 40],
      [40, 20],
    ].map(([a = NaN, b = NaN]) => ({ temperatureK, A: a, B: b })),
  )
  return tally(
    'global power law',
    count,
    seed,
    { 'activation energy': 0.95, 'order in A': 0.95, 'order in B': 0.95 },
    (stream) => {
      const fit = fitGlobalPowerLaw(
        design.map(({ temperatureK, A, B }) => ({
          temperatureK,
          pressuresPa: { A, B },
          ratePositive: Math.exp(
            truth(temperatureK) + orders.A * Math.log(A) + orders.B * Math.log(B) + 0.03 * stream.nextNormal(),
          ),
        })),
        ['A', 'B'],
      )
      const t = coverageFactor(0.95, fit.degreesOfFreedom)
      const inside = (value: number | undefined, error: number | null | undefined, true_: number) =>
        Math.abs((value ?? NaN) - true_) <= t * (error ?? 0)
      return {
        'activation energy': inside(fit.activationEnergyJPerMol ?? NaN, fit.activationEnergyStandardError, EA),
        'order in A': inside(fit.orders[0]?.order, fit.orders[0]?.standardError, orders.A),
        'order in B': inside(fit.orders[1]?.order, fit.orders[1]?.standardError, orders.B),
      }
    },
  )
}

/** The whole study. */
export function studyAll(count: number): Tally[] {
  return [
    ...studyOrdinary(count, 11),
    ...[0, 1, 2, 4].flatMap((between, i) => studyDefaultErrorModel(between, count, 21 + i)),
    ...studyDecayCorrected(count, 31),
    ...studyIntegral(count, 41),
    ...studyGlobalPowerLaw(count, 51),
  ]
}
