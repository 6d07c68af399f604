import { type Problem } from '../domain/intake'
import { LIMITS } from './limits'

export interface ProblemInput {
  readonly code: Problem['code']
  readonly severity: Problem['severity']
  readonly line?: number | null
  readonly column?: string | null
  readonly found?: string
  readonly expected?: string
  readonly sentence: string
}

/** A problem with every text cut to what the record holds. */
export function problem(input: ProblemInput): Problem {
  return {
    code: input.code,
    severity: input.severity,
    line: input.line ?? null,
    column: input.column === undefined || input.column === null ? null : clip(input.column, 300),
    found: clip(input.found ?? '', 200),
    expected: clip(input.expected ?? '', 300),
    sentence: clip(input.sentence, 600),
  }
}

function clip(text: string, length: number): string {
  const shown = text.replace(/[\u0000-\u001f\u007f]/g, ' ')
  return shown.length <= length ? shown : `${shown.slice(0, length - 1)}…`
}

/** Collects faults in order; past the limit they are counted and said once, so that a broken file of a million rows stays readable. */
export class ProblemList {
  readonly #listed: Problem[] = []
  readonly #unlisted = new Map<Problem['code'], number>()

  add(input: ProblemInput): void {
    if (this.#listed.length < LIMITS.listedProblems) this.#listed.push(problem(input))
    else this.#unlisted.set(input.code, (this.#unlisted.get(input.code) ?? 0) + 1)
  }

  addAll(problems: readonly Problem[]): void {
    for (const one of problems) this.add(one)
  }

  get isEmpty(): boolean {
    return this.#listed.length === 0
  }

  list(): Problem[] {
    const more = [...this.#unlisted].sort(([a], [b]) => (a < b ? -1 : 1))
    return [
      ...this.#listed,
      ...more.map(([code, count]) =>
        problem({
          code: 'limit-reached',
          severity: 'problem',
          found: `${String(count)} more of kind ${code}`,
          expected: `at most ${String(LIMITS.listedProblems)} listed one by one`,
          sentence: `${String(count)} further faults of the kind “${code}” are counted and not listed; mend the ones above and add the file again.`,
        }),
      ),
    ]
  }
}
