import { describe, expect, it } from 'vitest'
import tQuantile from '@stdlib/stats-base-dists-t-quantile'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { fitLinearModel, varianceInflation } from '@/lib/analysis/kinetics/linear-model'
import { fitNonlinear, type NonlinearModel } from '@/lib/analysis/kinetics/levenberg-marquardt'
import { numericalJacobian } from '@/lib/analysis/kinetics/numerical-jacobian'
import { profileInterval } from '@/lib/analysis/kinetics/profile-interval'
import { closeTo } from './close-to'

describe('C17 Longley: NIST StRD, certified values', () => {
  const deflator = [83, 88.5, 88.2, 89.5, 96.2, 98.1, 99, 100, 101.2, 104.6, 108.4, 110.8, 112.6, 114.2, 115.7, 116.9]
  const gnp = [
    234289, 259426, 258054, 284599, 328975, 346999, 365385, 363112, 397469, 419180, 442769, 444546, 482704, 502601,
    518173, 554894,
  ]
  const unemployed = [2356, 2325, 3682, 3351, 2099, 1932, 1870, 3578, 2904, 2822, 2936, 4681, 3813, 3931, 4806, 4007]
  const armed = [1590, 1456, 1616, 1650, 3099, 3594, 3547, 3350, 3048, 2857, 2798, 2637, 2552, 2514, 2572, 2827]
  const population = [
    107608, 108632, 109773, 110929, 112075, 113270, 115094, 116219, 117388, 118734, 120445, 121950, 123366, 125368,
    127852, 130081,
  ]
  const employed = [
    60323, 61122, 60171, 61187, 63221, 63639, 64989, 63761, 66019, 67857, 68169, 66513, 68655, 69564, 69331, 70551,
  ]
  const rows = deflator.map((value, i) => [
    1,
    value,
    gnp[i] ?? NaN,
    unemployed[i] ?? NaN,
    armed[i] ?? NaN,
    population[i] ?? NaN,
    1947 + i,
  ])
  it('coefficients, errors, spread and R²', () => {
    const fit = fitLinearModel(rows, employed)
    const certified = [
      [-3482258.63459582, 890420.383607373],
      [15.0618722713733, 84.9149257747669],
      [-0.035819179292591, 0.0334910077722432],
      [-2.02022980381683, 0.488399681651699],
      [-1.03322686717359, 0.214274163161675],
      [-0.0511041056535807, 0.22607320006937],
      [1829.15146461355, 455.478499142212],
    ] as const
    for (const [j, [value, error]] of certified.entries()) {
      closeTo(fit.coefficients[j], value, 1e-7)
      closeTo(fit.standardErrors[j], error, 1e-7)
    }
    closeTo(fit.residualStandardDeviation, 304.854073561965, 1e-7)
    closeTo(fit.rSquared, 0.995479004577296, 1e-9)
    closeTo(
      fit.leverage.reduce((sum, h) => sum + h, 0),
      7,
      1e-9,
    )
  })
  it('sees that its columns say nearly the same', () => {
    // R, car::vif(lm(Employed ~ ., longley)): 135.53, 1788.51, 33.62, 3.59, 399.15, 758.98
    const factors = varianceInflation(rows.map((row) => row.slice(1)))
    for (const [j, expected] of [135.53244, 1788.51348, 33.61889, 3.58893, 399.15102, 758.9806].entries())
      closeTo(factors[j], expected, 1e-6)
  })
  it('refuses designs that settle nothing', () => {
    expect(() =>
      fitLinearModel(
        [
          [1, 2],
          [2, 4],
          [3, 6],
        ],
        [1, 2, 3],
      ),
    ).toThrow(AnalysisError)
    expect(() => fitLinearModel([[1, 2]], [1])).toThrow(AnalysisError)
    expect(() => fitLinearModel([[1], [NaN]], [1, 2])).toThrow(AnalysisError)
    expect(() => fitLinearModel([[1], [1]], [1, 2], [1, 0])).toThrow(AnalysisError)
    expect(
      varianceInflation([
        [1, 1],
        [2, 2],
        [3, 3],
        [4, 4],
      ]),
    ).toEqual([null, null])
    const exact = fitLinearModel(
      [
        [1, 0],
        [1, 1],
      ],
      [1, 3],
    )
    expect(exact.standardErrors).toEqual([null, null])
    closeTo(exact.coefficients[1], 2)
  })
})

const misra: NonlinearModel = (() => {
  const x = [77.6, 114.9, 141.1, 190.8, 239.9, 289.0, 332.8, 378.4, 434.8, 477.3, 536.8, 593.1, 689.1, 760.0]
  return { values: ([b1 = NaN, b2 = NaN]) => x.map((value) => b1 * (1 - Math.exp(-b2 * value))) }
})()
const misraY = [10.07, 14.73, 17.94, 23.93, 29.61, 35.18, 40.02, 44.82, 50.76, 55.05, 61.01, 66.4, 75.47, 81.78]

