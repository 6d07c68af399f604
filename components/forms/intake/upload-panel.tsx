'use client'

import { useEffect, useState } from 'react'
import { fetchJson } from '@/components/server-state/fetch-json'
import { Button } from '@/components/ui/button'
import { Busy } from '@/components/ui/busy'
import { Fold } from '@/components/ui/fold'
import { Notice } from '@/components/ui/notice'
import { Tag, type TagKind } from '@/components/ui/tag'
import { type ColumnMapSpecification } from '@/lib/domain/column-map'
import { type Upload } from '@/lib/domain/intake'
import { type UploadPreview } from '@/lib/domain/upload-preview'
import { ChannelPlot } from './channel-plot'
import { ColumnTable } from './column-table'
import { ProblemList } from './problem-list'
import { QuestionGroup } from './question-group'
import { changeUpload } from './send-files'
import { sizeText } from './size-text'

const KINDS = { 'rig-log': 'Rig log', analyser: 'Analyser', attachment: 'Attachment' } as const

const STATES: Readonly<Record<Upload['state'], readonly [string, TagKind]>> = {
  received: ['received', 'plain'],
  reading: ['being read', 'plain'],
  'needs-answers': ['questions to answer', 'doubt'],
  ready: ['ready to confirm', 'doubt'],
  confirmed: ['taken in', 'sound'],
  failed: ['could not be read', 'fault'],
  'set-aside': ['set aside', 'plain'],
}

