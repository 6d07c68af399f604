import { and, eq, sql } from 'drizzle-orm'
import { type NewReaction, type ReactionChange } from '@/lib/domain/reaction'
import { type Transaction } from '../executor'
import { reactions } from '../schema'

export async function insertReaction(
  tx: Transaction,
  reaction: NewReaction & { readonly id: string; readonly createdBy: string },
): Promise<void> {
  await tx.insert(reactions).values({
    id: reaction.id,
    code: reaction.code,
    name: reaction.name,
    keyReactant: reaction.keyReactant,
    steps: reaction.steps,
    thermochemistry: reaction.thermochemistry,
    notes: reaction.notes,
    createdBy: reaction.createdBy,
  })
}

/** False where it has another version by now. */
export async function updateReaction(
  tx: Transaction,
  id: string,
  version: number,
  change: ReactionChange,
): Promise<boolean> {
  const rows = await tx
    .update(reactions)
    .set({
      name: change.name,
      keyReactant: change.keyReactant,
      steps: change.steps,
      thermochemistry: change.thermochemistry,
      notes: change.notes,
      version: sql`${reactions.version} + 1`,
    })
    .where(and(eq(reactions.id, id), eq(reactions.version, version)))
    .returning({ id: reactions.id })
  return rows.length > 0
}
