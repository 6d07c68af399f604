import 'server-only'
import { AppError } from '../domain/errors'
import { environment } from '../environment'

const SAFE_METHODS = new Set(['GET', 'HEAD', 'OPTIONS'])

/**
 * Refuses an unsafe request that rides on somebody's cookie from another page. The origin is compared with the
 * configured one, never with the Host header, which the sender chooses. A browser that sends no Origin has to say
 * same-origin in Sec-Fetch-Site; a script uses a token, and no cookie.
 */
export function assertSameOrigin(method: string, headers: Headers, appOrigin = environment.APP_ORIGIN): void {
  if (SAFE_METHODS.has(method.toUpperCase())) return
  const site = headers.get('sec-fetch-site')
  const origin = headers.get('origin')
  const isOurs = origin === null ? site === 'same-origin' : origin === new URL(appOrigin).origin
  const isFromElsewhere = site !== null && site !== 'same-origin' && site !== 'none'
  if (!isOurs || isFromElsewhere)
    throw new AppError(
      'bad-origin',
      `This change was not sent from the application’s own address (${new URL(appOrigin).origin}). Open the application there; a script sends a token instead of a cookie.`,
    )
}
