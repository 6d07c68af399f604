import { type Problem, type Question } from './intake'

/** A channel as a small picture shows it: thinned, peaks kept; null where a value is missing. */
export interface PreviewChannel {
  readonly name: string
  readonly unit: string
  readonly timeS: readonly number[]
  readonly values: readonly (number | null)[]
  readonly minimum: number | null
  readonly maximum: number | null
  readonly missingCount: number
}

/** What a confirmation would take in. */
export interface UploadPreview {
  readonly rowCount: number
  readonly problems: readonly Problem[]
  readonly questions: readonly Question[]
  readonly channels: readonly PreviewChannel[]
}
