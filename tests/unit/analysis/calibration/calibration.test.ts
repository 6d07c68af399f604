import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { amountFromResponse, fitCalibrationLine, mandelTest } from '@/lib/analysis/calibration/calibration-line'
import { effectiveCarbonNumber } from '@/lib/analysis/calibration/effective-carbon-number'
import {
  concentrationByInternalStandard,
  internalStandardFactor,
  normaliseAreas,
  reciprocalResponse,
} from '@/lib/analysis/calibration/internal-standard'
import { closeTo } from '../kinetics/close-to'

describe('C53 internal standard: Harris, Quantitative Chemical Analysis', () => {
  const factor = internalStandardFactor({ area: 423, concentration: 0.0837 }, { area: 347, concentration: 0.0666 })
  it('factor 0.970, unknown 0.143 mol/L', () => {
    closeTo(factor, 0.9699730408)
    // 10.0 mL of 0.146 mol/L standard and 10.0 mL unknown made up to 25.0 mL
    const mixture = concentrationByInternalStandard(553, { area: 582, concentration: (0.146 * 10) / 25 }, factor)
    closeTo(mixture, 0.05720781097)
    closeTo((mixture * 25) / 10, 0.1430195274)
  })
  it('a decimal slip of a copied page, 0.0146 for 0.146, gives a tenth: not reproduced', () => {
    const slip = concentrationByInternalStandard(553, { area: 582, concentration: (0.0146 * 10) / 25 }, factor)
    closeTo((slip * 25) / 10, 0.01430195274)
  })
  it('refuses what cannot be', () => {
    expect(() => internalStandardFactor({ area: 0, concentration: 1 }, { area: 1, concentration: 1 })).toThrow(
      AnalysisError,
    )
    expect(() => concentrationByInternalStandard(1, { area: 1, concentration: 1 }, 0)).toThrow(AnalysisError)
    expect(reciprocalResponse(4)).toBe(0.25)
    expect(() => reciprocalResponse(0)).toThrow(AnalysisError)
    expect(
      normaliseAreas([
        { area: 10, sensitivity: 1 },
        { area: 30, sensitivity: 1 },
      ]),
    ).toEqual([0.25, 0.75])
    expect(() => normaliseAreas([{ area: 0, sensitivity: 1 }])).toThrow(AnalysisError)
  })
})

// reference values: R 4.2.2, tests/reference/calibration.R
describe('calibration lines', () => {
  const straight = [
    [1, 10.1],
    [2, 19.7],
    [4, 40.6],
    [6, 59.8],
    [8, 81.1],
    [10, 99.4],
  ].map(([amount = NaN, response = NaN]) => ({ amount, response }))
  it('straight, equal weights: lm, inverse prediction and limits', () => {
    const line = fitCalibrationLine(straight)
    closeTo(line.coefficients[1], 9.998082191780822)
    closeTo(line.coefficients[0], 0.126575342465735, 1e-7)
    closeTo(line.standardErrors[1], 0.0903897858146644)
    closeTo(line.interceptPValue, 0.828843314002676)
    closeTo(line.mandel?.pValue, 0.430088420791387, 1e-7)
    const reading = amountFromResponse(line, 50, 3)
    if (!reading.ok) throw new Error(reading.sentence)
    closeTo(reading.amount, 4.98829912585976)
    closeTo(reading.standardUncertainty, 0.0498867802594541)
    expect(reading.degreesOfFreedom).toBe(4)
    closeTo(line.detectionLimit, (3.3 * (line.fit.residualStandardDeviation ?? NaN)) / 9.998082191780822)
  })
  it('weighted by 1/x²', () => {
    const line = fitCalibrationLine(straight, 'linear', 'one-over-amount-squared')
    closeTo(line.coefficients[0], 0.0277205811603922, 1e-7)
    closeTo(line.coefficients[1], 10.014133070335804)
    closeTo(line.standardErrors[0], 0.1762000748730024)
    closeTo(line.standardErrors[1], 0.0840698664562197)
    expect(() => fitCalibrationLine([{ amount: 0, response: 0 }, ...straight], 'linear', 'one-over-amount')).toThrow(
      AnalysisError,
    )
  })
  it('curved: Mandel sees it and the inverse stays on the right branch', () => {
    const curved = [1, 2, 4, 6, 8, 10].map((amount, i) => ({
      amount,
      response: 10 * amount - 0.3 * amount * amount + ([0.05, -0.04, 0.03, -0.05, 0.04, -0.02][i] ?? NaN),
    }))
    const line = fitCalibrationLine(curved, 'quadratic')
    expect(line.mandel?.pValue).toBeLessThan(1e-5)
    const reading = amountFromResponse(line, 10 * 5 - 0.3 * 25)
    if (!reading.ok) throw new Error(reading.sentence)
    expect(Math.abs(reading.amount - 5)).toBeLessThan(0.02)
    expect(amountFromResponse(line, 95)).toMatchObject({ ok: false })
    expect(amountFromResponse(line, 72)).toMatchObject({ ok: false })
  })
  it('does not extrapolate', () => {
    const line = fitCalibrationLine(straight)
    const beyond = amountFromResponse(line, 200)
    expect(beyond.ok ? '' : beyond.sentence).toContain('outside the standards from 1 to 10')
    expect(amountFromResponse(line, 1).ok).toBe(false)
  })
  it('needs enough standards', () => {
    expect(() => fitCalibrationLine(straight.slice(0, 2))).toThrow(AnalysisError)
    expect(() => fitCalibrationLine(straight.slice(0, 3), 'quadratic')).toThrow(AnalysisError)
    expect(mandelTest(straight.slice(0, 3), [1, 1, 1])).toBeNull()
  })
})

describe('effective carbon number', () => {
  it('adds up and states its doubt', () => {
    expect(effectiveCarbonNumber({ 'aliphatic-carbon': 3 })).toEqual({ value: 3, relativeStandardUncertainty: 0.07 })
    const ethanol = effectiveCarbonNumber({ 'aliphatic-carbon': 2, 'primary-alcohol-oxygen': 1 })
    closeTo(ethanol.value, 1.45, 1e-12)
    expect(ethanol.relativeStandardUncertainty).toBe(0.2)
    const acetone = effectiveCarbonNumber({ 'aliphatic-carbon': 2, 'carbonyl-carbon': 1 })
    expect(acetone.value).toBe(2)
    expect(effectiveCarbonNumber({ 'aliphatic-carbon': 5, 'ether-oxygen': 1 }).relativeStandardUncertainty).toBe(0.07)
  })
  it('is refused for one carbon atom with oxygen', () => {
    expect(() => effectiveCarbonNumber({ 'aliphatic-carbon': 1, 'primary-alcohol-oxygen': 1 })).toThrow(AnalysisError)
    expect(() => effectiveCarbonNumber({ 'carbonyl-carbon': 1 })).toThrow(AnalysisError)
    expect(() => effectiveCarbonNumber({})).toThrow(AnalysisError)
  })
})
