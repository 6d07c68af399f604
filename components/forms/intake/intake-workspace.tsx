'use client'

import { useState } from 'react'
import { QueryProvider } from '@/components/server-state/query-provider'
import { LinkButton } from '@/components/ui/link-button'
import { Notice } from '@/components/ui/notice'
import { type Upload } from '@/lib/domain/intake'
import { DropZone } from './drop-zone'
import { SendingList } from './sending-list'
import { UploadSection } from './upload-section'
import { useSending } from './use-sending'

type Added = Upload & { readonly isNew: boolean }

/** Files of one run: added, looked at, answered, taken in. */
export function IntakeWorkspace({
  runId,
  runHref,
  initial,
  species,
  canAddFiles,
  isAnalyserCalibrated,
}: {
  readonly runId: string
  readonly runHref: `/runs/${string}`
  readonly initial: readonly Upload[]
  /** formulas to choose from: of the feed and of the reaction */
  readonly species: readonly string[]
  readonly canAddFiles: boolean
  /** false: areas will need response factors that nobody gave yet */
  readonly isAnalyserCalibrated: boolean
}) {
  const [uploads, setUploads] = useState(initial)
  const [notes, setNotes] = useState<Readonly<Record<string, string>>>({})
  const keep = (upload: Upload) =>
    setUploads((before) =>
      before.some((one) => one.id === upload.id)
        ? before.map((one) => (one.id === upload.id ? upload : one))
        : [...before, upload],
    )
  const { sendings, add, cancel, again } = useSending<{ readonly items: readonly Added[] }>(
    `/api/v1/runs/${runId}/uploads`,
    (answer, sentName) => {
      for (const { isNew, ...upload } of answer.items) {
        keep(upload)
        if (!isNew)
          setNotes((before) => ({
            ...before,
            [upload.id]:
              sentName === upload.fileName
                ? 'Already added: the run has these very bytes. Nothing was stored twice.'
                : `Already added: ${sentName} has the very bytes of this file. Nothing was stored twice.`,
          }))
      }
    },
  )
  const isIn = (kind: Upload['kind']) => uploads.some((one) => one.state === 'confirmed' && one.kind === kind)
  const isWhole = isIn('rig-log') && isIn('analyser')
  const missing = isIn('rig-log') ? 'the analyser’s results' : isIn('analyser') ? 'the rig log' : null
  const list = (
    <>
      <SendingList sendings={sendings} onCancel={cancel} onAgain={again} />
      {isWhole ? (
        <Notice kind="sound" isLive className="mt-4" title="Rig log and analyser are in.">
          Holds, points and the line are made of them now.
          <span className="mt-2 block">
            <LinkButton href={runHref} kind="main" className="no-underline!">
              See the points
            </LinkButton>
          </span>
        </Notice>
      ) : missing === null ? null : (
        <Notice className="mt-4">Still missing for points: {missing}.</Notice>
      )}
      {isIn('analyser') && !isAnalyserCalibrated ? (
        <Notice kind="doubt" className="mt-4" title="No response factors hold when this run starts.">
          Peak areas become amounts only with them.{' '}
          <a href="/calibrations">Drop the table on the page of calibrations.</a>
        </Notice>
      ) : null}
      {uploads.length === 0 && sendings.length === 0 ? (
        <div className="prose mt-5 max-w-[62ch]">
          <h2>No files yet</h2>
          <p className="m-0 mt-1 text-ink-2">
            A run needs two: the log of the rig (temperatures, pressures, flows against time) and the results of the
            analyser (peaks or composition, one row an injection or a peak). Text tables, .xlsx workbooks and
            chromatograms (netCDF, ASTM E1947; drop all of a series together) are read; anything else can be kept beside
            the run.
          </p>
        </div>
      ) : null}
      {uploads.map((upload) => (
        <UploadSection
          key={upload.id}
          upload={upload}
          note={notes[upload.id] ?? null}
          species={species}
          canChange={canAddFiles}
          onChange={keep}
        />
      ))}
    </>
  )
  return (
    <QueryProvider>
      {canAddFiles ? (
        <DropZone
          label="Drop the rig log and the analyser’s results here"
          hint="Several at once. They are looked at, and nothing counts before you confirm it."
          onFiles={add}
        >
          {list}
        </DropZone>
      ) : (
        <>
          <Notice>
            Files are added by the people who work in the campaign while the run is open. You can look at them.
          </Notice>
          {list}
        </>
      )}
    </QueryProvider>
  )
}
