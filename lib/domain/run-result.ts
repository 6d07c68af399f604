import { type RunReduction } from '../analysis/reduction/run-reduction'
import { type Upload } from './intake'
import { type Run } from './run'

/** The rig's log as drawn: already thinned (at most 2,000 points, peaks kept); NaN is null here, as JSON has none. */
export interface RunTrace {
  /** seconds since the Unix epoch, UTC */
  readonly timeS: readonly number[]
  readonly bedTemperatureK: readonly (number | null)[]
  readonly setTemperatureK: readonly (number | null)[] | null
}

/** One run with its files, its log and what was made of them. */
export interface RunResult {
  readonly run: Run
  readonly uploads: readonly Upload[]
  /** null while something is missing; then `notReadyReason` says what */
  readonly reduction: RunReduction | null
  readonly notReadyReason: string
  /** null while no rig log is confirmed */
  readonly trace: RunTrace | null
}
