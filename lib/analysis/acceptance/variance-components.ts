import { AnalysisError } from '../analysis-error'
import { upperFProbability } from '../statistics/f-distribution'

/** One result on one packed bed: ln rate, or activation energy. */
export interface LoadingResult {
  /** results of one packed bed share this */
  readonly loading: string
  readonly value: number
}

/** Scatter within and between loadings of one catalyst. */
export interface VarianceComponents {
  readonly mean: number
  /** of runs on one loading; null without a repeated loading */
  readonly withinVariance: number | null
  readonly withinDegreesOfFreedom: number
  /** of loadings beyond that; may come out below zero and is then given as zero; null with one loading */
  readonly betweenVariance: number | null
  readonly betweenDegreesOfFreedom: number
  /** of no difference between loadings; null where it cannot be tested */
  readonly pValue: number | null
  /** variance of one run on a new loading: what two single runs of different samples must be compared with; null where unknown */
  readonly newRunVariance: number | null
}

/**
 * Variance components of replicate runs: within one loading and between loadings.
 *
 * MS_w = Σ (y_ij − ȳ_i)²/(N − k); MS_b = Σ n_i (ȳ_i − ȳ)²/(k − 1); s_b² = max(0, (MS_b − MS_w)/n₀), n₀ = (N − Σ n_i²/N)/(k − 1)
 *
 * Several runs on one packed bed are not independent: without this they count for more than they are. With every loading run once only the
 * sum of both parts is known and stands as the between part.
 * Source: Searle, Casella and McCulloch, Variance Components, 1992, section 3.6 (one-way, unbalanced).
 *
 * @param results - at least 2 results [any]
 * @returns components [unit of the value squared] with N − k and k − 1 degrees of freedom
 * @throws {AnalysisError} too-few-points | not-finite
 */
export function varianceComponents(results: readonly LoadingResult[]): VarianceComponents {
  if (results.length < 2) throw new AnalysisError('too-few-points', 'Scatter needs at least two results.')
  if (results.some(({ value }) => !Number.isFinite(value)))
    throw new AnalysisError('not-finite', 'A result is not a finite number.')
  const names = [...new Set(results.map(({ loading }) => loading))]
  const groups = names.map((name) => results.filter(({ loading }) => loading === name).map(({ value }) => value))
  const count = results.length
  const mean = results.reduce((sum, { value }) => sum + value, 0) / count
  let within = 0
  let between = 0
  let squaredCounts = 0
  for (const group of groups) {
    const centre = group.reduce((sum, value) => sum + value, 0) / group.length
    within += group.reduce((sum, value) => sum + (value - centre) * (value - centre), 0)
    between += group.length * (centre - mean) * (centre - mean)
    squaredCounts += group.length * group.length
  }
  const withinDegreesOfFreedom = count - groups.length
  const betweenDegreesOfFreedom = groups.length - 1
  const withinVariance = withinDegreesOfFreedom > 0 ? within / withinDegreesOfFreedom : null
  const betweenSquare = betweenDegreesOfFreedom > 0 ? between / betweenDegreesOfFreedom : null
  const typical = (count - squaredCounts / count) / Math.max(1, betweenDegreesOfFreedom)
  const betweenVariance = betweenSquare === null ? null : Math.max(0, (betweenSquare - (withinVariance ?? 0)) / typical)
  return {
    mean,
    withinVariance,
    withinDegreesOfFreedom,
    betweenVariance,
    betweenDegreesOfFreedom,
    pValue:
      betweenSquare === null || withinVariance === null || !(withinVariance > 0)
        ? null
        : upperFProbability(betweenSquare / withinVariance, betweenDegreesOfFreedom, withinDegreesOfFreedom),
    newRunVariance: betweenVariance === null ? null : betweenVariance + (withinVariance ?? 0),
  }
}
