import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { compareLines, fTest } from '@/lib/analysis/comparison/compare-lines'
import { testCompensation } from '@/lib/analysis/comparison/compensation'
import { crossingTemperature } from '@/lib/analysis/comparison/crossing-temperature'
import { adjustByHolm } from '@/lib/analysis/comparison/holm'
import { compareAllPairs, studentizedRangeQuantile } from '@/lib/analysis/comparison/tukey-kramer'
import { fitWeightedLine } from '@/lib/analysis/statistics/weighted-line'
import { testDifference } from '@/lib/analysis/statistics/welch'
import { twoSidedTProbability } from '@/lib/analysis/statistics/student-t'
import { closeTo } from '../kinetics/close-to'

const R = 8.314462618

describe('C12 equal slopes: dinitrogen pentoxide from two books', () => {
  const a = { t: [273, 293, 313, 333, 353], k: [0.0787, 1.7, 25.7, 178, 2140].map((k) => k * 1e-5) }
  const b = { t: [338, 318, 298], k: [4.9e-3, 5e-4, 3.5e-5] }
  const points = ({ t, k }: { t: number[]; k: number[] }) => ({ x: t.map((value) => 1 / value), y: k.map(Math.log) })
  const result = compareLines([points(a), points(b)])
  it('sums of squares and tests', () => {
    closeTo(result.commonLine.residualSumOfSquares, 0.156643175894)
    closeTo(result.commonSlope.residualSumOfSquares, 0.121419000136)
    closeTo(result.separate.residualSumOfSquares, 0.113538251811)
    expect([
      result.commonLine.degreesOfFreedom,
      result.commonSlope.degreesOfFreedom,
      result.separate.degreesOfFreedom,
    ]).toEqual([6, 5, 4])
    closeTo(result.equalSlopes.f, 0.277642052771)
    closeTo(result.equalSlopes.pValue, 0.626119761242)
    closeTo(result.equalLevels.f, 1.45052157071)
    closeTo(result.equalLevels.pValue, 0.282339985272)
  })
  it('Welch difference of the slopes', () => {
    const [first, second] = [a, b].map((set) => {
      const { x, y } = points(set)
      const line = fitWeightedLine(x, y, null)
      return {
        value: -R * line.slope,
        standardUncertainty: R * (line.scaled?.slope ?? NaN),
        degreesOfFreedom: line.degreesOfFreedom,
      }
    })
    if (first === undefined || second === undefined) throw new Error('two sets')
    const test = testDifference(first, second)
    closeTo(test.difference, -2857.21214058)
    closeTo(test.standardError, 2582.01510877)
    closeTo(test.t, -1.10658227014)
    closeTo(test.degreesOfFreedom, 3.54804907899)
    closeTo(test.pValue, 0.337801877665)
  })
  it('refuses one line and lines without freedom', () => {
    expect(() => compareLines([points(a)])).toThrow(AnalysisError)
    const two = { x: [1, 2], y: [1, 2] }
    expect(() => compareLines([two, two])).toThrow(AnalysisError)
    expect(() =>
      fTest({ residualSumOfSquares: 1, degreesOfFreedom: 4 }, { residualSumOfSquares: 1, degreesOfFreedom: 4 }),
    ).toThrow(AnalysisError)
  })
  it('C30: common constant of two states, extra sum of squares', () => {
    const test = fTest(
      { residualSumOfSquares: 2240.89143864, degreesOfFreedom: 20 },
      { residualSumOfSquares: 2055.05310822, degreesOfFreedom: 19 },
    )
    closeTo(test.f, 1.71816887)
    closeTo(test.pValue, 0.205552272)
  })
})

