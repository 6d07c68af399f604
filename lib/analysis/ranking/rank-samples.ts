import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import normalQuantile from '@stdlib/stats-base-dists-normal-quantile'
import { AnalysisError } from '../analysis-error'
import { type Estimate } from '../estimate'
import { createRandomStream } from '../statistics/random'
import { studentTQuantile } from '../statistics/student-t'

/** One sample to be ranked by the logarithm of its figure of merit; more is better. */
export interface RankCandidate {
  readonly id: string
  /** ln of the rate or turnover frequency, random part and shared effects in the same logarithm */
  readonly lnMerit: Estimate
  /** relative standard deviation of the figure from one packed bed to another, already divided by the root of the number of beds */
  readonly betweenLoadingStandardDeviation: number
}

export interface RankOptions {
  /** at least 1,000 */
  readonly draws: number
  readonly seed: number
}

export interface RankedSample {
  readonly id: string
  /** 1 for the best, in the order of the estimates */
  readonly rank: number
  /** 5 % and 95 % quantile of the rank over the draws */
  readonly rankInterval: readonly [number, number]
  readonly expectedRank: number
  readonly probabilityBest: number
  /** share of draws in which this sample beats the one ranked right below it; null for the last */
  readonly probabilityAboveNext: number | null
}

/** Two samples next to each other in the ranking, compared with their shared errors cancelled. */
export interface NeighbourComparison {
  readonly betterId: string
  readonly worseId: string
  readonly ratio: number
  readonly ratioInterval: readonly [number, number]
}

export interface RankResult {
  /** best first */
  readonly samples: readonly RankedSample[]
  readonly neighbours: readonly NeighbourComparison[]
  readonly draws: number
  readonly seed: number
}

const TAU_STEPS = 60
const NORMAL_975 = normalQuantile(0.975, 0, 1)

interface Prepared {
  readonly id: string
  readonly y: number
  /** variance that belongs to this sample alone */
  readonly own: number
  /** effect of each source that two or more samples share */
  readonly shared: readonly number[]
}

// A t distribution with few degrees of freedom is stood in for by the normal one with the same 95 % interval.
function ownVariance(candidate: RankCandidate): number {
  const { randomStandardUncertainty: u, degreesOfFreedom } = candidate.lnMerit
  const scale = degreesOfFreedom === null ? 1 : studentTQuantile(0.975, Math.max(1, degreesOfFreedom)) / NORMAL_975
  const random = (u ?? 0) * scale
  const between = candidate.betweenLoadingStandardDeviation
  return random * random + between * between
}

function prepare(candidates: readonly RankCandidate[]): Prepared[] {
  const uses = new Map<string, number>()
  for (const { id, lnMerit, betweenLoadingStandardDeviation } of candidates) {
    if (!Number.isFinite(lnMerit.value) || !(betweenLoadingStandardDeviation >= 0))
      throw new AnalysisError('not-finite', `Sample ${id} has no finite figure to rank by.`, { id })
    if (lnMerit.randomStandardUncertainty === null)
      throw new AnalysisError('missing-input', `Sample ${id} has no uncertainty; it cannot be ranked.`, { id })
    for (const source of Object.keys(lnMerit.sharedEffects)) uses.set(source, (uses.get(source) ?? 0) + 1)
  }
  const common = [...uses.keys()].filter((source) => (uses.get(source) ?? 0) > 1).sort()
  return candidates.map((candidate) => {
    let own = ownVariance(candidate)
    for (const source of Object.keys(candidate.lnMerit.sharedEffects).sort()) {
      const effect = candidate.lnMerit.sharedEffects[source] ?? 0
      if (uses.get(source) === 1) own += effect * effect
    }
    return {
      id: candidate.id,
      y: candidate.lnMerit.value,
      own,
      shared: common.map((source) => candidate.lnMerit.sharedEffects[source] ?? 0),
    }
  })
}

// Lower triangle L with L Lᵀ = matrix, row by row in one array.
function cholesky(matrix: readonly number[], size: number): number[] {
  const lower = new Array<number>(size * size).fill(0)
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i * size + j] ?? 0
      for (let k = 0; k < j; k++) sum -= (lower[i * size + k] ?? 0) * (lower[j * size + k] ?? 0)
      lower[i * size + j] = i === j ? Math.sqrt(sum) : sum / (lower[j * size + j] ?? 1)
    }
  }
  return lower
}

function solveLower(lower: readonly number[], size: number, right: readonly number[]): number[] {
  const x = [...right]
  for (let i = 0; i < size; i++) {
    let sum = x[i] ?? 0
    for (let k = 0; k < i; k++) sum -= (lower[i * size + k] ?? 0) * (x[k] ?? 0)
    x[i] = sum / (lower[i * size + i] ?? 1)
  }
  return x
}

