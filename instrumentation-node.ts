import { ensureSetUpCode } from '@/lib/access/set-up'
import { stampCallerAddress } from '@/lib/auth/stamp-caller-address'
import { environment } from '@/lib/environment'

/** Opens the database at the start, so that a folder that is in use is refused here and not at somebody's first click. */
export async function startServer(): Promise<void> {
  if (environment.NEXT_PHASE === 'phase-production-build') return
  stampCallerAddress()
  const setUp = await ensureSetUpCode()
  if (setUp === null) return
  console.log(
    [
      '',
      'There is no admin yet. Whoever has this code becomes the first one; it works once, until it runs out or the server starts again.',
      `  Set-up code: ${setUp.code}`,
      `  Use it here: ${environment.APP_ORIGIN}/set-up#${setUp.code}`,
      '',
    ].join('\n'),
  )
}
