import { describe, expect, it } from 'vitest'
import { lineAt } from '@/lib/analysis/arrhenius/line-at'
import reference from '../../../reference/line-at.json'
import { exampleFit } from '../../../support/example-fit'

const fit = exampleFit('R-0001', reference.temperatureK, reference.lnRate)

describe('lineAt', () => {
  it('agrees with lm and predict of R (tests/reference/line-at.R)', () => {
    reference.atK.forEach((temperatureK, index) => {
      const at = lineAt(fit, temperatureK)
      expect(at.lnRate).toBeCloseTo(reference.fit[index] ?? NaN, 11)
      expect(at.standardError).toBeCloseTo(reference.se[index] ?? NaN, 11)
      expect(at.interval?.[0]).toBeCloseTo(reference.lower[index] ?? NaN, 9)
      expect(at.interval?.[1]).toBeCloseTo(reference.upper[index] ?? NaN, 9)
    })
  })

  it('uses the covariance when the fit states it', () => {
    // with the line centred at its own mean, cov(ln A, Ea) = var(Ea) / (R T_c), so that ln r_c and Ea are uncorrelated
    const u = fit.activationEnergyJPerMol.randomStandardUncertainty ?? NaN
    const stated = { ...fit, covarianceLnAEa: u ** 2 / (8.31446261815324 * fit.centreTemperatureK) }
    expect(lineAt(stated, 560).standardError).toBeCloseTo(lineAt(fit, 560).standardError ?? NaN, 12)
  })

  it('gives a line without a band where two points leave no scatter', () => {
    const bare = {
      ...fit,
      lnRateAtCentre: { ...fit.lnRateAtCentre, randomStandardUncertainty: null },
      activationEnergyJPerMol: { ...fit.activationEnergyJPerMol, randomStandardUncertainty: null },
    }
    expect(lineAt(bare, 500)).toEqual({ lnRate: lineAt(fit, 500).lnRate, standardError: null, interval: null })
  })
})