describe('C20 all pairs: R data set PlantGrowth', () => {
  const control = [4.17, 5.58, 5.18, 6.11, 4.5, 4.61, 5.17, 4.53, 5.33, 5.14]
  const one = [4.81, 4.17, 4.41, 3.59, 5.87, 3.83, 6.03, 4.89, 4.32, 4.69]
  const two = [6.31, 5.12, 5.54, 5.5, 5.37, 5.29, 4.92, 6.15, 5.8, 5.26]
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
  const squares = (values: readonly number[]) =>
    values.reduce((sum, value) => sum + (value - mean(values)) * (value - mean(values)), 0)
  const compare = (groups: readonly (readonly number[])[]) => {
    const freedom = groups.reduce((sum, group) => sum + group.length - 1, 0)
    const s = Math.sqrt(groups.reduce((sum, group) => sum + squares(group), 0) / freedom)
    return {
      pairs: compareAllPairs(
        groups.map((group) => ({ mean: mean(group), count: group.length })),
        s,
        freedom,
      ),
      s,
      freedom,
    }
  }
  it('Tukey: widely printed probabilities 0.3908711, 0.1979960, 0.0120064', () => {
    const { pairs } = compare([control, one, two])
    // our pairs are first less second; the printed ones second less first
    const expected = [
      [0.371, -0.32021605141, 1.06221605141, 0.3908711442],
      [-0.494, -1.18521605141, 0.19721605141, 0.1979959913],
      [-0.865, -1.55621605141, -0.17378394859, 0.012006424],
    ] as const
    for (const [i, [difference, low, high, p]] of expected.entries()) {
      closeTo(pairs[i]?.difference, difference, 1e-12)
      closeTo(pairs[i]?.low, low, 1e-7)
      closeTo(pairs[i]?.high, high, 1e-7)
      closeTo(pairs[i]?.pValue, p, 1e-6)
    }
  })
  it('Tukey-Kramer with groups of 7, 9 and 10', () => {
    const { pairs } = compare([control.filter((_v, i) => ![7, 8, 9].includes(i)), one.filter((_v, i) => i !== 9), two])
    closeTo(pairs[0]?.difference, 0.387936507937)
    closeTo(pairs[0]?.low, -0.449941939897, 1e-6)
    closeTo(pairs[0]?.pValue, 0.4885362695876, 1e-6)
    closeTo(pairs[1]?.low, -1.299630593143, 1e-6)
    closeTo(pairs[1]?.pValue, 0.3243352249528, 1e-6)
    closeTo(pairs[2]?.high, -0.104304036916, 1e-6)
    closeTo(pairs[2]?.pValue, 0.0238951744034, 1e-6)
  })
  it('Holm on pooled t', () => {
    const { s, freedom } = compare([control, one, two])
    const p = (x: readonly number[], y: readonly number[]) =>
      twoSidedTProbability((mean(x) - mean(y)) / (s * Math.sqrt(1 / 10 + 1 / 10)), freedom)
    const adjusted = adjustByHolm([p(control, one), p(control, two), p(one, two)])
    for (const [i, expected] of [0.194387880054, 0.175363350125, 0.0133777078146].entries())
      closeTo(adjusted[i], expected)
  })
  it('Welch', () => {
    const part = (values: readonly number[]) => ({
      value: mean(values),
      standardUncertainty: Math.sqrt(squares(values) / 9 / 10),
      degreesOfFreedom: 9,
    })
    const test = testDifference(part(one), part(two))
    closeTo(test.t, -3.01009854212)
    closeTo(test.degreesOfFreedom, 14.1035691228)
    closeTo(test.pValue, 0.00929840471727)
  })
  it('quantiles of the studentised range: R 4.2.2 qtukey', () => {
    closeTo(studentizedRangeQuantile(0.95, 3, 27), 3.50642612339269, 1e-8)
    closeTo(studentizedRangeQuantile(0.95, 10, 20), 5.00788265540714, 1e-7)
    closeTo(studentizedRangeQuantile(0.99, 4, 8), 6.20383497253405, 1e-7)
    expect(() => studentizedRangeQuantile(1, 3, 3)).toThrow(AnalysisError)
    expect(() => compareAllPairs([{ mean: 1, count: 1 }], 1, 1)).toThrow(AnalysisError)
    expect(() =>
      compareAllPairs(
        [
          { mean: 1, count: 1 },
          { mean: 2, count: 0 },
        ],
        1,
        1,
      ),
    ).toThrow(AnalysisError)
  })
})

