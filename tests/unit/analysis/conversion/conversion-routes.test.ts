import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import {
  conversionByFlow,
  conversionByInternalStandard,
  conversionByNormalising,
  conversionByProducts,
  conversionBySingleReaction,
  convertedCarbonClosure,
  moleFractionAt,
  routeConsistency,
} from '@/lib/analysis/conversion/conversion-routes'
import { closeTo } from '../kinetics/close-to'

const of = (value: number, relativeStandardUncertainty = 0.01) => ({ value, relativeStandardUncertainty })

describe('C55 carbon monoxide 5 %, nitrogen 10 % in the feed; 4.76, 0.38 (CO2) and 10.12 % dry at the outlet', () => {
  const ratio = { value: 0.1 / 0.1012, relativeStandardUncertainty: 0.01 * Math.SQRT2 }
  const x2 = conversionByInternalStandard(of(0.0476), of(0.05), of(0.1012), of(0.1))
  const x4 = conversionByProducts([{ ...of(0.0038), inFeed: 0, keyPerMole: 1 }], of(0.05), ratio)
  const x5 = conversionByNormalising(of(0.0038), of(0.0476))
  it('routes', () => {
    closeTo(ratio.value, 0.98814229249)
    closeTo(x2.value, 0.059288537549)
    closeTo(x4.value, 0.075098814229)
    closeTo(x5.value, 0.073929961089)
    // taking the outlet flow as the inlet flow gives 0.048: not reproduced
    expect(Math.abs(x2.value - 0.048)).toBeGreaterThan(0.01)
    closeTo(1 - x2.value + x4.value, 1.0158102767)
  })
  it('uncertainties', () => {
    closeTo(x2.standardUncertainty, 0.018814229249)
    closeTo(x4.standardUncertainty, 0.0015019762846)
    closeTo(x5.standardUncertainty, 0.0009682317263)
  })
  it('agree within two standard uncertainties', () => {
    const z = routeConsistency(x4, x2)
    expect(Math.abs(z ?? NaN)).toBeLessThan(2)
    closeTo(convertedCarbonClosure(x4, x2)?.value, 0.075098814229 / 0.059288537549)
    expect(convertedCarbonClosure(x4, { value: -0.01, standardUncertainty: 0.02 })).toBeNull()
    expect(routeConsistency({ value: 1, standardUncertainty: 0 }, { value: 1, standardUncertainty: 0 })).toBeNull()
  })
})

describe('C56 expansion: N2 + 3 H2, 25 % nitrogen', () => {
  it.each([
    [0.02, 0.24747474747, 0.010101010101],
    [0.1, 0.23684210526, 0.052631578947],
    [0.5, 0.16666666667, 0.33333333333],
  ])('X = %s', (conversion, fraction, naive) => {
    closeTo(moleFractionAt(0.25, -1, 0.25, -2, conversion), fraction, 1e-10)
    closeTo(conversionBySingleReaction(moleFractionAt(0.25, -1, 0.25, -2, conversion), 0.25, -2), conversion, 1e-12)
    // 1 − y/y0 forgets that the gas shrinks: not reproduced
    closeTo(1 - fraction / 0.25, naive)
  })
  it('ammonia at X = 0.2 is 11.1 %', () => closeTo(moleFractionAt(0, 2, 0.25, -2, 0.2), 0.11111111111, 1e-10))
})

describe('what is not clipped and what is refused', () => {
  it('keeps negative conversions', () => {
    expect(conversionByFlow(of(1), of(1.02)).value).toBeCloseTo(-0.02, 12)
    expect(conversionByProducts([{ ...of(0.001), inFeed: 0.002, keyPerMole: 1 }], of(0.1), of(1)).value).toBeLessThan(0)
  })
  it('subtracts what was fed', () => {
    closeTo(conversionByProducts([{ ...of(0.03), inFeed: 0.02, keyPerMole: 1 }], of(0.1), of(1)).value, 0.1)
  })
  it('refuses zero feeds', () => {
    expect(() => conversionByFlow(of(0), of(1))).toThrow(AnalysisError)
    expect(() => conversionByInternalStandard(of(1), of(1), of(0), of(1))).toThrow(AnalysisError)
    expect(() => conversionByNormalising(of(0), of(0))).toThrow(AnalysisError)
    expect(() => conversionBySingleReaction(0.9, 0.5, -4)).toThrow(AnalysisError)
    expect(() => conversionByProducts([], of(0), of(1))).toThrow(AnalysisError)
  })
})
