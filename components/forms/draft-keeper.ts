export type DraftState =
  | { readonly kind: 'untouched' }
  | { readonly kind: 'changed' }
  | { readonly kind: 'saved'; readonly at: Date }
  | { readonly kind: 'unreachable' }
  | { readonly kind: 'signed-out' }
  | { readonly kind: 'refused'; readonly sentence: string }

const QUIET_MS = 700
const RETRY_MS = [2_000, 5_000, 10_000, 30_000] as const

/**
 * Sends what is being typed once the hand rests. What could not be sent stays in memory and in the tab's own store, and is tried again
 * until it arrives; only the newest text counts.
 */
export class DraftKeeper {
  private content: unknown = null
  private newest = ''
  private arrived = ''
  private timer: ReturnType<typeof setTimeout> | null = null
  private tries = 0
  private isOver = false

  constructor(
    private readonly form: string,
    private readonly tell: (state: DraftState) => void,
  ) {}

  /** Takes what stands in the form now. */
  take(content: unknown): void {
    const text = JSON.stringify(content)
    if (this.isOver || text === this.newest) return
    this.content = content
    this.newest = text
    keepLocal(this.form, text)
    this.tell({ kind: 'changed' })
    this.wait(QUIET_MS)
  }

  get isWaiting(): boolean {
    return !this.isOver && this.newest !== this.arrived
  }

  /** Sends at once. True when the server has it. */
  async send(isLeaving = false): Promise<boolean> {
    this.still()
    if (this.isOver) return false
    const text = this.newest
    if (text === this.arrived) return true
    try {
      const answer = await fetch(`/api/v1/drafts/${this.form}`, {
        method: 'PUT',
        headers: { 'Content-Type': 'application/json' },
        body: JSON.stringify({ content: this.content }),
        keepalive: isLeaving,
      })
      if (answer.status === 401) return this.again({ kind: 'signed-out' })
      if (answer.status >= 500 || answer.status === 429) return this.again({ kind: 'unreachable' })
      if (!answer.ok) {
        this.tell({ kind: 'refused', sentence: sentenceOf(await answer.json().catch(() => null), answer.status) })
        return false
      }
      this.tries = 0
      this.arrived = text
      if (this.newest === text) {
        forgetLocal(this.form)
        this.tell({ kind: 'saved', at: new Date() })
      }
      return true
    } catch (error) {
      // fetch answers an unreachable server with a TypeError
      if (error instanceof TypeError) return this.again({ kind: 'unreachable' })
      throw error
    }
  }

  /** The form was sent: nothing is to be kept any more. */
  stop(): void {
    this.isOver = true
    this.still()
    forgetLocal(this.form)
  }

  /** Sending the form failed: keep on. */
  goOn(): void {
    this.isOver = false
    keepLocal(this.form, this.newest)
  }

  /** No timer outlives the page. */
  still(): void {
    if (this.timer !== null) clearTimeout(this.timer)
    this.timer = null
  }

  private again(state: DraftState): false {
    this.tell(state)
    this.wait(RETRY_MS[Math.min(this.tries, RETRY_MS.length - 1)] ?? 30_000)
    this.tries += 1
    return false
  }

  private wait(ms: number): void {
    this.still()
    this.timer = setTimeout(() => void this.send(), ms)
  }
}

function sentenceOf(problem: unknown, status: number): string {
  return typeof problem === 'object' && problem !== null && 'detail' in problem && typeof problem.detail === 'string'
    ? problem.detail
    : `The server answered ${String(status)}.`
}

const keyOf = (form: string) => `draft ${form}`

function keepLocal(form: string, text: string): void {
  try {
    if (text !== '') sessionStorage.setItem(keyOf(form), text)
  } catch (error) {
    // a full or forbidden store: memory still has it
    if (!(error instanceof DOMException)) throw error
  }
}

function forgetLocal(form: string): void {
  try {
    sessionStorage.removeItem(keyOf(form))
  } catch (error) {
    if (!(error instanceof DOMException)) throw error
  }
}

/** What this tab could not send before it was loaded again, or null. */
export function unsentDraft(form: string): unknown {
  try {
    const text = sessionStorage.getItem(keyOf(form))
    return text === null ? null : JSON.parse(text)
  } catch (error) {
    if (error instanceof DOMException || error instanceof SyntaxError) return null
    throw error
  }
}
