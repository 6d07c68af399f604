import { type ProblemInput } from '../../problem-list'

/** A workbook that is not read on: with the reason, for the list of problems. */
export class Refusal extends Error {
  constructor(readonly input: Omit<ProblemInput, 'severity'>) {
    super(input.sentence)
    this.name = 'Refusal'
  }
}
