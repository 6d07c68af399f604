'use client'

import { useRouter } from 'next/navigation'
import { type ReactNode, useMemo, useState } from 'react'
import { type InjectionUse, type Point, type RunReduction } from '@/lib/analysis/reduction/run-reduction'
import { type Working } from '@/lib/analysis/working'
import { type RunExclusion, type RunHoldEdit } from '@/lib/domain/run'
import { type RunResult } from '@/lib/domain/run-result'
import { ArrheniusChart } from '@/components/charts/arrhenius-chart'
import { type HoldWindow } from '@/components/charts/hold-edges'
import { temperWindow, type TemperWindow } from '@/components/charts/temper-scale'
import { TimeTraceChart } from '@/components/charts/time-trace-chart'
import { timeTraceSpan } from '@/components/charts/time-trace-chart-option'
import { formatFixed } from '@/components/numbers/format-fixed'
import { practicalUnits } from '@/components/numbers/practical-units'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { CautionList } from '@/components/working/caution-list'
import { WorkingPanel } from '@/components/working/working-panel'
import { FitTable, type NamedFit } from './fit-table'
import { MoveHoldDialog } from './move-hold-dialog'
import { notesOfHolds, PointsTable, workingOfPoint, type PickedNumber } from './points-table'
import { ReasonDialog } from './reason-dialog'
import { type RunActions, type RunPermissions } from './run-actions'

interface RunWorkspaceProps {
  readonly result: RunResult
  readonly permissions: RunPermissions
  readonly exclusions: readonly RunExclusion[]
  readonly holdEdits: readonly RunHoldEdit[]
  /** the campaign's own window, so that a colour means the same temperature on all its pages; the run's when null */
  readonly window: TemperWindow | null
  readonly actions: Pick<RunActions, 'leaveOut' | 'putBack' | 'moveHold' | 'withdrawHoldEdit'>
  /** remarks and history, below the numbers */
  readonly children?: ReactNode
}

type Asked =
  | { readonly kind: 'leave-out'; readonly what: 'hold' | 'injection'; readonly atS: number; readonly name: string }
  | { readonly kind: 'put-back'; readonly exclusion: RunExclusion; readonly name: string }
  | { readonly kind: 'move'; readonly window: HoldWindow }
  | { readonly kind: 'restore'; readonly edit: RunHoldEdit; readonly name: string }

/** Instants are kept in milliseconds at most; two that agree to half a second are the same hold or injection. */
const isSameInstant = (a: number, b: number) => Math.abs(a - b) < 0.5

/** First shown: the rate in the middle of the run, where conversion is neither tiny nor large. */
function firstPicked(points: readonly Point[]): PickedNumber | null {
  const withWorking = points.filter(
    (point) => point.rateMolPerKgS !== null && workingOfPoint(point, 'rateMolPerKgS') !== null,
  )
  const middle = withWorking[Math.floor((withWorking.length - 1) / 2)]
  return middle ? { holdNumber: middle.hold.number, key: 'rateMolPerKgS' } : null
}

function usedBy(reduction: RunReduction, point: Point | undefined): string[] {
  const { fit } = reduction
  if (!point || !fit) return []
  const used = fit.points.filter((entry) => entry.isUsed)
  const place = used.findIndex((entry) => entry.holdNumber === point.hold.number && entry.runCode === reduction.runCode)
  return place < 0
    ? ['No line: it stays visible and is left out of the fit.']
    : [`Arrhenius line of this run (point ${place + 1} of ${used.length}), ranking of the campaign.`]
}

