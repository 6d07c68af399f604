import { type Problem } from '../domain/intake'

/** A cell: text as in the file, or a number that a workbook stores as one. */
export type Cell = string | number

export interface Row {
  readonly cells: readonly Cell[]
  /** one-based line of the file or row of the sheet */
  readonly line: number
  /** the whole line where it is a comment, else null */
  readonly comment: string | null
}

/** Rows of one text file or one sheet before anybody knows what they mean. */
export interface RawTable {
  /** sheet name; empty for a text file */
  readonly name: string
  /** first rows, blank ones included as rows without cells */
  readonly sample: readonly Row[]
  /** a text row with fewer cells than the header is faulty; a sheet leaves out empty cells at the end of a row */
  readonly isPadded: boolean
  /** visits every row in order; false from the visitor stops */
  readonly forEachRow: (visit: (row: Row) => boolean) => Promise<readonly Problem[]>
}

export interface OpenedFile {
  readonly format: 'delimited-text' | 'workbook' | 'chromatography-netcdf'
  /** how the file is written, in words */
  readonly dialect: readonly string[]
  readonly encoding: string
  /** only delimited text: whether a file's numbers can be told apart by mark (a workbook stores them as numbers) */
  readonly tables: readonly RawTable[]
  readonly problems: readonly Problem[]
  /** whether the last line has its line end; a file cut off in the middle of a row has not */
  readonly endsWithLineBreak: boolean
}