/** One file: what was understood, what is asked, what is wrong, and the button that takes it in. */
export function UploadPanel({
  upload,
  species,
  mayChange,
  onChange,
}: {
  readonly upload: Upload
  readonly species: readonly string[]
  readonly mayChange: boolean
  readonly onChange: (upload: Upload) => void
}) {
  const { detection } = upload
  const [draft, setDraft] = useState<ColumnMapSpecification | null>(null)
  const [answers, setAnswers] = useState<Record<string, string>>({})
  const [preview, setPreview] = useState<UploadPreview | null>(null)
  const [busy, setBusy] = useState<string | null>(null)
  const [fault, setFault] = useState<string | null>(null)
  const [reason, setReason] = useState('')
  const specification = draft ?? detection?.proposal ?? null
  const questions = detection?.questions ?? []
  const isOpen = upload.state === 'needs-answers' || upload.state === 'ready'
  const isChanged = draft !== null || Object.keys(answers).length > 0
  const isAnswered = questions.every((question) => (answers[question.key] ?? '') !== '')

  useEffect(() => {
    if (upload.state !== 'ready' || draft !== null || !mayChange) return
    const stop = new AbortController()
    fetchJson<UploadPreview>(`/api/v1/uploads/${encodeURIComponent(upload.id)}/preview`, stop.signal)
      .then(setPreview)
      .catch((error: unknown) => {
        if (!stop.signal.aborted) setFault(error instanceof Error ? error.message : 'The preview could not be fetched.')
      })
    return () => stop.abort()
  }, [upload.id, upload.version, upload.state, draft, mayChange])

  async function run(words: string, work: () => Promise<Upload>): Promise<void> {
    setBusy(words)
    setFault(null)
    try {
      const next = await work()
      setDraft(null)
      setAnswers({})
      onChange(next)
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'Something went wrong. Try again.')
    } finally {
      setBusy(null)
    }
  }

  const save = (changed: ColumnMapSpecification | null) =>
    run('Reading again', () =>
      changeUpload(upload, '', {
        ...(changed === null ? {} : { specification: changed }),
        ...(Object.keys(answers).length === 0 ? {} : { answers }),
      }),
    )
  const [stateText, stateKind] = STATES[upload.state]
  return (
    <section className="border-t border-line-strong pt-3 pb-5" aria-label={upload.fileName}>
      <div className="flex flex-wrap items-baseline gap-x-4 gap-y-1">
        <h2 className="break-all">{upload.fileName}</h2>
        <Tag kind={stateKind}>{stateText}</Tag>
        <span className="text-[13px] text-ink-2">
          {upload.kind === null ? '' : `${KINDS[upload.kind]}, `}
          {sizeText(upload.byteCount)}, added by {upload.createdByName}
        </span>
        <a className="text-[13px]" href={`/api/v1/uploads/${upload.id}/content`}>
          Download as it came
        </a>
      </div>
      {detection === null ? null : (
        <p className="mt-1 mb-2 text-ink-2">
          {detection.rowCount.toLocaleString('en-GB')} rows; {detection.dialect}.
          {detection.columnMapId === null ? '' : ' The columns are known from an earlier file of this rig.'}
        </p>
      )}
      {upload.failure === null ? null : (
        <Notice kind="fault" title="Could not be read.">
          {upload.failure}
        </Notice>
      )}
      {fault === null ? null : (
        <Notice kind="fault" title="Not done." isLive className="mb-2">
          {fault}
        </Notice>
      )}
      {isOpen && mayChange && questions.length > 0 ? (
        <div className="mb-3 grid gap-2">
          {questions.map((question) => (
            <QuestionGroup
              key={question.key}
              question={question}
              value={answers[question.key] ?? ''}
              onChange={(value) => setAnswers((before) => ({ ...before, [question.key]: value }))}
            />
          ))}
        </div>
      ) : null}
      {isOpen && detection !== null && specification !== null && specification.kind !== 'attachment' ? (
        <ColumnTable detection={detection} specification={specification} species={species} onChange={setDraft} />
      ) : null}
      {upload.state === 'ready' && draft === null && mayChange ? (
        preview === null && fault === null ? (
          <Busy label="Reading all rows" />
        ) : preview === null ? null : (
          <div className="mt-3 grid gap-3">
            <p className="m-0">
              <strong className="font-semibold">
                {preview.rowCount.toLocaleString('en-GB')} rows would be taken in.
              </strong>{' '}
              {preview.problems.length === 0
                ? 'Nothing is skipped.'
                : `${preview.problems.length} problems are listed below.`}
            </p>
            <div className="grid gap-x-5 gap-y-3 sm:grid-cols-2 lg:grid-cols-4">
              {preview.channels.map((channel) => (
                <ChannelPlot key={channel.name} channel={channel} />
              ))}
            </div>
            {preview.problems.length === 0 ? null : <ProblemList problems={preview.problems} />}
          </div>
        )
      ) : upload.problems.length > 0 ? (
        <Fold
          label={`${upload.problems.length} ${upload.problems.length === 1 ? 'problem' : 'problems'} by row and column`}
        >
          <ProblemList problems={upload.problems} />
        </Fold>
      ) : null}
      {mayChange ? (
        <div className="mt-3 flex flex-wrap gap-2">
          {isOpen && (isChanged || questions.length > 0) ? (
            <Button kind="main" disabled={!isAnswered} busyWith={busy} onClick={() => void save(draft)}>
              {questions.length > 0 ? 'Answer' : 'Read again with these columns'}
            </Button>
          ) : null}
          {upload.state === 'ready' && !isChanged ? (
            <Button
              kind="main"
              busyWith={busy}
              onClick={() => void run('Taking in', () => changeUpload(upload, '/confirm', undefined))}
            >
              Confirm
            </Button>
          ) : null}
          {isOpen && detection !== null && specification !== null && specification.kind !== 'attachment' ? (
            <Button busyWith={busy} onClick={() => void save({ ...specification, kind: 'attachment' })}>
              Keep as attachment
            </Button>
          ) : null}
          {upload.state !== 'set-aside' ? (
            <Fold label="Set aside">
              <label className="block">
                Reason
                <input className="control" value={reason} onChange={(event) => setReason(event.target.value)} />
              </label>
              <Button
                className="mt-2"
                disabled={reason.trim().length < 3}
                busyWith={busy}
                onClick={() =>
                  void run('Setting aside', () => changeUpload(upload, '/set-aside', { reason: reason.trim() }))
                }
              >
                Set this file aside
              </Button>
            </Fold>
          ) : null}
        </div>
      ) : null}
    </section>
  )
}
