import ln from '@stdlib/math-base-special-ln'
import { type InjectionTable, type RigLog, type Species } from './run-input'

export interface ClockOffsetProposal {
  /** to be added to the analyser's times so that they are the rig's [s] */
  readonly offsetS: number
  /** every offset between these fits as well [s] */
  readonly lowS: number
  readonly highS: number
  /** injections that agree with the valve at the proposed offset, and with the clocks as they are, of those compared */
  readonly agreeing: number
  readonly agreeingAsSet: number
  readonly compared: number
}

const LONGEST_OFFSET_S = 4 * 3_600
const FEWEST_INJECTIONS = 6
/** The two kinds of gas must differ by this factor, or nothing says which injection is which. */
const SMALLEST_CONTRAST = 3
/** Below the limit of detection counts as this part of the smallest signal seen. */
const CENSORED_PART = 0.1
const FEWEST_OF_A_KIND = 2
const MOST_COMPARED = 1_500

/**
 * Offset between the clocks of rig and analyser, from the turning of the bypass valve.
 *
 * Both are made two-valued: the valve as logged, and whether an injection has product in it (product area over the area of the base, on a logarithmic
 * scale, parted at the widest gap). Their cross-correlation, the number of injections that agree with
 * the valve at the shifted time, is taken at every shift where an injection passes a turn of the valve, so none is missed between steps of a grid. Of
 * the shifts that agree best the stretch nearest to the present offset is given, with its middle as the proposal: the valve cannot be timed better
 * than the spacing of the injections around its turns.
 * Source: common practice (cross-correlation of a by-pass step).
 *
 * @param log - times [s since the epoch] and the valve as logged [0 or 1]
 * @param injections - times by the analyser's own clock, line lag taken off [s since the epoch]; areas [counts]
 * @param products - species that the reactor makes and the feed has not [-]
 * @param base - peak that the others are divided by [-]
 * @param presentOffsetS - offset that is set now [s]
 * @returns the proposal; null where nothing can be told: no valve in the log, too few injections, or gas that does not differ [s]
 */
export function proposeClockOffset(
  log: Pick<RigLog, 'timeS' | 'isBypass'>,
  injections: InjectionTable,
  products: readonly Species[],
  base: Species,
  presentOffsetS: number,
): ClockOffsetProposal | null {
  const turns = valveTurns(log)
  if (turns === null || turns.length === 0) return null
  const first = log.timeS[0] ?? Number.NaN
  const last = log.timeS[log.timeS.length - 1] ?? Number.NaN
  const signal = productSignal(injections, products, base)
  const threshold = partingLevel(signal.map(({ level }) => level))
  if (threshold === null) return null
  // of a signal every second, more than this many say no more
  const step = Math.ceil(signal.length / MOST_COMPARED)
  const used = signal
    .filter((_one, index) => index % step === 0)
    .map(({ timeS, level }) => ({ timeS, hasProduct: level > threshold }))
  const startsBypassed = (log.isBypass?.[firstKnown(log)] ?? 0) > 0.5
  const agreeingAt = (offsetS: number): { agreeing: number; compared: number } => {
    let agreeing = 0
    let compared = 0
    for (const { timeS, hasProduct } of used) {
      const time = timeS + offsetS
      if (time < first || time > last) continue
      let passed = 0
      while (passed < turns.length && (turns[passed] ?? Number.POSITIVE_INFINITY) <= time) passed++
      const isBypass = passed % 2 === 0 ? startsBypassed : !startsBypassed
      compared++
      if (isBypass !== hasProduct) agreeing++
    }
    return { agreeing, compared }
  }

  // the count changes only where an injection meets a turn of the valve or an end of the log
  const edges = new Set<number>([-LONGEST_OFFSET_S, LONGEST_OFFSET_S])
  for (const { timeS } of used)
    for (const mark of [first, last, ...turns]) {
      const offset = mark - timeS
      if (Math.abs(offset) < LONGEST_OFFSET_S) edges.add(offset)
    }
  const sorted = [...edges].sort((a, b) => a - b)
  const asSet = agreeingAt(presentOffsetS)
  const distance = (low: number, high: number): number =>
    presentOffsetS < low ? low - presentOffsetS : presentOffsetS > high ? presentOffsetS - high : 0
  let best = null as ClockOffsetProposal | null
  for (let i = 1; i < sorted.length; i++) {
    const lowS = sorted[i - 1] ?? 0
    const highS = sorted[i] ?? 0
    const { agreeing, compared } = agreeingAt((lowS + highS) / 2)
    // a shift that pushes injections out of the log is no agreement
    if (compared < FEWEST_INJECTIONS || compared < 0.8 * used.length) continue
    if (best !== null && agreeing === best.agreeing && lowS === best.highS) {
      best = { ...best, highS, offsetS: (best.lowS + highS) / 2 }
      continue
    }
    const isBetter =
      best === null ||
      agreeing > best.agreeing ||
      (agreeing === best.agreeing && distance(lowS, highS) < distance(best.lowS, best.highS))
    if (isBetter) best = { offsetS: (lowS + highS) / 2, lowS, highS, agreeing, agreeingAsSet: asSet.agreeing, compared }
  }
  return best
}