describe('C24 Misra1a: NIST StRD, certified values', () => {
  it.each([[[500, 1e-4]], [[250, 5e-4]]])('from %s', (start) => {
    const fit = fitNonlinear(misra, misraY, start)
    closeTo(fit.parameters[0], 238.9421291789, 1e-9)
    closeTo(fit.standardErrors[0], 2.70700752414, 1e-8)
    closeTo(fit.parameters[1], 5.501564318059e-4, 1e-9)
    closeTo(fit.standardErrors[1], 7.26686884362e-6, 1e-8)
    closeTo(fit.residualSumOfSquares, 0.1245513889444, 1e-9)
    closeTo(fit.residualStandardDeviation, 0.1018787633024, 1e-9)
    closeTo(fit.correlation?.[0]?.[1], -0.99877619, 1e-7)
    const t = tQuantile(0.975, fit.degreesOfFreedom)
    closeTo((fit.parameters[0] ?? NaN) - t * (fit.standardErrors[0] ?? NaN), 233.044066455, 1e-8)
    closeTo((fit.parameters[1] ?? NaN) + t * (fit.standardErrors[1] ?? NaN), 5.65989578874e-4, 1e-8)
  })
})

describe('C26 BoxBOD: NIST StRD, certified values', () => {
  const x = [1, 2, 3, 5, 7, 10]
  const y = [109, 149, 149, 191, 213, 224]
  const model: NonlinearModel = {
    values: ([b1 = NaN, b2 = NaN]) => x.map((value) => b1 * (1 - Math.exp(-b2 * value))),
    jacobian: ([b1 = NaN, b2 = NaN]) =>
      x.map((value) => [1 - Math.exp(-b2 * value), b1 * value * Math.exp(-b2 * value)]),
  }
  const fit = fitNonlinear(model, y, [100, 0.75])
  it('estimates', () => {
    closeTo(fit.parameters[0], 213.8094088904, 1e-9)
    closeTo(fit.standardErrors[0], 12.3545151765, 1e-8)
    closeTo(fit.parameters[1], 0.5472374854192, 1e-9)
    closeTo(fit.standardErrors[1], 0.10455993237, 1e-8)
    closeTo(fit.residualSumOfSquares, 1168.008876556, 1e-9)
    closeTo(fit.residualStandardDeviation, 17.08807242315, 1e-9)
  })
  it('profile interval is lopsided where the Wald interval is not', () => {
    const t = tQuantile(0.975, fit.degreesOfFreedom)
    const rate = profileInterval(model, y, fit, 1, t)
    const best = fit.parameters[1] ?? NaN
    expect((rate.high ?? NaN) - best).toBeGreaterThan(best - (rate.low ?? NaN))
    // by definition the sum of squares at the ends is S (1 + t²/ν)
    for (const end of [rate.low, rate.high]) {
      const held = fitNonlinear(
        { values: ([b1 = NaN]) => x.map((value) => b1 * (1 - Math.exp(-(end ?? NaN) * value))) },
        y,
        [200],
      )
      closeTo(held.residualSumOfSquares, fit.residualSumOfSquares * (1 + (t * t) / 4), 1e-6)
    }
  })
})

