import { type Actor } from '../domain/role'
import { can } from './can'

/** The campaigns a query may touch: every one for an admin with no bound token, else a list that may be empty. */
export type CampaignScope = 'all' | readonly string[]

function scopeWhere(actor: Actor, mayRead: (actor: Actor, campaignId: string) => boolean): CampaignScope {
  if (actor.role === 'admin' && (actor.tokenScopes === null || actor.tokenScopes.includes('read')))
    return actor.tokenCampaignId === null ? 'all' : [actor.tokenCampaignId]
  return Object.keys(actor.memberships).filter((campaignId) => mayRead(actor, campaignId))
}

/** Campaigns whose runs and ranking the actor reads. */
export function readableCampaigns(actor: Actor): CampaignScope {
  return scopeWhere(actor, can.readCampaign)
}

/** Campaigns the actor knows of, as a guest too. */
export function visibleCampaigns(actor: Actor): CampaignScope {
  return scopeWhere(actor, can.seeCampaign)
}
