import { and, eq, max, sql } from 'drizzle-orm'
import { type CalibrationChange, type NewCalibration } from '@/lib/domain/calibration'
import { type NewColumnMap } from '@/lib/domain/column-map'
import { type NewRig, type RigChange } from '@/lib/domain/rig'
import { type Transaction } from '../executor'
import { dateOrNull } from '../instant'
import { calibrations, columnMaps, rigs } from '../schema'

interface Made {
  readonly id: string
  readonly createdBy: string
}

export async function insertRig(tx: Transaction, rig: NewRig & Made): Promise<void> {
  await tx.insert(rigs).values({
    id: rig.id,
    code: rig.code,
    name: rig.name,
    reactorKind: rig.reactorKind,
    timeZone: rig.timeZone,
    channels: rig.channels,
    barometerPa: rig.barometerPa,
    maximumPressurePa: rig.maximumPressurePa,
    maximumTemperatureK: rig.maximumTemperatureK,
    lineLagS: rig.lineLagS,
    flowReferenceTemperatureK: rig.flowReferenceTemperatureK,
    flowReferencePressurePa: rig.flowReferencePressurePa,
    notes: rig.notes,
    createdBy: rig.createdBy,
  })
}

/** False where it has another version by now. */
export async function updateRig(tx: Transaction, id: string, version: number, change: RigChange): Promise<boolean> {
  const rows = await tx
    .update(rigs)
    .set({
      name: change.name,
      reactorKind: change.reactorKind,
      timeZone: change.timeZone,
      channels: change.channels,
      barometerPa: change.barometerPa,
      maximumPressurePa: change.maximumPressurePa,
      maximumTemperatureK: change.maximumTemperatureK,
      lineLagS: change.lineLagS,
      flowReferenceTemperatureK: change.flowReferenceTemperatureK,
      flowReferencePressurePa: change.flowReferencePressurePa,
      notes: change.notes,
      version: sql`${rigs.version} + 1`,
    })
    .where(and(eq(rigs.id, id), eq(rigs.version, version)))
    .returning({ id: rigs.id })
  return rows.length > 0
}

export async function insertCalibration(tx: Transaction, calibration: NewCalibration & Made): Promise<void> {
  await tx.insert(calibrations).values({
    id: calibration.id,
    kind: calibration.kind,
    name: calibration.name,
    instrument: calibration.instrument,
    rigId: calibration.rigId,
    convention: calibration.convention,
    entries: calibration.entries,
    standardUsed: calibration.standardUsed,
    fileSha256: calibration.fileSha256,
    validFrom: new Date(calibration.validFrom),
    validTo: dateOrNull(calibration.validTo),
    supersedesId: calibration.supersedesId,
    createdBy: calibration.createdBy,
  })
}

/** Holds a calibration until the transaction ends, so that only one other supersedes it. */
export async function lockCalibration(tx: Transaction, id: string): Promise<boolean> {
  const rows = await tx.select({ id: calibrations.id }).from(calibrations).where(eq(calibrations.id, id)).for('update')
  return rows.length > 0
}

/** False where it has another version by now. */
export async function updateCalibration(
  tx: Transaction,
  id: string,
  version: number,
  change: CalibrationChange,
): Promise<boolean> {
  const rows = await tx
    .update(calibrations)
    .set({ validTo: dateOrNull(change.validTo), version: sql`${calibrations.version} + 1` })
    .where(and(eq(calibrations.id, id), eq(calibrations.version, version)))
    .returning({ id: calibrations.id })
  return rows.length > 0
}

/** Writes the next version of the instrument's map on the rig; holds the rig, so that no two get the same number. */
export async function insertColumnMap(tx: Transaction, map: NewColumnMap & Made): Promise<void> {
  await tx.select({ id: rigs.id }).from(rigs).where(eq(rigs.id, map.rigId)).for('update')
  const [row] = await tx
    .select({ largest: max(columnMaps.number) })
    .from(columnMaps)
    .where(and(eq(columnMaps.rigId, map.rigId), eq(columnMaps.instrument, map.instrument)))
  await tx.insert(columnMaps).values({
    id: map.id,
    rigId: map.rigId,
    instrument: map.instrument,
    number: (row?.largest ?? 0) + 1,
    // the time of this statement, under the lock: that of the transaction's start could be before that of a lower number
    createdAt: sql`clock_timestamp()`,
    fingerprint: map.fingerprint,
    specification: map.specification,
    sampleFileSha256: map.sampleFileSha256,
    createdBy: map.createdBy,
  })
}