describe('C27 n-pentane isomerisation: Carr 1960, Bates and Watts 1988', () => {
  const h = [
    205.8, 404.8, 209.7, 401.6, 224.9, 402.6, 212.7, 406.2, 133.3, 470.9, 300, 301.6, 297.3, 314, 305.7, 300.1, 305.4,
    305.2, 300.1, 106.6, 417.2, 251, 250.3, 145.1,
  ]
  const p = [
    90.9, 92.9, 174.9, 187.2, 92.7, 102.2, 186.9, 192.6, 140.8, 144.2, 68.3, 214.6, 142.2, 146.7, 142, 143.7, 141.1,
    141.5, 83, 209.6, 83.9, 294.4, 148, 291,
  ]
  const i = [
    37.1, 36.3, 49.4, 44.9, 116.3, 128.9, 134.4, 134.9, 87.6, 86.9, 81.7, 101.7, 10.5, 157.1, 86, 90.2, 87.4, 87, 66.4,
    33, 32.9, 41.5, 14.7, 50.2,
  ]
  const r = [
    3.541, 2.397, 6.694, 4.722, 0.593, 0.268, 2.797, 2.451, 3.196, 2.021, 0.896, 5.084, 5.686, 1.193, 2.648, 3.303,
    3.054, 3.302, 1.271, 11.648, 2.002, 9.604, 7.754, 11.59,
  ]
  const point = (k: number) => [h[k] ?? NaN, p[k] ?? NaN, i[k] ?? NaN] as const
  const model: NonlinearModel = {
    values: ([k = NaN, kh = NaN, kp = NaN, ki = NaN]) =>
      r.map((_value, n) => {
        const [hh, pp, ii] = point(n)
        return (k * kp * (pp - ii / 1.632)) / (1 + kh * hh + kp * pp + ki * ii)
      }),
  }
  const fit = fitNonlinear(model, r, [35, 0.1, 0.05, 0.2])
  it('estimates and the published ones 35.92, 0.0708, 0.0377, 0.167, sum of squares 3.234', () => {
    const expected = [35.92022305898, 0.07084331355079, 0.0377299645598, 0.1671347444319]
    const errors = [8.21233746135, 0.178682389991, 0.100060505863, 0.415970030599]
    for (const j of [0, 1, 2, 3]) {
      closeTo(fit.parameters[j], expected[j] ?? NaN, 1e-6)
      closeTo(fit.standardErrors[j], errors[j] ?? NaN, 1e-5)
    }
    closeTo(fit.residualSumOfSquares, 3.234482275391, 1e-10)
    closeTo(fit.residualStandardDeviation, 0.4021493674862, 1e-10)
    closeTo(fit.correlation?.[1]?.[2], 0.99782988, 1e-6)
    closeTo(fit.correlation?.[1]?.[3], 0.99758513, 1e-6)
  })
  it('Wald intervals of all adsorption constants reach below zero; profile intervals do not', () => {
    const t = tQuantile(0.975, 20)
    for (const j of [1, 2, 3]) {
      expect((fit.parameters[j] ?? NaN) - t * (fit.standardErrors[j] ?? NaN)).toBeLessThan(0)
      const { low } = profileInterval(model, r, fit, j, t)
      expect(low === null || low > 0).toBe(true)
    }
  })
  it('reparametrised denominators are better determined', () => {
    const again = fitNonlinear(
      {
        values: ([c0 = NaN, ch = NaN, cp = NaN, ci = NaN]) =>
          r.map((_value, n) => {
            const [hh, pp, ii] = point(n)
            return (pp - ii / 1.632) / (c0 + ch * hh + cp * pp + ci * ii)
          }),
      },
      r,
      [1, 0.05, 0.03, 0.1],
    )
    const expected = [0.7378610369112, 0.05227252079481, 0.02783947077271, 0.1233222158304]
    const errors = [1.81739661373, 0.0045810613159, 0.00636485826815, 0.0176765748005]
    for (const j of [0, 1, 2, 3]) {
      closeTo(again.parameters[j], expected[j] ?? NaN, 1e-6)
      closeTo(again.standardErrors[j], errors[j] ?? NaN, 1e-5)
    }
  })
  it('swapping the two pentane columns, as one printed table does, is not the same fit', () => {
    const [k = NaN, kh = NaN, kp = NaN, ki = NaN] = fit.parameters
    const swapped = r.reduce((sum, value, n) => {
      const [hh, ii, pp] = point(n)
      const error = value - (k * kp * (pp - ii / 1.632)) / (1 + kh * hh + kp * pp + ki * ii)
      return sum + error * error
    }, 0)
    expect(swapped).toBeGreaterThan(100)
  })
})

describe('C29 toluene hydrodemethylation: Fogler (published 1.45e-8, 1.39, 1.038)', () => {
  const rate = [71, 71.3, 41.6, 19.7, 42, 17.1, 71.8, 142, 284, 47, 71.3, 117, 127, 131, 133, 41.8]
  const toluene = [1, 1, 1, 1, 1, 1, 1, 1, 1, 0.5, 1, 5, 10, 15, 20, 1]
  const hydrogen = [1, 1, 1, 1, 1, 1, 1, 2, 4, 1, 1, 1, 1, 1, 1, 1]
  const benzene = [0, 0, 1, 4, 1, 5, 0, 0, 0, 0, 0, 0, 0, 0, 0, 1]
  const model: NonlinearModel = {
    values: ([k = NaN, kb = NaN, kt = NaN]) =>
      rate.map(
        (_value, n) =>
          (k * (hydrogen[n] ?? NaN) * (toluene[n] ?? NaN)) / (1 + kb * (benzene[n] ?? NaN) + kt * (toluene[n] ?? NaN)),
      ),
  }
  const linear = fitLinearModel(
    rate.map((_value, n) => [1, benzene[n] ?? NaN, toluene[n] ?? NaN]),
    rate.map((value, n) => ((hydrogen[n] ?? NaN) * (toluene[n] ?? NaN)) / value),
  )
  const start = [
    1 / (linear.coefficients[0] ?? NaN),
    (linear.coefficients[1] ?? NaN) / (linear.coefficients[0] ?? NaN),
    (linear.coefficients[2] ?? NaN) / (linear.coefficients[0] ?? NaN),
  ]
  it('linearised values serve as a start only: they are biased', () => {
    for (const [j, expected] of [140.4689801, 1.263775775, 1.00582892].entries()) closeTo(start[j], expected, 1e-8)
  })
  it('nonlinear estimates', () => {
    const fit = fitNonlinear(model, rate, start)
    const expected = [144.7673078288, 1.390526433642, 1.038410557951]
    const errors = [0.574277268978, 0.0212028666641, 0.00609292835803]
    // the first published error is for k in the units of the table
    for (const j of [1, 2]) closeTo(fit.standardErrors[j], errors[j] ?? NaN, 1e-6)
    for (const j of [0, 1, 2]) closeTo(fit.parameters[j], expected[j] ?? NaN, 1e-8)
    closeTo(fit.standardErrors[0], errors[0] ?? NaN, 1e-6)
    closeTo(fit.residualSumOfSquares, 3.260509018741, 1e-9)
  })
})

