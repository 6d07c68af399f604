import { type Readable } from 'node:stream'
import yauzl, { type Entry, type ZipFile } from 'yauzl'
import { LIMITS } from '../limits'
import { Refusal } from './refusal'

export interface Archive {
  /** what its parts make it */
  readonly holds: 'workbook' | 'chromatograms'
  readonly names: readonly string[]
  readonly has: (name: string) => boolean
  readonly open: (name: string) => Promise<Readable>
  readonly close: () => void
}

const FOLDERS = ['xl/', 'docProps/', '_rels/', 'customXml/', 'docMetadata/']
const CHROMATOGRAM = /\.(cdf|nc)$/i

/**
 * The parts of a packed file by name: of a workbook, or of a set of chromatograms. The whole directory is checked before a single byte is inflated: what it declares is held against the limits
 * here, and what comes out is counted again where it is read, since a directory can lie.
 */
export async function openArchive(input: string | Uint8Array): Promise<Archive> {
  const options = {
    lazyEntries: true,
    autoClose: false,
    validateEntrySizes: true,
    strictFileNames: true,
    decodeStrings: true,
  }
  let zip: ZipFile
  try {
    zip =
      typeof input === 'string'
        ? await yauzl.openPromise(input, options)
        : await yauzl.fromBufferPromise(Buffer.from(input.buffer, input.byteOffset, input.byteLength), options)
  } catch (cause) {
    throw damaged(cause)
  }
  try {
    const entries = await listEntries(zip)
    const names = [...entries.keys()]
    const holds = names.length > 0 && names.every((name) => CHROMATOGRAM.test(name)) ? 'chromatograms' : 'workbook'
    if (holds === 'workbook') refuseForeignParts(names)
    return {
      holds,
      names,
      has: (name) => entries.has(name),
      open: async (name) => {
        const entry = entries.get(name)
        if (entry === undefined)
          throw new Refusal({
            code: 'unreadable',
            found: `no part ${name}`,
            expected: 'a complete workbook',
            sentence: `The workbook lacks its part “${name}”: it is damaged. Save it again and add the new file.`,
          })
        return zip.openReadStreamPromise(entry)
      },
      close: () => zip.close(),
    }
  } catch (cause) {
    zip.close()
    throw cause instanceof Refusal ? cause : damaged(cause)
  }
}

function refuseForeignParts(names: readonly string[]): void {
  const limit = LIMITS.workbook.entryCount
  if (names.length > limit) throw tooMuch(`${String(names.length)} parts`, `at most ${String(limit)} parts`)
  const foreign = names.find(
    (name) => name !== '[Content_Types].xml' && !FOLDERS.some((folder) => name.startsWith(folder)),
  )
  if (foreign !== undefined)
    throw new Refusal({
      code: 'unsupported-format',
      found: `“${foreign}” in a packed file`,
      expected: 'an .xlsx workbook, a set of chromatograms (.cdf) or delimited text',
      sentence: `The file is packed and holds “${foreign}”, which neither a workbook nor a set of chromatograms does. Unpack it and add the files inside.`,
    })
}

async function listEntries(zip: ZipFile): Promise<Map<string, Entry>> {
  const limits = LIMITS.workbook
  if (zip.entryCount > LIMITS.chromatogram.setCount)
    throw tooMuch(`${String(zip.entryCount)} parts`, `at most ${String(LIMITS.chromatogram.setCount)} parts`)
  const entries = new Map<string, Entry>()
  const extents: [number, number][] = []
  let total = 0
  for await (const entry of zip.eachEntry()) {
    const name = entry.fileName
    if (name.endsWith('/')) continue
    if (entries.has(name)) throw suspicious(`the part “${name}” twice`)
    if (entry.isEncrypted())
      throw new Refusal({
        code: 'unsupported-format',
        found: 'an encrypted part',
        expected: 'a file without password',
        sentence: 'The file is protected by a password. Save it without one and add it again.',
      })
    if (entry.compressionMethod !== 0 && entry.compressionMethod !== 8)
      throw suspicious(`the packing method ${String(entry.compressionMethod)}`)
    const size = entry.uncompressedSize
    total += size
    if (size > limits.entryBytes || total > limits.totalBytes)
      throw tooMuch(
        `${String(Math.ceil(total / 1e6))} MB when unpacked`,
        `at most ${String(limits.totalBytes / 1024 / 1024)} MB`,
      )
    if (size > 1_048_576 && size > limits.ratio * Math.max(1, entry.compressedSize))
      throw tooMuch(
        `“${name}” that unpacks to ${String(Math.round(size / Math.max(1, entry.compressedSize)))} times its size`,
        `at most ${String(limits.ratio)} times`,
      )
    extents.push([entry.relativeOffsetOfLocalHeader, entry.relativeOffsetOfLocalHeader + 30 + entry.compressedSize])
    entries.set(name, entry)
  }
  extents.sort((a, b) => a[0] - b[0])
  let reached = 0
  for (const [from, to] of extents) {
    if (from < reached) throw suspicious('parts that lie over one another')
    reached = to
  }
  return entries
}

function tooMuch(found: string, expected: string): Refusal {
  return new Refusal({
    code: 'too-large',
    found,
    expected,
    sentence: `The packed file has ${found}; ${expected} are read. Export the readings as delimited text, or divide the file.`,
  })
}

function suspicious(found: string): Refusal {
  return new Refusal({
    code: 'unreadable',
    found,
    expected: 'a packed file as a spreadsheet program or an archiver writes it',
    sentence: `The packed file has ${found}, which no program that makes such files writes. It was not opened.`,
  })
}

function damaged(cause: unknown): Refusal {
  return new Refusal({
    code: 'unreadable',
    found: cause instanceof Error ? cause.message : 'a damaged directory',
    expected: 'a complete packed file',
    sentence:
      'The workbook or packed file is damaged or was cut off while it was copied. Copy it again from the instrument and add it.',
  })
}
