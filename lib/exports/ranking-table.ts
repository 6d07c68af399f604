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
  /** a unit with a zero of its own: what is added to the value and the ends, and the unit of a difference */
  zero: { readonly offset: number; readonly differenceUnit: string } = { offset: 0, differenceUnit: unit },
): RankingColumn[] {
  const place = (value: number | undefined) => (value === undefined ? null : value * factor + zero.offset)
  const percent = `${Math.round(level * 1000) / 10} %`
  return [
    { header: `${name} [${unit}]`, value: (row) => place(estimate(row)?.value) },
    {
      header: `${name}, standard uncertainty [${zero.differenceUnit}]`,
      value: (row) => {
        const found = estimate(row)
        return found === null ? null : scaled(totalUncertainty(found)?.standardUncertainty, factor)
      },
    },
    { header: `${name}, ${percent} interval, low [${unit}]`, value: (row) => place(interval(row)?.[0]) },
    { header: `${name}, ${percent} interval, high [${unit}]`, value: (row) => place(interval(row)?.[1]) },
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
  const target =
    ranking.targetConversion === undefined
      ? 'the method’s target'
      : `${String(Number((ranking.targetConversion * 100).toPrecision(6)))} %`
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
    ...numberColumns(
      `Temperature for a conversion of ${target}`,
      '°C',
      1,
      (row) => row.temperatureForConversionK,
      (row) => row.temperatureForConversionInterval,
      level,
      { offset: -273.15, differenceUnit: 'K' },
    ),
    ...species.flatMap((name) =>
      numberColumns(
        `Carbon selectivity to ${name} at a conversion of ${target}`,
        'C-mol %',
        100,
        (row) => row.selectivity[name] ?? null,
        (row) => row.selectivityIntervals[name] ?? null,
        level,
      ),
    ),
    ...numberColumns(
      'Carbon out over carbon in',
      'mol mol⁻¹',
      1,
      (row) => row.carbonBalance,
      (row) => row.carbonBalanceInterval,
      level,
    ),
    ...numberColumns(
      'Loss of activity on stream',
      '% h⁻¹',
      100,
      (row) => row.decayPerH,
      (row) => row.decayInterval,
      level,
    ),
    {
      header: 'What cannot be told',
      value: (row) =>
        row.kind === 'blank'
          ? ''
          : Object.entries(row.cannotTell)
              .map(([name, why]) => `${name}: ${why}`)
              .join(' | '),
    },
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
