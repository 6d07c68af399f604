import { z } from 'zod'
import { type MethodSettings } from './method'
import { type Ranking } from './ranking'
import { type RunDecision } from './run'
import { reasonSchema } from './text'

/** What a published edition rests on, run by run: the decision and the bytes. */
export interface EditionRun {
  readonly runId: string
  readonly runCode: string
  readonly sampleCode: string
  /** name of the reduction, made of everything that it rests on */
  readonly reductionKey: string
  readonly decision: RunDecision
  readonly decisionReason: string
  readonly files: readonly { readonly fileName: string; readonly sha256: string; readonly byteCount: number }[]
}

/** All that an edition says. Its canonical text is hashed and never changes. */
export interface EditionContent {
  readonly format: 1
  readonly laboratory: string
  readonly methodSettings: MethodSettings
  readonly ranking: Omit<Ranking, 'computedAt'>
  readonly runs: readonly EditionRun[]
}

export interface EditionSummary {
  readonly id: string
  readonly campaignId: string
  readonly number: number
  readonly methodNumber: number
  readonly engineId: string
  /** SHA-256 of the canonical text of the content */
  readonly contentSha256: string
  /** what the lead stated with the signature */
  readonly statement: string
  readonly publishedByName: string
  readonly publishedAt: string
  readonly withdrawnAt: string | null
  readonly withdrawnByName: string | null
  readonly withdrawnReason: string | null
  readonly runCount: number
}

export interface Edition extends EditionSummary {
  readonly content: EditionContent
  /** the content still has the hash that it was published under */
  readonly isIntact: boolean
}

/** What a publication would freeze now, for the lead to look at first. */
export interface EditionProposal {
  readonly number: number
  readonly contentSha256: string
  readonly ranking: Omit<Ranking, 'computedAt'>
  readonly runs: readonly EditionRun[]
  /** runs that would not be in it, each with why */
  readonly leftOut: readonly { readonly runCode: string; readonly sampleCode: string; readonly reason: string }[]
  /** why nothing can be published now; empty when it can */
  readonly refusal: string
}

export const publicationSchema = z.strictObject({
  /** hash of the proposal that was looked at: if anything moved since, nothing is published */
  contentSha256: z.string().regex(/^[0-9a-f]{64}$/),
  statement: z
    .string()
    .trim()
    .min(10, 'Say in a sentence what your signature means.')
    .max(1_000, 'A statement has at most 1,000 characters.'),
  password: z.string().min(1, 'Type your password: it signs the edition.').max(2_000),
})
export type Publication = z.infer<typeof publicationSchema>

export const editionWithdrawalSchema = z.strictObject({ reason: reasonSchema })
