import 'server-only'
import { type Actor, type Role } from '../domain/role'

/** A person as the actor of a change to their own account before any session says who they are; for the audit trail only. */
export function ownActor(
  account: { readonly id: string; readonly displayName: string; readonly email: string; readonly role: Role },
  sessionRef: string,
): Actor {
  return {
    userId: account.id,
    displayName: account.displayName,
    email: account.email,
    role: account.role,
    memberships: {},
    tokenScopes: null,
    tokenCampaignId: null,
    sessionRef,
    secondsSinceSignIn: 0,
  }
}
