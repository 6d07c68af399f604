import 'server-only'
import { and, eq, isNull } from 'drizzle-orm'
import { type Transaction } from '../executor'
import { editionRuns, editions } from '../schema'

export interface NewEdition {
  readonly id: string
  readonly campaignId: string
  readonly number: number
  readonly methodId: string
  readonly engineId: string
  readonly content: unknown
  readonly contentSha256: string
  readonly statement: string
  readonly publishedBy: string
  readonly publishedAt: Date
}

/** Keeps an edition with the runs it holds; from then on triggers refuse any change of either. */
export async function insertEdition(
  tx: Transaction,
  edition: NewEdition,
  runs: readonly { readonly runId: string; readonly reductionKey: string }[],
): Promise<void> {
  await tx.insert(editions).values(edition)
  if (runs.length > 0)
    await tx
      .insert(editionRuns)
      .values(runs.map(({ runId, reductionKey }) => ({ editionId: edition.id, runId, reductionKey })))
}

/** Withdraws an edition that stands; false where it was withdrawn already. */
export async function withdrawEditionRow(
  tx: Transaction,
  id: string,
  withdrawal: { readonly by: string; readonly at: Date; readonly reason: string },
): Promise<boolean> {
  const rows = await tx
    .update(editions)
    .set({ withdrawnAt: withdrawal.at, withdrawnBy: withdrawal.by, withdrawnReason: withdrawal.reason })
    .where(and(eq(editions.id, id), isNull(editions.withdrawnAt)))
    .returning({ id: editions.id })
  return rows.length === 1
}
