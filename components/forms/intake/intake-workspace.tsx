'use client'

import { useRef, useState } from 'react'
import { type Route } from 'next'
import { LinkButton } from '@/components/ui/link-button'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { Progress } from '@/components/ui/progress'
import { type Upload } from '@/lib/domain/intake'
import { DropZone } from './drop-zone'
import { sendFile, type Transfer } from './send-files'
import { sizeText } from './size-text'
import { UploadPanel } from './upload-panel'

/** Files of one run: dropped, looked at, asked about, confirmed. */
export function IntakeWorkspace({
  runId,
  initial,
  species,
  mayChange,
}: {
  readonly runId: string
  readonly initial: readonly Upload[]
  readonly species: readonly string[]
  readonly mayChange: boolean
}) {
  const [uploads, setUploads] = useState(initial)
  const [transfers, setTransfers] = useState<readonly Transfer[]>([])
  const cancels = useRef(new Map<string, () => void>())
  const counter = useRef(0)

  const replace = (upload: Upload) =>
    setUploads((before) =>
      before.some((one) => one.id === upload.id)
        ? before.map((one) => (one.id === upload.id ? upload : one))
        : [...before, upload],
    )
  const change = (key: string, to: Partial<Transfer>) =>
    setTransfers((before) => before.map((one) => (one.key === key ? { ...one, ...to } : one)))

  async function send(file: File): Promise<void> {
    counter.current += 1
    const key = `${counter.current}`
    setTransfers((before) => [
      ...before,
      { key, name: file.name, byteCount: file.size, sent: 0, state: 'sending', message: '' },
    ])
    const { done, cancel } = sendFile(runId, file, {
      onProgress: (sent) => change(key, { sent }),
      onSent: () => change(key, { state: 'reading', sent: file.size }),
    })
    cancels.current.set(key, cancel)
    try {
      const { upload, isNew } = await done
      replace(upload)
      change(key, {
        state: isNew ? 'done' : 'known',
        message: isNew ? '' : 'The run has these very bytes already; no second copy was made.',
      })
    } catch (error) {
      const isCancelled = error instanceof DOMException && error.name === 'AbortError'
      change(key, {
        state: isCancelled ? 'cancelled' : 'failed',
        message: isCancelled ? 'Cancelled; nothing of it was kept.' : error instanceof Error ? error.message : '',
      })
    } finally {
      cancels.current.delete(key)
    }
  }

  const isTaken = (kind: Upload['kind']) => uploads.some((one) => one.kind === kind && one.state === 'confirmed')
  return (
    <>
      {mayChange ? (
        <DropZone
          label="Drop the rig log and the analyser file here"
          hint="Delimited text or .xlsx, as the instruments write them. The bytes are kept as they come."
          onFiles={(files) => {
            for (const file of files) void send(file)
          }}
        />
      ) : (
        <Notice title="Reading only.">
          The run is no longer open for you; its files can be looked at and downloaded.
        </Notice>
      )}
      <div aria-live="polite" className="mt-3 grid gap-2">
        {transfers
          .filter((one) => one.state !== 'done')
          .map((one) =>
            one.state === 'sending' || one.state === 'reading' ? (
              <div key={one.key} className="flex flex-wrap items-end gap-3">
                <div className="min-w-60 flex-1">
                  <Progress
                    label={one.state === 'sending' ? `Sending ${one.name}` : `Reading ${one.name}`}
                    value={one.state === 'sending' ? one.sent : null}
                    max={one.byteCount}
                    said={`${sizeText(one.sent)} of ${sizeText(one.byteCount)}`}
                  />
                </div>
                <Button onClick={() => cancels.current.get(one.key)?.()}>Cancel {one.name}</Button>
              </div>
            ) : (
              <Notice key={one.key} kind={one.state === 'failed' ? 'fault' : 'plain'} title={`${one.name}.`}>
                {one.message}
              </Notice>
            ),
          )}
      </div>
      {isTaken('rig-log') && isTaken('analyser') ? (
        <Notice kind="sound" title="Both files are in." className="mt-3">
          The points are computed.{' '}
          <LinkButton href={`/runs/${runId}` as Route} kind="main" className="ml-2">
            See the points
          </LinkButton>
        </Notice>
      ) : null}
      <div className="mt-4">
        {uploads.length === 0 ? (
          <p className="text-ink-2">
            No file yet. A run needs the rig’s log and the analyser’s results; other files can stand beside them.
          </p>
        ) : (
          uploads.map((upload) => (
            <UploadPanel key={upload.id} upload={upload} species={species} mayChange={mayChange} onChange={replace} />
          ))
        )}
      </div>
    </>
  )
}
