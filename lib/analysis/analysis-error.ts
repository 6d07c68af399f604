/** What a formula can be given that it cannot work with. */
export type AnalysisErrorCode =
  | 'too-few-points'
  | 'no-spread-in-temperature'
  | 'not-positive'
  | 'not-finite'
  | 'lengths-differ'
  | 'out-of-range'
  | 'collinear-design'
  | 'no-convergence'
  | 'missing-input'
  | 'unknown-unit'
  | 'unknown-species'
  | 'incompatible-units'
  | 'confounded-design'

/** Impossible input to a formula; the entry point turns it into a 422 answer with the code and the sentence. */
export class AnalysisError extends Error {
  constructor(
    readonly code: AnalysisErrorCode,
    message: string,
    readonly details: Readonly<Record<string, unknown>> = {},
  ) {
    super(message)
    this.name = 'AnalysisError'
  }
}
