import { median } from '../statistics/median'
import { type Hold } from './run-reduction'
import { type HoldEdit, type RigLog } from './run-input'

export interface HoldRules {
  readonly holdToleranceK: number
  readonly minimumHoldS: number
}

interface Stretch {
  readonly isBypass: boolean
  readonly first: number
  readonly last: number
}

/** A species' flow may wander by this part of itself, or of the total, within a hold. */
const FLOW_TOLERANCE = 0.05
const FLOW_TOLERANCE_OF_TOTAL = 0.01
/** Rows off the conditions before a hold is taken as ended: a single bad reading does not cut it. */
const ROWS_TO_END = 3
const SHORTEST_BYPASS_S = 300

const WINDOW_ROWS = 7

// Median over seven rows, so that the noise of a bed thermocouple does not pass for a change.
function smooth(values: Float64Array): Float64Array {
  const result = new Float64Array(values.length)
  const window = new Float64Array(WINDOW_ROWS)
  const reach = (WINDOW_ROWS - 1) / 2
  for (let i = 0; i < values.length; i++) {
    let count = 0
    for (let j = Math.max(0, i - reach); j <= Math.min(values.length - 1, i + reach); j++) {
      const value = values[j] ?? Number.NaN
      if (!Number.isFinite(value)) continue
      let place = count++
      for (; place > 0 && (window[place - 1] ?? 0) > value; place--) window[place] = window[place - 1] ?? 0
      window[place] = value
    }
    const half = Math.floor(count / 2)
    const upper = count === 0 ? Number.NaN : (window[half] ?? Number.NaN)
    result[i] = count % 2 === 1 ? upper : ((window[half - 1] ?? Number.NaN) + upper) / 2
  }
  return result
}

interface Conditions {
  readonly temperature: Float64Array
  readonly bed: Float64Array
  readonly species: readonly string[]
  readonly flows: readonly Float64Array[]
}

function conditionsOf(log: RigLog): Conditions {
  const bed = smooth(log.bedTemperatureK)
  const species = Object.keys(log.flowMolPerS).sort()
  return {
    temperature: log.setTemperatureK ?? bed,
    bed,
    species,
    flows: species.map((name) => log.flowMolPerS[name] ?? new Float64Array()),
  }
}

// Rows that run together: through the bypass, or through the reactor at one set temperature and one feed
function cutIntoStretches(log: RigLog, conditions: Conditions, toleranceK: number): Stretch[] {
  const count = log.timeS.length
  const stretches: Stretch[] = []
  const bypassAt = (i: number): boolean => (log.isBypass?.[i] ?? 0) > 0.5
  let start = 0
  while (start < count) {
    const isBypass = bypassAt(start)
    const reference = {
      temperature: conditions.temperature[start] ?? Number.NaN,
      flows: conditions.flows.map((flow) => flow[start] ?? Number.NaN),
    }
    let total = 0
    for (const flow of reference.flows) if (Number.isFinite(flow)) total += flow
    const room = reference.flows.map((wanted) =>
      Math.max(FLOW_TOLERANCE * Math.abs(wanted), FLOW_TOLERANCE_OF_TOTAL * total),
    )
    const isOff = (i: number): boolean => {
      if (!isBypass) {
        const temperature = conditions.temperature[i] ?? Number.NaN
        if (Number.isFinite(temperature) && !(Math.abs(temperature - reference.temperature) <= toleranceK)) return true
      }
      for (let s = 0; s < conditions.flows.length; s++) {
        const value = conditions.flows[s]?.[i] ?? Number.NaN
        if (!Number.isFinite(value)) continue
        if (!(Math.abs(value - (reference.flows[s] ?? Number.NaN)) <= (room[s] ?? Number.NaN))) return true
      }
      return false
    }
    let last = start
    let off = 0
    let next = start + 1
    for (; next < count; next++) {
      if (bypassAt(next) !== isBypass) break
      if (isOff(next)) {
        off++
        if (off >= ROWS_TO_END) break
      } else {
        off = 0
        last = next
      }
    }
    stretches.push({ isBypass, first: start, last })
    start = last + 1
  }
  return stretches
}

