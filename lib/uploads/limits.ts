/** What a file may cost. Larger ones are refused with the limit in the sentence, never cut short in silence. */
export const LIMITS = {
  rowCount: 20_000_000,
  columnCount: 512,
  /** characters in one line or one record with line breaks inside quotes */
  recordLength: 65_536,
  /** characters in one cell */
  cellLength: 4_096,
  /** faults listed one by one; beyond it they are counted */
  listedProblems: 1_000,
  /** bytes from the start of a text file on which delimiter and layout are proposed; every row is then held against them */
  sniffBytes: 262_144,
  /** rows kept to find header, units and types of the columns */
  sampleRows: 400,
  /** rows shown as they stand in the file */
  firstRows: 20,
  preambleEntries: 200,
  workbook: {
    archiveBytes: 256 * 1024 * 1024,
    entryCount: 200,
    entryBytes: 256 * 1024 * 1024,
    totalBytes: 256 * 1024 * 1024,
    /** inflated size over packed size, for a part above a megabyte */
    ratio: 200,
    sharedStrings: 500_000,
    sharedStringCharacters: 64 * 1024 * 1024,
    sheets: 64,
    xmlDepth: 64,
    styles: 65_536,
  },
  chromatogram: {
    bytes: 32 * 1024 * 1024,
    /** chromatograms in one packed set, and bytes of all of them */
    setCount: 1_000,
    setBytes: 64 * 1024 * 1024,
  },
  /** wall clock for one reading: a minute, and half a minute more for each 100 MB */
  readingMs: (byteCount: number): number => 60_000 + 30_000 * Math.ceil(byteCount / 100_000_000),
} as const
