import { IANAZone } from 'luxon'

/**
 * Turns wall-clock times of one zone into instants. A wall clock shows some hours twice and some never; both are said, and neither is
 * settled here.
 */
export class LocalClock {
  readonly #zone: IANAZone
  /** offsets per quarter of an hour: every change of a zone falls on one */
  readonly #offsets = new Map<number, readonly number[]>()

  constructor(readonly timeZone: string) {
    if (!isTimeZone(timeZone)) throw new RangeError(`“${timeZone}” is not a time zone`)
    this.#zone = IANAZone.create(timeZone)
  }

  /** @returns instants [s since the epoch], earlier first: one for most times, two in the hour that comes twice, none in the hour that is left out */
  instants(localS: number): readonly number[] {
    const quarter = Math.floor(localS / 900)
    let offsets = this.#offsets.get(quarter)
    if (offsets === undefined) {
      offsets = this.#offsetsAt(quarter * 900)
      if (this.#offsets.size > 100_000) this.#offsets.clear()
      this.#offsets.set(quarter, offsets)
    }
    return offsets.map((minutes) => localS - minutes * 60)
  }

  #offsetsAt(localS: number): readonly number[] {
    const localMs = localS * 1_000
    const day = 86_400_000
    const before = this.#zone.offset(localMs - day)
    const after = this.#zone.offset(localMs + day)
    const here = (minutes: number) => this.#zone.offset(localMs - minutes * 60_000) === minutes
    const candidates = before === after ? [before] : [before, after]
    // the larger offset gives the earlier instant
    return candidates.filter(here).sort((a, b) => b - a)
  }
}

/** Whether the name is a zone the engine knows. */
export function isTimeZone(name: string): boolean {
  return name !== '' && name.length <= 60 && IANAZone.isValidZone(name)
}
