import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { aicc } from '@/lib/analysis/kinetics/aicc'
import { fitIntegralPowerLaw } from '@/lib/analysis/kinetics/integral-power-law'
import { adsorptionPlausibility, fitLangmuirHinshelwood } from '@/lib/analysis/kinetics/langmuir-hinshelwood'
import { powerLawTerm, partialPressures } from '@/lib/analysis/kinetics/power-law'
import { solveBed } from '@/lib/analysis/kinetics/solve-bed'
import { testSiteSeries } from '@/lib/analysis/transport/koros-nowak'
import { closeTo } from './close-to'

const R = 8.31446261815324

describe('saturation laws', () => {
  const rate = [71, 71.3, 41.6, 19.7, 42, 17.1, 71.8, 142, 284, 47, 71.3, 117, 127, 131, 133, 41.8]
  const toluene = [1, 1, 1, 1, 1, 1, 1, 1, 1, 0.5, 1, 5, 10, 15, 20, 1]
  const hydrogen = [1, 1, 1, 1, 1, 1, 1, 2, 4, 1, 1, 1, 1, 1, 1, 1]
  const benzene = [0, 0, 1, 4, 1, 5, 0, 0, 0, 0, 0, 0, 0, 0, 0, 1]
  const points = rate.map((value, i) => ({
    rate: value,
    pressures: { T: toluene[i] ?? NaN, H2: hydrogen[i] ?? NaN, B: benzene[i] ?? NaN },
  }))
  const law = { drivingOrders: { T: 1, H2: 1 }, adsorbed: ['B', 'T'], denominatorPower: 1, equilibrium: null } as const
  const fit = fitLangmuirHinshelwood(points, law)
  it('C29 toluene hydrodemethylation, without start values', () => {
    closeTo(fit.constants[0]?.value, 144.7673078288)
    closeTo(fit.constants[1]?.value, 1.390526433642)
    closeTo(fit.constants[2]?.value, 1.038410557951)
    closeTo(fit.residualSumOfSquares, 3.260509018741)
    // standard error of a logarithm is the relative one
    closeTo(fit.constants[1]?.logarithmStandardError, 0.0212028666641 / 1.390526433642, 1e-7)
    expect(fit.remarks).toEqual([])
    expect(fit.constants.map(({ name }) => name)).toEqual(['k', 'K(B)', 'K(T)'])
  })
  it('the square of the denominator is told apart by AICc', () => {
    const squared = fitLangmuirHinshelwood(points, { ...law, denominatorPower: 2 })
    expect((squared.aicc ?? 0) - (fit.aicc ?? 0)).toBeGreaterThan(10)
    closeTo(fit.aicc, 16 * Math.log(3.260509018741 / 16) + 8 + 40 / 11, 1e-8)
    expect(aicc(1, 5, 4)).toBeNull()
  })
  it('C27 pentane: says what the data cannot identify', () => {
    const h = [
      205.8, 404.8, 209.7, 401.6, 224.9, 402.6, 212.7, 406.2, 133.3, 470.9, 300, 301.6, 297.3, 314, 305.7, 300.1, 305.4,
      305.2, 300.1, 106.6, 417.2, 251, 250.3, 145.1,
    ]
    const p = [
      90.9, 92.9, 174.9, 187.2, 92.7, 102.2, 186.9, 192.6, 140.8, 144.2, 68.3, 214.6, 142.2, 146.7, 142, 143.7, 141.1,
      141.5, 83, 209.6, 83.9, 294.4, 148, 291,
    ]
    const i = [
      37.1, 36.3, 49.4, 44.9, 116.3, 128.9, 134.4, 134.9, 87.6, 86.9, 81.7, 101.7, 10.5, 157.1, 86, 90.2, 87.4, 87,
      66.4, 33, 32.9, 41.5, 14.7, 50.2,
    ]
    const r = [
      3.541, 2.397, 6.694, 4.722, 0.593, 0.268, 2.797, 2.451, 3.196, 2.021, 0.896, 5.084, 5.686, 1.193, 2.648, 3.303,
      3.054, 3.302, 1.271, 11.648, 2.002, 9.604, 7.754, 11.59,
    ]
    const pentane = fitLangmuirHinshelwood(
      r.map((value, n) => ({ rate: value, pressures: { H: h[n] ?? NaN, P: p[n] ?? NaN, I: i[n] ?? NaN } })),
      {
        drivingOrders: { P: 1 },
        adsorbed: ['H', 'P', 'I'],
        denominatorPower: 1,
        equilibrium: { orders: { I: 1, P: -1 }, constant: 1.632 },
      },
    )
    // k of this form is k K_P of the other
    closeTo(pentane.constants[0]?.value, 35.92022305898 * 0.0377299645598, 1e-5)
    closeTo(pentane.constants[1]?.value, 0.07084331355079, 1e-5)
    closeTo(pentane.residualSumOfSquares, 3.234482275391, 1e-9)
    expect(pentane.remarks.join(' ')).toContain('K(H) and K(P) move together')
    expect(pentane.constants.every(({ profile }) => profile.low === null || profile.low > 0)).toBe(true)
  }, 20_000)
  it('over temperatures brings back energies of reaction and adsorption', () => {
    const made = [480, 500, 520].flatMap((temperatureK) =>
      [0.1, 0.5, 1, 3, 8].map((a) => {
        const k = Math.exp(2 - (90_000 / R) * (1 / temperatureK - 1 / 500))
        const adsorption = Math.exp(0.3 + (40_000 / R) * (1 / temperatureK - 1 / 500))
        return { temperatureK, pressures: { A: a }, rate: (k * a) / (1 + adsorption * a) ** 2 }
      }),
    )
    const over = fitLangmuirHinshelwood(made, {
      drivingOrders: { A: 1 },
      adsorbed: ['A'],
      denominatorPower: 2,
      equilibrium: null,
    })
    closeTo(over.constants[0]?.energyJPerMol, 90_000, 1e-6)
    closeTo(over.constants[1]?.energyJPerMol, -40_000, 1e-6)
  })
  it('want points', () => {
    expect(() => fitLangmuirHinshelwood(points.slice(0, 3), law)).toThrow(AnalysisError)
  })
  it('plausible adsorption', () => {
    const good = adsorptionPlausibility(-80_000, -70, 197.7)
    expect(good).toEqual({
      isExothermic: true,
      losesEntropy: true,
      keepsWithinGasEntropy: true,
      isWithinGuideline: true,
    })
    expect(adsorptionPlausibility(-80_000, -210, 197.7).keepsWithinGasEntropy).toBe(false)
    expect(adsorptionPlausibility(20_000, 5, 197.7)).toMatchObject({
      isExothermic: false,
      losesEntropy: false,
      isWithinGuideline: false,
    })
  })
})

