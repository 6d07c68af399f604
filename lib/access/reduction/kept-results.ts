import 'server-only'

/** How many results stay in memory; a run's is some tens of kilobytes. */
const MOST = 2_000

/**
 * Results by content key, newest use last, and the ones being computed: two people who ask at once get one computation. A key stands for
 * all that went in, so an entry can never be out of date, only unused.
 */
export class KeptResults<T> {
  readonly #kept = new Map<string, T>()
  readonly #underway = new Map<string, Promise<T>>()

  get(key: string): T | undefined {
    const found = this.#kept.get(key)
    if (found !== undefined) {
      this.#kept.delete(key)
      this.#kept.set(key, found)
    }
    return found
  }

  set(key: string, value: T): void {
    this.#kept.set(key, value)
    for (const oldest of this.#kept.keys()) {
      if (this.#kept.size <= MOST) break
      this.#kept.delete(oldest)
    }
  }

  async getOrCompute(key: string, compute: () => Promise<T>): Promise<T> {
    const found = this.get(key)
    if (found !== undefined) return found
    const running = this.#underway.get(key)
    if (running !== undefined) return running
    const started = compute()
      .then((value) => {
        this.set(key, value)
        return value
      })
      .finally(() => this.#underway.delete(key))
    this.#underway.set(key, started)
    return started
  }
}
