import { existsSync } from 'node:fs'
import path from 'node:path'
import { openMemoryDatabase, setDatabase, type OpenDatabase } from '@/db/client'

/** Written once by the global set-up. */
export const templateFile = path.join(process.cwd(), 'tests/.cache/migrated.tar')

/**
 * An empty, migrated database for one test file, in the product's own thread client; `getDatabase()` gives it from now on.
 * Close it in `afterAll`.
 */
export async function freshDatabase(): Promise<OpenDatabase> {
  const opened = await openMemoryDatabase(existsSync(templateFile) ? templateFile : undefined)
  setDatabase(opened)
  return opened
}
