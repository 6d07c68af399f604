import { type Problem } from '../../domain/intake'
import { problem, type ProblemInput } from '../problem-list'

/** A file that is not read on: with the reason, for the list of problems. */
export class Refusal extends Error {
  constructor(readonly input: Omit<ProblemInput, 'severity'>) {
    super(input.sentence)
    this.name = 'Refusal'
  }
}

/** What stopped the reading of a packed file, as the problem that is listed. */
export function refused(cause: unknown): Problem {
  if (cause instanceof Refusal) return problem({ ...cause.input, severity: 'fatal' })
  return problem({
    code: 'unreadable',
    severity: 'fatal',
    found: cause instanceof Error ? cause.message : String(cause),
    expected: 'a complete workbook',
    sentence: 'The workbook is damaged. Save it again and add the new file.',
  })
}
