import { randomBytes } from 'node:crypto'
import { linkSync, mkdirSync, readFileSync, realpathSync, unlinkSync, writeFileSync } from 'node:fs'
import { hostname } from 'node:os'
import path from 'node:path'
import { z } from 'zod'

const ownerSchema = z.object({
  pid: z.number().int(),
  /** start of that process in clock ticks since boot: tells it from a later one with the same number */
  startTicks: z.string().nullable(),
  bootId: z.string(),
  host: z.string(),
})
type Owner = z.infer<typeof ownerSchema>

export interface DataFolderLock {
  readonly file: string
  release(): void
}

export class DataFolderLockedError extends Error {
  readonly code = 'EDATAFOLDERLOCKED'
  constructor(folder: string, why: string) {
    super(`The data folder ${folder} is in use: ${why}`)
    this.name = 'DataFolderLockedError'
  }
}

const readText = (file: string): string | null => {
  try {
    return readFileSync(file, 'utf8')
  } catch {
    return null
  }
}

const isErrno = (error: unknown, code: string) => error instanceof Error && 'code' in error && error.code === code

function removeIfThere(file: string) {
  try {
    unlinkSync(file)
  } catch (error) {
    if (!isErrno(error, 'ENOENT')) throw error
  }
}

/** Field 22 of /proc/<pid>/stat, counted after the name, which may hold anything; null where there is no such process or no /proc. */
function startTicksOf(pid: number): string | null {
  const stat = readText(`/proc/${pid}/stat`)
  return stat === null ? null : (stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19] ?? null)
}

const bootId = () => readText('/proc/sys/kernel/random/boot_id')?.trim() ?? ''

const thisProcess = (): Owner => ({
  pid: process.pid,
  startTicks: startTicksOf(process.pid),
  bootId: bootId(),
  host: hostname(),
})

function exists(pid: number): boolean {
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return isErrno(error, 'EPERM')
  }
}

/** Never by age or heartbeat: a process that is only slow looks dead, and two writers destroy the data without a word. */
function isAlive(owner: Owner): boolean {
  if (owner.bootId !== bootId()) return false
  if (owner.startTicks === null) return exists(owner.pid)
  return startTicksOf(owner.pid) === owner.startTicks
}

function parseOwner(text: string | null): Owner | null {
  if (text === null) return null
  try {
    return ownerSchema.safeParse(JSON.parse(text)).data ?? null
  } catch {
    return null
  }
}

/** One process may hold several copies of this module, so what is held is written down where all of them look. */
const held: Set<string> = ((globalThis as Record<symbol, unknown>)[Symbol.for('inverse-kelvin.data-folder-locks')] ??=
  new Set<string>()) as Set<string>

const pause = (milliseconds: number) => Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, milliseconds)

/**
 * Takes the data folder for this process, or throws a `DataFolderLockedError`. The lock is a file beside the folder that names its holder; one
 * left by a killed process is taken over, also when another process has that number by now.
 */
export function acquireDataFolderLock(folder: string): DataFolderLock {
  const parent = path.dirname(path.resolve(folder))
  mkdirSync(parent, { recursive: true, mode: 0o700 })
  const file = path.join(realpathSync(parent), `${path.basename(folder)}.lock`)
  if (held.has(file)) throw new DataFolderLockedError(folder, 'this process has it open already')

  const me = JSON.stringify(thisProcess())
  const draft = `${file}.${process.pid}.${randomBytes(4).toString('hex')}`
  writeFileSync(draft, me, { flag: 'wx', mode: 0o600 })
  try {
    for (let attempt = 0; attempt < 100; attempt++) {
      try {
        linkSync(draft, file)
        held.add(file)
        return { file, release: () => release(file, me) }
      } catch (error) {
        if (!isErrno(error, 'EEXIST')) throw error
      }
      const text = readText(file)
      if (text === null) continue
      const owner = parseOwner(text)
      if (owner && owner.host !== hostname())
        throw new DataFolderLockedError(
          folder,
          `process ${owner.pid} on ${owner.host} has it, and from here it cannot be seen whether that process still runs. ` +
            `If you are sure that it does not, delete ${file} and start again.`,
        )
      if (owner && isAlive(owner))
        throw new DataFolderLockedError(
          folder,
          `process ${owner.pid} has it. Stop that one first, or set DATA_DIR to another folder.`,
        )
      takeAway(file, text, draft)
    }
    throw new DataFolderLockedError(folder, 'others are taking it at this moment')
  } finally {
    removeIfThere(draft)
  }
}

/** Removes a dead holder's file under a second lock, so that nobody removes the file of the one who was quicker. */
function takeAway(file: string, seen: string, draft: string) {
  const steal = `${file}.steal`
  try {
    linkSync(draft, steal)
  } catch (error) {
    if (!isErrno(error, 'EEXIST')) throw error
    const thief = parseOwner(readText(steal))
    if (thief && !isAlive(thief)) removeIfThere(steal)
    pause(20)
    return
  }
  try {
    if (readText(file) === seen) removeIfThere(file)
  } finally {
    removeIfThere(steal)
  }
}

function release(file: string, me: string) {
  held.delete(file)
  if (readText(file) === me) removeIfThere(file)
}
