import 'server-only'
import { getDatabase } from '../../db/client'
import { hasCampaign, lockCampaign } from '../../db/queries/campaigns'
import { type SampleScope } from '../../db/queries/samples'
import { type Scope } from '../../db/scope'
import { type Transaction } from '../../db/executor'
import { AppError } from '../domain/errors'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { readableCampaigns } from '../policy/campaign-scope'
import { authorise, hideUnless } from './authorise'

/** Who does not work in the campaign is told that there is nothing; who does, that their role does not allow it. */
export function authoriseIn(actor: Actor, campaignId: string, allowed: boolean, message?: string): asserts allowed {
  if (allowed) return
  hideUnless(can.readCampaign(actor, campaignId) || can.addRun(actor, campaignId))
  authorise(allowed, message)
}

/** For lists: who reads every campaign reads none that is not there, and an empty list would say that it is. */
export async function hideUnlessReadable(actor: Actor, campaignId: string): Promise<void> {
  hideUnless(can.readCampaign(actor, campaignId))
  hideUnless(await hasCampaign(await getDatabase(), [campaignId], campaignId))
}

/** Campaigns in whose rows a change may look; wider than reading, as a token may add without being let to read. */
export function touchableCampaigns(actor: Actor): Scope {
  if (actor.role === 'admin') return actor.tokenCampaignId === null ? 'all' : [actor.tokenCampaignId]
  return Object.keys(actor.memberships).filter((id) => can.readCampaign(actor, id) || can.addRun(actor, id))
}

const makerOf = (actor: Actor) => (actor.tokenCampaignId === null ? actor.userId : null)

/** Samples the actor reads: those of the campaigns they read, and their own. */
export function readableSamples(actor: Actor): SampleScope {
  return { campaigns: readableCampaigns(actor), makerId: makerOf(actor) }
}

export function touchableSamples(actor: Actor): SampleScope {
  return { campaigns: touchableCampaigns(actor), makerId: makerOf(actor) }
}

/** Holds the campaign for the transaction; a closed one takes no changes. */
export async function holdOpenCampaign(tx: Transaction, campaignId: string): Promise<void> {
  const campaign = await lockCampaign(tx, [campaignId], campaignId)
  hideUnless(campaign !== null)
  if (campaign.closedAt !== null)
    throw new AppError(
      'conflict',
      'The campaign is closed. A lead can open it again; until then nothing in it changes.',
    )
}
