import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { sphereEffectiveness } from '@/lib/analysis/transport/effectiveness-factor'
import { fitEyring, hasEyringMeaning } from '@/lib/analysis/kinetics/eyring'
import { fitNonlinearArrhenius } from '@/lib/analysis/kinetics/nonlinear-arrhenius'
import { fitGlobalPowerLaw, fitReactionOrders } from '@/lib/analysis/kinetics/reaction-orders'
import { fitYorkLine } from '@/lib/analysis/kinetics/york-line'
import { fitWeightedLine } from '@/lib/analysis/statistics/weighted-line'
import { fitQuadratic } from '@/lib/analysis/statistics/quadratic'
import { diagnoseResiduals } from '@/lib/analysis/statistics/residuals'
import { testLackOfFit } from '@/lib/analysis/statistics/lack-of-fit'
import { workingHotellingBand } from '@/lib/analysis/statistics/bands'
import { fDistributionQuantile } from '@/lib/analysis/statistics/f-distribution'
import { closeTo } from './close-to'

describe('C11 acetaldehyde: unweighted fit of k (Atkins, Elements of Physical Chemistry)', () => {
  const t = [700, 730, 760, 790, 810, 840, 910, 1000]
  const k = [0.011, 0.035, 0.105, 0.343, 0.789, 2.17, 20, 145]
  it('lets the hottest point decide: 168.2 kJ/mol against 188.3 from logarithms, with the smaller standard error', () => {
    const fit = fitNonlinearArrhenius(t, k)
    // computed with R = 8.314462618; the exact constant differs in the eleventh digit
    closeTo(fit.activationEnergyJPerMol, 168178.9862932, 1e-6)
    closeTo(fit.activationEnergyStandardError, 1914.37012148, 1e-6)
    closeTo(fit.lnRateAtCentre, 0.1628444707197, 1e-6)
    closeTo(fit.lnRateAtCentreStandardError, 0.0544589353684, 1e-6)
    closeTo(fit.fit.residualSumOfSquares, 1.322601952162, 1e-6)
    closeTo(fit.fit.residualStandardDeviation, 0.4695036301176, 1e-6)
    closeTo(fit.fit.correlation?.[0]?.[1], -0.99826427, 1e-6)
  })
  it('weighted by relative errors it comes back to the logarithmic line', () => {
    const fit = fitNonlinearArrhenius(
      t,
      k,
      k.map((value) => 0.001 * value),
    )
    expect(Math.abs(fit.activationEnergyJPerMol - 188_329)).toBeLessThan(3_000)
  })
  it('takes values at or below zero, which a line of logarithms cannot', () => {
    const fit = fitNonlinearArrhenius([680, ...t], [-0.002, ...k], [0.005, ...k.map((value) => 0.05 * value + 0.005)])
    expect(fit.activationEnergyJPerMol).toBeGreaterThan(170_000)
    expect(() => fitNonlinearArrhenius([0, 1], [1, 2])).toThrow(AnalysisError)
    expect(() => fitNonlinearArrhenius([1], [1, 2])).toThrow(AnalysisError)
  })
})

describe('C01 Eyring of HI decomposition: OpenStax, Chemistry 2e', () => {
  const t = [555, 575, 645, 700, 781]
  const k = [3.52e-7, 1.22e-6, 8.59e-5, 1.16e-3, 3.95e-2]
  it('enthalpy and entropy for the standard state 1 mol/L', () => {
    const fit = fitEyring(t, k)
    closeTo(fit.activationEnthalpyJPerMol, 179894.302006, 2e-9)
    closeTo(fit.activationEnthalpyStandardError, 2062.79710913, 2e-9)
    closeTo(fit.activationEntropyJPerMolK, -50.2423070817, 2e-8)
    closeTo(fit.activationEntropyStandardError, 3.24260046458, 2e-9)
  })
  it('C03 acetaldehyde', () => {
    const fit = fitEyring([700, 730, 760, 790, 810, 840, 910, 1000], [0.011, 0.035, 0.105, 0.343, 0.789, 2.17, 20, 145])
    closeTo(fit.activationEnthalpyJPerMol, 181424.596128, 2e-9)
    closeTo(fit.activationEntropyJPerMolK, -31.4371026147, 2e-8)
  })
  it('is refused where it means nothing', () => {
    expect(hasEyringMeaning('rate-per-mass')).toBe(false)
    expect(hasEyringMeaning('turnover-frequency')).toBe(true)
    expect(() => fitEyring([300, 310], [1, 0])).toThrow(AnalysisError)
    expect(fitEyring([300, 310], [1, 2]).activationEnthalpyStandardError).toBeNull()
  })
})

