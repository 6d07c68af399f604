import { Moment } from '@/components/ui/moment'
import { type HistoryEntry } from '@/lib/domain/history'
import { type RunDecisionRecord, type RunExclusion, type RunHoldEdit, type RunRemark } from '@/lib/domain/run'

export interface RunEvent {
  readonly key: string
  readonly at: string
  readonly by: string
  readonly what: string
  readonly reason: string
}

/** Actions of the audit trail on a run, in words; one that is new here is shown by its name. */
const actionWords: Readonly<Record<string, string>> = {
  'run.create': 'logged the run',
  'run.change': 'changed what was logged',
  'run.hand-in': 'handed it in',
  'run.decide': 'decided',
  'run.leave-out': 'left something out',
  'run.put-back': 'put something back',
  'run.move-window': 'moved a window',
  'run.give-window-back': 'restored a window',
  'run.remark': 'wrote a remark',
}

/** What people did to the run's numbers, newest first; the campaign's history holds the rest for its leads. */
export function runEvents(
  decisions: readonly RunDecisionRecord[],
  exclusions: readonly RunExclusion[],
  holdEdits: readonly RunHoldEdit[],
  history: readonly HistoryEntry[],
): RunEvent[] {
  const made = (prefix: string, record: RunDecisionRecord | RunExclusion | RunHoldEdit, what: string): RunEvent => ({
    key: `${prefix}-${record.id}`,
    at: record.createdAt,
    by: record.createdByName,
    what,
    reason: record.reason,
  })
  // with the audit trail at hand, the records below would say everything twice
  const events =
    history.length > 0
      ? history.map((entry) => ({
          key: `history-${entry.seq}`,
          at: entry.at,
          by: entry.actorName,
          what: actionWords[entry.action] ?? entry.action.replaceAll('.', ', ').replaceAll('-', ' '),
          reason: entry.reason,
        }))
      : [
          ...decisions.map((record) => made('decision', record, `decided: ${record.decision.replace('-', ' ')}`)),
          ...exclusions.map((record) =>
            made(
              'exclusion',
              record,
              `left out a ${record.kind}${record.withdrawnAt === null ? '' : ', put back later'}`,
            ),
          ),
          ...holdEdits.map((record) =>
            made('hold', record, `moved a window${record.withdrawnAt === null ? '' : ', restored later'}`),
          ),
        ]
  return events.sort((a, b) => b.at.localeCompare(a.at))
}

/** Remarks, oldest first. */
export function RemarkList({ remarks }: { remarks: readonly RunRemark[] }) {
  if (remarks.length === 0) return <p className="mt-1 mb-0 text-ink-3">None yet.</p>
  return (
    <ul className="m-0 mt-1 list-none space-y-1.5 p-0">
      {remarks.map((remark) => (
        <li key={remark.id}>
          <span className="text-[12.5px] text-ink-3">
            {remark.createdByName}, <Moment at={remark.createdAt} />
          </span>
          <span className="block whitespace-pre-line">{remark.body}</span>
        </li>
      ))}
    </ul>
  )
}

export function EventList({ events }: { events: readonly RunEvent[] }) {
  if (events.length === 0) return <p className="mt-1 mb-0 text-ink-3">Nothing was changed by hand.</p>
  return (
    <ul className="m-0 mt-1 list-none space-y-1 p-0">
      {events.map((event) => (
        <li key={event.key}>
          <span className="text-[12.5px] text-ink-3">
            <Moment at={event.at} />, {event.by}
          </span>{' '}
          {event.what}
          {event.reason === '' ? '' : `: ${event.reason}`}
        </li>
      ))}
    </ul>
  )
}
