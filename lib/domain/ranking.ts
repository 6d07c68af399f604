import { type ArrheniusFit } from '../analysis/reduction/run-reduction'
import { type Caution } from '../analysis/caution'
import { type Estimate } from '../analysis/estimate'
import { type Working } from '../analysis/working'
import { type RunDecision, type RunState } from './run'

export interface RankingRun {
  readonly runId: string
  readonly code: string
  readonly state: RunState
  readonly decision: RunDecision | null
  readonly isIncluded: boolean
  /** why it is not in the line; empty when it is */
  readonly reason: string
}

/** One sample in the ranking. Every number is an estimate in SI; the grid turns it into practical units. */
export interface RankingRow {
  readonly sampleId: string
  readonly sampleCode: string
  readonly sampleName: string
  readonly kind: 'catalyst' | 'blank'
  readonly runs: readonly RankingRun[]
  /** null where the sample cannot be ranked; the cautions say why */
  readonly rank: number | null
  readonly rankInterval: readonly [number, number] | null
  readonly probabilityBest: number | null
  readonly activationEnergyJPerMol: Estimate | null
  readonly activationEnergyInterval: readonly [number, number] | null
  readonly lnPreExponential: Estimate | null
  readonly lnPreExponentialInterval: readonly [number, number] | null
  /** at the method's reference temperature and feed composition */
  readonly rateMolPerKgS: Estimate | null
  readonly rateInterval: readonly [number, number] | null
  readonly turnoverFrequencyPerS: Estimate | null
  readonly turnoverFrequencyInterval: readonly [number, number] | null
  /** temperature at which the target conversion is reached at the run's own contact time; null outside the measured range */
  readonly temperatureForConversionK: Estimate | null
  readonly temperatureForConversionInterval: readonly [number, number] | null
  /** carbon selectivity at the target conversion, by species */
  readonly selectivity: Readonly<Record<string, Estimate>>
  readonly selectivityIntervals: Readonly<Record<string, readonly [number, number] | null>>
  /** carbon out over carbon in, mean of the runs in the line */
  readonly carbonBalance: Estimate | null
  readonly carbonBalanceInterval: readonly [number, number] | null
  /** first-order loss of activity on stream that returned holds show; below zero the bed became more active */
  readonly decayPerH: Estimate | null
  readonly decayInterval: readonly [number, number] | null
  /** by field name (`selectivity.CH4` for one species): why there is no number, or none behind ± */
  readonly cannotTell: Readonly<Record<string, string>>
  readonly distinctTemperatures: number
  readonly lowestTemperatureK: number | null
  readonly highestTemperatureK: number | null
  readonly cautions: readonly Caution[]
  readonly isProvisional: boolean
  readonly isShortlisted: boolean
  readonly priority: number | null
  readonly remark: string
  readonly version: number
  /** the sample's line as it is ranked: one slope for all its runs */
  readonly fit: ArrheniusFit | null
  /** each run's own line, where the sample has several in the ranking; empty where the sample's line is that of its one run */
  readonly runFits: readonly ArrheniusFit[]
  /** keyed by field name of this record, `selectivity.CH4` for one species */
  readonly workings: Readonly<Record<string, Working>>
}

export interface Ranking {
  readonly campaignId: string
  readonly campaignCode: string
  readonly campaignName: string
  readonly methodId: string
  readonly methodNumber: number
  readonly rankedBy: 'turnover-frequency' | 'rate'
  readonly referenceTemperatureK: number
  /** the method's own, where the one in use was moved by the viewer */
  readonly methodReferenceTemperatureK?: number
  /** conversion that `temperatureForConversionK` of the rows speaks of */
  readonly targetConversion?: number
  readonly confidenceLevel: number
  readonly draws: number
  readonly seed: number
  readonly engineId: string
  /** when these rows were computed; asked for again unchanged, they keep it */
  readonly computedAt: string
  readonly includesProvisional: boolean
  readonly rows: readonly RankingRow[]
  /** every hold of every shown run, for the ruler */
  readonly holdTemperaturesK: readonly number[]
  /** one sentence that says what the numbers mean */
  readonly summary: string
}

export interface RankingOptions {
  /** left out, the method's own */
  readonly referenceTemperatureK?: number
  /** runs that no lead has decided on yet are in the live ranking, marked so, unless this says no */
  readonly includeProvisional?: boolean
  /** an older version of the method, to look through */
  readonly methodNumber?: number
}
