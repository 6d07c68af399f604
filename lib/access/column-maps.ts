import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertColumnMap } from '../../db/mutations/rigs'
import {
  selectColumnMap,
  selectColumnMapByFingerprint,
  selectColumnMaps,
  selectRig,
  type ColumnMapFilter,
  type ColumnMapKey,
} from '../../db/queries/rigs'
import { type ColumnMap, type NewColumnMap } from '../domain/column-map'
import { wholeList, type Page } from '../domain/page'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { authorise, hideUnless } from './authorise'
import { refuseField } from './stale'

async function foundColumnMap(db: Executor, id: string): Promise<ColumnMap> {
  const map = await selectColumnMap(db, id)
  hideUnless(map !== null)
  return map
}

/** By rig and instrument, oldest version first. */
export async function listColumnMaps(
  actor: Actor,
  filter: ColumnMapFilter = {},
  page: Page<ColumnMapKey> = wholeList,
): Promise<ColumnMap[]> {
  authorise(can.readHouse(actor))
  return selectColumnMaps(await getDatabase(), filter, page)
}

export async function getColumnMap(actor: Actor, id: string): Promise<ColumnMap> {
  authorise(can.readHouse(actor))
  return foundColumnMap(await getDatabase(), id)
}

/** The newest map of the rig for files with these columns, or null for a file not met before. */
export async function findColumnMap(actor: Actor, rigId: string, fingerprint: string): Promise<ColumnMap | null> {
  authorise(can.readHouse(actor) || can.makeColumnMap(actor))
  return selectColumnMapByFingerprint(await getDatabase(), rigId, fingerprint)
}

/** Keeps the next version of the map of one instrument on one rig; earlier ones stay as they were. */
export async function createColumnMap(actor: Actor, input: NewColumnMap): Promise<ColumnMap> {
  authorise(can.makeColumnMap(actor), 'Column maps are made by technicians, researchers, leads and admins.')
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    if ((await selectRig(tx, input.rigId)) === null) refuseField('rigId', 'There is no such rig.')
    await insertColumnMap(tx, { ...input, id, createdBy: actor.userId })
    const map = await foundColumnMap(tx, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'column-map.create',
      entity: 'column-map',
      entityId: id,
      after: { rigId: map.rigId, instrument: map.instrument, number: map.number, fingerprint: map.fingerprint },
    })
    return map
  })
}
