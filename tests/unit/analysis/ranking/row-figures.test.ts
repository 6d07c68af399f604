import { describe, expect, it } from 'vitest'
import { selectivityAtConversion, temperatureAtConversion } from '@/lib/analysis/ranking/at-conversion'
import { meanOfEstimates } from '@/lib/analysis/ranking/mean-of-estimates'
import { lossOfReturnedHold } from '@/lib/analysis/reduction/returned-hold'
import { type Point } from '@/lib/analysis/reduction/run-reduction'
import { exampleRunResult } from '../../../support/example-run-result'
import { estimateOf } from '../../../support/example-fit'
import reference from '../../../reference/row-figures.json'

/* Expected numbers: tests/reference/row-figures.R, by R's symbolic derivatives; agreement to the digits R prints (15) less those lost in ln X. */
const NEAR = 1e-11
const expectRelative = (found: number, expected: number, tolerance: number) =>
  expect(Math.abs(found / expected - 1)).toBeLessThan(tolerance)
const points = exampleRunResult().reduction?.points ?? []
const pointLike = (index: number, more: Partial<Point>): Point => {
  const found = points[index]
  if (found === undefined) throw new Error('the example has eight points')
  return { ...found, ...more }
}

describe('figures at a conversion', () => {
  const cold = pointLike(1, {
    temperatureK: estimateOf(503.21, 0.03, { thermocouple: 0.8 }, null),
    conversion: estimateOf(0.0153, 9e-5, { factor: 1.53e-4 }, 24),
    carbonSelectivity: { CH4: estimateOf(0.972, 0.0021, { factor: 0.0003 }, 24) },
  })
  const hot = pointLike(2, {
    temperatureK: estimateOf(513.16, 0.04, { thermocouple: 0.8 }, null),
    conversion: estimateOf(0.0241, 1.4e-4, { factor: 2.41e-4 }, 24),
    carbonSelectivity: { CH4: estimateOf(0.958, 0.0019, { factor: 0.0004 }, 24) },
  })

  it('temperature: value, own part, shared parts and degrees of freedom as by symbolic derivatives', () => {
    const found = temperatureAtConversion([hot, cold], 0.02)
    expectRelative(found?.estimate.value ?? NaN, reference.temperature.value, NEAR)
    expectRelative(found?.estimate.randomStandardUncertainty ?? NaN, reference.temperature.own, NEAR)
    expectRelative(found?.estimate.sharedEffects['factor'] ?? NaN, reference.temperature.shared[0] ?? NaN, NEAR)
    expectRelative(found?.estimate.sharedEffects['thermocouple'] ?? NaN, reference.temperature.shared[1] ?? NaN, NEAR)
    expectRelative(found?.estimate.degreesOfFreedom ?? NaN, reference.temperature.degreesOfFreedom, NEAR)
    expect(found?.holdNumbers).toEqual([2, 3])
    // a factor that is 1 % high on both conversions: 1 % of the change of temperature per ln X
    expectRelative(0.01 * (found?.perLnConversionK ?? NaN), reference.temperature.shared[0] ?? NaN, NEAR)
  })
  it('selectivity: value, own part and shared part as by symbolic derivatives', () => {
    const found = selectivityAtConversion([hot, cold], 0.02)['CH4']
    expectRelative(found?.estimate.value ?? NaN, reference.selectivity.value, NEAR)
    expectRelative(found?.estimate.randomStandardUncertainty ?? NaN, reference.selectivity.own, NEAR)
    expectRelative(found?.estimate.sharedEffects['factor'] ?? NaN, reference.selectivity.shared[0] ?? NaN, NEAR)
  })
  it('says nothing outside the measured range, and no uncertainty where a part is not known', () => {
    expect(temperatureAtConversion([cold, hot], 0.03)).toBeNull()
    expect(selectivityAtConversion([cold, hot], 0.01)).toEqual({})
    const vague = { ...hot, conversion: estimateOf(0.0241, null) }
    expect(temperatureAtConversion([cold, vague], 0.02)?.estimate.randomStandardUncertainty).toBeNull()
    expect(temperatureAtConversion([cold, vague], 0.02)?.estimate.value).toBeGreaterThan(503)
  })
  it('passes over a conversion that has no logarithm instead of clipping it', () => {
    const none = pointLike(0, { temperatureK: estimateOf(493, 0.03), conversion: estimateOf(-0.001, 9e-5) })
    expect(temperatureAtConversion([none, cold, hot], 0.02)).toEqual(temperatureAtConversion([cold, hot], 0.02))
    expect(temperatureAtConversion([none, cold], 0.01)).toBeNull()
  })
})

