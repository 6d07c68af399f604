import { describe, expect, it } from 'vitest'
import { formulaParts } from '@/components/working/formula-parts'
import { symbolUncertainty, symbolValue, workingText } from '@/components/working/working-text'
import { exampleRunResult } from '../../../support/example-run-result'

const symbol = {
  symbol: 'X',
  meaning: 'conversion',
  value: 0.01661,
  unit: '',
  standardUncertainty: 0.0001,
  uncertaintyKind: 'own',
} as const

describe('formula', () => {
  it('sets what follows an underscore as a subscript', () => {
    expect(formulaParts('r = F_A0 · X / W')).toEqual([
      { text: 'r = F', isSubscript: false },
      { text: 'A0', isSubscript: true },
      { text: ' · X / W', isSubscript: false },
    ])
    expect(formulaParts('y_{CH4, out}')).toEqual([
      { text: 'y', isSubscript: false },
      { text: 'CH4, out', isSubscript: true },
    ])
    expect(formulaParts('a / b')).toEqual([{ text: 'a / b', isSubscript: false }])
  })
})

describe('symbols', () => {
  it('are rounded to their uncertainty, which is given as a share', () => {
    expect(symbolValue(symbol)).toBe('0.01661')
    expect(symbolUncertainty(symbol)).toBe('± 0.6 %')
    expect(symbolUncertainty({ ...symbol, uncertaintyKind: 'shared' })).toBe('± 0.6 % shared')
  })
  it('are exact where they have no uncertainty, and say so where not known', () => {
    expect(symbolValue({ ...symbol, value: 8.314462618, unit: 'J mol⁻¹ K⁻¹', standardUncertainty: null })).toBe(
      '8.31446 J mol⁻¹ K⁻¹',
    )
    expect(symbolValue({ ...symbol, value: 1.2e-9, standardUncertainty: null })).toBe('1.20000 × 10⁻⁹')
    expect(symbolValue({ ...symbol, value: null })).toBe('not known')
    expect(symbolUncertainty({ ...symbol, standardUncertainty: null })).toBe('')
  })
})

describe('working as text', () => {
  it('has every part of the derivation', () => {
    const working = exampleRunResult().reduction?.points[3]?.workings['rateMolPerKgS']
    if (!working) throw new Error('the example has it')
    const text = workingText(working)
    for (const part of [
      'Rate at hold 4',
      'r = F_A0 · X / W',
      '5.354 µmol s⁻¹',
      '75.50 mg',
      'Levenspiel',
      'rows 172 to 195',
    ]) {
      expect(text).toContain(part)
    }
  })
})
