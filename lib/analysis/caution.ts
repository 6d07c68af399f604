/** How heavy a doubt weighs: a note informs, a caution asks for a look, a grave one keeps a run from counting until a lead decides. */
export type CautionSeverity = 'note' | 'caution' | 'grave'

/** A machine-made doubt about a number. The catalogue of codes stands in cautions.ts. */
export interface Caution {
  readonly code: string
  readonly severity: CautionSeverity
  /** short words for a tag, for example `line bends, p 0.0004` */
  readonly tag: string
  /** one full sentence with the numbers in it */
  readonly sentence: string
  readonly value: number | null
  readonly limit: number | null
  readonly unit: string
  /** published source of the threshold, or `common practice` */
  readonly source: string
  /** hold number the caution belongs to; null when it is about the whole run or sample */
  readonly holdNumber: number | null
}
