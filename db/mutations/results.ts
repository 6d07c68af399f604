import { type Transaction } from '../executor'
import { fits, holds, points, reductions } from '../schema'

export interface NewReduction {
  readonly key: string
  readonly runId: string
  readonly methodId: string
  readonly engineId: string
  readonly summary: unknown
  readonly holds: readonly {
    readonly kind: string
    readonly number: number
    readonly startedAt: Date
    readonly endedAt: Date
    readonly setTemperatureK: number
    readonly content: unknown
  }[]
  readonly points: readonly {
    readonly holdNumber: number
    readonly temperatureK: number
    readonly rateMolPerKgS: number | null
    readonly conversion: number | null
    readonly content: unknown
  }[]
}

/**
 * Keeps a result under its content key. Two requests may compute the same one at once; they hold the same bits, so the second insert is
 * simply dropped.
 */
export async function insertReduction(tx: Transaction, result: NewReduction): Promise<void> {
  const inserted = await tx
    .insert(reductions)
    .values({
      key: result.key,
      runId: result.runId,
      methodId: result.methodId,
      engineId: result.engineId,
      summary: result.summary,
    })
    .onConflictDoNothing()
    .returning({ key: reductions.key })
  if (inserted.length === 0) return
  if (result.holds.length > 0)
    await tx
      .insert(holds)
      .values(result.holds.map((hold, position) => ({ reductionKey: result.key, position, ...hold })))
  if (result.points.length > 0)
    await tx.insert(points).values(result.points.map((point) => ({ reductionKey: result.key, ...point })))
}

export interface NewFit {
  readonly key: string
  readonly campaignId: string
  readonly sampleId: string
  readonly runId: string | null
  readonly methodId: string
  readonly engineId: string
  readonly activationEnergyJPerMol: number | null
  readonly lnPreExponential: number | null
  readonly content: unknown
}

export async function insertFits(tx: Transaction, rows: readonly NewFit[]): Promise<void> {
  if (rows.length > 0)
    await tx
      .insert(fits)
      .values([...rows])
      .onConflictDoNothing()
}