// The stretch without the rows in which the set-point or the bed is still on its way
function trimToReached(stretch: Stretch, conditions: Conditions, toleranceK: number): Stretch {
  const wanted = median(conditions.temperature.subarray(stretch.first, stretch.last + 1))
  const middle = Math.floor((stretch.first + stretch.last) / 2)
  const bedWanted = median(conditions.bed.subarray(middle, stretch.last + 1))
  const isReached = (i: number): boolean =>
    Math.abs((conditions.temperature[i] ?? Number.NaN) - wanted) <= toleranceK / 3 &&
    !(Math.abs((conditions.bed[i] ?? bedWanted) - bedWanted) > toleranceK)
  let { first, last } = stretch
  while (first < last && !isReached(first)) first++
  while (last > first && !isReached(last)) last--
  return { ...stretch, first, last }
}

function meanFlows(conditions: Conditions, stretch: Stretch): number[] {
  return conditions.flows.map((flow) => median(flow.subarray(stretch.first, stretch.last + 1)))
}

function sameFlows(a: readonly number[], b: readonly number[]): boolean {
  let total = 0
  for (const flow of a) if (Number.isFinite(flow)) total += flow
  return a.every((flow, i) => {
    const other = b[i] ?? Number.NaN
    if (!Number.isFinite(flow) && !Number.isFinite(other)) return true
    return Math.abs(flow - other) <= Math.max(FLOW_TOLERANCE * Math.abs(flow), FLOW_TOLERANCE_OF_TOTAL * total)
  })
}

/**
 * Times at constant set conditions, and the stretches through the bypass, found in a rig's log.
 *
 * A stretch ends where the valve turns, or where for three rows on end the set temperature is more than the tolerance, or the flow of a gas more
 * than 5 % of itself and 1 % of the total, from where the stretch began. Rows in which set-point or bed (median of seven rows) are not there yet
 * are cut off. Without a set-point the bed temperature serves. Through the bypass the temperature does not matter. A hold whose conditions an
 * earlier one had, with another between them, returns to it.
 * Source: common practice.
 *
 * @param log - the rig's log in time order [SI]
 * @param rules - tolerance [K] and shortest hold [s]
 * @param edits - windows moved by a person, keyed by the start as found [s since the epoch]
 * @returns holds and bypass stretches in time order; times in seconds since the epoch [s; K]
 */
export function findHolds(log: RigLog, rules: HoldRules, edits: readonly HoldEdit[]): Hold[] {
  const conditions = conditionsOf(log)
  const time = (i: number): number => log.timeS[i] ?? Number.NaN
  const holds: Hold[] = []
  const flowsOf: number[][] = []
  let reactorCount = 0
  let bypassCount = 0
  for (const raw of cutIntoStretches(log, conditions, rules.holdToleranceK)) {
    const stretch = raw.isBypass ? raw : trimToReached(raw, conditions, rules.holdToleranceK)
    const foundStartS = time(stretch.first)
    const foundEndS = time(stretch.last)
    const shortest = raw.isBypass ? Math.min(SHORTEST_BYPASS_S, rules.minimumHoldS) : rules.minimumHoldS
    if (!(foundEndS - foundStartS >= shortest)) continue
    const setTemperatureK = median(conditions.temperature.subarray(stretch.first, stretch.last + 1))
    const flows = meanFlows(conditions, stretch)
    const edit = edits.find((entry) => Math.abs(entry.foundStartS - foundStartS) < 1)
    let returnsTo: number | null = null
    if (!raw.isBypass) {
      holds.forEach((earlier, i) => {
        const isSame =
          earlier.kind === 'reactor' &&
          Math.abs(earlier.setTemperatureK - setTemperatureK) <= rules.holdToleranceK &&
          sameFlows(flowsOf[i] ?? [], flows)
        // the one just before is the same hold cut in two, not a return
        if (isSame && returnsTo === null && earlier.number < reactorCount) returnsTo = earlier.number
      })
    }
    holds.push({
      number: raw.isBypass ? ++bypassCount : ++reactorCount,
      kind: raw.isBypass ? 'bypass' : 'reactor',
      foundStartS,
      startS: edit?.startS ?? foundStartS,
      endS: edit?.endS ?? foundEndS,
      setTemperatureK,
      returnsTo,
      isEdited: edit !== undefined && (edit.startS !== null || edit.endS !== null),
    })
    flowsOf.push(flows)
  }
  return holds
}
