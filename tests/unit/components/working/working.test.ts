import { describe, expect, it } from 'vitest'
import { formulaParts } from '@/components/working/formula-parts'
import { withSourceWords } from '@/components/working/source-words'
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
      { text: 'r = F', place: 'line' },
      { text: 'A0', place: 'subscript' },
      { text: ' · X / W', place: 'line' },
    ])
    expect(formulaParts('y_{CH4, out}')).toEqual([
      { text: 'y', place: 'line' },
      { text: 'CH4, out', place: 'subscript' },
    ])
    expect(formulaParts('a / b')).toEqual([{ text: 'a / b', place: 'line' }])
  })
  it('sets what follows a caret as a superscript', () => {
    expect(formulaParts('(p_i/p_i0)^a_i')).toEqual([
      { text: '(p', place: 'line' },
      { text: 'i', place: 'subscript' },
      { text: '/p', place: 'line' },
      { text: 'i0', place: 'subscript' },
      { text: ')', place: 'line' },
      { text: 'ai', place: 'superscript' },
    ])
  })
})

describe('shared sources', () => {
  it('are called what people call them', () => {
    expect(
      withSourceWords(
        'Shared parts: flow:a049d6bb-4c88-413f-95e2-471e30064c0e 1.0 %, calibration:4024ce74-365a-414f-8bbb-6fb113ae47ab:CH4 0.96 %, inlet:R-0008 −0.31 %.',
      ),
    ).toBe('Shared parts: flow controllers 1.0 %, response factor (CH4) 0.96 %, inlet composition (R-0008) −0.31 %.')
    expect(withSourceWords('feed: R-0008-analysis.xlsx, rows 2 to 8')).toBe('feed: R-0008-analysis.xlsx, rows 2 to 8')
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
