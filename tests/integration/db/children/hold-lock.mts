// Takes the lock of a data folder, says so, and stays until it is killed; or says that it was refused, and ends.
import { acquireDataFolderLock, DataFolderLockedError } from '@/db/pglite/data-folder-lock'

try {
  acquireDataFolderLock(process.argv[2] ?? '')
  process.stdout.write('held\n')
  setInterval(() => {}, 60_000)
} catch (error) {
  process.stdout.write(error instanceof DataFolderLockedError ? 'refused\n' : `failed: ${String(error)}\n`)
}