function solveUpper(lower: readonly number[], size: number, right: readonly number[]): number[] {
  const x = [...right]
  for (let i = size - 1; i >= 0; i--) {
    let sum = x[i] ?? 0
    for (let k = i + 1; k < size; k++) sum -= (lower[k * size + i] ?? 0) * (x[k] ?? 0)
    x[i] = sum / (lower[i * size + i] ?? 1)
  }
  return x
}

/** Mean and shared errors given the spread tau, and how well tau fits: y = mu + S z + e, e ~ N(0, own + tau²), z ~ N(0, 1), mu flat. */
interface Given {
  readonly tau: number
  readonly lower: readonly number[]
  readonly mean: readonly number[]
  readonly lnLikelihood: number
}

function givenTau(samples: readonly Prepared[], tau: number): Given {
  const sources = samples[0]?.shared.length ?? 0
  const size = sources + 1
  const precision = new Array<number>(size * size).fill(0)
  const right = new Array<number>(size).fill(0)
  let lnDeterminant = 0
  let sumOfSquares = 0
  for (const sample of samples) {
    const variance = sample.own + tau * tau
    lnDeterminant += ln(variance)
    sumOfSquares += (sample.y * sample.y) / variance
    const row = [1, ...sample.shared]
    for (let i = 0; i < size; i++) {
      right[i] = (right[i] ?? 0) + ((row[i] ?? 0) * sample.y) / variance
      for (let j = 0; j <= i; j++)
        precision[i * size + j] = (precision[i * size + j] ?? 0) + ((row[i] ?? 0) * (row[j] ?? 0)) / variance
    }
  }
  for (let i = 1; i < size; i++) precision[i * size + i] = (precision[i * size + i] ?? 0) + 1
  const lower = cholesky(precision, size)
  const half = solveLower(lower, size, right)
  let lnPrecision = 0
  let explained = 0
  for (let i = 0; i < size; i++) {
    lnPrecision += 2 * ln(lower[i * size + i] ?? 1)
    explained += (half[i] ?? 0) * (half[i] ?? 0)
  }
  return {
    tau,
    lower,
    mean: solveUpper(lower, size, half),
    lnLikelihood: -0.5 * (lnDeterminant + lnPrecision + sumOfSquares - explained),
  }
}

// The spread of the samples on a grid with the weight that the estimates give each value of it (uniform prior on the spread).
function spreadGrid(samples: readonly Prepared[]): { given: Given[]; cumulative: number[] } {
  let least = Number.POSITIVE_INFINITY
  let most = Number.NEGATIVE_INFINITY
  let largest = 0
  for (const sample of samples) {
    least = Math.min(least, sample.y)
    most = Math.max(most, sample.y)
    largest = Math.max(largest, sample.own)
  }
  const top = Math.max(2 * (most - least), 2 * Math.sqrt(largest), 1e-6)
  const given: Given[] = []
  for (let step = 0; step < TAU_STEPS; step++) {
    // finer near zero, where small spreads differ most; the prior stays uniform in tau by the width of each step
    const share = (step + 0.5) / TAU_STEPS
    given.push(givenTau(samples, top * share * share))
  }
  let best = Number.NEGATIVE_INFINITY
  for (const entry of given) best = Math.max(best, entry.lnLikelihood)
  const cumulative: number[] = []
  let total = 0
  given.forEach((entry, step) => {
    const width = (2 * step + 1) / (TAU_STEPS * TAU_STEPS)
    total += width * exp(entry.lnLikelihood - best)
    cumulative.push(total)
  })
  return { given, cumulative: cumulative.map((value) => value / total) }
}

function compareNeighbours(better: Prepared, worse: Prepared): NeighbourComparison {
  let variance = better.own + worse.own
  better.shared.forEach((effect, i) => {
    const difference = effect - (worse.shared[i] ?? 0)
    variance += difference * difference
  })
  const difference = better.y - worse.y
  const reach = NORMAL_975 * Math.sqrt(variance)
  return {
    betterId: better.id,
    worseId: worse.id,
    ratio: exp(difference),
    ratioInterval: [exp(difference - reach), exp(difference + reach)],
  }
}

