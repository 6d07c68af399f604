import 'server-only'
import { getDatabase } from '../../db/client'
import { selectCampaignNames } from '../../db/queries/people'
import { type Actor } from '../domain/role'
import { visibleCampaigns } from '../policy/campaign-scope'

/** Codes and names of the campaigns the actor knows of, to choose one from. */
export async function listCampaignNames(actor: Actor): Promise<{ id: string; code: string; name: string }[]> {
  return selectCampaignNames(await getDatabase(), visibleCampaigns(actor))
}