describe('C13 errors in both variables: Pearson 1901 with the weights of York 1966', () => {
  const x = [0, 0.9, 1.8, 2.6, 3.3, 4.4, 5.2, 6.1, 6.5, 7.4]
  const y = [5.9, 5.4, 4.4, 4.6, 3.5, 3.7, 2.8, 2.8, 2.4, 1.5]
  const wx = [1000, 1000, 500, 800, 200, 80, 60, 20, 1.8, 1]
  const wy = [1, 1.8, 4, 8, 20, 20, 70, 70, 100, 500]
  const points = x.map((value, i) => ({
    x: value,
    y: y[i] ?? NaN,
    standardUncertaintyX: 1 / Math.sqrt(wx[i] ?? NaN),
    standardUncertaintyY: 1 / Math.sqrt(wy[i] ?? NaN),
  }))
  it('published 5.479910224 and −0.480533407', () => {
    const line = fitYorkLine(points)
    closeTo(line.intercept, 5.479910224033, 1e-11)
    closeTo(line.slope, -0.4805334074462, 1e-11)
    closeTo(line.internal.intercept, 0.2949707354931, 1e-10)
    closeTo(line.internal.slope, 0.05798500900077, 1e-10)
    closeTo(line.external?.intercept, 0.359246522551, 1e-10)
    closeTo(line.external?.slope, 0.0706202695288, 1e-10)
    closeTo(line.chiSquared, 11.86635319406, 1e-11)
    closeTo(line.reducedChiSquared, 1.483294149258, 1e-11)
    closeTo(line.covariance, -0.01647254465812, 1e-10)
    // another published convention gives 0.29193 and 0.057617: not reproduced
    expect(Math.abs(line.internal.intercept - 0.29193)).toBeGreaterThan(0.002)
  })
  it('errors in y alone', () => {
    const line = fitWeightedLine(x, y, wy)
    closeTo(line.intercept, 6.100109316666, 1e-11)
    closeTo(line.slope, -0.6108129565839, 1e-11)
    const exact = fitYorkLine(points.map((point) => ({ ...point, standardUncertaintyX: 1e-9 })))
    closeTo(exact.slope, -0.6108129565839, 1e-9)
  })
  it('refuses points without errors, and gives no external errors to two', () => {
    expect(() => fitYorkLine(points.slice(0, 1))).toThrow(AnalysisError)
    expect(() => fitYorkLine(points.map((point) => ({ ...point, standardUncertaintyX: 0 })))).toThrow(AnalysisError)
    expect(fitYorkLine(points.slice(0, 2)).external).toBeNull()
  })
})