describe('loss of activity by a returned hold', () => {
  const first = pointLike(3, {
    temperatureK: estimateOf(523.16, 0.03, {}, null),
    timeOnStreamS: 7_200,
    rateMolPerKgS: estimateOf(1.94e-3, 8e-6, { flow: 1.94e-5 }, 24),
  })
  const returned = pointLike(7, {
    temperatureK: estimateOf(523.31, 0.03, { drift: 0.5 }, null),
    timeOnStreamS: 7_200 + 14.2 * 3_600,
    rateMolPerKgS: estimateOf(1.66e-3, 9e-6, { flow: 1.66e-5 }, 24),
  })
  const R = 8.31446261815324
  const ratio = estimateOf((1.66 / 1.94) * Math.exp((78_200 / R) * (1 / 523.31 - 1 / 523.16)), 0.005)
  const what = { holdNumber: returned.hold.number, returnsTo: first.hold.number, ratio, lossPerH: 0 }

  it('is the one of symbolic derivatives; what moves both rates alike cancels', () => {
    const found = lossOfReturnedHold([first, returned], what, estimateOf(78_200, 640, { flow: 3 }, 5))
    expect(found?.hours).toBeCloseTo(14.2, 12)
    expectRelative(found?.lossPerH.value ?? NaN, reference.loss.value, NEAR)
    expectRelative(found?.lossPerH.randomStandardUncertainty ?? NaN, reference.loss.own, NEAR)
    expectRelative(found?.lossPerH.sharedEffects['drift'] ?? NaN, reference.loss.shared[1] ?? NaN, NEAR)
    expect(Math.abs(found?.lossPerH.sharedEffects['flow'] ?? NaN)).toBeLessThan(1e-15)
  })
  it('has no uncertainty where a rate has none', () => {
    const vague = { ...returned, rateMolPerKgS: estimateOf(1.66e-3, null) }
    const found = lossOfReturnedHold([first, vague], what, null)
    expect(found?.lossPerH.randomStandardUncertainty).toBeNull()
    expect(lossOfReturnedHold([first], what, null)).toBeNull()
  })
})

describe('mean of several numbers', () => {
  const of = (values: readonly number[], nus = [9, 12, 9, 7], us = [0.004, 0.005, 0.004, 0.006]) =>
    values.map((value, i) => estimateOf(value, us[i] ?? NaN, {}, nus[i] ?? null))
  const apart = of([0.991, 1.004, 1.012, 0.998])

  it('counts their scatter where it is larger than their own uncertainties, and only then', () => {
    const cases = [
      [apart, reference.meanApart],
      [of([0.999, 1.001, 1.002, 1.0]), reference.meanClose],
    ] as const
    for (const [estimates, expected] of cases) {
      const found = meanOfEstimates(estimates, { hasPooledScatter: false })
      expectRelative(found?.value ?? NaN, expected[0] ?? NaN, NEAR)
      expectRelative(found?.randomStandardUncertainty ?? NaN, expected[1] ?? NaN, NEAR)
      expectRelative(found?.degreesOfFreedom ?? NaN, expected[2] ?? NaN, NEAR)
    }
  })
  it('counts one pooled scatter once: 4 numbers with u 0.004 on 9 degrees of freedom have u 0.002 on 9', () => {
    const found = meanOfEstimates(of([1, 1, 1, 1], [9, 9, 9, 9], [0.004, 0.004, 0.004, 0.004]), {
      hasPooledScatter: true,
    })
    expectRelative(found?.randomStandardUncertainty ?? NaN, 0.002, 1e-14)
    expectRelative(found?.degreesOfFreedom ?? NaN, 9, 1e-13)
  })
  it('lets a spread that is counted elsewhere explain the scatter', () => {
    // s of 0.991, 1.004, 1.012, 0.998 is 0.0089; a spread of 0.02 explains all of it: u = sqrt(16 + 25 + 16 + 36)/4 · 1e-3 = 0.0024109
    const found = meanOfEstimates(apart, { hasPooledScatter: false, expectedSpread: 0.02 })
    expectRelative(found?.randomStandardUncertainty ?? NaN, Math.sqrt(93) / 4_000, 1e-13)
  })
  it('does not shrink what they share, and shrinks what each has alone', () => {
    const found = meanOfEstimates(
      [estimateOf(1, 0.01, { flow: 0.02, 'mass:a': 0.004 }), estimateOf(1, 0.01, { flow: 0.02, 'mass:b': 0.004 })],
      { hasPooledScatter: false },
    )
    expect(found?.sharedEffects).toEqual({ flow: 0.02, 'mass:a': 0.002, 'mass:b': 0.002 })
  })
  it('does not count twice what sources of one number alone explain of the scatter', () => {
    const two = (effect: number) => [
      estimateOf(0.994, 0.001, { 'inlet:a': effect }, 20),
      estimateOf(1, 0.001, { 'inlet:b': effect }, 20),
    ]
    // s² = 18e-6; own 1e-6 each. Sources of 4e-3 explain 2 · (2e-3)² · 2 = 16e-6 of it: between (18 - 16)/2 - 0.5 = 0.5, own² = 1e-6
    const some = meanOfEstimates(two(4e-3), { hasPooledScatter: false })
    expectRelative(some?.randomStandardUncertainty ?? NaN, 1e-3, 1e-10)
    // sources of 5e-3 explain all of it: own² = 0.5e-6
    const all = meanOfEstimates(two(5e-3), { hasPooledScatter: false })
    expectRelative(all?.randomStandardUncertainty ?? NaN, Math.sqrt(0.5e-6), 1e-10)
    expectRelative(all?.degreesOfFreedom ?? NaN, 40, 1e-10)
  })
  it('is nothing without a number, and has no uncertainty where one has none', () => {
    expect(meanOfEstimates([], { hasPooledScatter: false })).toBeNull()
    const found = meanOfEstimates([estimateOf(1, 0.01), estimateOf(3, null)], { hasPooledScatter: false })
    expect(found).toMatchObject({ value: 2, randomStandardUncertainty: null })
  })
})
