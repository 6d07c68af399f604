import { AnalysisError } from '../analysis-error'
import { coverageFactor, twoSidedTProbability } from '../statistics/student-t'
import { fitWeightedLine } from '../statistics/weighted-line'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'

/** One catalyst's fitted line, as the compensation test needs it. */
export interface CompensationLine {
  readonly activationEnergyJPerMol: number
  readonly lnPreExponential: number
}

/** What can be said about compensation. */
export interface CompensationTest {
  /** correlation of ln A and Ea: close to 1 whatever the chemistry, shown as a warning and not as evidence */
  readonly naiveCorrelation: number
  /** isokinetic temperature that the naive plot suggests; near the harmonic mean temperature when it is an artefact [K] */
  readonly naiveIsokineticTemperatureK: number | null
  readonly commonTemperatureK: number
  /** of ln k at the common temperature with Ea, which errors leave uncorrelated */
  readonly correlation: number
  readonly correlationPValue: number | null
  /** d ln k(T_h)/dEa [mol J-1] */
  readonly slope: number
  readonly slopeStandardError: number | null
  readonly slopeInterval: readonly [number, number] | null
  readonly verdict: 'no-compensation-shown' | 'compensation' | 'cannot-tell'
  /** 1/(R T_iso) = 1/(R T_h) + slope [K]; null unless compensation is shown */
  readonly isokineticTemperatureK: number | null
  /** ends of the isokinetic temperature from the ends of the slope, null where the interval is not one stretch of temperatures */
  readonly isokineticInterval: readonly [number, number] | null
}

/**
 * Whether fitted activation energies and pre-exponential factors compensate beyond what errors alone produce.
 *
 * ln k(T_h) = ln A − Ea/(R T_h) against Ea; slope β; 1/(R T_iso) = 1/(R T_h) + β; an interval of β with 0 in it shows no compensation
 *
 * T_h is the harmonic mean temperature all lines share. ln A against Ea is never used: its errors form a needle of slope 1/(R T_h).
 * Source: Krug, Hunter and Grieger, Nature 261 (1976) 566; Barrie, Phys. Chem. Chem. Phys. 14 (2012) 318.
 *
 * @param lines - at least 3 lines: Ea [J mol-1], ln A in one unit for all [-]
 * @param commonTemperatureK - harmonic mean temperature of the points [K] > 0
 * @param confidenceLevel - two-sided, between 0 and 1 [-]
 * @returns both plots and a verdict; n − 2 degrees of freedom
 * @throws {AnalysisError} too-few-points with fewer than 3 lines | not-positive for a temperature not above zero | no-spread when all Ea are equal, as the line fit says
 */
export function testCompensation(
  lines: readonly CompensationLine[],
  commonTemperatureK: number,
  confidenceLevel = 0.95,
): CompensationTest {
  if (lines.length < 3) throw new AnalysisError('too-few-points', 'Compensation needs at least three lines.')
  if (!(commonTemperatureK > 0)) throw new AnalysisError('not-positive', 'The common temperature must be above zero.')
  const energy = lines.map((line) => line.activationEnergyJPerMol)
  const lnA = lines.map((line) => line.lnPreExponential)
  const inverse = 1 / (GAS_CONSTANT_J_PER_MOL_K * commonTemperatureK)
  const lnK = lines.map((line) => line.lnPreExponential - line.activationEnergyJPerMol * inverse)
  const naive = fitWeightedLine(energy, lnA, null)
  const fit = fitWeightedLine(energy, lnK, null)
  const error = fit.scaled?.slope ?? null
  const reach = error === null ? null : coverageFactor(confidenceLevel, fit.degreesOfFreedom) * error
  const interval = reach === null ? null : ([fit.slope - reach, fit.slope + reach] as const)
  const isShown = interval !== null && (interval[0] > 0 || interval[1] < 0)
  const toTemperature = (slope: number) => 1 / (GAS_CONSTANT_J_PER_MOL_K * (inverse + slope))
  const r = correlationOf(energy, lnK)
  const ends = interval?.map((slope) => inverse + slope) ?? []
  const isOneStretch = isShown && ends.every((end) => end > 0)
  return {
    naiveCorrelation: correlationOf(energy, lnA),
    naiveIsokineticTemperatureK: naive.slope > 0 ? 1 / (GAS_CONSTANT_J_PER_MOL_K * naive.slope) : null,
    commonTemperatureK,
    correlation: r,
    correlationPValue:
      Math.abs(r) < 1
        ? twoSidedTProbability((r * Math.sqrt(lines.length - 2)) / Math.sqrt(1 - r * r), lines.length - 2)
        : null,
    slope: fit.slope,
    slopeStandardError: error,
    slopeInterval: interval,
    verdict: interval === null ? 'cannot-tell' : isShown ? 'compensation' : 'no-compensation-shown',
    isokineticTemperatureK: isShown ? toTemperature(fit.slope) : null,
    isokineticInterval:
      isOneStretch && interval !== null ? [toTemperature(interval[1]), toTemperature(interval[0])] : null,
  }
}

function correlationOf(x: readonly number[], y: readonly number[]): number {
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
  const [mx, my] = [mean(x), mean(y)]
  let xy = 0
  let xx = 0
  let yy = 0
  for (const [i, value] of x.entries()) {
    const dx = value - mx
    const dy = (y[i] ?? NaN) - my
    xy += dx * dy
    xx += dx * dx
    yy += dy * dy
  }
  return xy / Math.sqrt(xx * yy)
}
