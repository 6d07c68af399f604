import 'server-only'
import { and, eq, sql } from 'drizzle-orm'
import { type Detection, type Problem, type UploadState } from '@/lib/domain/intake'
import { type Transaction } from '../executor'
import { uploads } from '../schema'

export interface NewUpload {
  readonly id: string
  readonly campaignId: string
  readonly runId: string
  readonly sha256: string
  readonly byteCount: number
  readonly fileName: string
  readonly createdBy: string
}

/** Adds a file to a run. False when the run has these very bytes already: then nothing is added. */
export async function insertUpload(tx: Transaction, upload: NewUpload): Promise<boolean> {
  const rows = await tx
    .insert(uploads)
    .values(upload)
    .onConflictDoNothing({ target: [uploads.runId, uploads.sha256] })
    .returning({ id: uploads.id })
  return rows.length > 0
}

export interface UploadChange {
  readonly state?: UploadState
  readonly kind?: 'rig-log' | 'analyser' | 'attachment' | null
  readonly format?: string | null
  readonly detection?: Detection | null
  readonly problems?: readonly Problem[]
  readonly failure?: string | null
  readonly columnMapId?: string | null
  readonly confirmedBy?: string | null
  readonly confirmedAt?: Date | null
}

/** Changes a file's record where it still has the version that was seen. False when it has not. */
export async function updateUpload(
  tx: Transaction,
  key: { readonly id: string; readonly version: number },
  change: UploadChange,
): Promise<boolean> {
  const { problems, ...rest } = change
  const rows = await tx
    .update(uploads)
    .set({
      ...rest,
      ...(problems === undefined ? {} : { problems: [...problems] }),
      version: sql`${uploads.version} + 1`,
    })
    .where(and(eq(uploads.id, key.id), eq(uploads.version, key.version)))
    .returning({ id: uploads.id })
  return rows.length > 0
}
