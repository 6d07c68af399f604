import 'server-only'
import { randomUUID } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { type Executor, type Transaction } from '../../db/executor'
import { insertAuditEntry } from '../../db/mutations/audit'
import { insertCalibration, lockCalibration, updateCalibration } from '../../db/mutations/rigs'
import {
  selectCalibration,
  selectCalibrations,
  selectRig,
  selectValidCalibrations,
  type CalibrationFilter,
  type CalibrationKey,
} from '../../db/queries/rigs'
import { changedFields } from '../audit/changed-fields'
import { type Calibration, type CalibrationChange, type NewCalibration } from '../domain/calibration'
import { AppError } from '../domain/errors'
import { wholeList, type Page } from '../domain/page'
import { type Actor } from '../domain/role'
import { can } from '../policy/can'
import { authorise, hideUnless } from './authorise'
import { refuseField, refuseStale } from './stale'

async function foundCalibration(db: Executor, id: string): Promise<Calibration> {
  const calibration = await selectCalibration(db, id)
  hideUnless(calibration !== null)
  return calibration
}

/** Latest validity first. */
export async function listCalibrations(
  actor: Actor,
  filter: CalibrationFilter = {},
  page: Page<CalibrationKey> = wholeList,
): Promise<Calibration[]> {
  authorise(can.readHouse(actor))
  return selectCalibrations(await getDatabase(), filter, page)
}

/** What holds for a measurement at that instant on that rig. */
export async function listValidCalibrations(
  actor: Actor,
  at: Date,
  rigId: string | null = null,
): Promise<Calibration[]> {
  authorise(can.readHouse(actor))
  return selectValidCalibrations(await getDatabase(), at, rigId)
}

export async function getCalibration(actor: Actor, id: string): Promise<Calibration> {
  authorise(can.readHouse(actor))
  return foundCalibration(await getDatabase(), id)
}

/** Keeps a calibration. With `supersedesId` it corrects an earlier one of its kind, which one calibration can do only. */
export async function createCalibration(actor: Actor, input: NewCalibration): Promise<Calibration> {
  const [made] = await createCalibrations(actor, [input])
  if (made === undefined) throw new Error('a calibration that was kept was not read back')
  return made
}

/** Keeps several, all or none. */
export async function createCalibrations(actor: Actor, inputs: readonly NewCalibration[]): Promise<Calibration[]> {
  authorise(can.makeCalibration(actor), 'Calibrations are made by technicians, researchers, leads and admins.')
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const made: Calibration[] = []
    for (const input of inputs) made.push(await keepCalibration(tx, actor, input))
    return made
  })
}

/** What the reduction of a run could only guess at or pass over: which way the factors go, a factor of nothing, one that is not above zero, two for one species. */
function checkFactors({ convention, entries }: NewCalibration): void {
  if (convention === null)
    refuseField(
      'convention',
      'Say whether the values are amounts per area (factor) or areas per amount (sensitivity): the two are reciprocals.',
    )
  entries.forEach(({ species, value }, index) => {
    if (species === null) refuseField(`entries.${index}.species`, 'A response factor is that of a species; name it.')
    if (value <= 0)
      refuseField(`entries.${index}.value`, `The response factor of ${species} is ${value}; it has to be above zero.`)
    if (entries.findIndex((other) => other.species === species) !== index)
      refuseField(
        `entries.${index}.species`,
        `${species} stands in the calibration twice; give it one response factor.`,
      )
  })
}

async function keepCalibration(tx: Transaction, actor: Actor, input: NewCalibration): Promise<Calibration> {
  if (input.validTo !== null && Date.parse(input.validTo) <= Date.parse(input.validFrom))
    refuseField('validTo', 'A calibration has to be valid from a time before the one it is valid to.')
  if (input.kind === 'response-factors') checkFactors(input)
  const id = randomUUID()
  if (input.rigId !== null && (await selectRig(tx, input.rigId)) === null) refuseField('rigId', 'There is no such rig.')
  if (input.supersedesId !== null) await checkSuperseding(tx, input.kind, input.supersedesId)
  await insertCalibration(tx, { ...input, id, createdBy: actor.userId })
  const calibration = await foundCalibration(tx, id)
  await insertAuditEntry(tx, {
    actor,
    action: input.supersedesId === null ? 'calibration.create' : 'calibration.supersede',
    entity: 'calibration',
    entityId: id,
    after: calibration,
  })
  return calibration
}

async function checkSuperseding(
  tx: Parameters<typeof lockCalibration>[0],
  kind: Calibration['kind'],
  id: string,
): Promise<void> {
  if (!(await lockCalibration(tx, id))) refuseField('supersedesId', 'There is no such calibration to supersede.')
  const earlier = await foundCalibration(tx, id)
  if (earlier.kind !== kind)
    refuseField('supersedesId', `A calibration of kind ${kind} cannot supersede one of kind ${earlier.kind}.`)
  if (earlier.supersededById !== null)
    throw new AppError('conflict', `“${earlier.name}” was superseded already; supersede the one that did.`, {
      supersededById: earlier.supersededById,
    })
}

/** Corrects a calibration by another one. What rests on the earlier one is valued anew; both are kept. */
export async function supersedeCalibration(
  actor: Actor,
  id: string,
  input: Omit<NewCalibration, 'supersedesId'>,
): Promise<Calibration> {
  authorise(can.makeCalibration(actor), 'Calibrations are made by technicians, researchers, leads and admins.')
  await foundCalibration(await getDatabase(), id)
  return createCalibration(actor, { ...input, supersedesId: id })
}

/** Ends the validity of a calibration, or opens it again. */
export async function changeCalibration(
  actor: Actor,
  id: string,
  change: CalibrationChange,
  version: number,
): Promise<Calibration> {
  authorise(can.makeCalibration(actor), 'Calibrations are changed by technicians, researchers, leads and admins.')
  const db = await getDatabase()
  return db.transaction(async (tx) => {
    const before = await foundCalibration(tx, id)
    if (!(await updateCalibration(tx, id, version, change))) refuseStale(await foundCalibration(tx, id))
    const after = await foundCalibration(tx, id)
    await insertAuditEntry(tx, {
      actor,
      action: 'calibration.change',
      entity: 'calibration',
      entityId: id,
      ...changedFields(before, after),
    })
    return after
  })
}
