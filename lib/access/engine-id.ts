import 'server-only'
import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import path from 'node:path'

let known: string | null = null

/**
 * What computed a number: release, lock file, V8 and processor. The same inputs under the same engine id give the same bits; under
 * another one the results may differ by rounding, and a stored result of the other engine is not taken for this one's.
 */
export function engineId(): string {
  if (known !== null) return known
  const root = process.cwd()
  const release = JSON.parse(readFileSync(path.join(/* turbopackIgnore: true */ root, 'package.json'), 'utf8')) as {
    version: string
  }
  const lock = readFileSync(path.join(/* turbopackIgnore: true */ root, 'package-lock.json'))
  const lockHash = createHash('sha256').update(lock).digest('hex').slice(0, 12)
  known = `${release.version}+${lockHash}.v8-${process.versions.v8}.${process.arch}`
  return known
}
