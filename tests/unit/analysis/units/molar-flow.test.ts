import { describe, expect, it } from 'vitest'
import { absolutePressure } from '@/lib/analysis/units/absolute-pressure'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { CONSTANTS } from '@/lib/analysis/units/constants'
import { contactTime, gasSpaceVelocity, weightSpaceVelocity } from '@/lib/analysis/units/space-velocity'
import { molarFlowFromVolumeFlow, volumeFlowFromMolarFlow } from '@/lib/analysis/units/molar-flow-from-volume-flow'
import { formatNumber, formatWithUncertainty } from '@/lib/analysis/units/format-number'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'

describe('C58 flow references', () => {
  // µmol/s per cm3/min, computed with 40 digits from R = N_A k_B
  it.each([
    [273.15, 101_325, 0.74358389],
    [273.15, 100_000, 0.733860242],
    [293.15, 101_325, 0.692853282],
    [298.15, 101_325, 0.681234075],
    [298.15, 100_000, 0.672325759],
    [288.15, 101_325, 0.704875723],
  ])('%s K, %s Pa', (temperatureK, pressurePa, expected) => {
    const flow = molarFlowFromVolumeFlow(1e-6 / 60, { temperatureK, pressurePa })
    expect(Math.abs((flow * 1e6) / expected - 1)).toBeLessThan(1e-9)
  })
  it('agrees with a national laboratory: 1 µmol/s is 1.3448 sccm', () => {
    // Source: NIST, "Two primary standards for low flows of gases", abstract (its "mol/s" is a slip for µmol/s)
    const flow = volumeFlowFromMolarFlow(1e-6, { temperatureK: 273.15, pressurePa: 101_325 })
    expect(flow * 6e7).toBeCloseTo(1.3448, 4)
  })
  it('refuses an impossible state', () => {
    expect(() => molarFlowFromVolumeFlow(1, { temperatureK: 0, pressurePa: 1 })).toThrow(AnalysisError)
    expect(() => volumeFlowFromMolarFlow(1, { temperatureK: 300, pressurePa: NaN })).toThrow(AnalysisError)
  })
})

describe('constants', () => {
  it('gas constant is the product of Avogadro and Boltzmann', () => {
    expect(CONSTANTS.avogadro.value * CONSTANTS.boltzmann.value).toBeCloseTo(CONSTANTS.gas.value, 14)
  })
})

describe('space velocities', () => {
  it('of 60 mL/min through 0.5 mL is 7200 per hour', () => {
    const reference = { temperatureK: 273.15, pressurePa: 101_325 }
    const feed = molarFlowFromVolumeFlow(60e-6 / 60, reference)
    expect(gasSpaceVelocity(feed, 0.5e-6, reference) * 3_600).toBeCloseTo(7_200, 9)
    expect(contactTime(80e-6, 2e-6)).toBeCloseTo(40, 12)
    expect(weightSpaceVelocity([{ molarFlowMolPerS: 1e-6, molarMassKgPerMol: 0.04401 }], 80e-6) * 3_600).toBeCloseTo(
      1.98045,
      10,
    )
    expect(absolutePressure(30_000, 101_325)).toBe(131_325)
  })
})

describe('printing', () => {
  it.each([
    [518.15, 'temperature', undefined, '245.0 °C'],
    [80e-6, 'mass', undefined, '80.00 mg'],
    [130_000, 'pressure', undefined, '1.300 bar'],
    [1.4e-3, 'rate-per-mass', undefined, '1.400 µmol g⁻¹ s⁻¹'],
    [1.2e-7, 'volume-flow', undefined, '7.200 mL/min'],
    [0.05, 'fraction', undefined, '5.000 %'],
    [250e-6, 'fraction', undefined, '250.0 ppm'],
    [80_000, 'energy-per-amount', 'kcal/mol', '19.12 kcal/mol'],
  ] as const)('%s %s', (value, dimension, unit, text) => {
    expect(formatQuantity(value, dimension, unit === undefined ? {} : { unit })).toBe(text)
  })
  it('rounds a value with its uncertainty', () => {
    expect(formatWithUncertainty(80.123, 0.4567)).toBe('80.12 ± 0.46')
    expect(formatWithUncertainty(185_307.855, 2_177.39)).toBe('185308 ± 2177')
    expect(formatWithUncertainty(1.23456, 0.0996)).toBe('1.23 ± 0.10')
    expect(formatWithUncertainty(1.23456e-9, 2.5e-11)).toBe('(1.235 ± 0.025) × 10⁻⁹')
    expect(formatQuantity(518.15, 'temperature', { standardUncertaintySi: 0.5 })).toBe('(245.00 ± 0.50) °C')
    expect(formatNumber(-0.0000123, 3)).toBe('−1.23 × 10⁻⁵')
    expect(formatNumber(NaN)).toBe('not known')
    expect(formatWithUncertainty(5, null)).toBe('5.000')
  })
})
