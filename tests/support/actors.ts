import type { Actor, CampaignRole, Role } from '@/lib/domain/role'

/** An actor for a test, as the session would give it. */
export function actorOf(
  role: Role,
  more: Partial<Actor> & { memberships?: Readonly<Record<string, CampaignRole>> } = {},
): Actor {
  return {
    userId: `user-${role}`,
    displayName: `Test ${role}`,
    email: `${role}@example.test`,
    role,
    memberships: {},
    tokenScopes: null,
    tokenCampaignId: null,
    sessionRef: `session-${role}`,
    secondsSinceSignIn: 10,
    ...more,
  }
}
