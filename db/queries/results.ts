import { and, inArray, isNull } from 'drizzle-orm'
import { type Executor } from '../executor'
import { fits, holds, points, readingSets, reductions } from '../schema'

export interface StoredReduction {
  readonly key: string
  readonly summary: unknown
  readonly holds: readonly unknown[]
  readonly points: readonly unknown[]
}

/** Results kept under these keys, in no particular order; a key that is not there is simply missing. */
export async function selectReductions(db: Executor, keys: readonly string[]): Promise<StoredReduction[]> {
  if (keys.length === 0) return []
  const wanted = [...keys]
  const heads = await db
    .select({ key: reductions.key, summary: reductions.summary })
    .from(reductions)
    .where(inArray(reductions.key, wanted))
  const holdRows = await db
    .select({ key: holds.reductionKey, content: holds.content })
    .from(holds)
    .where(inArray(holds.reductionKey, wanted))
    .orderBy(holds.reductionKey, holds.position)
  const pointRows = await db
    .select({ key: points.reductionKey, content: points.content })
    .from(points)
    .where(inArray(points.reductionKey, wanted))
    .orderBy(points.reductionKey, points.holdNumber)
  return heads.map((head) => ({
    ...head,
    holds: holdRows.filter((row) => row.key === head.key).map((row) => row.content),
    points: pointRows.filter((row) => row.key === head.key).map((row) => row.content),
  }))
}

export async function selectFits(db: Executor, keys: readonly string[]): Promise<{ key: string; content: unknown }[]> {
  if (keys.length === 0) return []
  return db
    .select({ key: fits.key, content: fits.content })
    .from(fits)
    .where(inArray(fits.key, [...keys]))
}

export interface CurrentReadingSet {
  readonly id: string
  readonly uploadId: string
  readonly runId: string
  readonly kind: string
  readonly contentSha256: string
  readonly rowCount: number
}

/** The reading of each file that is in force (not replaced by another reading), oldest first. */
export async function selectCurrentReadingSets(db: Executor, runIds: readonly string[]): Promise<CurrentReadingSet[]> {
  if (runIds.length === 0) return []
  return db
    .select({
      id: readingSets.id,
      uploadId: readingSets.uploadId,
      runId: readingSets.runId,
      kind: readingSets.kind,
      contentSha256: readingSets.contentSha256,
      rowCount: readingSets.rowCount,
    })
    .from(readingSets)
    .where(and(inArray(readingSets.runId, [...runIds]), isNull(readingSets.supersededAt)))
    .orderBy(readingSets.firstAt, readingSets.id)
}
