import { type Estimate, type SharedSource } from '../estimate'
import { type Hold } from './run-reduction'
import { type RigLog, type Species } from './run-input'

/** What the rig's log says about one hold, averaged over its settled part. */
export interface HoldConditions {
  readonly temperatureK: Estimate
  readonly inletPressurePa: number | null
  readonly meanPressurePa: number | null
  readonly flowMolPerS: Readonly<Record<Species, number>>
  readonly totalFlowMolPerS: number
  readonly rows: number
  readonly firstRow: number | null
  readonly lastRow: number | null
}

/** Neighbouring rows are not independent: the scatter of the mean comes from the means of this many blocks. */
const BLOCKS = 10

interface Mean {
  readonly value: number
  readonly standardError: number | null
  readonly count: number
}

function meanOf(values: Float64Array, rows: readonly number[]): Mean {
  const seen = new Float64Array(rows.length)
  let count = 0
  for (const row of rows) {
    const value = values[row] ?? Number.NaN
    if (Number.isFinite(value)) seen[count++] = value
  }
  if (count === 0) return { value: Number.NaN, standardError: null, count }
  const first = seen[0] ?? 0
  let total = 0
  for (let i = 0; i < count; i++) total += (seen[i] ?? 0) - first
  const mean = first + total / count
  if (count < 2 * BLOCKS) return { value: mean, standardError: null, count }
  let squares = 0
  for (let block = 0; block < BLOCKS; block++) {
    const from = Math.floor((block * count) / BLOCKS)
    const to = Math.floor(((block + 1) * count) / BLOCKS)
    let sum = 0
    for (let i = from; i < to; i++) sum += (seen[i] ?? 0) - mean
    const deviation = sum / (to - from)
    squares += deviation * deviation
  }
  return { value: mean, standardError: Math.sqrt(squares / (BLOCKS - 1) / BLOCKS), count }
}

/**
 * Mean bed temperature, pressure and flows of one hold.
 *
 * Means over the rows after the settling time; the temperature's own uncertainty is the standard error of ten block means, its shared one that of
 * the thermocouple. The pressure is the mean of inlet and outlet where both are logged.
 * Source: common practice; block means: H. Flyvbjerg, H. G. Petersen, J. Chem. Phys. 91 (1989) 461, doi:10.1063/1.457480.
 *
 * @param log - the rig's log in time order [SI]
 * @param hold - window [s since the epoch]
 * @param settlingTimeS - left out at its start; taken as zero where nothing would remain [s]
 * @param thermocouple - shared source of the temperature [K]
 * @returns the means; nine degrees of freedom for the temperature [K; Pa; mol s-1]
 */
export function averageConditions(
  log: RigLog,
  hold: Hold,
  settlingTimeS: number,
  thermocouple: SharedSource | null,
): HoldConditions {
  const start = hold.endS - hold.startS > settlingTimeS ? hold.startS + settlingTimeS : hold.startS
  const rows: number[] = []
  for (let i = 0; i < log.timeS.length; i++) {
    const time = log.timeS[i] ?? Number.NaN
    if (time >= start && time <= hold.endS) rows.push(i)
  }
  const bed = meanOf(log.bedTemperatureK, rows)
  const inlet = log.inletPressurePa === null ? null : meanOf(log.inletPressurePa, rows)
  const outlet = log.outletPressurePa === null ? null : meanOf(log.outletPressurePa, rows)
  const pressures = [inlet, outlet].flatMap((mean) => (mean !== null && mean.count > 0 ? [mean.value] : []))
  let pressureSum = 0
  for (const pressure of pressures) pressureSum += pressure
  const flowMolPerS: Record<Species, number> = {}
  let totalFlowMolPerS = 0
  for (const species of Object.keys(log.flowMolPerS).sort()) {
    const flow = meanOf(log.flowMolPerS[species] ?? new Float64Array(), rows)
    if (flow.count === 0) continue
    flowMolPerS[species] = flow.value
    totalFlowMolPerS += flow.value
  }
  const sourceRow = (row: number | undefined): number | null => {
    const number = row === undefined ? Number.NaN : (log.sourceRow[row] ?? Number.NaN)
    return Number.isFinite(number) ? number : null
  }
  return {
    temperatureK: {
      value: bed.value,
      randomStandardUncertainty: bed.standardError,
      degreesOfFreedom: bed.standardError === null ? null : BLOCKS - 1,
      sharedEffects: thermocouple === null ? {} : { [thermocouple.id]: thermocouple.standardUncertainty },
    },
    inletPressurePa: inlet !== null && inlet.count > 0 ? inlet.value : null,
    meanPressurePa: pressures.length > 0 ? pressureSum / pressures.length : null,
    flowMolPerS,
    totalFlowMolPerS,
    rows: rows.length,
    firstRow: sourceRow(rows[0]),
    lastRow: sourceRow(rows[rows.length - 1]),
  }
}