/** One run: the trace, its points, its line, and the working of the picked number. */
export function RunWorkspace(props: RunWorkspaceProps) {
  const { result, permissions, exclusions, holdEdits, actions } = props
  const { reduction, trace, run } = result
  const router = useRouter()
  const [asked, setAsked] = useState<Asked | null>(null)
  const [message, setMessage] = useState('')
  const [picked, setPicked] = useState<PickedNumber | null>(() => firstPicked(reduction?.points ?? []))
  const [fitWorking, setFitWorking] = useState<Working | null>(null)
  const [hasPicked, setHasPicked] = useState(false)
  const window = useMemo(
    () => props.window ?? temperWindow(reduction?.points.map((point) => point.temperatureK.value) ?? []),
    [props.window, reduction],
  )
  const standing = exclusions.filter((exclusion) => exclusion.withdrawnAt === null)
  const exclusionOf = (kind: 'hold' | 'injection', atS: number) =>
    standing.find((exclusion) => exclusion.kind === kind && isSameInstant(exclusion.atS, atS))
  const editOf = (foundStartS: number) =>
    holdEdits.find((edit) => edit.withdrawnAt === null && isSameInstant(edit.foundStartS, foundStartS))

  const askAboutInjection = (injection: InjectionUse) => {
    const name = `injection ${injection.number}`
    const exclusion = exclusionOf('injection', injection.timeS)
    if (exclusion) setAsked({ kind: 'put-back', exclusion, name })
    else if (injection.use !== 'left-out')
      setAsked({ kind: 'leave-out', what: 'injection', atS: injection.timeS, name })
  }
  const done = (text: string) => {
    setAsked(null)
    setMessage(text)
    router.refresh()
  }

  const point = reduction?.points.find((entry) => entry.hold.number === picked?.holdNumber)
  const working = fitWorking ?? (point && picked ? workingOfPoint(point, picked.key) : null)
  const fits: NamedFit[] = reduction?.fit
    ? [
        {
          name: reduction.fitWithAllPoints ? 'without what was left out' : 'all counting holds',
          fit: reduction.fit,
          about: reduction.cautions,
        },
        ...(reduction.fitWithAllPoints ? [{ name: 'with it', fit: reduction.fitWithAllPoints }] : []),
      ]
    : []
  const series = useMemo(
    () =>
      reduction?.fit
        ? [
            {
              code: run.code,
              symbol: 'circle' as const,
              fit: reduction.fit,
              shift: reduction.fit.quantity === 'rate' ? practicalUnits.lnRate.fromSi(0) : 0,
            },
          ]
        : [],
    [reduction, run.code],
  )
  const returned = reduction?.points.find((entry) => entry.hold.returnsTo !== null)

  return (
    <div className="grid grid-cols-[minmax(0,1fr)] xl:grid-cols-[minmax(0,1fr)_400px]">
      <div className="min-w-0 px-4 py-3 sm:px-6">
        <p role="status" className="sr-only">
          {message}
        </p>
        {message === '' ? null : (
          <Notice kind="sound" className="mb-3">
            {message}
          </Notice>
        )}
        {reduction === null ? (
          <Notice title="Not reduced yet." className="mb-3">
            {result.notReadyReason}
          </Notice>
        ) : null}
        {trace === null ? null : (
          <section aria-label="Time trace">
            <TimeTraceChart
              trace={trace}
              holds={reduction?.holds ?? []}
              injections={reduction?.injections ?? []}
              window={window}
              {...(permissions.canLeaveOut
                ? {
                    onMoveHold: (moved: HoldWindow) => setAsked({ kind: 'move', window: moved }),
                    onPickInjection: (timeS: number) => {
                      const injection = reduction?.injections.find((entry) => isSameInstant(entry.timeS, timeS))
                      if (injection) askAboutInjection(injection)
                    },
                  }
                : {})}
            />
          </section>
        )}
        {reduction === null ? null : (
          <>
            <h2 className="mt-4 mb-0">
              Points{' '}
              <span className="font-ui text-[12.5px] font-normal text-ink-3">
                {reduction.points.length} holds
                {returned
                  ? `; hold ${returned.hold.number} returns to ${formatFixed(returned.hold.setTemperatureK - 273.15, 0)} °C`
                  : ''}
                ; ± is one standard uncertainty of this hold alone
              </span>
            </h2>
            <PointsTable
              points={reduction.points}
              window={window}
              picked={fitWorking ? null : picked}
              onPick={(next) => {
                setFitWorking(null)
                setPicked(next)
                setHasPicked(true)
              }}
            />
            <HoldNotes points={reduction.points} />
            {permissions.canLeaveOut && point ? (
              <HoldActions
                point={point}
                exclusion={exclusionOf('hold', point.hold.foundStartS)}
                edit={editOf(point.hold.foundStartS)}
                onAsk={setAsked}
              />
            ) : null}
            {permissions.canLeaveOut ? (
              <InjectionList
                injections={reduction.injections}
                hasExclusion={(injection) => exclusionOf('injection', injection.timeS) !== undefined}
                onPick={askAboutInjection}
              />
            ) : null}
            <h2 className="mt-5 mb-0">Arrhenius line</h2>
            {fits.length === 0 ? (
              <p className="mt-1 text-ink-2">{reduction.noFitReason}</p>
            ) : (
              <>
                <FitTable
                  caption="Arrhenius line of this run"
                  fits={fits}
                  onOpen={(fit, key) => {
                    setFitWorking(fit.workings[key] ?? null)
                    setHasPicked(true)
                  }}
                />
                <div className="mt-3 max-w-[560px]">
                  <ArrheniusChart
                    series={series}
                    window={window}
                    quantity={series[0]?.fit.quantity ?? 'rate'}
                    isCompact
                  />
                </div>
              </>
            )}
            <h2 className="mt-5 mb-1">Cautions</h2>
            <CautionList cautions={reduction.cautions} />
            {reduction.mayCount ? null : (
              <Notice kind="fault" className="mt-2">
                A grave caution keeps this run from counting until a lead decides.
              </Notice>
            )}
          </>
        )}
        {props.children}
      </div>
      <aside
        aria-label="Working"
        className="min-w-0 border-line bg-sheet px-4 py-3.5 max-xl:border-t sm:px-5 xl:border-l"
      >
        {working ? (
          <WorkingPanel
            working={working}
            takesFocus={hasPicked}
            usedBy={fitWorking || reduction === null ? [] : usedBy(reduction, point)}
          />
        ) : (
          <p className="m-0 text-ink-3">Pick a number to see how it came about.</p>
        )}
      </aside>
      {asked === null ? null : (
        <Question
          asked={asked}
          runId={run.id}
          span={trace ? timeTraceSpan(trace) : null}
          actions={actions}
          onClose={() => setAsked(null)}
          onDone={done}
        />
      )}
    </div>
  )
}

