import { and, asc, desc, eq, gt, isNull, lte, notExists, or, sql, type SQL } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'
import { calibrationEntrySchema, newCalibrationSchema, type Calibration } from '@/lib/domain/calibration'
import { columnMapSpecificationSchema, type ColumnMap } from '@/lib/domain/column-map'
import { type Page } from '@/lib/domain/page'
import { newRigSchema, type Rig } from '@/lib/domain/rig'
import { type Executor } from '../executor'
import { instantOf, instantOrNull } from '../instant'
import { calibrations, columnMaps, rigs, users } from '../schema'

// Rigs, calibrations and column maps belong to the house, not to a campaign.

const rigColumns = {
  id: rigs.id,
  code: rigs.code,
  name: rigs.name,
  reactorKind: rigs.reactorKind,
  timeZone: rigs.timeZone,
  channels: rigs.channels,
  barometerPa: rigs.barometerPa,
  maximumPressurePa: rigs.maximumPressurePa,
  maximumTemperatureK: rigs.maximumTemperatureK,
  lineLagS: rigs.lineLagS,
  flowReferenceTemperatureK: rigs.flowReferenceTemperatureK,
  flowReferencePressurePa: rigs.flowReferencePressurePa,
  notes: rigs.notes,
  version: rigs.version,
}

function toRig(row: Omit<Rig, 'reactorKind' | 'channels'> & { reactorKind: string; channels: unknown }): Rig {
  return {
    ...row,
    reactorKind: newRigSchema.shape.reactorKind.parse(row.reactorKind),
    channels: newRigSchema.shape.channels.parse(row.channels),
  }
}

export async function selectRigs(db: Executor, page: Page<string>): Promise<Rig[]> {
  const rows = await db
    .select(rigColumns)
    .from(rigs)
    .where(page.after === null ? undefined : gt(rigs.code, page.after))
    .orderBy(asc(rigs.code))
    .limit(page.limit)
  return rows.map(toRig)
}

export async function selectRig(db: Executor, id: string): Promise<Rig | null> {
  const [row] = await db.select(rigColumns).from(rigs).where(eq(rigs.id, id))
  return row === undefined ? null : toRig(row)
}

const correction = alias(calibrations, 'correction')

const calibrationColumns = {
  id: calibrations.id,
  kind: calibrations.kind,
  name: calibrations.name,
  instrument: calibrations.instrument,
  rigId: calibrations.rigId,
  convention: calibrations.convention,
  entries: calibrations.entries,
  standardUsed: calibrations.standardUsed,
  fileSha256: calibrations.fileSha256,
  validFrom: calibrations.validFrom,
  validTo: calibrations.validTo,
  supersedesId: calibrations.supersedesId,
  supersededById: correction.id,
  createdBy: calibrations.createdBy,
  createdByName: users.displayName,
  createdAt: calibrations.createdAt,
  version: calibrations.version,
}

export interface CalibrationFilter {
  readonly kind?: Calibration['kind'] | undefined
  readonly rigId?: string | undefined
}

export interface CalibrationKey {
  readonly validFrom: string
  readonly id: string
}

async function calibrationsWhere(db: Executor, where: SQL | undefined, limit: number): Promise<Calibration[]> {
  const rows = await db
    .select(calibrationColumns)
    .from(calibrations)
    .innerJoin(users, eq(users.id, calibrations.createdBy))
    .leftJoin(correction, eq(correction.supersedesId, calibrations.id))
    .where(where)
    .orderBy(desc(calibrations.validFrom), asc(calibrations.id))
    .limit(limit)
  return rows.map((row) => ({
    ...row,
    kind: newCalibrationSchema.shape.kind.parse(row.kind),
    convention: newCalibrationSchema.shape.convention.parse(row.convention),
    entries: calibrationEntrySchema.array().parse(row.entries),
    validFrom: instantOf(row.validFrom),
    validTo: instantOrNull(row.validTo),
    createdAt: instantOf(row.createdAt),
  }))
}

/** Latest validity first. */
export async function selectCalibrations(
  db: Executor,
  filter: CalibrationFilter,
  page: Page<CalibrationKey>,
): Promise<Calibration[]> {
  const after = page.after
  const where = and(
    filter.kind === undefined ? undefined : eq(calibrations.kind, filter.kind),
    filter.rigId === undefined ? undefined : eq(calibrations.rigId, filter.rigId),
    after === null
      ? undefined
      : or(
          sql`${calibrations.validFrom} < ${after.validFrom}::timestamptz`,
          and(sql`${calibrations.validFrom} = ${after.validFrom}::timestamptz`, gt(calibrations.id, after.id)),
        ),
  )
  return calibrationsWhere(db, where, page.limit)
}

