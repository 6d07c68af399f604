import normalCdf from '@stdlib/stats-base-dists-normal-cdf'
import { describe, expect, test } from 'vitest'
import { rankSamples, type RankCandidate } from '@/lib/analysis/ranking/rank-samples'
import { createRandomStream } from '@/lib/analysis/statistics/random'

const candidate = (id: string, value: number, u: number, sharedEffects: Record<string, number> = {}): RankCandidate =>
  Object.freeze({
    id,
    lnMerit: Object.freeze({ value, randomStandardUncertainty: u, degreesOfFreedom: null, sharedEffects }),
    betweenLoadingStandardDeviation: 0,
  })

describe('ranks under uncertainty', () => {
  test('two well separated among many widely spread ones: P(A above B) is Phi of their distance (normal theory)', () => {
    // with a spread of the samples far above their errors nothing is shrunk, and Phi((a - b) / sqrt(ua² + ub²)) holds
    const far = Array.from({ length: 12 }, (_, i) => candidate(`far ${i}`, -20 - 5 * i, 0.1))
    const result = rankSamples([candidate('a', 0.15, 0.1), candidate('b', 0, 0.1), ...far], {
      draws: 100_000,
      seed: 11,
    })
    const expected = normalCdf(0.15 / Math.sqrt(0.02), 0, 1)
    // binomial standard error at 100,000 draws: 0.0011
    expect(Math.abs((result.samples[0]?.probabilityAboveNext ?? 0) - expected)).toBeLessThan(0.005)
    expect(result.samples[0]?.rankInterval).toEqual([1, 2])
    expect(result.samples[2]?.rankInterval).toEqual([3, 3])
  })

  test('an error that two samples share cancels between them', () => {
    const alone = rankSamples([candidate('a', 0.1, 0.01, { x: 0.2 }), candidate('b', 0, 0.01, { y: 0.2 })], {
      draws: 20_000,
      seed: 2,
    })
    const shared = rankSamples([candidate('a', 0.1, 0.01, { s: 0.2 }), candidate('b', 0, 0.01, { s: 0.2 })], {
      draws: 20_000,
      seed: 2,
    })
    expect(alone.samples[0]?.probabilityBest).toBeLessThan(0.7)
    expect(shared.samples[0]?.probabilityBest).toBeGreaterThan(0.99)
    const reach = (result: typeof alone) => Math.log(result.neighbours[0]?.ratioInterval[1] ?? 0) - 0.1
    // 1.959964 sqrt(2 (0.01² + 0.2²)) and 1.959964 sqrt(2 0.01²)
    expect(reach(alone)).toBeCloseTo(1.959964 * Math.sqrt(2 * (0.0001 + 0.04)), 5)
    expect(reach(shared)).toBeCloseTo(1.959964 * Math.sqrt(2 * 0.0001), 5)
  })

  test('the same samples in another order give the same bits, another seed does not', () => {
    const samples = [
      candidate('a', 0.3, 0.1),
      candidate('b', 0.2, 0.2),
      candidate('c', 0.1, 0.1),
      candidate('d', 0.1, 0.1),
    ]
    const result = rankSamples(samples, { draws: 5_000, seed: 3 })
    expect(rankSamples([...samples].reverse(), { draws: 5_000, seed: 3 })).toEqual(result)
    expect(rankSamples(samples, { draws: 5_000, seed: 4 })).not.toEqual(result)
  })

  test.each([0.3, 1, 3])(
    'nine-in-ten rank intervals hold the true rank in 88 of 100 cases or more, spread %s times the error',
    (spread) => {
      const random = createRandomStream(99)
      let held = 0
      let total = 0
      for (let campaign = 0; campaign < 60; campaign++) {
        const truth = Array.from({ length: 12 }, () => spread * random.nextNormal())
        const result = rankSamples(
          truth.map((value, i) => candidate(`${i}`, value + random.nextNormal(), 1)),
          { draws: 1_000, seed: campaign + 1 },
        )
        const order = truth.map((value, id) => ({ value, id })).sort((a, b) => b.value - a.value)
        for (const sample of result.samples) {
          const rank = order.findIndex((entry) => `${entry.id}` === sample.id) + 1
          total++
          if (rank >= sample.rankInterval[0] && rank <= sample.rankInterval[1]) held++
        }
      }
      expect(held / total).toBeGreaterThan(0.88)
    },
  )

  test('one sample, none, too few draws, no uncertainty', () => {
    expect(rankSamples([candidate('a', 1, 0.1)], { draws: 1_000, seed: 1 }).samples[0]?.rankInterval).toEqual([1, 1])
    expect(rankSamples([], { draws: 1_000, seed: 1 }).samples).toEqual([])
    expect(() => rankSamples([candidate('a', 1, 0.1)], { draws: 10, seed: 1 })).toThrow(/too few/)
    const unknown = {
      ...candidate('a', 1, 0.1),
      lnMerit: { ...candidate('a', 1, 0.1).lnMerit, randomStandardUncertainty: null },
    }
    expect(() => rankSamples([unknown], { draws: 1_000, seed: 1 })).toThrow(/no uncertainty/)
  })
})
