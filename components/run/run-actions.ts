import { type ActionResult } from '@/lib/domain/errors'
import { type NewDecision, type NewExclusion, type NewHoldEdit } from '@/lib/domain/run'

/** What the run page may ask the server to do; each is authorised there again. */
export interface RunActions {
  readonly handIn: (runId: string, version: number) => Promise<ActionResult<string>>
  readonly decide: (runId: string, version: number, decision: NewDecision) => Promise<ActionResult<string>>
  readonly leaveOut: (runId: string, exclusion: NewExclusion) => Promise<ActionResult<string>>
  readonly putBack: (runId: string, exclusionId: string, reason: string) => Promise<ActionResult<string>>
  readonly moveHold: (runId: string, edit: NewHoldEdit) => Promise<ActionResult<string>>
  readonly withdrawHoldEdit: (runId: string, holdEditId: string, reason: string) => Promise<ActionResult<string>>
  readonly setClock: (runId: string, version: number, offsetS: number) => Promise<ActionResult<string>>
  readonly remark: (runId: string, body: string) => Promise<ActionResult<string>>
}

/** What this person may do with this run. */
export interface RunPermissions {
  readonly canAddFiles: boolean
  readonly canEdit: boolean
  readonly canHandIn: boolean
  readonly canDecide: boolean
  readonly canLeaveOut: boolean
  readonly canRemark: boolean
}
