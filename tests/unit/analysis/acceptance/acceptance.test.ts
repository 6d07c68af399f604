import { describe, expect, it } from 'vitest'
import { feedDrift } from '@/lib/analysis/acceptance/feed-drift'
import { judgeReference, referenceLimits } from '@/lib/analysis/acceptance/reference-limits'
import { blankAt, subtractBlank } from '@/lib/analysis/acceptance/subtract-blank'
import { varianceComponents } from '@/lib/analysis/acceptance/variance-components'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { closeTo } from '../kinetics/close-to'

describe('blank', () => {
  const points = [
    { temperatureK: 500, consumptionMolPerS: 1e-9, standardUncertaintyMolPerS: 1e-10 },
    { temperatureK: 550, consumptionMolPerS: 4e-9, standardUncertaintyMolPerS: 2e-10 },
  ]
  it('is interpolated as an Arrhenius line between its points', () => {
    // half-way in 1/T the geometric mean
    const middle = 2 / (1 / 500 + 1 / 550)
    const blank = blankAt(points, middle)
    closeTo(blank.consumptionMolPerS, 2e-9, 1e-12)
    closeTo(blank.standardUncertaintyMolPerS, 2e-9 * Math.sqrt(0.05 ** 2 + 0.025 ** 2), 1e-12)
    expect(blankAt(points, 500)).toEqual({
      consumptionMolPerS: 1e-9,
      standardUncertaintyMolPerS: 1e-10,
      isExtrapolated: false,
    })
    expect(blankAt(points, 600)).toMatchObject({ consumptionMolPerS: 4e-9, isExtrapolated: true })
    expect(blankAt(points, 450).isExtrapolated).toBe(true)
  })
  it('may be zero or below', () => {
    const zero = blankAt(
      [
        { ...points[0], temperatureK: 500, consumptionMolPerS: 0, standardUncertaintyMolPerS: 1e-10 },
        ...points.slice(1),
      ],
      525,
    )
    closeTo(zero.consumptionMolPerS, 2e-9, 1e-12)
  })
  it('takes its rate, not its conversion, from the rate', () => {
    const corrected = subtractBlank(1e-4, 1e-6, 80e-6, blankAt(points, 550))
    closeTo(corrected.rateMolPerKgS, 1e-4 - 5e-5, 1e-12)
    closeTo(corrected.standardUncertaintyMolPerKgS, Math.hypot(1e-6, 2.5e-6), 1e-12)
    expect([corrected.verdict, corrected.blankShare]).toEqual(['too-large', 0.5])
    expect(subtractBlank(1e-3, 0, 80e-6, blankAt(points, 550)).verdict).toBe('small')
    expect(subtractBlank(4e-4, 0, 80e-6, blankAt(points, 550)).verdict).toBe('noticeable')
    // nothing is clipped
    expect(subtractBlank(1e-5, 0, 80e-6, blankAt(points, 550)).rateMolPerKgS).toBeLessThan(0)
  })
  it('refuses what is not there', () => {
    expect(() => blankAt([], 500)).toThrow(AnalysisError)
    expect(() => blankAt(points, 0)).toThrow(AnalysisError)
    expect(() => subtractBlank(1, 1, 0, blankAt(points, 500))).toThrow(AnalysisError)
  })
})

describe('feed analysis before and after', () => {
  const of = (value: number, u: number) => ({ value, relativeStandardUncertainty: u })
  it.each([
    [1.005, 0.001, 'within'],
    [1.05, 0.005, 'beyond'],
    [0.95, 0.005, 'beyond'],
    [1.015, 0.01, 'cannot-tell'],
  ] as const)('ratio %s with %s each: %s', (ratio, u, verdict) => {
    expect(feedDrift(of(1, u), of(ratio, u)).verdict).toBe(verdict)
  })
  it('refuses zero', () => expect(() => feedDrift(of(0, 0), of(1, 0))).toThrow(AnalysisError))
})

// reference values: R 4.2.2, tests/reference/variance-components.R
describe('variance components', () => {
  const values = { a: [1.02, 0.98, 1.05], b: [1.21, 1.18], c: [0.9, 0.95, 0.93, 0.91] }
  const results = Object.entries(values).flatMap(([loading, list]) => list.map((value) => ({ loading, value })))
  it('within and between loadings, unbalanced', () => {
    const parts = varianceComponents(results)
    closeTo(parts.withinVariance, 0.000731944444444444)
    closeTo(parts.betweenVariance, 0.016886538461538449)
    closeTo(parts.pValue, 0.00007656786049881)
    closeTo(parts.newRunVariance, 0.000731944444444444 + 0.016886538461538449)
    expect([parts.withinDegreesOfFreedom, parts.betweenDegreesOfFreedom]).toEqual([6, 2])
  })
  it('say what one run a loading, or one loading, leaves unknown', () => {
    const single = varianceComponents([
      { loading: 'a', value: 1 },
      { loading: 'b', value: 1.2 },
    ])
    expect(single.withinVariance).toBeNull()
    closeTo(single.newRunVariance, 0.02)
    const one = varianceComponents([
      { loading: 'a', value: 1 },
      { loading: 'a', value: 1.2 },
    ])
    expect([one.betweenVariance, one.newRunVariance, one.pValue]).toEqual([null, null, null])
    closeTo(one.withinVariance, 0.02)
    expect(() => varianceComponents([{ loading: 'a', value: 1 }])).toThrow(AnalysisError)
    expect(() =>
      varianceComponents([
        { loading: 'a', value: 1 },
        { loading: 'a', value: NaN },
      ]),
    ).toThrow(AnalysisError)
  })
  it('never gives a negative part', () => {
    const same = varianceComponents([
      { loading: 'a', value: 1 },
      { loading: 'a', value: 2 },
      { loading: 'b', value: 1.5 },
      { loading: 'b', value: 1.6 },
    ])
    expect(same.betweenVariance).toBe(0)
  })
})

describe('reference catalyst', () => {
  const limits = referenceLimits([10.1, 9.8, 10.3, 10, 9.9, 10.2])
  it('limits for a new result', () => {
    closeTo(limits.warning[0], 9.5305558598275)
    closeTo(limits.warning[1], 10.5694441401725)
    closeTo(limits.action[0], 8.9636525852496)
    expect([10, 10.8, 12].map((value) => judgeReference(limits, value))).toEqual(['within', 'warning', 'action'])
  })
  it('want five results', () => {
    expect(() => referenceLimits([1, 2, 3, 4])).toThrow(AnalysisError)
    expect(() => referenceLimits([1, 2, 3, 4, NaN])).toThrow(AnalysisError)
  })
})
