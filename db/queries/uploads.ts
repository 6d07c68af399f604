import 'server-only'
import { and, asc, eq, isNotNull, isNull, lt, ne } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import { detectionSchema, problemSchema, type Upload, type UploadState } from '@/lib/domain/intake'
import { type Executor } from '../executor'
import { calibrations, columnMaps, readingSets, runs, uploads, users } from '../schema'
import { inScope, type Scope } from '../scope'

const author = alias(users, 'author')

const columns = {
  id: uploads.id,
  campaignId: uploads.campaignId,
  runId: uploads.runId,
  sha256: uploads.sha256,
  byteCount: uploads.byteCount,
  fileName: uploads.fileName,
  state: uploads.state,
  kind: uploads.kind,
  detection: uploads.detection,
  problems: uploads.problems,
  failure: uploads.failure,
  columnMapId: uploads.columnMapId,
  createdByName: author.displayName,
  createdAt: uploads.createdAt,
  confirmedAt: uploads.confirmedAt,
  version: uploads.version,
}

function uploadOf(row: {
  [K in keyof typeof columns]: K extends 'detection' | 'problems'
    ? unknown
    : K extends 'createdAt'
      ? Date
      : K extends 'confirmedAt'
        ? Date | null
        : K extends 'byteCount' | 'version'
          ? number
          : K extends 'kind' | 'failure' | 'columnMapId'
            ? string | null
            : string
}): Upload {
  return {
    ...row,
    state: row.state as UploadState,
    kind: row.kind as Upload['kind'],
    detection: row.detection === null ? null : detectionSchema.parse(row.detection),
    problems: problemSchema.array().parse(row.problems),
    createdAt: row.createdAt.toISOString(),
    confirmedAt: row.confirmedAt?.toISOString() ?? null,
  }
}

/** Files of a run, in the order they were added. */
export async function selectUploads(db: Executor, scope: Scope, runId: string): Promise<Upload[]> {
  const rows = await db
    .select(columns)
    .from(uploads)
    .innerJoin(author, eq(author.id, uploads.createdBy))
    .where(and(eq(uploads.runId, runId), inScope(uploads.campaignId, scope)))
    .orderBy(asc(uploads.createdAt), asc(uploads.id))
  return rows.map(uploadOf)
}

export async function selectUpload(db: Executor, scope: Scope, id: string): Promise<Upload | null> {
  const rows = await db
    .select(columns)
    .from(uploads)
    .innerJoin(author, eq(author.id, uploads.createdBy))
    .where(and(eq(uploads.id, id), inScope(uploads.campaignId, scope)))
  return rows[0] === undefined ? null : uploadOf(rows[0])
}

/** The file of a run with these very bytes, if it was added before. */
export async function selectUploadIdByHash(db: Executor, runId: string, sha256: string): Promise<string | null> {
  const rows = await db
    .select({ id: uploads.id })
    .from(uploads)
    .where(and(eq(uploads.runId, runId), eq(uploads.sha256, sha256)))
  return rows[0]?.id ?? null
}

export interface ReadingSpan {
  readonly uploadId: string
  readonly fileName: string
  readonly firstAt: Date | null
  readonly lastAt: Date | null
}

/** From when to when the readings of one kind go that a run has from other files. */
export async function selectReadingSpans(
  db: Executor,
  runId: string,
  kind: 'rig-log' | 'injections',
  butUploadId: string,
): Promise<ReadingSpan[]> {
  return db
    .select({
      uploadId: readingSets.uploadId,
      fileName: uploads.fileName,
      firstAt: readingSets.firstAt,
      lastAt: readingSets.lastAt,
    })
    .from(readingSets)
    .innerJoin(uploads, eq(uploads.id, readingSets.uploadId))
    .where(
      and(
        eq(readingSets.runId, runId),
        eq(readingSets.kind, kind),
        isNull(readingSets.supersededAt),
        ne(readingSets.uploadId, butUploadId),
      ),
    )
    .orderBy(asc(readingSets.firstAt), asc(readingSets.id))
}

/** Other runs in scope that have a file with these very bytes. */
export async function selectRunsWithBytes(
  db: Executor,
  scope: Scope,
  sha256: string,
  butRunId: string,
): Promise<{ runCode: string; fileName: string }[]> {
  return db
    .select({ runCode: runs.code, fileName: uploads.fileName })
    .from(uploads)
    .innerJoin(runs, eq(runs.id, uploads.runId))
    .where(
      and(
        eq(uploads.sha256, sha256),
        ne(uploads.runId, butRunId),
        ne(uploads.state, 'set-aside'),
        inScope(uploads.campaignId, scope),
      ),
    )
    .orderBy(asc(runs.code))
    .limit(5)
}

/** Files that were stored and never looked at: their process ended in between. */
export async function selectUnreadUploads(
  db: Executor,
  addedBefore: Date,
): Promise<{ id: string; runId: string; campaignId: string }[]> {
  return db
    .select({ id: uploads.id, runId: uploads.runId, campaignId: uploads.campaignId })
    .from(uploads)
    .where(and(eq(uploads.state, 'received'), lt(uploads.createdAt, addedBefore), isNull(uploads.erasedAt)))
    .orderBy(asc(uploads.createdAt), asc(uploads.id))
}

/** Hash of every file that a record names: of runs, of calibrations, of column maps. Erased ones are named by no bytes any more. */
export async function selectKnownFileHashes(db: Executor): Promise<string[]> {
  const ofRuns = await db.selectDistinct({ sha256: uploads.sha256 }).from(uploads).where(isNull(uploads.erasedAt))
  const ofCalibrations = await db
    .selectDistinct({ sha256: calibrations.fileSha256 })
    .from(calibrations)
    .where(isNotNull(calibrations.fileSha256))
  const ofMaps = await db
    .selectDistinct({ sha256: columnMaps.sampleFileSha256 })
    .from(columnMaps)
    .where(isNotNull(columnMaps.sampleFileSha256))
  return [...new Set([...ofRuns, ...ofCalibrations, ...ofMaps].flatMap((row) => row.sha256 ?? []))]
}