describe('C62 orders by logarithms', () => {
  const co = [1, 2, 4, 1, 1, 2, 4, 0.5]
  const o2 = [10, 10, 10, 5, 20, 20, 5, 10]
  const r = [7.92, 4.61, 2.59, 4.31, 14.8, 8.47, 1.4, 13.9]
  const points = r.map((rate, i) => ({ ratePositive: rate, pressuresPa: { CO: co[i] ?? NaN, O2: o2[i] ?? NaN } }))
  it('CO −0.807, O2 0.893', () => {
    const fit = fitReactionOrders(points, ['CO', 'O2'])
    const [first, second] = fit.orders
    closeTo(first?.order, -0.80668257606)
    closeTo(first?.standardError, 0.0036201977879)
    closeTo(first?.interval?.[0], -0.81598859073)
    closeTo(first?.interval?.[1], -0.79737656138)
    closeTo(second?.order, 0.89252249194)
    closeTo(second?.standardError, 0.005079577423)
    closeTo(second?.interval?.[0], 0.87946502248)
    closeTo(fit.lnRateConstant, 0.020576311756, 1e-7)
    closeTo(fit.lnRateConstantStandardError, 0.012320634684)
    closeTo(fit.residualStandardDeviation, 0.0069291136359)
    // O2 has three levels over a factor of four; CO four levels over eight
    expect(fit.remarks).toEqual(['O2 has 3 levels; 4 or more are wanted for an order.'])
    expect(first?.wholeNumberPValue).toBeLessThan(1e-6)
  })
  it('names a design that cannot tell two orders apart', () => {
    const near = points.map((point, i) => ({
      ...point,
      pressuresPa: { CO: co[i] ?? NaN, O2: (co[i] ?? NaN) * (1 + 0.01 * (i % 3)) },
    }))
    expect(fitReactionOrders(near, ['CO', 'O2']).remarks.join(' ')).toContain('changes together with another variable')
    const same = points.map((point, i) => ({ ...point, pressuresPa: { CO: co[i] ?? NaN, O2: co[i] ?? NaN } }))
    expect(() => fitReactionOrders(same, ['CO', 'O2'])).toThrow(AnalysisError)
    expect(() => fitReactionOrders([{ ratePositive: 0, pressuresPa: { CO: 1 } }], ['CO'])).toThrow(AnalysisError)
  })
  it('global fit brings back what was put in', () => {
    const made = [500, 510, 520, 530].flatMap((temperatureK) =>
      [1, 2, 4].map((p) => ({
        temperatureK,
        ratePositive: Math.exp(20 - 80_000 / (8.31446261815324 * temperatureK)) * Math.pow(p, 0.7),
        pressuresPa: { CO: p },
      })),
    )
    const fit = fitGlobalPowerLaw(made, ['CO'])
    closeTo(fit.activationEnergyJPerMol, 80_000, 1e-9)
    closeTo(fit.orders[0]?.order, 0.7, 1e-9)
    closeTo(fit.lnRateConstant, 20 - 80_000 / (8.31446261815324 * (fit.referenceTemperatureK ?? NaN)), 1e-9)
    expect(() => fitGlobalPowerLaw([{ ratePositive: 1, pressuresPa: { CO: 1 } }], ['CO'])).toThrow(AnalysisError)
  })
})

describe('C70 activation energy falsified by pore diffusion', () => {
  it.each([
    [0.2, 99.6841],
    [1, 93.4591],
    [3, 73.9569],
    [10, 56.3927],
    [50, 51.1438],
  ])('true 100 kJ/mol, φ(500 K) = %s: apparent %s kJ/mol', (modulus, expected) => {
    const t = [470, 480, 490, 500, 510, 520, 530]
    const lnK = (temperature: number) => (-100_000 / R_) * (1 / temperature - 1 / 500)
    const y = t.map(
      (temperature) => lnK(temperature) + Math.log(sphereEffectiveness(modulus * Math.exp(lnK(temperature) / 2))),
    )
    const line = fitWeightedLine(
      t.map((value) => 1 / value),
      y,
      null,
    )
    closeTo((-R_ * line.slope) / 1e3, expected, 1e-5)
  })
  it('5 K offset of the thermocouple on 450 to 550 K: 102.03 kJ/mol', () => {
    const t = [450, 475, 500, 525, 550]
    const line = fitWeightedLine(
      t.map((value) => 1 / (value + 5)),
      t.map((value) => -100_000 / (R_ * value)),
      null,
    )
    closeTo(-R_ * line.slope, 102030.810147, 1e-9)
  })
})
const R_ = 8.314462618

