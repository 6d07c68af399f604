import { readFileSync, statSync } from 'node:fs'
import { type Problem } from '../../../domain/intake'
import { LIMITS } from '../../limits'
import { problem } from '../../problem-list'
import { type OpenedFile, type Row } from '../../table'
import { Refusal, refused } from '../refusal'
import { type Chromatogram, readChromatogram } from './read-chromatogram'
import { tooLarge } from './read-part'

export interface NamedBytes {
  readonly name: string
  readonly bytes: Uint8Array
}

/** A single chromatogram in a file of its own. */
export function openChromatogramFile(input: string | Uint8Array): OpenedFile {
  const name = 'chromatogram'
  const size = typeof input === 'string' ? statSync(input).size : input.length
  if (size > LIMITS.chromatogram.bytes) return unopened(refused(tooLarge(name)))
  return openChromatograms([{ name, bytes: typeof input === 'string' ? readFileSync(input) : input }])
}

const unopened = (fault: Problem): OpenedFile => ({
  format: 'chromatography-netcdf',
  dialect: [],
  encoding: 'netCDF',
  tables: [],
  problems: [fault],
  endsWithLineBreak: true,
})

/**
 * Chromatograms of one analysis series as a table with one row a peak, injections in order of time. A file that cannot be read is a problem of its
 * own; the others stand.
 */
export function openChromatograms(files: readonly NamedBytes[]): OpenedFile {
  const problems: Problem[] = []
  const read: { readonly name: string; readonly chromatogram: Chromatogram }[] = []
  for (const { name, bytes } of files) {
    try {
      read.push({ name, chromatogram: readChromatogram(bytes, name) })
    } catch (cause) {
      if (!(cause instanceof Refusal)) throw cause
      problems.push(problem({ ...cause.input, severity: files.length === 1 ? 'fatal' : 'problem' }))
    }
  }
  read.sort((a, b) => {
    const [first, second] = [orderOf(a.chromatogram), orderOf(b.chromatogram)]
    return first < second ? -1 : first > second ? 1 : a.name < b.name ? -1 : 1
  })
  const rows = tableRows(read)
  for (const { name, chromatogram } of read)
    if (chromatogram.peaks.length === 0)
      problems.push(
        problem({
          code: 'empty-file',
          severity: files.length === 1 ? 'fatal' : 'problem',
          found: 'a trace without a peak table',
          expected: 'peaks found by the integrator of the instrument',
          sentence: `“${name}” has no peak table. Integrate it on the instrument and export it again with its peaks.`,
        }),
      )
  if (read.length === 0 && files.length > 1)
    problems.push(
      problem({
        code: 'unreadable',
        severity: 'fatal',
        expected: 'chromatograms with a peak table',
        sentence: `None of the ${String(files.length)} chromatograms could be read.`,
      }),
    )
  const hasPeaks = rows.length > 1
  const first = read[0]?.chromatogram
  return {
    format: 'chromatography-netcdf',
    dialect: [files.length === 1 ? 'chromatogram' : `${String(files.length)} chromatograms`, 'ASTM E1947'],
    encoding: 'netCDF',
    tables: hasPeaks
      ? [
          {
            name: '',
            sample: [...preamble(first), ...rows].slice(0, LIMITS.sampleRows),
            isPadded: true,
            forEachRow: async (visit) => {
              for (const row of rows) if (!visit(row)) break
              return []
            },
          },
        ]
      : [],
    problems,
    endsWithLineBreak: true,
  }
}

const orderOf = ({ injectedAt }: Chromatogram): number | string => {
  const instant = Date.parse(injectedAt)
  return Number.isNaN(instant) ? injectedAt : instant
}

/** Header and rows; the line of a row is its place in this table, as the preview shows it. */
function tableRows(read: readonly { readonly name: string; readonly chromatogram: Chromatogram }[]): Row[] {
  const unit = read[0]?.chromatogram.retentionUnit ?? 's'
  const rows: Row[] = [
    {
      cells: ['Injection', 'File', 'Injected at', 'Peak', `Retention time [${unit}]`, 'Area', 'Height'],
      line: 1,
      comment: null,
    },
  ]
  read.forEach(({ name, chromatogram }, index) => {
    for (const peak of chromatogram.peaks)
      rows.push({
        cells: [
          index + 1,
          name,
          chromatogram.injectedAt,
          peak.name,
          peak.retentionTime ?? '',
          peak.area ?? '',
          peak.height ?? '',
        ],
        line: rows.length + 1,
        comment: null,
      })
  })
  return rows
}

function preamble(chromatogram: Chromatogram | undefined): Row[] {
  return (chromatogram?.attributes ?? [])
    .filter(({ value }) => value !== '')
    .map(({ key, value }) => ({ cells: [], line: 0, comment: `${key}: ${value}` }))
}
