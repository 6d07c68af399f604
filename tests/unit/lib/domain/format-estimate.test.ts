import { describe, expect, test } from 'vitest'
import { estimateAsText, formatEstimate } from '@/lib/domain/format-estimate'

const ONE = '\u202f'

describe('a value and its uncertainty are rounded together (JCGM 100:2008, 7.2.6)', () => {
  test.each([
    // first row: the mass m_S = 100,021 47 g with u = 0,35 mg of JCGM 100:2008, 7.2.2
    { value: 100.02147, u: 0.00035, shown: ['100.02147', '0.00035', null] },
    { value: 84.3966, u: 0.41234, shown: ['84.40', '0.41', null] },
    { value: 1.2, u: 0.0996, shown: ['1.20', '0.10', null] },
    { value: 84_431, u: 1_249, shown: [`84${ONE}400`, '1200', null] },
    { value: -0.5, u: 0.25, shown: ['−0.50', '0.25', null] },
    { value: 0, u: 0.012, shown: ['0.000', '0.012', null] },
    { value: 1.178e-6, u: 7.1e-9, shown: ['1.1780', '0.0071', '−6'] },
    { value: 4.2e9, u: 3.3e8, shown: ['4.20', '0.33', '9'] },
    { value: 0.001, u: 0.4, shown: ['0.00', '0.40', null] },
    { value: 47_712.3, u: null, shown: [`47${ONE}712`, null, null] },
    { value: 0.0166141, u: null, shown: ['0.01661', null, null] },
    { value: 5, u: 0, shown: ['5.000', null, null] },
  ])('$value with $u', ({ value, u, shown }) => {
    const text = formatEstimate(value, u)
    expect([text.value, text.uncertainty, text.exponent]).toEqual(shown)
  })

  test('a number that rounds to nothing has no minus', () => {
    expect(formatEstimate(-0.001, 0.4).value).toBe('0.00')
  })

  test('as one line', () => {
    expect(estimateAsText(1.178e-6, 7.1e-9, 'mol')).toBe('(1.1780 ± 0.0071) × 10^−6 mol')
    expect(estimateAsText(null, null)).toBe('not known')
  })
})
