import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertRig, updateRig } from '../../db/mutations/rigs'
import { selectRig, selectRigs } from '../../db/queries/rigs'
import { changedFields } from '../audit/changed-fields'
import { wholeList, type Page } from '../domain/page'
import { type NewRig, type Rig, type RigChange } from '../domain/rig'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { authorise, hideUnless } from './authorise'
import { refuseEmpty, refuseField, refuseStale } from './stale'

async function foundRig(db: Executor, id: string): Promise<Rig> {
  const rig = await selectRig(db, id)
  hideUnless(rig !== null)
  return rig
}

function isTimeZone(name: string): boolean {
  try {
    return new Intl.DateTimeFormat('en', { timeZone: name }).resolvedOptions().timeZone !== ''
  } catch (error) {
    if (error instanceof RangeError) return false
    throw error
  }
}

function checkRig(rig: RigChange): void {
  if (rig.timeZone !== undefined && !isTimeZone(rig.timeZone))
    refuseField('timeZone', `There is no time zone “${rig.timeZone}”. Name one as Europe/Oslo or UTC.`)
  const codes = rig.channels?.map((channel) => channel.code) ?? []
  const twice = codes.find((code, index) => codes.indexOf(code) !== index)
  if (twice !== undefined) refuseField('channels', `Two channels have the code ${twice}; give each its own.`)
}

export async function listRigs(actor: Actor, page: Page<string> = wholeList): Promise<Rig[]> {
  authorise(can.readHouse(actor))
  return selectRigs(await getDatabase(), page)
}

export async function getRig(actor: Actor, id: string): Promise<Rig> {
  authorise(can.readHouse(actor))
  return foundRig(await getDatabase(), id)
}

export async function createRig(actor: Actor, input: NewRig): Promise<Rig> {
  authorise(can.manageRigs(actor), 'Rigs are managed by admins.')
  checkRig(input)
  const id = randomUUID()
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    await insertRig(tx, { ...input, id, createdBy: actor.userId })
    const rig = await foundRig(tx, id)
    await insertAuditEntry(tx, { actor, action: 'rig.create', entity: 'rig', entityId: id, after: rig })
    return rig
  })
}

export async function changeRig(actor: Actor, id: string, change: RigChange, version: number): Promise<Rig> {
  authorise(can.manageRigs(actor), 'Rigs are managed by admins.')
  refuseEmpty(change)
  checkRig(change)
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const before = await foundRig(tx, id)
    if (!(await updateRig(tx, id, version, change))) refuseStale(await foundRig(tx, id))
    const after = await foundRig(tx, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'rig.change',
      entity: 'rig',
      entityId: id,
      ...changedFields(before, after),
    })
    return after
  })
}
