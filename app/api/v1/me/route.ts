import { handle } from '../_respond'

/** Who the request acts for, and how far. */
export async function GET(request: Request): Promise<Response> {
  return handle(request, async (actor) => ({
    id: actor.userId,
    email: actor.email,
    displayName: actor.displayName,
    role: actor.role,
    memberships: actor.memberships,
    tokenScopes: actor.tokenScopes,
    tokenCampaignId: actor.tokenCampaignId,
  }))
}
