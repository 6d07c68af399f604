import { and, eq, inArray, isNull, sql } from 'drizzle-orm'
import {
  type FeedEntry,
  type NewDecision,
  type NewExclusion,
  type NewHoldEdit,
  type NewRun,
  type RunChange,
  type RunDecision,
  type RunState,
} from '@/lib/domain/run'
import { type Transaction } from '../executor'
import { decisions, exclusions, feeds, holdEdits, remarks, runs } from '../schema'
import { inScope, type Scope } from '../scope'

interface MadeForRun {
  readonly id: string
  readonly runId: string
  readonly createdBy: string
}

export async function insertRun(
  tx: Transaction,
  run: Omit<NewRun, 'code' | 'channel' | 'loading' | 'feed'> & {
    readonly id: string
    readonly code: string
    readonly loadingId: string
    readonly createdBy: string
  },
): Promise<void> {
  await tx.insert(runs).values({
    id: run.id,
    code: run.code,
    campaignId: run.campaignId,
    loadingId: run.loadingId,
    rigId: run.rigId,
    kind: run.kind,
    startedAt: new Date(run.startedAt),
    pressurePa: run.pressurePa,
    pressureKind: run.pressureKind,
    barometerPa: run.barometerPa,
    pressureText: run.pressureText,
    pretreatment: run.pretreatment,
    notes: run.notes,
    createdBy: run.createdBy,
  })
}

/** Puts this feed in the place of the one the run had. The caller has changed or made the run in the same transaction. */
export async function replaceFeed(tx: Transaction, runId: string, feed: readonly FeedEntry[]): Promise<void> {
  await tx.delete(feeds).where(eq(feeds.runId, runId))
  if (feed.length === 0) return
  await tx.insert(feeds).values(
    feed.map((entry, position) => ({
      runId,
      species: entry.species,
      position,
      flowText: entry.flowText,
      flowMolPerS: entry.flowMolPerS,
      referenceTemperatureK: entry.referenceTemperatureK,
      referencePressurePa: entry.referencePressurePa,
      isInternalStandard: Number(entry.isInternalStandard),
    })),
  )
}

export interface RunStateChange {
  readonly state: RunState
  readonly decision: RunDecision | null
  readonly handedInAt?: Date
  readonly handedInBy?: string
}

/** False where the run is out of scope, has another version, or is in none of the states by now. */
export async function updateRun(
  tx: Transaction,
  scope: Scope,
  key: { readonly id: string; readonly version: number; readonly states: readonly RunState[] },
  change: Omit<RunChange, 'feed'> | RunStateChange,
): Promise<boolean> {
  const { startedAt, ...more } = { startedAt: undefined, ...change }
  const rows = await tx
    .update(runs)
    .set({
      ...columnsOf(more),
      startedAt: startedAt === undefined ? undefined : new Date(startedAt),
      version: sql`${runs.version} + 1`,
    })
    .where(
      and(
        inScope(runs.campaignId, scope),
        eq(runs.id, key.id),
        eq(runs.version, key.version),
        inArray(runs.state, [...key.states]),
      ),
    )
    .returning({ id: runs.id })
  return rows.length > 0
}

/** Column by column, so that nothing else a caller passes can reach the row. */
function columnsOf(change: Partial<Omit<RunChange, 'feed' | 'startedAt'> & RunStateChange>) {
  return {
    pressurePa: change.pressurePa,
    pressureKind: change.pressureKind,
    barometerPa: change.barometerPa,
    pressureText: change.pressureText,
    pretreatment: change.pretreatment,
    notes: change.notes,
    clockOffsetS: change.clockOffsetS,
    state: change.state,
    decision: change.decision,
    handedInAt: change.handedInAt,
    handedInBy: change.handedInBy,
  }
}

export async function insertDecision(tx: Transaction, decision: NewDecision & MadeForRun): Promise<void> {
  await tx.insert(decisions).values({
    id: decision.id,
    runId: decision.runId,
    decision: decision.decision,
    reason: decision.reason,
    createdBy: decision.createdBy,
  })
}

export async function insertExclusion(tx: Transaction, exclusion: NewExclusion & MadeForRun): Promise<void> {
  await tx.insert(exclusions).values({
    id: exclusion.id,
    runId: exclusion.runId,
    kind: exclusion.kind,
    atS: exclusion.atS,
    reason: exclusion.reason,
    createdBy: exclusion.createdBy,
  })
}

/** False where there is no such exclusion in force. */
export async function withdrawExclusionRow(
  tx: Transaction,
  key: { readonly runId: string; readonly id: string },
  by: string,
): Promise<boolean> {
  const rows = await tx
    .update(exclusions)
    .set({ withdrawnBy: by, withdrawnAt: sql`now()` })
    .where(and(eq(exclusions.runId, key.runId), eq(exclusions.id, key.id), isNull(exclusions.withdrawnAt)))
    .returning({ id: exclusions.id })
  return rows.length > 0
}

export async function insertHoldEdit(tx: Transaction, edit: NewHoldEdit & MadeForRun): Promise<void> {
  await tx.insert(holdEdits).values({
    id: edit.id,
    runId: edit.runId,
    foundStartS: edit.foundStartS,
    startS: edit.startS,
    endS: edit.endS,
    reason: edit.reason,
    createdBy: edit.createdBy,
  })
}

/** Ends the edits of one hold that are in force; tells how many there were. */
export async function withdrawHoldEdits(
  tx: Transaction,
  key: { readonly runId: string } & ({ readonly foundStartS: number } | { readonly id: string }),
): Promise<number> {
  const rows = await tx
    .update(holdEdits)
    .set({ withdrawnAt: sql`now()` })
    .where(
      and(
        eq(holdEdits.runId, key.runId),
        'id' in key ? eq(holdEdits.id, key.id) : eq(holdEdits.foundStartS, key.foundStartS),
        isNull(holdEdits.withdrawnAt),
      ),
    )
    .returning({ id: holdEdits.id })
  return rows.length
}

export async function insertRemark(tx: Transaction, remark: MadeForRun & { readonly body: string }): Promise<void> {
  await tx
    .insert(remarks)
    .values({ id: remark.id, runId: remark.runId, body: remark.body, createdBy: remark.createdBy })
}
