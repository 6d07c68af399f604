import 'server-only'
import { randomUUID } from 'node:crypto'
import { createReadStream, type ReadStream } from 'node:fs'
import { access, mkdir, mkdtemp, open, readdir, rename, rm, stat, statfs, unlink } from 'node:fs/promises'
import path from 'node:path'
import { AppError } from '../domain/errors'
import { environment } from '../environment'

const SHA256 = /^[0-9a-f]{64}$/
const INCOMING = 'incoming'
/** Kept free beside the file that comes in, for the database and its log. */
const RESERVE_BYTES = 256 * 1024 * 1024

function root(): string {
  return path.join(/* turbopackIgnore: true */ environment.DATA_DIR, 'files')
}

/** Where the bytes with this hash stand. The name is made of the hash alone: nothing that a person or an instrument wrote is part of a path. */
export function pathOf(sha256: string): string {
  if (!SHA256.test(sha256)) throw new RangeError('not a SHA-256 in hexadecimal')
  return path.join(root(), sha256.slice(0, 2), sha256)
}

/**
 * Runs the work with a new folder in the store's own file system, so that a finished file is moved in by renaming, and removes the folder with
 * all that is left in it, however the work ends.
 */
export async function withIncomingFolder<T>(work: (folder: string) => Promise<T>): Promise<T> {
  const incoming = path.join(root(), INCOMING)
  await mkdir(incoming, { recursive: true, mode: 0o700 })
  const folder = await mkdtemp(path.join(incoming, 'in-'))
  try {
    return await work(folder)
  } finally {
    await rm(folder, { recursive: true, force: true, maxRetries: 3 })
  }
}

/** Refuses before the first byte is taken in what the disk could not hold. */
export async function requireSpace(byteCount: number): Promise<void> {
  await mkdir(root(), { recursive: true, mode: 0o700 })
  const { bavail, bsize } = await statfs(root())
  if (bavail * bsize < byteCount + RESERVE_BYTES)
    throw new AppError(
      'storage-full',
      'There is not enough space left for this file. Tell an admin; the file stays where it is on your machine.',
    )
}

/**
 * Moves a finished file under its hash: synced to disk first, then renamed, then the folder synced, so that a name never stands for bytes that
 * are not there. The same bytes again are not kept twice.
 *
 * @returns whether the bytes are new to the store
 */
export async function putFile(temporaryPath: string, sha256: string): Promise<boolean> {
  const target = pathOf(sha256)
  if (await exists(target)) {
    await unlink(temporaryPath)
    return false
  }
  await sync(temporaryPath)
  const folder = path.dirname(target)
  const isNewFolder = (await mkdir(folder, { recursive: true, mode: 0o700 })) !== undefined
  await rename(temporaryPath, target)
  await sync(folder)
  if (isNewFolder) await sync(root())
  return true
}

/** The bytes under a hash as a stream, with their count. */
export async function openFile(sha256: string): Promise<{ readonly stream: ReadStream; readonly byteCount: number }> {
  const file = pathOf(sha256)
  const { size } = await stat(file)
  return { stream: createReadStream(file), byteCount: size }
}

export async function hasFile(sha256: string): Promise<boolean> {
  return exists(pathOf(sha256))
}

/** Removes the bytes for ever. Only an erasure asks for this. */
export async function removeFile(sha256: string): Promise<void> {
  const file = pathOf(sha256)
  await rm(file, { force: true })
  if (await exists(path.dirname(file))) await sync(path.dirname(file))
}

export interface Sweep {
  /** folders of transfers that never ended */
  readonly removedFolders: number
  /** files that no record names: removed, as their transfer was never acknowledged */
  readonly removedOrphans: number
  /** records whose file is gone: an alarm, never mended in silence */
  readonly lost: readonly string[]
}

/** Clears what a killed process left behind. Runs before the first transfer, so everything that is incoming is old; orphans are given an hour. */
export async function sweepFiles(known: ReadonlySet<string>, now: number): Promise<Sweep> {
  let removedFolders = 0
  let removedOrphans = 0
  const found = new Set<string>()
  for (const name of await list(root())) {
    const folder = path.join(root(), name)
    if (name === INCOMING) {
      for (const left of await list(folder)) {
        await rm(path.join(folder, left), { recursive: true, force: true })
        removedFolders++
      }
      continue
    }
    for (const file of await list(folder)) {
      if (!SHA256.test(file)) continue
      if (known.has(file)) found.add(file)
      else if (now - (await stat(path.join(folder, file))).mtimeMs > 3_600_000) {
        await unlink(path.join(folder, file))
        removedOrphans++
      }
    }
  }
  return { removedFolders, removedOrphans, lost: [...known].filter((sha256) => !found.has(sha256)).sort() }
}

/** A name in a folder that nobody else has. */
export function temporaryName(): string {
  return randomUUID()
}

async function list(folder: string): Promise<string[]> {
  try {
    return (await readdir(folder)).sort()
  } catch (error) {
    if (error instanceof Error && 'code' in error && (error.code === 'ENOENT' || error.code === 'ENOTDIR')) return []
    throw error
  }
}

async function exists(file: string): Promise<boolean> {
  try {
    await access(file)
    return true
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return false
    throw error
  }
}

async function sync(file: string): Promise<void> {
  const handle = await open(file, 'r')
  try {
    await handle.sync()
  } finally {
    await handle.close()
  }
}
