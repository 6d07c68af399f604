'use client'

import { useQuery } from '@tanstack/react-query'
import { type ReactNode, useId, useRef, useState } from 'react'
import { ReasonDialog } from '@/components/run/reason-dialog'
import { fetchJson, RequestError } from '@/components/server-state/fetch-json'
import { sendJson } from '@/components/server-state/send-json'
import { Busy } from '@/components/ui/busy'
import { Button } from '@/components/ui/button'
import { Moment } from '@/components/ui/moment'
import { Notice } from '@/components/ui/notice'
import { Tag, type TagKind } from '@/components/ui/tag'
import { type ColumnMapSpecification } from '@/lib/domain/column-map'
import { type ActionResult } from '@/lib/domain/errors'
import { type Problem, type Question, type Upload, type UploadState } from '@/lib/domain/intake'
import { type UploadPreview } from '@/lib/domain/upload-preview'
import { ChannelPlots } from './channel-plots'
import { ColumnEditor } from './column-editor'
import { fileSize } from './file-size'
import { ProblemTable } from './problem-table'
import { QuestionGroup } from './question-group'
import { ReadingSettings } from './reading-settings'
import { takenInText } from './taken-in-text'

const STATES: Readonly<Record<UploadState, { readonly label: string; readonly kind: TagKind }>> = {
  received: { label: 'arrived, not read yet', kind: 'plain' },
  reading: { label: 'being read', kind: 'plain' },
  'needs-answers': { label: 'needs answers', kind: 'doubt' },
  ready: { label: 'ready to confirm', kind: 'plain' },
  confirmed: { label: 'taken in', kind: 'sound' },
  failed: { label: 'could not be read', kind: 'fault' },
  'set-aside': { label: 'set aside', kind: 'plain' },
}
const KINDS = { 'rig-log': 'Rig log', analyser: 'Analyser', attachment: 'Attachment' } as const

interface Trouble {
  readonly kind: 'stale' | 'connection' | 'refused'
  readonly sentence: string
  readonly again: () => void
}

type Work = 'reading' | 'confirming' | 'keeping' | 'loading'
const WORK_WORDS: Readonly<Record<Work, string>> = {
  reading: 'Reading',
  confirming: 'Taking in',
  keeping: 'Keeping',
  loading: 'Loading',
}

function standInTheWay(problems: readonly Problem[]): string {
  const count = problems.filter((problem) => problem.severity === 'fatal').length
  return count === 1 ? 'One problem stands in the way.' : `${String(count)} problems stand in the way.`
}