/**
 * Ranks of samples under uncertainty, by draws from their joint distribution.
 *
 * theta_i ~ N(mu, tau²), y_i = theta_i + sum_s effect_is z_s + e_i, e_i ~ N(0, own_i): errors that samples share are drawn once and cancel where
 * they should; errors of one sample alone, and the spread between packed beds, are drawn for each. mu has a flat prior, tau a uniform one on a
 * grid; both are drawn anew each time, so that close samples are not told apart by luck. The order stated is that of the estimates; the draws say
 * how far it can be trusted. Few degrees of freedom widen the own part to the same 95 % interval.
 * Source: A. Gelman et al., Bayesian Data Analysis, 3rd edition, 2013, sections 5.4 to 5.7 (normal model with unknown spread, uniform prior on it);
 * H. Goldstein, D. J. Spiegelhalter, J. R. Stat. Soc. A 159 (1996) 385 (intervals of ranks).
 *
 * @param candidates - samples with ln of their figure of merit; ids are distinct [ln of the figure's unit]
 * @param options - number of draws and seed [-]
 * @returns samples best first with 90 % rank intervals and probabilities, neighbours with their ratio [-]
 * @throws {AnalysisError} not-finite | missing-input | out-of-range
 */
export function rankSamples(candidates: readonly RankCandidate[], options: RankOptions): RankResult {
  if (!(options.draws >= 1_000))
    throw new AnalysisError(
      'out-of-range',
      `${options.draws} draws are too few to state a rank by; take 1,000 or more.`,
      {
        draws: options.draws,
      },
    )
  // the order of the estimates, ids breaking ties, so that the same samples in any order give the same bits
  const samples = prepare(candidates).sort((a, b) => b.y - a.y || (a.id < b.id ? -1 : 1))
  const count = samples.length
  if (count === 0) return { samples: [], neighbours: [], ...options }
  if (count === 1) {
    const only = samples[0]
    return {
      samples:
        only === undefined
          ? []
          : [
              {
                id: only.id,
                rank: 1,
                rankInterval: [1, 1],
                expectedRank: 1,
                probabilityBest: 1,
                probabilityAboveNext: null,
              },
            ],
      neighbours: [],
      ...options,
    }
  }
  const { given, cumulative } = spreadGrid(samples)
  const sources = samples[0]?.shared.length ?? 0
  const random = createRandomStream(options.seed)
  const rankCounts = samples.map(() => new Float64Array(count))
  const aboveNext = new Float64Array(count)
  const theta = new Float64Array(count)
  const order = Array.from({ length: count }, (_, index) => index)
  for (let draw = 0; draw < options.draws; draw++) {
    const u = random.nextUniform()
    let step = 0
    while (step < TAU_STEPS - 1 && (cumulative[step] ?? 1) < u) step++
    const spread = given[step]
    if (spread === undefined) continue
    const noise: number[] = []
    for (let i = 0; i <= sources; i++) noise.push(random.nextNormal())
    const shift = solveUpper(spread.lower, sources + 1, noise)
    const mu = (spread.mean[0] ?? 0) + (shift[0] ?? 0)
    const variance = spread.tau * spread.tau
    for (let i = 0; i < count; i++) {
      const sample = samples[i]
      if (sample === undefined) continue
      let free = sample.y
      for (let s = 0; s < sources; s++)
        free -= (sample.shared[s] ?? 0) * ((spread.mean[s + 1] ?? 0) + (shift[s + 1] ?? 0))
      const share = variance / (variance + sample.own)
      theta[i] = mu + share * (free - mu) + Math.sqrt(share * sample.own) * random.nextNormal()
    }
    order.sort((a, b) => (theta[b] ?? 0) - (theta[a] ?? 0) || a - b)
    order.forEach((index, place) => {
      const counts = rankCounts[index]
      if (counts !== undefined) counts[place] = (counts[place] ?? 0) + 1
    })
    for (let i = 0; i + 1 < count; i++)
      if ((theta[i] ?? 0) > (theta[i + 1] ?? 0)) aboveNext[i] = (aboveNext[i] ?? 0) + 1
  }
  const ranked = samples.map((sample, index): RankedSample => {
    const counts = rankCounts[index] ?? new Float64Array(count)
    let total = 0
    let expected = 0
    let low = 0
    let high = 0
    for (let place = 0; place < count; place++) {
      const here = counts[place] ?? 0
      total += here
      expected += (place + 1) * here
      if (low === 0 && total >= 0.05 * options.draws) low = place + 1
      if (high === 0 && total >= 0.95 * options.draws) high = place + 1
    }
    return {
      id: sample.id,
      rank: index + 1,
      rankInterval: [low, high],
      expectedRank: expected / options.draws,
      probabilityBest: (counts[0] ?? 0) / options.draws,
      probabilityAboveNext: index + 1 < count ? (aboveNext[index] ?? 0) / options.draws : null,
    }
  })
  const neighbours: NeighbourComparison[] = []
  for (let i = 0; i + 1 < count; i++) {
    const better = samples[i]
    const worse = samples[i + 1]
    if (better !== undefined && worse !== undefined) neighbours.push(compareNeighbours(better, worse))
  }
  return { samples: ranked, neighbours, draws: options.draws, seed: options.seed }
}
