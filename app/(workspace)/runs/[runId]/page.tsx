import { type Metadata } from 'next'
import Link from 'next/link'
import { routeOf } from '@/app/_route-of'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { temperWindow, type TemperWindow } from '@/components/charts/temper-scale'
import { formatFixed } from '@/components/numbers/format-fixed'
import { RemarkForm } from '@/components/run/remark-form'
import { RunButtons } from '@/components/run/run-buttons'
import { runConditions } from '@/components/run/run-conditions'
import { EventList, RemarkList, runEvents } from '@/components/run/run-notes'
import { RunWorkspace } from '@/components/run/run-workspace'
import { RunStateTag } from '@/components/run/runs-table'
import { UploadLine } from '@/components/run/upload-line'
import { PageHead } from '@/components/ui/page-head'
import { Tag } from '@/components/ui/tag'
import { CautionTag } from '@/components/working/caution-tag'
import { requireActor } from '@/lib/access/actor'
import { listHistory } from '@/lib/access/history'
import { getRanking, getRunResult } from '@/lib/access/results'
import { getRig } from '@/lib/access/rigs'
import { getRun, listDecisions, listExclusions, listHoldEdits, listRemarks } from '@/lib/access/runs'
import { type Actor } from '@/lib/domain/role'
import { type RunResult } from '@/lib/domain/run-result'
import { can } from '@/lib/policy/can'
import {
  decideAction,
  handInAction,
  leaveOutAction,
  moveHoldAction,
  putBackAction,
  remarkAction,
  setClockAction,
  withdrawHoldEditAction,
} from './actions'

interface RunPageProps {
  readonly params: Promise<{ runId: string }>
}

export async function generateMetadata({ params }: RunPageProps): Promise<Metadata> {
  const actor = await requireActor()
  const run = await showOrNotFound(getRun(actor, (await params).runId))
  return { title: run.code }
}

/** The campaign's temperatures, so that a colour means the same on all its pages; the run's own where there is no ranking to take them from. */
async function campaignWindow(actor: Actor, campaignId: string): Promise<TemperWindow | null> {
  try {
    const ranking = await getRanking(actor, campaignId)
    const temperaturesK = [...ranking.holdTemperaturesK, ranking.referenceTemperatureK]
    return ranking.holdTemperaturesK.length === 0 ? null : temperWindow(temperaturesK)
  } catch (error) {
    // a run must be shown also when another one spoils the ranking: that is where it is mended
    console.warn('The colour scale of the campaign is not known:', error)
    return null
  }
}

/** State, cautions and carbon balance as words beside the title. */
function HeadTags({ result }: { result: RunResult }) {
  const { run, reduction } = result
  const carbon = reduction?.meanCarbonBalance ?? null
  const isCarbonDoubtful = reduction?.cautions.some((caution) => caution.code.includes('carbon')) ?? false
  return (
    <span className="flex flex-wrap items-center gap-1.5 self-center">
      <RunStateTag run={run} />
      {run.isFrozen ? <Tag>held by an edition</Tag> : null}
      {reduction?.cautions.map((caution, index) => (
        <CautionTag key={`${caution.code}-${index}`} caution={caution} />
      ))}
      {carbon !== null && !isCarbonDoubtful ? <Tag kind="sound">carbon {formatFixed(carbon, 2)}</Tag> : null}
    </span>
  )
}

export default async function RunPage({ params }: RunPageProps) {
  const actor = await requireActor()
  const { runId } = await params
  const result = await showOrNotFound(getRunResult(actor, runId))
  const { run } = result
  const mayReadHistory = can.readHistory(actor, run.campaignId)
  const [window, rig, decisions, exclusions, holdEdits, remarks, history] = await Promise.all([
    campaignWindow(actor, run.campaignId),
    getRig(actor, run.rigId),
    listDecisions(actor, runId),
    listExclusions(actor, runId),
    listHoldEdits(actor, runId),
    listRemarks(actor, runId),
    mayReadHistory ? listHistory(actor, run.campaignId) : [],
  ])
  const permissions = {
    canAddFiles: can.addFiles(actor, run),
    canEdit: can.editRun(actor, run),
    canHandIn: can.handIn(actor, run),
    canDecide: can.decide(actor, run.campaignId, run),
    canLeaveOut: can.leaveOut(actor, run),
    canRemark: can.remark(actor, run.campaignId),
  }
  const events = runEvents(
    decisions,
    exclusions,
    holdEdits,
    history.filter((entry) => entry.entityId === run.id),
  )
  return (
    <>
      <PageHead
        title={run.code}
        of={`on ${run.sampleCode}, ${run.sampleName}`}
        meta={
          <>
            <Link href={routeOf(`/campaigns/${run.campaignId}`)} className="underline underline-offset-2">
              {run.campaignCode}
            </Link>{' '}
            · {runConditions(run, rig.timeZone)}
          </>
        }
        actions={
          <>
            <HeadTags result={result} />
            <RunButtons
              runId={run.id}
              runCode={run.code}
              state={run.state}
              decision={run.decision}
              version={run.version}
              permissions={permissions}
              actions={{ handIn: handInAction, decide: decideAction }}
            />
          </>
        }
      />
      <div className="border-t border-line px-4 pt-3 sm:px-6">
        <UploadLine
          uploads={result.uploads}
          runId={run.id}
          version={run.version}
          clockOffsetS={run.clockOffsetS}
          clockProposal={result.reduction?.clockOffset ?? null}
          canOpen={permissions.canAddFiles}
          canSetClock={permissions.canEdit}
          setClock={setClockAction}
        />
        {run.decisionReason === null ? null : (
          <p className="mt-1 mb-0 text-[12.5px] text-ink-2">
            {run.decision?.replace('-', ' ')}: {run.decisionReason}
          </p>
        )}
      </div>
      <RunWorkspace
        result={result}
        permissions={permissions}
        exclusions={exclusions}
        holdEdits={holdEdits}
        window={window}
        actions={{
          leaveOut: leaveOutAction,
          putBack: putBackAction,
          moveHold: moveHoldAction,
          withdrawHoldEdit: withdrawHoldEditAction,
        }}
      >
        {run.pretreatment === '' && run.notes === '' ? null : (
          <section className="max-w-prose">
            <h2 className="mt-5 mb-1">As logged</h2>
            {run.pretreatment === '' ? null : <p className="m-0">Pretreatment: {run.pretreatment}</p>}
            {run.notes === '' ? null : <p className="m-0 whitespace-pre-line">{run.notes}</p>}
          </section>
        )}
        <section>
          <h2 className="mt-5 mb-0">Remarks</h2>
          <RemarkList remarks={remarks} />
          {permissions.canRemark ? <RemarkForm runId={run.id} remark={remarkAction} /> : null}
        </section>
        <section>
          <h2 className="mt-5 mb-0">What was changed</h2>
          <EventList events={events} />
        </section>
      </RunWorkspace>
    </>
  )
}