/** One file of a run: what was found in it, what it leaves open, what would be taken in, and the button that takes it in. */
export function UploadSection({
  upload,
  note,
  species,
  canChange,
  onChange,
}: {
  readonly upload: Upload
  /** something to say about how it came: `already added` */
  readonly note: string | null
  readonly species: readonly string[]
  readonly canChange: boolean
  readonly onChange: (upload: Upload) => void
}) {
  const id = useId()
  const said = useRef<HTMLDivElement>(null)
  const [draft, setDraft] = useState<ColumnMapSpecification | null>(null)
  const [answers, setAnswers] = useState<Readonly<Record<string, string>>>({})
  const [work, setWork] = useState<Work | null>(null)
  const [trouble, setTrouble] = useState<Trouble | null>(null)
  const [done, setDone] = useState<string | null>(null)
  const [isSettingAside, setIsSettingAside] = useState(false)
  const [isOpened, setIsOpened] = useState(false)
  const [takenInCount, setTakenInCount] = useState<number | null>(null)

  const { detection } = upload
  const isAttachment = upload.kind === 'attachment'
  const isReady = upload.state === 'ready' && !isAttachment
  const isConfirmed = upload.state === 'confirmed'
  const isOpen = upload.state === 'needs-answers' || upload.state === 'ready' || isConfirmed
  const preview = useQuery({
    queryKey: ['upload-preview', upload.id, upload.version],
    queryFn: ({ signal }) => fetchJson<UploadPreview>(`/api/v1/uploads/${upload.id}/preview`, signal),
    enabled: canChange && (isReady || (isConfirmed && isOpened && !isAttachment)),
    staleTime: Infinity,
    refetchOnWindowFocus: false,
  })
  const questions: readonly Question[] = merged(detection?.questions ?? [], preview.data?.questions ?? [])
  const isAnswered = questions.every((question) => (answers[question.key] ?? '') !== '')
  const isChanged = draft !== null || questions.length > 0
  const found = preview.data?.problems ?? upload.problems
  // the one reason of a failure stands above already, and what is only kept need not be read
  const problems = isAttachment || (upload.state === 'failed' && found.length === 1) ? [] : found
  const isWithoutFault = upload.problems.every((problem) => problem.severity === 'note')
  const rowCount =
    preview.data?.rowCount ??
    takenInCount ??
    // one row a reading and none left out: the file's own count
    (detection?.proposal.shape === 'wide' && isWithoutFault ? detection.rowCount : null)
  const isFatal = problems.some((problem) => problem.severity === 'fatal')

  /** Runs a change; what stops it is said where the buttons are, and what was chosen stays. */
  const attempt = async (name: Work, change: () => Promise<Upload>, sentence: (upload: Upload) => string | null) => {
    setWork(name)
    setTrouble(null)
    setDone(null)
    try {
      const next = await change()
      setDraft(null)
      setAnswers({})
      setDone(sentence(next))
      onChange(next)
      // the fields that had the focus may be gone
      said.current?.focus()
    } catch (error) {
      const again = () => void attempt(name, change, sentence)
      if (error instanceof RequestError)
        setTrouble({ kind: error.status === 412 ? 'stale' : 'refused', sentence: error.message, again })
      else if (error instanceof TypeError)
        setTrouble({ kind: 'connection', sentence: 'What you chose stays here; nothing was taken in.', again })
      else throw error
    } finally {
      setWork(null)
    }
  }

  const path = `/api/v1/uploads/${upload.id}`
  const correct = (from: Upload, body: object) => sendJson<Upload>(path, 'PATCH', from, body)
  const confirm = (from: Upload) => sendJson<Upload>(`${path}/confirm`, 'POST', from)
  const change = { ...(draft === null ? {} : { specification: draft }), answers }
  const readAgain = () =>
    attempt(
      'reading',
      () => correct(upload, change),
      (next) =>
        (next.detection?.questions.length ?? 0) > 0
          ? 'Kept. Something is still open, see the questions.'
          : isConfirmed
            ? null
            : 'Kept. Look at what would be taken in, then confirm.',
    )
  const takeIn = () =>
    attempt(
      'confirming',
      () => confirm(upload),
      () => {
        setTakenInCount(preview.data?.rowCount ?? null)
        return null
      },
    )
  const correctAndTakeIn = () =>
    attempt(
      'confirming',
      async () => {
        const corrected = await correct(upload, change)
        // with something still open the answer is shown and not confirmed
        return (corrected.detection?.questions.length ?? 0) > 0 ? corrected : confirm(corrected)
      },
      (next) =>
        (next.detection?.questions.length ?? 0) > 0 ? 'Kept. Something is still open, see the questions.' : null,
    )
  const keepAsAttachment = () =>
    attempt(
      'keeping',
      async () => confirm(await correct(upload, { answers: { kind: 'attachment' } })),
      () => null,
    )
  const takeUpAgain = () =>
    attempt(
      'loading',
      () => correct(upload, { answers: {} }),
      () => 'Taken up again. Its readings count once it is confirmed.',
    )
  const reload = () =>
    attempt(
      'loading',
      () => fetchJson<Upload>(path),
      () => 'This is how the file stands now.',
    )
  const setAside = async (reason: string): Promise<ActionResult<string>> => {
    try {
      onChange(await sendJson<Upload>(`${path}/set-aside`, 'POST', upload, { reason }))
      return { ok: true, value: 'Set aside. It stays in the list; its readings do not count.' }
    } catch (error) {
      if (error instanceof RequestError)
        return { ok: false, code: error.status === 412 ? 'stale' : 'invalid', message: error.message, issues: [] }
      throw error
    }
  }

  const state = STATES[upload.state]
  return (
    <section aria-labelledby={id} className="mt-7">
      <div className="mb-1 flex flex-wrap items-center gap-x-3 gap-y-1">
        <h2 id={id} className="min-w-0 break-all">
          {upload.fileName}
        </h2>
        <Tag kind={state.kind}>{state.label}</Tag>
        {upload.kind === null ? null : <span className="text-[13px] text-ink-2">{KINDS[upload.kind]}</span>}
        <span className="hidden h-px flex-1 bg-line sm:block" aria-hidden="true" />
      </div>
      <p className="prose m-0 text-[13px] text-ink-2">
        {fileSize(upload.byteCount)}
        {detection === null
          ? null
          : ` · ${detection.rowCount.toLocaleString('en')} ${detection.rowCount === 1 ? 'row' : 'rows'} · ${detection.dialect}`}
        {detection === null || detection.columnMapId === null ? null : ' · columns as this rig’s kept map has them'}
        {' · added by '}
        {upload.createdByName}, <Moment at={upload.createdAt} /> ·{' '}
        <a href={`${path}/content`} download={upload.fileName} className="inline-block min-h-6">
          Download as it came
        </a>
      </p>

      <div ref={said} tabIndex={-1} className="mt-2 grid gap-2 outline-none empty:hidden">
        {note === null ? null : <Notice isLive>{note}</Notice>}
        {upload.failure === null || upload.state !== 'failed' ? null : (
          <Notice kind="fault" title="Not read.">
            {upload.failure}
          </Notice>
        )}
        {isConfirmed ? (
          <Notice kind="sound" isLive title={isAttachment ? 'Kept as an attachment' : 'Taken in'}>
            {upload.confirmedAt === null ? null : <Moment at={upload.confirmedAt} />}:{' '}
            {takenInText(upload.kind, rowCount, upload.problems)}.
          </Notice>
        ) : null}
        {upload.state === 'set-aside' ? <Notice>The file is kept. Nothing of it counts in the run.</Notice> : null}
        {upload.state === 'received' || upload.state === 'reading' ? (
          <Notice>
            The file is stored but was not read to the end. Add it once more: it is read then, not stored twice.
          </Notice>
        ) : null}
        {done === null || (isFatal && !isConfirmed) ? null : (
          <Notice kind="sound" isLive>
            {done}
          </Notice>
        )}
      </div>

      {canChange && isOpen && detection !== null ? (
        <>
          {questions.length === 0 ? null : (
            <div className="mt-3">
              <h3 className="mb-2">
                {questions.length === 1
                  ? 'One thing the file does not say'
                  : `${String(questions.length)} things the file does not say`}
              </h3>
              <div className="grid gap-4">
                {questions.map((question) => (
                  <QuestionGroup
                    key={`${question.key} ${String(upload.version)}`}
                    question={question}
                    answer={answers[question.key] ?? ''}
                    onAnswer={(value) => setAnswers((before) => ({ ...before, [question.key]: value }))}
                  />
                ))}
              </div>
            </div>
          )}
          <Opened
            isAlways={!isConfirmed}
            label="What was taken in, and how the columns were read"
            onOpen={() => setIsOpened(true)}
          >
            {isAttachment && draft === null ? null : (
              <>
                <h3 className="mt-4 mb-1">Columns</h3>
                <ColumnEditor
                  fileName={upload.fileName}
                  detection={detection}
                  specification={draft ?? detection.proposal}
                  species={species}
                  isDisabled={work !== null}
                  onChange={setDraft}
                />
              </>
            )}
            <details className="mt-2">
              <summary className="inline-flex min-h-7 cursor-pointer items-center text-accent touch:min-h-11">
                Kind of file, clock and numbers
              </summary>
              <div className="mt-2">
                <ReadingSettings key={upload.version} specification={draft ?? detection.proposal} onChange={setDraft} />
              </div>
            </details>
            {preview.data === undefined || draft !== null || preview.data.channels.length === 0 ? null : (
              <>
                <h3 className="mt-5 mb-2">{isConfirmed ? 'Taken in' : 'Would be taken in'}</h3>
                <ChannelPlots channels={preview.data.channels} />
              </>
            )}
            {preview.isFetching ? <Busy label="Reading all rows" /> : null}
          </Opened>
        </>
      ) : null}
      {preview.error === null ? null : (
        <Notice kind="fault" isLive className="mt-3" title="The rows could not be read.">
          {preview.error instanceof TypeError ? 'No connection. ' : `${preview.error.message} `}
          <Button kind="quiet" className="px-1" onClick={() => void preview.refetch()}>
            Read again
          </Button>
        </Notice>
      )}
      {isFatal && isReady ? (
        <Notice kind="fault" isLive className="mt-3" title="It cannot be confirmed yet.">
          {standInTheWay(problems)} Mend what the list below names, in the table of columns above or in the file, and it
          can be.
        </Notice>
      ) : null}
      <ProblemTable problems={problems} fileName={upload.fileName} />

      {trouble === null ? null : (
        <Notice
          kind={trouble.kind === 'refused' ? 'fault' : 'doubt'}
          isLive
          className="mt-3"
          title={
            trouble.kind === 'stale'
              ? 'Changed by somebody else meanwhile.'
              : trouble.kind === 'connection'
                ? 'No connection.'
                : 'Not taken in.'
          }
        >
          {trouble.sentence}{' '}
          {trouble.kind === 'stale' ? (
            <Button kind="quiet" className="px-1" onClick={() => void reload()}>
              Load it as it stands now
            </Button>
          ) : trouble.kind === 'connection' ? (
            <Button kind="quiet" className="px-1" onClick={trouble.again}>
              Try again
            </Button>
          ) : null}
        </Notice>
      )}

      {canChange ? (
        <div className="mt-4 flex flex-wrap items-center gap-2">
          {isOpen && isChanged ? (
            <Button
              kind="main"
              disabled={!isAnswered}
              busyWith={work === null ? null : WORK_WORDS[work]}
              onClick={() => void (isConfirmed ? correctAndTakeIn() : readAgain())}
            >
              {isConfirmed
                ? 'Take in anew with these changes'
                : questions.length > 0
                  ? 'Use these answers'
                  : 'Read with these columns'}
            </Button>
          ) : null}
          {isReady && !isChanged ? (
            <Button
              kind="main"
              disabled={preview.data === undefined || isFatal || preview.data.rowCount === 0}
              busyWith={work === null ? null : WORK_WORDS[work]}
              onClick={() => void takeIn()}
            >
              {preview.data === undefined || preview.data.rowCount === 0
                ? 'Confirm'
                : `Confirm: ${preview.data.rowCount.toLocaleString('en')} ${upload.kind === 'analyser' ? 'injections' : 'rows'}`}
            </Button>
          ) : null}
          {isOpen && draft !== null ? (
            <Button disabled={work !== null} onClick={() => setDraft(null)}>
              Undo the changes
            </Button>
          ) : null}
          {['ready', 'needs-answers', 'failed'].includes(upload.state) ? (
            <Button disabled={work !== null} onClick={() => void keepAsAttachment()}>
              Keep as attachment
            </Button>
          ) : null}
          {upload.state === 'set-aside' && detection !== null ? (
            <Button busyWith={work === null ? null : WORK_WORDS[work]} onClick={() => void takeUpAgain()}>
              Take it up again
            </Button>
          ) : null}
          {upload.state === 'set-aside' ? null : (
            <Button kind="quiet" disabled={work !== null} onClick={() => setIsSettingAside(true)}>
              Set aside
            </Button>
          )}
          {isOpen && questions.length > 0 && !isAnswered ? (
            <span className="text-[13px] text-ink-2">Answer each question first.</span>
          ) : null}
        </div>
      ) : null}
      {isSettingAside ? (
        <ReasonDialog
          title={`Set ${upload.fileName} aside`}
          confirmLabel="Set aside"
          onClose={() => setIsSettingAside(false)}
          onConfirm={setAside}
          onDone={(sentence) => {
            setIsSettingAside(false)
            setDone(sentence)
          }}
        >
          <p className="m-0 mb-3">
            The file stays in the list and can be downloaded. Its readings no longer count in the run.
          </p>
        </ReasonDialog>
      ) : null}
    </section>
  )
}

/** Both lists, each question once. */
function merged(first: readonly Question[], second: readonly Question[]): readonly Question[] {
  return [...new Map([...first, ...second].map((question) => [question.key, question])).values()]
}

/** Folded once the file is confirmed: what it was is a line then, and the whole of it on request. */
function Opened({
  isAlways,
  label,
  onOpen,
  children,
}: {
  readonly isAlways: boolean
  readonly label: string
  readonly onOpen: () => void
  readonly children: ReactNode
}) {
  if (isAlways) return children
  return (
    <details className="mt-2" onToggle={(event) => (event.currentTarget.open ? onOpen() : undefined)}>
      <summary className="inline-flex min-h-7 cursor-pointer items-center text-accent touch:min-h-11">{label}</summary>
      {children}
    </details>
  )
}
