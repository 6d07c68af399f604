'use server'

import { revalidatePath } from 'next/cache'
import { requireActor } from '@/lib/access/actor'
import {
  addExclusion,
  addRemark,
  changeRun,
  decide,
  editHold,
  handIn,
  withdrawExclusion,
  withdrawHoldEdit,
} from '@/lib/access/runs'
import { answerAction } from '@/lib/domain/action-answer'
import { type ActionResult } from '@/lib/domain/errors'
import { type Actor } from '@/lib/domain/role'
import {
  decisionSchema,
  exclusionSchema,
  holdEditSchema,
  remarkSchema,
  runChangeSchema,
  withdrawalSchema,
  type NewDecision,
  type NewExclusion,
  type NewHoldEdit,
} from '@/lib/domain/run'
import { idSchema } from '@/lib/domain/text'

/** Actor, then one access call, then the sentence; whatever changed a run changes its page and its campaign's. */
async function changing(work: (actor: Actor) => Promise<string>): Promise<ActionResult<string>> {
  const actor = await requireActor()
  const answer = await answerAction(() => work(actor))
  if (answer.ok) revalidatePath('/', 'layout')
  return answer
}

export async function handInAction(runId: string, version: number): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    const run = await handIn(actor, idSchema.parse(runId), Number(version))
    return `${run.code} is handed in.`
  })
}

export async function decideAction(
  runId: string,
  version: number,
  decision: NewDecision,
): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    const run = await decide(actor, idSchema.parse(runId), decisionSchema.parse(decision), Number(version))
    return `${run.code}: ${run.decision?.replace('-', ' ') ?? 'undecided'}.`
  })
}

export async function leaveOutAction(runId: string, exclusion: NewExclusion): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    const made = await addExclusion(actor, idSchema.parse(runId), exclusionSchema.parse(exclusion))
    return `The ${made.kind} is left out. It stays visible with your reason.`
  })
}

export async function putBackAction(runId: string, exclusionId: string, reason: string): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    const { reason: why } = withdrawalSchema.parse({ reason })
    const back = await withdrawExclusion(actor, idSchema.parse(runId), idSchema.parse(exclusionId), why)
    return `The ${back.kind} is put back.`
  })
}

export async function moveHoldAction(runId: string, edit: NewHoldEdit): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    await editHold(actor, idSchema.parse(runId), holdEditSchema.parse(edit))
    return 'The window is moved and the point computed anew.'
  })
}

export async function withdrawHoldEditAction(
  runId: string,
  holdEditId: string,
  reason: string,
): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    const { reason: why } = withdrawalSchema.parse({ reason })
    await withdrawHoldEdit(actor, idSchema.parse(runId), idSchema.parse(holdEditId), why)
    return 'The window that the rule found is in force again.'
  })
}

export async function setClockAction(runId: string, version: number, offsetS: number): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    const change = runChangeSchema.pick({ clockOffsetS: true }).parse({ clockOffsetS: offsetS })
    const run = await changeRun(actor, idSchema.parse(runId), change, Number(version))
    return `The analyser’s clock of ${run.code} is set.`
  })
}

export async function remarkAction(runId: string, body: string): Promise<ActionResult<string>> {
  return changing(async (actor) => {
    await addRemark(actor, idSchema.parse(runId), remarkSchema.parse({ body }).body)
    return 'The remark is kept.'
  })
}
