import { type Working } from '@/lib/analysis/working'
import { plainSymbol } from '@/lib/analysis/working-symbols'
import { type Ranking, type RankingRow } from '@/lib/domain/ranking'
import { formatFixed } from '@/components/numbers/format-fixed'
import { whyMissing, workingKeyOf } from './ranking-columns'

const missingMeanings: Readonly<Record<string, string>> = {
  rank: 'Rank',
  activationEnergyJPerMol: 'Apparent activation energy',
  lnPreExponential: 'ln A',
  rateMolPerKgS: 'Rate at the reference',
  turnoverFrequencyPerS: 'Turnover frequency at the reference',
  selectivity: 'Selectivity at the target conversion',
  temperatureForConversionK: 'Temperature for the target conversion',
  carbonBalance: 'Carbon balance',
  decayPerH: 'Loss of activity',
}

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

/** What there is to say about a number that cannot be told. */
function missingWorking(row: RankingRow, colId: string): Working | null {
  const why = row.kind === 'blank' ? '' : whyMissing(row, colId)
  const meaning = missingMeanings[colId.split('.')[0] ?? ''] ?? null
  if (why === '' || meaning === null) return null
  return {
    title: `${meaning} of ${row.sampleCode}`,
    formula: 'cannot tell',
    symbols: [],
    result: plainSymbol('', meaning, null),
    assumptions: [],
    source: 'nothing computed',
    from: [],
    leftOut: row.runs.filter((run) => !run.isIncluded && run.reason !== '').map((run) => `${run.code}: ${run.reason}`),
    notes: [`Cannot tell: ${why}`],
  }
}

/** The working of a number that the grid's rows carry without one: it follows from the ranking as a whole. */
export function derivedWorking(ranking: Ranking, row: RankingRow, colId: string): Working | null {
  const key = workingKeyOf(colId)
  return key === 'rank' ? (rankWorking(ranking, row) ?? missingWorking(row, key)) : missingWorking(row, key)
}
