import { type OpenedFile } from '../table'
import { openChromatograms } from './chromatogram/open-chromatograms'
import { readPart } from './chromatogram/read-part'
import { type Archive, openArchive } from './open-archive'
import { refused } from './refusal'
import { openWorkbook } from './workbook/open-workbook'

/** A zip archive is a workbook or a set of chromatograms, by the names of its parts. */
export async function openPackedFile(input: string | Uint8Array): Promise<OpenedFile> {
  let archive: Archive | null = null
  try {
    archive = await openArchive(input)
    if (archive.holds === 'workbook') return await openWorkbook(archive, input)
    const files = []
    for (const name of archive.names) files.push({ name, bytes: await readPart(archive, name) })
    return openChromatograms(files)
  } catch (cause) {
    return {
      format: archive?.holds === 'chromatograms' ? 'chromatography-netcdf' : 'workbook',
      dialect: [],
      encoding: 'packed',
      tables: [],
      problems: [refused(cause)],
      endsWithLineBreak: true,
    }
  } finally {
    archive?.close()
  }
}