function HoldNotes({ points }: { points: readonly Point[] }) {
  const notes = points.flatMap((point) =>
    point.cautions
      .filter((caution) => caution.severity === 'note')
      .map((caution) => ({ holdNumber: point.hold.number, caution })),
  )
  if (notes.length === 0) return null
  return (
    <details className="mt-1.5">
      <summary className="inline-block min-h-6 cursor-pointer text-[12.5px] text-ink-2 touch:min-h-11">
        Notes: {notesOfHolds(points).map(noteText).join('; ')}
      </summary>
      <ul className="m-0 mt-1 list-none space-y-0.5 p-0 text-[12.5px]">
        {notes.map((note, index) => (
          <li key={index}>
            <span className="text-ink-3">Hold {note.holdNumber}</span> {note.caution.sentence}
          </li>
        ))}
      </ul>
    </details>
  )
}

const noteText = (note: { tag: string; holds: readonly number[] }) =>
  `${note.tag} (hold${note.holds.length === 1 ? '' : 's'} ${note.holds.join(', ')})`

function HoldActions({
  point,
  exclusion,
  edit,
  onAsk,
}: {
  point: Point
  exclusion: RunExclusion | undefined
  edit: RunHoldEdit | undefined
  onAsk: (asked: Asked) => void
}) {
  const { hold } = point
  const name = `hold ${hold.number}`
  const window = { foundStartS: hold.foundStartS, number: hold.number, startS: hold.startS, endS: hold.endS }
  return (
    <p className="mt-2 mb-0 flex flex-wrap items-center gap-2 print:hidden">
      <span className="text-ink-2">Hold {hold.number}</span>
      {exclusion ? (
        <Button onClick={() => onAsk({ kind: 'put-back', exclusion, name })}>Put back</Button>
      ) : (
        <Button onClick={() => onAsk({ kind: 'leave-out', what: 'hold', atS: hold.foundStartS, name })}>
          Leave out
        </Button>
      )}
      <Button onClick={() => onAsk({ kind: 'move', window })}>Move window</Button>
      {edit ? <Button onClick={() => onAsk({ kind: 'restore', edit, name })}>Restore window</Button> : null}
    </p>
  )
}

