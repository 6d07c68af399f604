import { signOut } from '@/lib/access/sign-in'
import { safeNextPath } from '@/lib/auth/next-path'
import { assertSameOrigin } from '@/lib/auth/same-origin'
import { clearSessionSecret, readSessionSecret } from '@/lib/auth/session'
import { appErrorOf } from '@/lib/domain/errors'

/**
 * Ends the session on the server, not only in this browser, and goes to the sign-in page as a whole new page: on a shared
 * tablet nothing of the last person stays in memory, in storage or behind the back button.
 */
export async function POST(request: Request): Promise<Response> {
  try {
    assertSameOrigin(request.method, request.headers)
  } catch (error) {
    const refusal = appErrorOf(error)
    if (refusal === null) throw error
    return new Response(refusal.message, { status: 403, headers: { 'Content-Type': 'text/plain; charset=utf-8' } })
  }
  const form = await request.formData()
  const secret = await readSessionSecret()
  if (secret !== null) await signOut(secret)
  await clearSessionSecret()
  const next = safeNextPath(form.get('next'))
  return new Response(null, {
    status: 303,
    headers: {
      Location: next === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(next)}`,
      'Cache-Control': 'private, no-store',
      'Clear-Site-Data': '"storage"',
    },
  })
}
