import { type Problem } from '../../../domain/intake'
import { LIMITS } from '../../limits'
import { problem } from '../../problem-list'
import { type OpenedFile, type RawTable, type Row } from '../../table'
import { type Archive, openArchive } from '../open-archive'
import { readSheet } from './read-sheet'
import { readWorkbookParts } from './read-workbook-parts'
import { refused } from '../refusal'

/** A workbook's visible sheets as tables of raw cells. The archive is read now and closed by the caller; a table opens the file anew for its rows. */
export async function openWorkbook(archive: Archive, input: string | Uint8Array): Promise<OpenedFile> {
  const parts = await readWorkbookParts(archive)
  const tables: RawTable[] = []
  const problems: Problem[] = []
  for (const sheet of parts.sheets) {
    if (sheet.isHidden) {
      problems.push(
        problem({
          code: 'footer',
          severity: 'note',
          found: `hidden sheet “${sheet.name}”`,
          sentence: `Sheet “${sheet.name}” is hidden in the workbook and was not read.`,
        }),
      )
      continue
    }
    const sample: Row[] = []
    await readSheet(archive, sheet, parts, (row) => sample.push(row) < LIMITS.sampleRows)
    if (sample.length === 0) continue
    tables.push({
      name: sheet.name,
      sample,
      isPadded: true,
      forEachRow: async (visit) => {
        const again = await openArchive(input)
        try {
          return await readSheet(again, sheet, parts, visit)
        } catch (cause) {
          return [refused(cause)]
        } finally {
          again.close()
        }
      },
    })
  }
  if (tables.length === 0)
    problems.push(
      problem({
        code: 'empty-file',
        severity: 'fatal',
        expected: 'a sheet with a table',
        sentence: 'The workbook has no visible sheet with anything in it.',
      }),
    )
  return {
    format: 'workbook',
    dialect: ['workbook', ...(parts.is1904 ? ['dates counted from 1904'] : [])],
    encoding: 'workbook',
    tables,
    problems,
    endsWithLineBreak: true,
  }
}
