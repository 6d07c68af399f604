import { type Working } from '@/lib/analysis/working'
import { plainSymbol } from '@/lib/analysis/working-symbols'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { formatFixed } from '@/components/numbers/format-fixed'
import { speciesLabel } from '@/components/numbers/species-label'

function rankWorking(ranking: Ranking, row: RankingRow): Working | null {
  if (row.rank === null || row.rankInterval === null) return null
  const celsius = formatFixed(ranking.referenceTemperatureK - 273.15, 1).replace('.0', '')
  const quantity = ranking.rankedBy === 'turnover-frequency' ? 'turnover frequency' : 'rate per gram'
  return {
    title: `Rank of ${row.sampleCode}`,
    formula: 'rank in a draw = 1 + number of samples whose drawn value is larger',
    symbols: [
      plainSymbol('N', 'draws', ranking.draws),
      plainSymbol('seed', 'start of the random numbers: the same seed gives the same ranks', ranking.seed),
      plainSymbol('P_best', 'share of the draws in which it comes first', row.probabilityBest),
      plainSymbol('r_low', 'best rank in the middle nine draws of ten', row.rankInterval[0]),
      plainSymbol('r_high', 'worst rank in the middle nine draws of ten', row.rankInterval[1]),
    ],
    result: plainSymbol('rank', `by the ${quantity} at ${celsius} °C itself`, row.rank),
    assumptions: [
      'Each draw moves every sample by its own uncertainty, and all samples together by the errors they share.',
    ],
    source: 'JCGM 101:2008 (propagation of distributions by Monte Carlo)',
    from: row.runs.filter((run) => run.isIncluded).map((run) => `${run.code}: points in the line`),
    leftOut: row.runs.filter((run) => !run.isIncluded && run.reason !== '').map((run) => `${run.code}: ${run.reason}`),
    notes: [
      'An error that two samples share moves both and changes no order: a shared flow controller cannot reverse them.',
    ],
  }
}

function selectivityWorking(ranking: Ranking, row: RankingRow, species: string): Working | null {
  const value = row.selectivity[species]
  if (value === undefined) return null
  const target = ranking.targetConversion
  return {
    title: `Selectivity to ${speciesLabel(species)} of ${row.sampleCode}`,
    formula: 'S = S_1 + (X − X_1)/(X_2 − X_1) · (S_2 − S_1)',
    symbols: [plainSymbol('X', 'target conversion of the method', target === undefined ? null : target * 100, '%')],
    result: plainSymbol('S', `share of the converted carbon found as ${speciesLabel(species)}`, value * 100, 'C-mol %'),
    assumptions: [
      'At equal conversion for all samples, by a straight line between the two neighbouring holds; mean of the runs in the line.',
    ],
    source: 'common practice',
    from: row.runs.filter((run) => run.isIncluded).map((run) => `${run.code}: points in the line`),
    leftOut: [],
    notes: [],
  }
}

/** The working of a number that the grid's rows carry without one: it follows from the ranking as a whole. */
export function derivedWorking(ranking: Ranking, row: RankingRow, colId: string): Working | null {
  if (colId === 'rank' || colId === 'rankInterval' || colId === 'probabilityBest') return rankWorking(ranking, row)
  if (colId.startsWith('selectivity.')) return selectivityWorking(ranking, row, colId.slice('selectivity.'.length))
  return null
}
