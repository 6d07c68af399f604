import { z } from 'zod'
import { idSchema, speciesSchema } from './text'

/** What a column can mean. */
export const columnMeanings = [
  'ignore',
  'time',
  'date',
  'time-of-day',
  'elapsed-time',
  'set-temperature',
  'bed-temperature',
  'wall-temperature',
  'inlet-pressure',
  'outlet-pressure',
  'flow',
  'valve',
  'injection-number',
  'species-name',
  'area',
  'mole-fraction',
  'retention-time',
  'height',
  'text',
] as const
export type ColumnMeaning = (typeof columnMeanings)[number]

export const mappedColumnSchema = z.strictObject({
  /** header as in the file, units included */
  header: z.string().max(300),
  index: z.int().gte(0).lt(1_024),
  meaning: z.enum(columnMeanings),
  /** alias as in the file; the exact table of lib/analysis/units reads it */
  unit: z.string().max(60).default(''),
  species: speciesSchema.nullable().default(null),
  /** flows: the state their volume is stated at */
  referenceTemperatureK: z.number().gt(200).lt(400).nullable().default(null),
  referencePressurePa: z.number().gt(50_000).lt(200_000).nullable().default(null),
  /** pressures: what the gauge is open to; absolute when null */
  pressureKind: z.enum(['absolute', 'gauge']).nullable().default(null),
  /** rig with several channels: which one this column belongs to */
  channel: z.string().max(40).nullable().default(null),
})
export type MappedColumn = z.infer<typeof mappedColumnSchema>

export const columnMapSpecificationSchema = z.strictObject({
  kind: z.enum(['rig-log', 'analyser', 'attachment']),
  /** long tables name the species in a column, wide ones in the headers */
  shape: z.enum(['wide', 'long']).default('wide'),
  /** workbook sheet name; empty for the only table */
  sheet: z.string().max(100).default(''),
  columns: z.array(mappedColumnSchema).max(512),
  decimalMark: z.enum(['.', ',']),
  dateOrder: z.enum(['year-first', 'day-first', 'month-first']).nullable().default(null),
  /** IANA zone of the file's clock; instants with their own offset do not use it */
  timeZone: z.string().max(60),
  /** start of elapsed time, with offset, when the file does not say it itself */
  elapsedStart: z.string().max(40).nullable().default(null),
  /** words of the valve column that mean the gas goes round the reactor */
  bypassWords: z.array(z.string().max(40)).max(20).default(['bypass']),
  /** composition columns: whether water was removed before the analyser */
  basis: z.enum(['dry', 'wet']).nullable().default(null),
  barometerPa: z.number().gte(50_000).lte(120_000).nullable().default(null),
  /** which of the two a local time is that the clock shows twice, where the order of the rows does not tell */
  ambiguousHour: z.enum(['earlier', 'later']).nullable().default(null),
})
export type ColumnMapSpecification = z.infer<typeof columnMapSpecificationSchema>

export interface ColumnMap {
  readonly id: string
  readonly rigId: string
  readonly instrument: string
  readonly number: number
  readonly fingerprint: string
  readonly specification: ColumnMapSpecification
  readonly createdBy: string
  readonly createdAt: string
}

/** The next version of the map of one instrument on one rig. */
export const newColumnMapSchema = z.strictObject({
  rigId: idSchema,
  instrument: z.string().trim().min(1).max(100),
  fingerprint: z.string().min(1).max(64),
  specification: columnMapSpecificationSchema,
  sampleFileSha256: z
    .string()
    .regex(/^[0-9a-f]{64}$/)
    .nullable()
    .default(null),
})
export type NewColumnMap = z.infer<typeof newColumnMapSchema>
