import { type Estimate } from '../analysis/estimate'
import { type Ranking, type RankingRow } from '../domain/ranking'
import { totalUncertainty } from '../analysis/total-uncertainty'

/** One column of the downloaded ranking: header with its unit, and a typed cell. Text and spreadsheet are written from the same list. */
export interface RankingColumn {
  readonly header: string
  readonly value: (row: RankingRow) => string | number | null
}

const scaled = (value: number | null | undefined, factor: number) =>
  value === null || value === undefined ? null : value * factor

function numberColumns(
  name: string,
  unit: string,
  factor: number,
  estimate: (row: RankingRow) => Estimate | null,
  interval: (row: RankingRow) => readonly [number, number] | null,
  level: number,
): RankingColumn[] {
  const percent = `${Math.round(level * 1000) / 10} %`
  return [
    { header: `${name} [${unit}]`, value: (row) => scaled(estimate(row)?.value, factor) },
    {
      header: `${name}, standard uncertainty [${unit}]`,
      value: (row) => {
        const found = estimate(row)
        return found === null ? null : scaled(totalUncertainty(found)?.standardUncertainty, factor)
      },
    },
    { header: `${name}, ${percent} interval, low [${unit}]`, value: (row) => scaled(interval(row)?.[0], factor) },
    { header: `${name}, ${percent} interval, high [${unit}]`, value: (row) => scaled(interval(row)?.[1], factor) },
  ]
}

const decisionOf = (row: RankingRow) =>
  row.runs
    .map((run) => `${run.code}: ${run.decision ?? (run.state === 'handed-in' ? 'handed in, undecided' : 'open')}`)
    .join('; ')

/** Columns of the downloaded ranking, in practical units, each with its unit in the header. */
export function rankingColumns(ranking: Ranking): RankingColumn[] {
  const level = ranking.confidenceLevel
  const celsius = Math.round((ranking.referenceTemperatureK - 273.15) * 100) / 100
  const at = `at ${celsius} °C, feed composition`
  const species = [...new Set(ranking.rows.flatMap((row) => Object.keys(row.selectivity)))].sort()
  return [
    { header: 'Rank', value: (row) => row.rank },
    { header: 'Rank, 90 % of draws, best', value: (row) => row.rankInterval?.[0] ?? null },
    { header: 'Rank, 90 % of draws, worst', value: (row) => row.rankInterval?.[1] ?? null },
    { header: 'Probability of being best', value: (row) => row.probabilityBest },
    { header: 'Sample', value: (row) => row.sampleCode },
    { header: 'Sample name', value: (row) => row.sampleName },
    ...numberColumns(
      `Turnover frequency ${at}`,
      's⁻¹',
      1,
      (row) => row.turnoverFrequencyPerS,
      (row) => row.turnoverFrequencyInterval,
      level,
    ),
    ...numberColumns(
      `Rate ${at}`,
      'µmol g⁻¹ s⁻¹',
      1e3,
      (row) => row.rateMolPerKgS,
      (row) => row.rateInterval,
      level,
    ),
    ...numberColumns(
      'Apparent activation energy',
      'kJ mol⁻¹',
      1e-3,
      (row) => row.activationEnergyJPerMol,
      (row) => row.activationEnergyInterval,
      level,
    ),
    ...numberColumns(
      'ln A of the rate',
      'A in mol kg⁻¹ s⁻¹',
      1,
      (row) => row.lnPreExponential,
      (row) => row.lnPreExponentialInterval,
      level,
    ),
    {
      header: 'Temperature for the target conversion [°C]',
      value: (row) => (row.temperatureForConversionK === null ? null : row.temperatureForConversionK - 273.15),
    },
    ...species.map((name) => ({
      header: `Carbon selectivity to ${name}, mean of the points`,
      value: (row: RankingRow) => row.selectivity[name] ?? null,
    })),
    { header: 'Carbon out over carbon in', value: (row) => row.carbonBalance },
    { header: 'Loss of activity [% h⁻¹]', value: (row) => scaled(row.decayPerH, 100) },
    { header: 'Distinct temperatures', value: (row) => row.distinctTemperatures },
    {
      header: 'Lowest temperature [°C]',
      value: (row) => (row.lowestTemperatureK === null ? null : row.lowestTemperatureK - 273.15),
    },
    {
      header: 'Highest temperature [°C]',
      value: (row) => (row.highestTemperatureK === null ? null : row.highestTemperatureK - 273.15),
    },
    { header: 'Cautions', value: (row) => row.cautions.map((caution) => caution.sentence).join(' | ') },
    {
      header: 'Runs in the line',
      value: (row) =>
        row.runs
          .filter((run) => run.isIncluded)
          .map((run) => run.code)
          .join('; '),
    },
    {
      header: 'Runs left out',
      value: (row) =>
        row.runs
          .filter((run) => !run.isIncluded)
          .map((run) => `${run.code}: ${run.reason}`)
          .join(' | '),
    },
    { header: 'Decisions', value: decisionOf },
    { header: 'Provisional', value: (row) => (row.isProvisional ? 'yes' : 'no') },
    { header: 'Shortlisted', value: (row) => (row.isShortlisted ? 'yes' : 'no') },
    { header: 'Priority', value: (row) => row.priority },
    { header: 'Remark', value: (row) => row.remark },
    { header: 'Campaign', value: () => `${ranking.campaignCode} ${ranking.campaignName}` },
    { header: 'Method version', value: () => ranking.methodNumber },
    { header: 'Computed at', value: () => ranking.computedAt },
    { header: 'Engine', value: () => ranking.engineId },
  ]
}