function InjectionList({
  injections,
  hasExclusion,
  onPick,
}: {
  injections: readonly InjectionUse[]
  hasExclusion: (injection: InjectionUse) => boolean
  onPick: (injection: InjectionUse) => void
}) {
  return (
    <details className="mt-2 print:hidden">
      <summary className="inline-block min-h-6 cursor-pointer text-[13px] text-accent touch:min-h-11">
        Injections, one by one
      </summary>
      <div className="relative max-h-80 overflow-auto" role="region" aria-label="Injections" tabIndex={0}>
        <table className="mt-1 border-collapse">
          <thead>
            <tr>
              {['Injection', 'Row', 'Hold', 'X / %', 'Use', ''].map((name) => (
                <th
                  key={name}
                  scope="col"
                  className="border-b border-line-strong px-2 py-1 text-left text-[12.5px] font-semibold text-ink-2"
                >
                  {name === '' ? <span className="sr-only">What can be done</span> : name}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {injections.map((injection) => (
              <tr key={injection.number} className="border-b border-line">
                <th scope="row" className="px-2 py-0.5 text-left font-normal">
                  {injection.number}
                </th>
                <td className="px-2 py-0.5">{injection.sourceRow}</td>
                <td className="px-2 py-0.5">{injection.holdNumber ?? '–'}</td>
                <td className="px-2 py-0.5 text-right">
                  {injection.conversion === null ? '–' : formatFixed(injection.conversion * 100, 3)}
                </td>
                <td className="px-2 py-0.5">
                  {injection.use.replace('-', ' ')}
                  {injection.reason === '' ? '' : `: ${injection.reason}`}
                </td>
                <td className="px-2 py-0.5">
                  {injection.use !== 'left-out' || hasExclusion(injection) ? (
                    <Button
                      kind="quiet"
                      className="px-1 text-[12.5px]"
                      aria-label={`${hasExclusion(injection) ? 'Put back' : 'Leave out'} injection ${injection.number}`}
                      onClick={() => onPick(injection)}
                    >
                      {hasExclusion(injection) ? 'Put back…' : 'Leave out…'}
                    </Button>
                  ) : null}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  )
}

function Question({
  asked,
  runId,
  span,
  actions,
  onClose,
  onDone,
}: {
  asked: Asked
  runId: string
  span: { startS: number; endS: number } | null
  actions: RunWorkspaceProps['actions']
  onClose: () => void
  onDone: (message: string) => void
}) {
  if (asked.kind === 'move') {
    if (span === null) return null
    return (
      <MoveHoldDialog
        window={asked.window}
        logStartS={span.startS}
        logEndS={span.endS}
        onClose={onClose}
        onDone={onDone}
        onConfirm={(edit) => actions.moveHold(runId, edit)}
      />
    )
  }
  if (asked.kind === 'leave-out') {
    return (
      <ReasonDialog
        title={`Leave out ${asked.name}`}
        confirmLabel="Leave out"
        onClose={onClose}
        onDone={onDone}
        onConfirm={(reason) => actions.leaveOut(runId, { kind: asked.what, atS: asked.atS, reason })}
      >
        <p className="mt-0 mb-3 text-ink-2">
          It stays on the page, hollow, with your name and reason; the line is shown with it and without it.
        </p>
      </ReasonDialog>
    )
  }
  if (asked.kind === 'put-back') {
    return (
      <ReasonDialog
        title={`Put back ${asked.name}`}
        confirmLabel="Put back"
        onClose={onClose}
        onDone={onDone}
        onConfirm={(reason) => actions.putBack(runId, asked.exclusion.id, reason)}
      >
        <p className="mt-0 mb-3 text-ink-2">
          Left out by {asked.exclusion.createdByName}: {asked.exclusion.reason}
        </p>
      </ReasonDialog>
    )
  }
  return (
    <ReasonDialog
      title={`Restore the window of ${asked.name}`}
      confirmLabel="Restore"
      onClose={onClose}
      onDone={onDone}
      onConfirm={(reason) => actions.withdrawHoldEdit(runId, asked.edit.id, reason)}
    >
      <p className="mt-0 mb-3 text-ink-2">
        Moved by {asked.edit.createdByName}: {asked.edit.reason}
      </p>
    </ReasonDialog>
  )
}
