import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertReaction, updateReaction } from '../../db/mutations/reactions'
import { selectReaction, selectReactions } from '../../db/queries/reactions'
import { AnalysisError } from '../analysis/analysis-error'
import { elementCount } from '../analysis/element-count'
import { changedFields } from '../audit/changed-fields'
import { wholeList, type Page } from '../domain/page'
import { type NewReaction, type Reaction, type ReactionChange } from '../domain/reaction'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { authorise, hideUnless } from './authorise'
import { refuseEmpty, refuseField, refuseStale } from './stale'

/** Steps are typed in by hand; half of a hydrogen more is not an unbalanced step, a forgotten water is. */
const BALANCE_TOLERANCE = 1e-6

async function foundReaction(db: Executor, id: string): Promise<Reaction> {
  const reaction = await selectReaction(db, id)
  hideUnless(reaction !== null)
  return reaction
}

/** Every step consumes the key reactant and keeps every element; names that are no formula cannot be checked and are let be. */
function checkSteps({ keyReactant, steps }: Pick<NewReaction, 'keyReactant' | 'steps'>): void {
  steps.forEach((step, index) => {
    const field = `steps.${index}`
    if (!((step[keyReactant] ?? 0) < 0))
      refuseField(field, `Step ${index + 1} does not consume ${keyReactant}; its number there has to be below zero.`)
    const totals = new Map<string, number>()
    for (const [species, number] of Object.entries(step)) {
      const atoms = atomsIn(species)
      if (atoms === null) return
      for (const [element, count] of Object.entries(atoms))
        totals.set(element, (totals.get(element) ?? 0) + number * count)
    }
    for (const [element, total] of totals)
      if (Math.abs(total) > BALANCE_TOLERANCE)
        refuseField(
          field,
          `Step ${index + 1} does not balance: ${element} is ${total > 0 ? 'gained' : 'lost'} (${total}).`,
        )
  })
}

function atomsIn(species: string): Readonly<Record<string, number>> | null {
  try {
    return elementCount(species)
  } catch (error) {
    if (error instanceof AnalysisError) return null
    throw error
  }
}

export async function listReactions(actor: Actor, page: Page<string> = wholeList): Promise<Reaction[]> {
  authorise(can.readHouse(actor))
  return selectReactions(await getDatabase(), page)
}

export async function getReaction(actor: Actor, id: string): Promise<Reaction> {
  authorise(can.readHouse(actor))
  return foundReaction(await getDatabase(), id)
}

export async function createReaction(actor: Actor, input: NewReaction): Promise<Reaction> {
  authorise(can.makeReaction(actor), 'Reactions are made by researchers, leads and admins.')
  checkSteps(input)
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await insertReaction(tx, { ...input, id, createdBy: actor.userId })
    const reaction = await foundReaction(tx, id)
    await insertAuditEntry(tx, { actor, action: 'reaction.create', entity: 'reaction', entityId: id, after: reaction })
    return reaction
  })
}

export async function changeReaction(
  actor: Actor,
  id: string,
  change: ReactionChange,
  version: number,
): Promise<Reaction> {
  authorise(can.makeReaction(actor), 'Reactions are changed by researchers, leads and admins.')
  refuseEmpty(change)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const before = await foundReaction(tx, id)
    checkSteps({ keyReactant: change.keyReactant ?? before.keyReactant, steps: change.steps ?? before.steps })
    if (!(await updateReaction(tx, id, version, change))) refuseStale(await foundReaction(tx, id))
    const after = await foundReaction(tx, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'reaction.change',
      entity: 'reaction',
      entityId: id,
      ...changedFields(before, after),
    })
    return after
  })
}