describe('C15 Pontius: NIST StRD and NIST/SEMATECH e-Handbook', () => {
  const x = [
    ...Array.from({ length: 20 }, (_v, i) => 150_000 * (i + 1)),
    ...Array.from({ length: 20 }, (_v, i) => 150_000 * (i + 1)),
  ]
  const y = [
    0.11019, 0.21956, 0.32949, 0.43899, 0.54803, 0.65694, 0.76562, 0.87487, 0.98292, 1.09146, 1.20001, 1.30822, 1.41599,
    1.52399, 1.63194, 1.73947, 1.84646, 1.95392, 2.06128, 2.16844, 0.11052, 0.22018, 0.32939, 0.43886, 0.54798, 0.65739,
    0.76596, 0.87474, 0.983, 1.0915, 1.20004, 1.30818, 1.41613, 1.52408, 1.63159, 1.73965, 1.84696, 1.95445, 2.06177,
    2.16829,
  ]
  it('a line with R² = 0.99999 that does not fit', () => {
    const line = fitWeightedLine(x, y, null)
    closeTo(line.intercept, 6.14968421053e-3, 1e-9)
    closeTo(line.scaled?.intercept, 7.13205167466e-4, 1e-9)
    closeTo(line.slope, 7.22102581454e-7, 1e-10)
    closeTo(line.rSquared, 0.999988519115, 1e-11)
    const test = testLackOfFit(x, y, line.fitted, 2)
    closeTo(test?.f, 214.746923654, 1e-8)
    closeTo(test?.pValue, 5.50371738e-19, 1e-7)
    closeTo(fDistributionQuantile(0.95, 18, 20), 2.15112442712, 1e-9)
  })
  it('the parabola does', () => {
    const parabola = fitQuadratic(x, y, null)
    closeTo(parabola?.curvature, -0.316081871345029e-14, 1e-8)
    closeTo(parabola?.residualSumOfSquares, 37 * 2.05177424076e-4 * 2.05177424076e-4, 1e-8)
  })
})

describe('C19 Working-Hotelling band: Kutner et al., the Toluca company', () => {
  const x = [80, 30, 50, 90, 70, 60, 120, 80, 100, 50, 40, 70, 90, 20, 110, 100, 30, 50, 90, 110, 30, 90, 40, 80, 70]
  const y = [
    399, 121, 221, 376, 361, 224, 546, 352, 353, 157, 160, 252, 389, 113, 435, 420, 212, 268, 377, 421, 273, 468, 244,
    342, 323,
  ]
  const line = fitWeightedLine(x, y, null)
  it.each([
    [30, 169.471919192, 131.154187595, 207.789650789],
    [65, 294.428989899, 272.035064268, 316.82291553],
    [100, 419.386060606, 387.15909744, 451.613023772],
  ])('at lot size %s', (at, value, low, high) => {
    const band = workingHotellingBand(line, at, 0.9)
    closeTo(band.value, value)
    closeTo(band.low, low)
    closeTo(band.high, high)
  })
})

describe('C22 Anscombe: four sets of the same R² and not the same thing', () => {
  const x = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5]
  const sets = [
    [x, [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68]],
    [x, [9.14, 8.14, 8.74, 8.77, 9.26, 8.1, 6.13, 3.1, 9.13, 7.26, 4.74]],
    [x, [7.46, 6.77, 12.74, 7.11, 7.81, 8.84, 6.08, 5.39, 8.15, 6.42, 5.73]],
    [
      [8, 8, 8, 8, 8, 8, 8, 19, 8, 8, 8],
      [6.58, 5.76, 7.71, 8.84, 8.47, 7.04, 5.25, 12.5, 5.56, 7.91, 6.89],
    ],
  ] as const
  const lines = sets.map(([xs, ys]) => fitWeightedLine(xs, ys, null))
  it('intercepts, slopes, R²', () => {
    for (const [i, expected] of [3.0000909, 3.0009091, 3.0024545, 3.0017273].entries())
      closeTo(lines[i]?.intercept, expected, 1e-7)
    for (const [i, expected] of [0.500090909091, 0.5, 0.499727272727, 0.499909090909].entries())
      closeTo(lines[i]?.slope, expected)
    for (const [i, expected] of [0.666542459509, 0.666242033727, 0.666324041067, 0.666707256898].entries())
      closeTo(lines[i]?.rSquared, expected)
  })
  it('diagnostics tell them apart', () => {
    const [, , third, fourth] = lines
    if (third === undefined || fourth === undefined) throw new Error('four sets')
    const outlier = diagnoseResiduals(third)
    closeTo(Math.max(...outlier.externallyStudentised.map((value) => Math.abs(value ?? 0))), 1203.53946383, 1e-6)
    closeTo(Math.max(...outlier.cookDistance.map((value) => value ?? 0)), 1.39284945025)
    // the point of leverage 1 has no studentised residual: null, not a crash
    expect(diagnoseResiduals(fourth).externallyStudentised[7]).toBeNull()
  })
})