describe('power law by solving the bed', () => {
  it('brings back what made conversions up to 60 %, where a differential treatment cannot', () => {
    const reference = { CO2: 12_000, H2: 60_000 }
    const points = [490, 510, 530, 550].flatMap((temperatureK) =>
      [0.12, 0.24].map((y) => {
        const feed = {
          pressurePa: 100_000,
          moleFraction: { CO2: y, H2: 0.6, Ar: 0.4 - y },
          keyReactant: 'CO2',
          stoichiometry: { CO2: -1, H2: -4, CH4: 1, H2O: 2 },
        }
        const k = Math.exp(-6 - (85_000 / R) * (1 / temperatureK - 1 / 520))
        const contactTimeKgSPerMol = 60
        const conversion = solveBed(
          (x) => k * powerLawTerm(partialPressures(feed, x), { CO2: 0.3, H2: 0.5 }, reference),
          contactTimeKgSPerMol,
        )
        return {
          temperatureK,
          feed,
          contactTimeKgSPerMol,
          conversion,
          conversionStandardUncertainty: 0.01 * conversion,
        }
      }),
    )
    const fit = fitIntegralPowerLaw(points, { CO2: 0, H2: 0.5 }, ['CO2'], reference, {
      lnRateConstant: -6.5,
      activationEnergyJPerMol: 70_000,
    })
    closeTo(fit.activationEnergyJPerMol, 85_000, 1e-6)
    closeTo(fit.orders[0]?.order, 0.3, 1e-5)
    closeTo(fit.lnRateConstant, -6 - (85_000 / R) * (1 / fit.referenceTemperatureK - 1 / 520), 1e-6)
    expect(() =>
      fitIntegralPowerLaw(
        points.map((p) => ({ ...p, conversionStandardUncertainty: 0 })),
        {},
        [],
        {},
        { lnRateConstant: 0, activationEnergyJPerMol: 1 },
      ),
    ).toThrow(AnalysisError)
  }, 20_000)
})

describe('samples of different site density', () => {
  const series = (slope: number) =>
    [1, 2, 4, 8, 16].map((sites, i) => ({
      sitesMolPerKg: sites,
      rateMolPerKgS: Math.pow(sites, slope) * (1 + 0.01 * ((i % 2) - 0.5)),
    }))
  it.each([
    [1, 'no-limitation-seen'],
    [0.5, 'internal-limitation'],
    [0, 'external-limitation'],
    [0.75, 'some-limitation'],
  ])('slope %s: %s', (slope, verdict) => {
    expect(testSiteSeries(series(slope)).verdict).toBe(verdict)
  })
  it('cannot tell from two samples', () => {
    const two = testSiteSeries(series(1).slice(0, 2))
    expect(two.verdict).toBe('cannot-tell')
    expect(two.sentence).toContain('span a factor of 2.0; 10 or more is wanted')
    expect(() => testSiteSeries(series(1).slice(0, 1))).toThrow(AnalysisError)
    expect(() =>
      testSiteSeries([
        { sitesMolPerKg: 0, rateMolPerKgS: 1 },
        { sitesMolPerKg: 1, rateMolPerKgS: 1 },
      ]),
    ).toThrow(AnalysisError)
  })
})
