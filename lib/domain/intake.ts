import { z } from 'zod'
import { columnMapSpecificationSchema, type ColumnMapSpecification } from './column-map'

/** A fault in a file: what, where, and what was expected, so that it can be mended at the bench. All of them are listed, not the first. */
export const problemSchema = z.strictObject({
  code: z.enum([
    'unreadable',
    'empty-file',
    'too-large',
    'unsupported-format',
    'encoding',
    'ragged-row',
    'not-a-number',
    'bad-date',
    'time-goes-back',
    'duplicate-time',
    'missing-column',
    'unknown-unit',
    'unknown-species',
    'out-of-range',
    'repeated-header',
    'footer',
    'truncated',
    'duplicate-injection',
    'missing-cached-value',
    'limit-reached',
    'same-bytes',
  ]),
  severity: z.enum(['note', 'problem', 'fatal']),
  /** one-based line in the file or row in the sheet; null for the file as a whole */
  line: z.int().nullable(),
  column: z.string().max(300).nullable(),
  found: z.string().max(200),
  expected: z.string().max(300),
  sentence: z.string().max(600),
})
export type Problem = z.infer<typeof problemSchema>

/** What the file cannot settle and a person must: never guessed. */
export const questionSchema = z.strictObject({
  key: z.enum([
    'kind',
    'date-order',
    'time-zone',
    'elapsed-start',
    'flow-reference',
    'pressure-kind',
    'barometer',
    'basis',
    'response-convention',
    'decimal-mark',
    'ambiguous-hour',
  ]),
  sentence: z.string().max(400),
  choices: z.array(z.strictObject({ value: z.string().max(100), label: z.string().max(200) })).max(20),
  /** put first and explained, not taken without asking */
  proposal: z.string().max(100).nullable(),
})
export type Question = z.infer<typeof questionSchema>

/** What the rows and the preamble of one file leave open, apart from what its columns mean. */
export const fileFactsSchema = z.strictObject({
  isKindOpen: z.boolean(),
  isDateOrderOpen: z.boolean(),
  dateOrderProposal: z.enum(['day-first', 'month-first']),
  dateOrderReason: z.string().max(200),
  dateExample: z.string().max(100),
  isDecimalMarkOpen: z.boolean(),
  decimalExample: z.string().max(300),
  /** start of elapsed time as the preamble has it */
  statedStart: z.string().max(100).nullable(),
  needsStart: z.boolean(),
  /** every time carries its own offset, so no zone is needed */
  hasOffsets: z.boolean(),
  hasAmbiguousHour: z.boolean(),
})
export type FileFacts = z.infer<typeof fileFactsSchema>

export const detectionSchema = z.strictObject({
  format: z.enum(['delimited-text', 'workbook', 'chromatography-netcdf', 'jcamp-dx']),
  /** in words: `semicolon-separated, decimal comma, Windows-1252, header in row 5, units in row 6` */
  dialect: z.string().max(300),
  encoding: z.string().max(40),
  preamble: z.array(z.strictObject({ key: z.string().max(200), value: z.string().max(500) })).max(200),
  tableName: z.string().max(100),
  headers: z.array(z.string().max(300)).max(1_024),
  rowCount: z.int(),
  /** first data rows as text, as in the file */
  firstRows: z.array(z.array(z.string().max(200))).max(50),
  fingerprint: z.string().max(64),
  proposal: columnMapSpecificationSchema,
  /** id of the stored map that was recognised, when the instrument is known */
  columnMapId: z.string().nullable(),
  questions: z.array(questionSchema).max(20),
  facts: fileFactsSchema,
})
export type Detection = z.infer<typeof detectionSchema>

export const uploadStates = [
  'received',
  'reading',
  'needs-answers',
  'ready',
  'confirmed',
  'failed',
  'set-aside',
] as const
export type UploadState = (typeof uploadStates)[number]

export interface Upload {
  readonly id: string
  readonly campaignId: string
  readonly runId: string
  readonly sha256: string
  readonly byteCount: number
  readonly fileName: string
  readonly state: UploadState
  readonly kind: 'rig-log' | 'analyser' | 'attachment' | null
  readonly detection: Detection | null
  readonly problems: readonly Problem[]
  readonly failure: string | null
  readonly columnMapId: string | null
  readonly createdByName: string
  readonly createdAt: string
  readonly confirmedAt: string | null
  readonly version: number
}

/** One channel of a reading, SI, ready for the store. */
export interface ReadingChannel {
  /** for example `time`, `bedTemperatureK`, `flowMolPerS.CO2`, `area.CH4`, `isCensored.CH4`, `sourceRow` */
  readonly name: string
  readonly unit: string
  readonly values: Float64Array
}

/** Result of reading a file with a column map: all rows, all problems. Nothing of it is stored before a person confirms. */
export interface FileReading {
  readonly kind: 'rig-log' | 'injections'
  readonly rowCount: number
  readonly channels: readonly ReadingChannel[]
  readonly problems: readonly Problem[]
  readonly specification: ColumnMapSpecification
}

/** Bumped when a reader changes what it makes of the same bytes. */
export const PARSER_VERSION = '1'
