import { createHash } from 'node:crypto'
import { closeSync, openSync, readFileSync, readSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { zipSync, type Zippable } from 'fflate'
import { AppError } from '../domain/errors'
import { LIMITS } from './limits'
import { type ReceivedFile } from './receive-multipart'

export interface PackedFile extends ReceivedFile {
  /** the files inside, as they came */
  readonly parts: readonly { readonly name: string; readonly sha256: string; readonly byteCount: number }[]
}

/** One moment for all parts, so that the same chromatograms make the same bytes. The format counts local years from 1980. */
const FIXED_TIME = new Date(1980, 0, 1)

/**
 * Chromatograms that came in one request are one series of injections and are kept as one file: a zip archive without compression, the bytes of each as
 * they came. Other files, and a chromatogram that came alone, stay what they are.
 */
export function packChromatograms(received: readonly ReceivedFile[], folder: string): (ReceivedFile | PackedFile)[] {
  const isIn = received.map((file) => isNetcdf(file.path))
  const found = received.filter((_file, index) => isIn[index])
  const set = [...new Map(found.map((file) => [file.sha256, file])).values()]
  if (set.length < 2) return [...received]
  const size = set.reduce((sum, file) => sum + file.byteCount, 0)
  if (size > LIMITS.chromatogram.setBytes)
    throw new AppError(
      'too-large',
      `The ${String(set.length)} chromatograms have ${String(Math.ceil(size / 1_000_000))} MB together; a set of at most ${String(Math.floor(LIMITS.chromatogram.setBytes / 1_000_000))} MB is kept as one series. Send them in several requests.`,
    )
  const sorted = set.sort((a, b) => (a.name < b.name ? -1 : a.name > b.name ? 1 : a.sha256 < b.sha256 ? -1 : 1))
  const entries: Zippable = {}
  const parts = sorted.map((file) => {
    const name = freeName(partName(file.name), entries)
    entries[name] = [readFileSync(file.path), { level: 0, mtime: FIXED_TIME }]
    return { name, sha256: file.sha256, byteCount: file.byteCount }
  })
  const bytes = zipSync(entries)
  const sha256 = createHash('sha256').update(bytes).digest('hex')
  const target = path.join(folder, sha256)
  writeFileSync(target, bytes, { mode: 0o600, flag: 'wx' })
  const first = path.parse(parts[0]?.name ?? '').name
  const packed: PackedFile = {
    path: target,
    sha256,
    byteCount: bytes.length,
    name: `${first} and ${String(parts.length - 1)} more chromatograms.zip`,
    parts,
  }
  return [packed, ...received.filter((_file, index) => isIn[index] !== true)]
}

function isNetcdf(file: string): boolean {
  const handle = openSync(file, 'r')
  try {
    const head = Buffer.alloc(4)
    readSync(handle, head, 0, 4, 0)
    return head.toString('latin1', 0, 3) === 'CDF' && (head[3] === 1 || head[3] === 2)
  } finally {
    closeSync(handle)
  }
}

/** The ending says inside the archive what the parts are. */
const partName = (name: string): string => (/\.(cdf|nc)$/i.test(name) ? name : `${name}.cdf`)

function freeName(name: string, taken: Zippable): string {
  const { name: stem, ext } = path.parse(name)
  let free = name
  for (let count = 2; Object.hasOwn(taken, free); count++) free = `${stem} (${String(count)})${ext}`
  return free
}
