import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import ValidationPage from '@/app/validation/page'
import { errorText, longNumber } from '@/components/validation/number-text'
import { ALL_CHECKS } from '@/lib/analysis/validation/all-checks'

describe('the validation page', () => {
  const markup = renderToStaticMarkup(<ValidationPage />)
  it('shows every check with its source, and that all agree', () => {
    for (const { id } of ALL_CHECKS) expect(markup).toContain(`id="${id}"`)
    expect(markup).toContain('NIST Statistical Reference Datasets')
    expect(markup).not.toContain('disagrees')
    expect(markup).not.toContain('no number')
    expect(markup).not.toContain('NaN')
  })
  it('writes numbers a person can compare', () => {
    expect(longNumber(-0.262323073774029)).toBe('−0.262323073774')
    expect(longNumber(null)).toBe('none')
    expect(errorText(3.7e-12)).toBe('3.7 × 10⁻¹²')
    expect(errorText(0)).toBe('0')
    expect(errorText(null)).toBe('no number')
  })
})
