import { describe, expect, test } from 'vitest'
import { keyReactantEnthalpy } from '@/lib/domain/reaction-enthalpy'

describe('heat of a reaction per mole of key reactant', () => {
  // enthalpies of formation at 298.15 K in kJ/mol: CO2 -393.51, CH4 -74.60, H2O(g) -241.83, CO -110.53 (CRC Handbook, recalled)
  test('methanation of carbon dioxide gives off 164.8 kJ', () => {
    const heat = keyReactantEnthalpy({
      keyReactant: 'CO2',
      steps: [{ CO2: -1, H2: -4, CH4: 1, H2O: 2 }],
      thermochemistry: null,
    })
    expect((heat ?? 0) / 1_000).toBeCloseTo(-74.6 - 2 * 241.83 + 393.51, 0)
  })
  test('it is for one mole of the key reactant, however the equation is written', () => {
    const once = keyReactantEnthalpy({
      keyReactant: 'CO',
      steps: [{ CO: -1, O2: -0.5, CO2: 1 }],
      thermochemistry: null,
    })
    const twice = keyReactantEnthalpy({ keyReactant: 'CO', steps: [{ CO: -2, O2: -1, CO2: 2 }], thermochemistry: null })
    expect((once ?? 0) / 1_000).toBeCloseTo(-393.51 + 110.53, 0)
    expect(twice).toBeCloseTo(once ?? Number.NaN, 6)
  })
  test('what was entered with the reaction goes first; what nobody knows is not guessed', () => {
    const reaction = { keyReactant: 'Q', steps: [{ Q: -1, CO2: 1 }] }
    expect(keyReactantEnthalpy({ ...reaction, thermochemistry: null })).toBeNull()
    const entered = { Q: { enthalpyJPerMol: -100_000, entropyJPerMolK: 200, heatCapacityJPerMolK: 50, source: 'test' } }
    expect((keyReactantEnthalpy({ ...reaction, thermochemistry: entered }) ?? 0) / 1_000).toBeCloseTo(-393.51 + 100, 0)
  })
})
