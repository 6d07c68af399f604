import { describe, expect, it } from 'vitest'
import { runConditions, totalFlowText } from '@/components/run/run-conditions'
import { exampleRunResult } from '../../../support/example-run-result'

/** 1 mL/min at 0 °C and 101.325 kPa: 22.414 L/mol, so 7.436e-7 mol/s (molar volume of CODATA 2018). */
const MOL_PER_S_OF_ML_PER_MIN = 1e-6 / 60 / 22.41396954e-3

const entry = (species: string, mlPerMin: number) => ({
  species,
  flowText: `${mlPerMin} mL/min`,
  flowMolPerS: mlPerMin * MOL_PER_S_OF_ML_PER_MIN,
  referenceTemperatureK: 273.15,
  referencePressurePa: 101_325,
  isInternalStandard: false,
})

describe('conditions of a run', () => {
  it('state the whole flow at the state it was typed at', () => {
    expect(totalFlowText([entry('CO2', 7.2), entry('H2', 36), entry('Ar', 16.8)])).toBe(
      '60 mL min⁻¹ (0 °C, 101.325 kPa)',
    )
  })
  it('fall back to moles where the states differ', () => {
    const other = { ...entry('H2', 36), referenceTemperatureK: 293.15 }
    expect(totalFlowText([entry('CO2', 24), other])).toBe('44.62 µmol s⁻¹')
    expect(totalFlowText([])).toBeNull()
  })
  it('name rig, time, bed and pressure', () => {
    const { run } = exampleRunResult()
    expect(runConditions(run, 'Europe/Berlin')).toBe(
      'Rig B, channel 1 · 9 Mar 2026 07:30 Europe/Berlin · 75.5 mg in 450 mg SiC · 1.3 bar abs',
    )
    expect(runConditions({ ...run, pressureKind: 'gauge', barometerPa: 100_000 }, 'UTC')).toContain(
      '1.3 bar gauge, barometer 1 bar',
    )
  })
})
