import { describe, expect, it } from 'vitest'
import { compareEstimates, lnOfEstimate } from '@/lib/analysis/ranking/compare-estimates'
import { estimateOf } from '../../../support/example-fit'

describe('compareEstimates', () => {
  it('is Welch’s test where nothing is shared', () => {
    // R 4.2.2: a = 84.4, u 0.35, nu 5; b = 82.9, u 0.52, nu 4.
    // se <- sqrt(.35^2+.52^2); nu <- se^4/(.35^4/5+.52^4/4); 2*pt(-1.5/se, nu); qt(.975, nu)*se
    const found = compareEstimates(estimateOf(84.4, 0.35, {}, 5), estimateOf(82.9, 0.52, {}, 4), 0.95)
    expect(found?.difference).toBeCloseTo(1.5, 12)
    expect(found?.standardUncertainty).toBeCloseTo(0.62681735777, 9)
    expect(found?.degreesOfFreedom).toBeCloseTo(7.25414973198, 8)
    expect(found?.pValue).toBeCloseTo(0.04673952528, 8)
    expect(found?.interval[0]).toBeCloseTo(0.02827464462, 7)
    expect(found?.interval[1]).toBeCloseTo(2.97172535538, 7)
  })
  it('lets an error that moves both alike cancel, and counts one that moves them apart', () => {
    const a = estimateOf(10, 0.1, { 'flow:rig-b': 0.8 }, null)
    const same = compareEstimates(a, estimateOf(9, 0.1, { 'flow:rig-b': 0.8 }, null), 0.95)
    expect(same?.standardUncertainty).toBeCloseTo(Math.sqrt(0.02), 12)
    const apart = compareEstimates(a, estimateOf(9, 0.1, { 'flow:rig-b': -0.8 }, null), 0.95)
    expect(apart?.standardUncertainty).toBeCloseTo(Math.sqrt(0.02 + 1.6 ** 2), 12)
    const alone = compareEstimates(a, estimateOf(9, 0.1, {}, null), 0.95)
    expect(alone?.standardUncertainty).toBeCloseTo(Math.sqrt(0.02 + 0.8 ** 2), 12)
  })
  it('says nothing where a random part is not known', () => {
    expect(compareEstimates(estimateOf(1, null), estimateOf(2, 0.1), 0.95)).toBeNull()
  })
})

describe('lnOfEstimate', () => {
  it('turns parts into relative ones', () => {
    const found = lnOfEstimate(estimateOf(2, 0.02, { 'flow:rig-b': -0.016 }))
    expect(found.value).toBeCloseTo(0.6931471805599453, 15)
    expect(found.randomStandardUncertainty).toBeCloseTo(0.01, 15)
    expect(found.sharedEffects['flow:rig-b']).toBeCloseTo(-0.008, 15)
  })
  it('refuses what has no logarithm', () => {
    expect(() => lnOfEstimate(estimateOf(0, 0.1))).toThrow('positive')
  })
})