export async function selectCalibration(db: Executor, id: string): Promise<Calibration | null> {
  const [found] = await calibrationsWhere(db, eq(calibrations.id, id), 1)
  return found ?? null
}

/**
 * Calibrations to be used for something measured at that instant, of all rigs and of the given one, latest validity first. One that was
 * superseded gives way where something that supersedes it, at first or second hand, is valid itself.
 */
export async function selectValidCalibrations(
  db: Executor,
  at: Date,
  rigId: string | null = null,
): Promise<Calibration[]> {
  const instant = at.toISOString()
  const newer = sql`(
    with recursive chain as (
      select c.id, c.valid_from, c.valid_to from calibrations c where c.supersedes_id = ${calibrations.id}
      union
      select c.id, c.valid_from, c.valid_to from calibrations c join chain on c.supersedes_id = chain.id
    )
    select 1 from chain
    where chain.valid_from <= ${instant}::timestamptz and (chain.valid_to is null or chain.valid_to > ${instant}::timestamptz)
  )`
  const where = and(
    lte(calibrations.validFrom, at),
    or(isNull(calibrations.validTo), sql`${calibrations.validTo} > ${instant}::timestamptz`),
    or(isNull(calibrations.rigId), rigId === null ? undefined : eq(calibrations.rigId, rigId)),
    notExists(newer),
  )
  return calibrationsWhere(db, where, 10_000)
}

const columnMapColumns = {
  id: columnMaps.id,
  rigId: columnMaps.rigId,
  instrument: columnMaps.instrument,
  number: columnMaps.number,
  fingerprint: columnMaps.fingerprint,
  specification: columnMaps.specification,
  createdBy: columnMaps.createdBy,
  createdAt: columnMaps.createdAt,
}

type ColumnMapRow = Omit<ColumnMap, 'specification' | 'createdAt'> & { specification: unknown; createdAt: Date }

function toColumnMap(row: ColumnMapRow): ColumnMap {
  return {
    ...row,
    specification: columnMapSpecificationSchema.parse(row.specification),
    createdAt: instantOf(row.createdAt),
  }
}

export interface ColumnMapFilter {
  readonly rigId?: string | undefined
  readonly instrument?: string | undefined
  readonly fingerprint?: string | undefined
}

export interface ColumnMapKey {
  readonly rigId: string
  readonly instrument: string
  readonly number: number
}

const columnMapFilter = (filter: ColumnMapFilter) => [
  filter.rigId === undefined ? undefined : eq(columnMaps.rigId, filter.rigId),
  filter.instrument === undefined ? undefined : eq(columnMaps.instrument, filter.instrument),
  filter.fingerprint === undefined ? undefined : eq(columnMaps.fingerprint, filter.fingerprint),
]

/** By rig and instrument, oldest version first. */
export async function selectColumnMaps(
  db: Executor,
  filter: ColumnMapFilter,
  page: Page<ColumnMapKey>,
): Promise<ColumnMap[]> {
  const after = page.after
  const rows = await db
    .select(columnMapColumns)
    .from(columnMaps)
    .where(
      and(
        ...columnMapFilter(filter),
        after === null
          ? undefined
          : sql`(${columnMaps.rigId}, ${columnMaps.instrument}, ${columnMaps.number}) > (${after.rigId}::text, ${after.instrument}::text, ${after.number}::int)`,
      ),
    )
    .orderBy(asc(columnMaps.rigId), asc(columnMaps.instrument), asc(columnMaps.number))
    .limit(page.limit)
  return rows.map(toColumnMap)
}

export async function selectColumnMap(db: Executor, id: string): Promise<ColumnMap | null> {
  const [row] = await db.select(columnMapColumns).from(columnMaps).where(eq(columnMaps.id, id))
  return row === undefined ? null : toColumnMap(row)
}

/** The newest map whose file had these columns, on this rig. */
export async function selectColumnMapByFingerprint(
  db: Executor,
  rigId: string,
  fingerprint: string,
): Promise<ColumnMap | null> {
  const [row] = await db
    .select(columnMapColumns)
    .from(columnMaps)
    .where(and(eq(columnMaps.rigId, rigId), eq(columnMaps.fingerprint, fingerprint)))
    .orderBy(desc(columnMaps.createdAt), desc(columnMaps.number))
    .limit(1)
  return row === undefined ? null : toColumnMap(row)
}
