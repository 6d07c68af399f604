import { numberText } from '../number-text'
import { type Hold } from './run-reduction'
import { type Exclusion, type InjectionTable } from './run-input'

export interface InjectionRules {
  readonly settlingTimeS: number
  readonly purgeInjections: number
}

/** What one injection is used for, before any number is made from it. */
export interface AssignedInjection {
  readonly index: number
  readonly use: 'point' | 'inlet' | 'left-out' | 'unassigned'
  /** the stretch it falls into; null between stretches */
  readonly hold: Hold | null
  readonly reason: string
}

/** An injection and an exclusion are the same instant within this time. */
const SAME_INSTANT_S = 0.5

/**
 * Which injection belongs to which hold, and which are left out, each with its reason.
 *
 * By time. Left out: what a person left out; the first injections after a change of conditions (still the old gas); those within the settling
 * time of a hold; those without a time. Injections outside every stretch stay listed as unassigned.
 * Source: common practice.
 *
 * @param injections - in time order, on the rig's clock [s since the epoch]
 * @param holds - holds and bypass stretches in time order [s since the epoch]
 * @param rules - settling time [s] and injections to pass over after a change [-]
 * @param exclusions - by persons [s since the epoch]
 * @returns one entry an injection, in the order of the table [-]
 */
export function assignInjections(
  injections: InjectionTable,
  holds: readonly Hold[],
  rules: InjectionRules,
  exclusions: readonly Exclusion[],
): AssignedInjection[] {
  const stretches = [...holds].sort((a, b) => a.startS - b.startS)
  const assigned: AssignedInjection[] = []
  // injections seen since the end of the stretch before, for each stretch
  const passed = new Map<Hold, number>()
  for (let index = 0; index < injections.timeS.length; index++) {
    const time = injections.timeS[index] ?? Number.NaN
    if (!Number.isFinite(time)) {
      assigned.push({ index, use: 'unassigned', hold: null, reason: 'it has no time' })
      continue
    }
    const hold = stretches.find((stretch) => time >= stretch.startS && time <= stretch.endS) ?? null
    const coming = hold ?? stretches.find((stretch) => stretch.startS > time) ?? null
    let order = 0
    if (coming !== null) {
      order = (passed.get(coming) ?? 0) + 1
      passed.set(coming, order)
    }
    const exclusion = exclusions.find(
      (entry) => entry.kind === 'injection' && Math.abs(entry.atS - time) <= SAME_INSTANT_S,
    )
    if (hold === null) {
      assigned.push({
        index,
        use: 'unassigned',
        hold: null,
        reason: 'taken between two holds, while conditions changed',
      })
    } else if (exclusion !== undefined) {
      assigned.push({ index, use: 'left-out', hold, reason: `left out by ${exclusion.by}: ${exclusion.reason}` })
    } else if (order <= rules.purgeInjections) {
      assigned.push({
        index,
        use: 'left-out',
        hold,
        reason: 'first after a change of conditions: the line still held the old gas',
      })
    } else if (time - hold.startS < rules.settlingTimeS) {
      assigned.push({
        index,
        use: 'left-out',
        hold,
        reason: `${numberText((time - hold.startS) / 60, 2)} min into the hold, within the settling time of ${numberText(rules.settlingTimeS / 60, 2)} min`,
      })
    } else {
      assigned.push({ index, use: hold.kind === 'bypass' ? 'inlet' : 'point', hold, reason: '' })
    }
  }
  return assigned
}
