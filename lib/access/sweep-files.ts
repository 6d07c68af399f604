import 'server-only'
import { getDatabase } from '../../db/client'
import { selectKnownFileHashes } from '../../db/queries/uploads'
import { sweepFiles, type Sweep } from '../storage/file-store'

/**
 * Clears what a killed process left in the file store: transfers that never ended, and files that no record names. A record whose file is gone
 * is an alarm for the log, never mended in silence.
 */
export async function sweepStoredFiles(now = Date.now()): Promise<Sweep> {
  const swept = await sweepFiles(new Set(await selectKnownFileHashes(await getDatabase())), now)
  for (const sha256 of swept.lost)
    console.error(JSON.stringify({ at: new Date(now).toISOString(), event: 'files.lost', sha256 }))
  return swept
}