describe('C21 Holm', () => {
  it('steps down and never back', () => {
    const adjusted = adjustByHolm([0.01, 0.04, 0.03, 0.005])
    for (const [i, expected] of [0.03, 0.06, 0.06, 0.02].entries()) closeTo(adjusted[i], expected, 1e-12)
    // multiplying alone would give 0.04 for the second: not reproduced
    expect(adjusted[1]).not.toBeCloseTo(0.04, 6)
    expect(adjustByHolm([])).toEqual([])
    expect(adjustByHolm([0.9, 0.9])).toEqual([1, 1])
    expect(() => adjustByHolm([NaN])).toThrow(AnalysisError)
  })
})

describe('C61 compensation artefact: six replicates of one invented catalyst', () => {
  const temperatures = [430, 440, 450, 460, 470]
  const errors = [
    [0.1, -0.05, 0.02, -0.08, 0.06],
    [-0.12, 0.04, 0.05, 0.03, -0.1],
    [0.05, 0.1, -0.1, 0.02, -0.06],
    [-0.03, -0.08, 0.06, 0.1, 0.02],
    [0.08, 0.02, -0.04, -0.06, 0.11],
    [-0.1, -0.02, 0.03, 0.05, 0.09],
  ]
  const lines = errors.map((row) => {
    const x = temperatures.map((t) => 1 / t)
    const line = fitWeightedLine(
      x,
      x.map((value, i) => (-80_000 / R) * (value - 1 / 450) + (row[i] ?? NaN)),
      null,
    )
    return { activationEnergyJPerMol: -R * line.slope, lnPreExponential: line.intercept }
  })
  const harmonic = 5 / temperatures.reduce((sum, t) => sum + 1 / t, 0)
  const test = testCompensation(lines, harmonic)
  it('the naive plot looks perfect and means nothing', () => {
    for (const [i, expected] of [
      77999.375639, 80732.124355, 74939.095393, 84759.774211, 79479.221229, 87600.171432,
    ].entries())
      closeTo(lines[i]?.activationEnergyJPerMol, expected)
    closeTo(test.naiveCorrelation, 0.99993300752)
    closeTo(test.naiveIsokineticTemperatureK, 448.73839698)
    closeTo(test.commonTemperatureK, 449.55524792)
  })
  it('the proper test shows no compensation', () => {
    closeTo(test.correlation, 0.15506882782)
    closeTo(test.correlationPValue, 0.76926117725)
    // the reference used R = 8.314462618, ours has two digits more
    closeTo(test.slope, 4.8700376839e-7, 2e-8)
    closeTo(test.slopeStandardError, 1.5512879546e-6)
    closeTo(test.slopeInterval?.[0], -3.8200620799e-6)
    closeTo(test.slopeInterval?.[1], 4.7940696167e-6)
    expect(test.verdict).toBe('no-compensation-shown')
    expect(test.isokineticTemperatureK).toBeNull()
  })
  it('finds a true isokinetic temperature outside the data', () => {
    // lines through one point at 700 K, with a little scatter
    const scatter = [0.02, -0.03, 0.01, -0.02, 0.03, -0.01]
    const true_ = [60, 70, 80, 90, 100, 110].map((kilo, i) => ({
      activationEnergyJPerMol: kilo * 1e3,
      lnPreExponential: 3 + (scatter[i] ?? 0) + (kilo * 1e3) / (8.31446261815324 * 700),
    }))
    const found = testCompensation(true_, 450)
    expect(found.verdict).toBe('compensation')
    closeTo(found.isokineticTemperatureK, 700, 0.03)
    expect(found.isokineticInterval?.[0]).toBeLessThan(700)
    expect(found.isokineticInterval?.[1]).toBeGreaterThan(700)
  })
  it('crossing of two lines', () => {
    const first = { activationEnergyJPerMol: 80e3, lnPreExponential: 20 }
    closeTo(
      crossingTemperature(first, { activationEnergyJPerMol: 100e3, lnPreExponential: 25 }),
      20_000 / (8.31446261815324 * 5),
    )
    expect(crossingTemperature(first, { activationEnergyJPerMol: 100e3, lnPreExponential: 20 })).toBeNull()
    expect(crossingTemperature(first, { activationEnergyJPerMol: 100e3, lnPreExponential: 18 })).toBeNull()
    expect(() => testCompensation(lines.slice(0, 2), 450)).toThrow(AnalysisError)
  })
})
