import { type ArrheniusFit, type FitPoint } from '@/lib/analysis/reduction/run-reduction'
import { type Estimate } from '@/lib/analysis/estimate'

const GAS_CONSTANT = 8.31446261815324

/** Estimate with an own part and, where given, shared parts. */
export function estimateOf(
  value: number,
  randomStandardUncertainty: number | null,
  sharedEffects: Record<string, number> = {},
  degreesOfFreedom: number | null = 5,
): Estimate {
  return { value, randomStandardUncertainty, degreesOfFreedom, sharedEffects }
}

/** A plain least-squares line through invented points, in the shape the product's own fit has. Numbers are for drawing, not for science. */
export function exampleFit(
  runCode: string,
  temperaturesK: readonly number[],
  lnRates: readonly number[],
  options: { leftOut?: readonly number[]; referenceTemperatureK?: number } = {},
): ArrheniusFit {
  const leftOut = options.leftOut ?? []
  const referenceTemperatureK = options.referenceTemperatureK ?? 523.15
  const used = temperaturesK
    .map((temperatureK, index) => ({ x: 1 / temperatureK, y: lnRates[index] ?? 0, index }))
    .filter((entry) => !leftOut.includes(entry.index))
  const count = used.length
  const meanX = used.reduce((sum, entry) => sum + entry.x, 0) / count
  const meanY = used.reduce((sum, entry) => sum + entry.y, 0) / count
  const sxx = used.reduce((sum, entry) => sum + (entry.x - meanX) ** 2, 0)
  const slope = used.reduce((sum, entry) => sum + (entry.x - meanX) * entry.y, 0) / sxx
  const line = (x: number) => meanY + slope * (x - meanX)
  const residualSd = Math.sqrt(used.reduce((sum, entry) => sum + (entry.y - line(entry.x)) ** 2, 0) / (count - 2))
  const slopeSe = residualSd / Math.sqrt(sxx)
  const ea = -slope * GAS_CONSTANT
  const eaSe = slopeSe * GAS_CONSTANT
  const lnA = line(0)
  const lnASe = residualSd * Math.sqrt(1 / count + meanX ** 2 / sxx)
  const t = 2.571
  const atReference = line(1 / referenceTemperatureK)
  const atReferenceSe = residualSd * Math.sqrt(1 / count + (1 / referenceTemperatureK - meanX) ** 2 / sxx)
  const around = (value: number, se: number): readonly [number, number] => [value - t * se, value + t * se]
  const points: FitPoint[] = temperaturesK.map((temperatureK, index) => {
    const lnRate = lnRates[index] ?? 0
    const fitted = line(1 / temperatureK)
    const isUsed = !leftOut.includes(index)
    return {
      holdNumber: index + 1,
      runCode,
      temperatureK,
      lnRate,
      lnRateStandardUncertainty: 0.008,
      fitted,
      residual: lnRate - fitted,
      leverage: isUsed ? 1 / count + (1 / temperatureK - meanX) ** 2 / sxx : null,
      studentisedResidual: isUsed ? (lnRate - fitted) / residualSd : null,
      cookDistance: isUsed ? 0.1 : null,
      isUsed,
      reason: isUsed ? '' : 'left out by M. Reed: bed temperature jumped',
    }
  })
  return {
    quantity: 'rate',
    runCodes: [runCode],
    activationEnergyJPerMol: estimateOf(ea, eaSe, { 'thermocouple:rig-b': ea * 0.0015 }),
    lnPreExponential: estimateOf(lnA, lnASe, { 'thermocouple:rig-b': 0.03 }),
    centreTemperatureK: 1 / meanX,
    lnRateAtCentre: estimateOf(meanY, residualSd / Math.sqrt(count)),
    lnRateAtReference: estimateOf(atReference, atReferenceSe),
    referenceTemperatureK,
    isReferenceExtrapolated: false,
    covarianceLnAEa: null,
    confidenceLevel: 0.95,
    intervals: {
      activationEnergyJPerMol: around(ea, eaSe),
      lnPreExponential: around(lnA, lnASe),
      lnRateAtReference: around(atReference, atReferenceSe),
    },
    residualStandardDeviation: residualSd,
    betweenHoldStandardDeviation: 0,
    chiSquared: 4.1,
    degreesOfFreedom: count - 2,
    distinctTemperatures: count,
    lowestTemperatureK: Math.min(...temperaturesK),
    highestTemperatureK: Math.max(...temperaturesK),
    curvature: null,
    points,
    cautions: [],
    workings: {},
  }
}
