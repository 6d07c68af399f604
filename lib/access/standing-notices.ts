import 'server-only'
import { isOriginTrustworthy } from '../auth/session'
import { type Actor } from '../domain/role'
import { environment } from '../environment'

/** What an admin has to know on every page until it is mended. */
export function listStandingNotices(actor: Actor): readonly { readonly title: string; readonly text: string }[] {
  if (actor.role !== 'admin' || isOriginTrustworthy()) return []
  return [
    {
      title: 'This installation runs over plain http.',
      text: `Whoever listens on the network between here and ${environment.APP_ORIGIN} can read passwords and take sessions over. Put TLS in front and set APP_ORIGIN to the https address; the README has a recipe.`,
    },
  ]
}