describe('C30 saturation kinetics in two states: R data set Puromycin, Bates and Watts 1988', () => {
  const conc = [0.02, 0.02, 0.06, 0.06, 0.11, 0.11, 0.22, 0.22, 0.56, 0.56, 1.1, 1.1]
  const treated = [76, 47, 97, 107, 123, 139, 159, 152, 191, 201, 207, 200]
  const untreated = [67, 51, 84, 86, 98, 115, 131, 124, 144, 158, 160]
  const model = (count: number): NonlinearModel => ({
    values: ([v = NaN, k = NaN]) => conc.slice(0, count).map((c) => (v * c) / (k + c)),
  })
  it('each alone', () => {
    const fit = fitNonlinear(model(12), treated, [200, 0.1])
    closeTo(fit.parameters[0], 212.6837431425, 1e-8)
    closeTo(fit.standardErrors[0], 6.94715516004, 1e-7)
    closeTo(fit.parameters[1], 0.06412128168157, 1e-8)
    closeTo(fit.standardErrors[1], 0.00828094949848, 1e-7)
    closeTo(fit.residualSumOfSquares, 1195.448814439, 1e-9)
    const other = fitNonlinear(model(11), untreated, [160, 0.05])
    closeTo(other.parameters[0], 160.28004618, 1e-6)
    closeTo(other.parameters[1], 0.047708184494, 1e-6)
    closeTo(other.residualSumOfSquares, 859.60429378, 1e-6)
  })
  it('common constant', () => {
    const fit = fitNonlinear(
      {
        values: ([v = NaN, d = NaN, k = NaN]) => [
          ...conc.slice(0, 11).map((c) => (v * c) / (k + c)),
          ...conc.map((c) => ((v + d) * c) / (k + c)),
        ],
      },
      [...untreated, ...treated],
      [160, 40, 0.05],
    )
    for (const [j, expected] of [166.60409693, 42.025973507, 0.057971832876].entries())
      closeTo(fit.parameters[j], expected, 1e-7)
    closeTo(fit.residualSumOfSquares, 2240.89143864, 1e-8)
  })
})

describe('derivatives', () => {
  it('are good to eleven digits', () => {
    const [row] = numericalJacobian(([a = NaN, b = NaN]) => [Math.exp(a) * Math.sin(b)], [1.3, 0.7])
    closeTo(row?.[0], Math.exp(1.3) * Math.sin(0.7), 1e-11)
    closeTo(row?.[1], Math.exp(1.3) * Math.cos(0.7), 1e-11)
  })
})

describe('what the fit cannot do', () => {
  it('says so', () => {
    expect(() => fitNonlinear(misra, [1, 2], [1, 1])).toThrow(AnalysisError)
    expect(() => fitNonlinear(misra, [1], [1, 1])).toThrow(AnalysisError)
    expect(() => fitNonlinear(misra, misraY, [NaN, 1])).toThrow(AnalysisError)
    expect(() => fitNonlinear(misra, misraY, [250, 5e-4], [0])).toThrow(AnalysisError)
    // two parameters that only enter as a product: a minimum without standard errors
    const product: NonlinearModel = { values: ([a = NaN, b = NaN]) => [1, 2, 3].map((x) => a * b * x) }
    const fit = fitNonlinear(product, [2, 4.1, 6], [1, 1])
    closeTo((fit.parameters[0] ?? NaN) * (fit.parameters[1] ?? NaN), 2.0142857142857, 1e-8)
    expect(fit.unscaledCovariance === null || fit.standardErrors.every((error) => (error ?? 1) > 1e3)).toBe(true)
  })
})