const firstKnown = (log: Pick<RigLog, 'isBypass'>): number =>
  Math.max(0, log.isBypass?.findIndex((value) => Number.isFinite(value)) ?? 0)

// Times of the turns of the valve: the middle between the last row before and the first row after
function valveTurns(log: Pick<RigLog, 'timeS' | 'isBypass'>): number[] | null {
  if (log.isBypass === null) return null
  const turns: number[] = []
  let before = Number.NaN
  let beforeS = Number.NaN
  for (let i = 0; i < log.timeS.length; i++) {
    const now = log.isBypass[i] ?? Number.NaN
    if (!Number.isFinite(now)) continue
    const timeS = log.timeS[i] ?? Number.NaN
    if (Number.isFinite(before) && now > 0.5 !== before > 0.5) turns.push((beforeS + timeS) / 2)
    before = now
    beforeS = timeS
  }
  return turns
}

function productSignal(
  injections: InjectionTable,
  products: readonly Species[],
  base: Species,
): { readonly timeS: number; readonly level: number }[] {
  const sums = Array.from(injections.timeS, (timeS, index) => {
    const divisor = injections.quantity === 'area' ? (injections.response[base]?.[index] ?? Number.NaN) : 1
    let sum = 0
    for (const species of products) {
      const value = injections.response[species]?.[index] ?? Number.NaN
      const isSeen = Number.isFinite(value) && value > 0 && (injections.isCensored[species]?.[index] ?? 0) < 0.5
      if (isSeen) sum += value
    }
    return { timeS, ratio: sum / divisor }
  }).filter(({ timeS, ratio }) => Number.isFinite(timeS) && Number.isFinite(ratio))
  const seen = sums.filter(({ ratio }) => ratio > 0).map(({ ratio }) => ratio)
  const floor = CENSORED_PART * Math.min(...seen)
  return sums.map(({ timeS, ratio }) => ({ timeS, level: ln(ratio > 0 ? ratio : floor) }))
}

// The middle of the widest gap between the values, a few left on either side; null where no gap is wide enough to tell two gases apart
function partingLevel(levels: readonly number[]): number | null {
  const sorted = levels.filter((level) => Number.isFinite(level)).sort((a, b) => a - b)
  if (sorted.length < FEWEST_INJECTIONS) return null
  let widest = { gap: 0, level: Number.NaN }
  for (let i = FEWEST_OF_A_KIND; i <= sorted.length - FEWEST_OF_A_KIND; i++) {
    const [below, above] = [sorted[i - 1] ?? Number.NaN, sorted[i] ?? Number.NaN]
    if (above - below > widest.gap) widest = { gap: above - below, level: (below + above) / 2 }
  }
  return widest.gap >= ln(SMALLEST_CONTRAST) ? widest.level : null
}
