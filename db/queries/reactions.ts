import { asc, eq, gt } from 'drizzle-orm'
import { type Page } from '@/lib/domain/page'
import { stoichiometrySchema, thermochemistrySchema, type Reaction } from '@/lib/domain/reaction'
import { type Executor } from '../executor'
import { reactions } from '../schema'

const columns = {
  id: reactions.id,
  code: reactions.code,
  name: reactions.name,
  keyReactant: reactions.keyReactant,
  steps: reactions.steps,
  thermochemistry: reactions.thermochemistry,
  notes: reactions.notes,
  version: reactions.version,
}

function toReaction(row: Omit<Reaction, 'steps' | 'thermochemistry'> & { steps: unknown; thermochemistry: unknown }) {
  return {
    ...row,
    steps: stoichiometrySchema.array().parse(row.steps),
    thermochemistry: thermochemistrySchema.nullable().parse(row.thermochemistry),
  }
}

/** Reactions belong to the house, not to a campaign. */
export async function selectReactions(db: Executor, page: Page<string>): Promise<Reaction[]> {
  const rows = await db
    .select(columns)
    .from(reactions)
    .where(page.after === null ? undefined : gt(reactions.code, page.after))
    .orderBy(asc(reactions.code))
    .limit(page.limit)
  return rows.map(toReaction)
}

export async function selectReaction(db: Executor, id: string): Promise<Reaction | null> {
  const [row] = await db.select(columns).from(reactions).where(eq(reactions.id, id))
  return row === undefined ? null : toReaction(row)
}
