import 'server-only'
import { getDatabase } from '../../db/client'
import { selectHistory } from '../../db/queries/history'
import { type HistoryEntry } from '../domain/history'
import { wholeList, type Page } from '../domain/page'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { authoriseIn, hideUnlessReadable } from './campaign-rights'

/** Who changed what in a campaign and in the samples it holds, latest first. */
export async function listHistory(
  actor: Actor,
  campaignId: string,
  page: Page<number> = wholeList,
): Promise<HistoryEntry[]> {
  authoriseIn(
    actor,
    campaignId,
    can.readHistory(actor, campaignId),
    'The history of a campaign is read by its leads and by admins.',
  )
  await hideUnlessReadable(actor, campaignId)
  return selectHistory(await getDatabase(), [campaignId], campaignId, page)
}
