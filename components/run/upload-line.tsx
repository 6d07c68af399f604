'use client'

import { type Route } from 'next'
import Link from 'next/link'
import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { type Upload } from '@/lib/domain/intake'
import { formatFixed } from '@/components/numbers/format-fixed'
import { type ClockOffsetProposal } from '@/lib/analysis/reduction/clock-offset'
import { ClockDialog } from './clock-dialog'
import { type RunActions } from './run-actions'

const kinds = { 'rig-log': 'Rig log', analyser: 'Analyser', attachment: 'Attachment' } as const

function stateText(upload: Upload): string {
  if (upload.kind === 'attachment' && upload.state === 'confirmed') return `${upload.fileName}, kept beside the run`
  if (upload.state === 'set-aside') return 'set aside'
  if (upload.failure !== null) return `failed: ${upload.failure}`
  switch (upload.state) {
    case 'confirmed': {
      const rows = upload.detection === null ? '' : `${upload.detection.rowCount.toLocaleString('en')} rows, `
      const problems = upload.problems.filter((problem) => problem.severity !== 'note').length
      return `${rows}${problems === 0 ? 'nothing skipped' : `${problems} ${problems === 1 ? 'problem' : 'problems'}`}`
    }
    case 'needs-answers':
      return 'questions to be answered'
    case 'ready':
      return 'read, to be confirmed'
    case 'failed':
      return 'could not be read'
    default:
      return 'being read'
  }
}

/** The files that the run rests on. */
export function UploadLine({
  uploads,
  runId,
  version,
  clockOffsetS,
  clockProposal,
  canOpen,
  canSetClock,
  setClock,
}: {
  uploads: readonly Upload[]
  runId: string
  version: number
  clockOffsetS: number
  clockProposal: ClockOffsetProposal | null
  canOpen: boolean
  canSetClock: boolean
  setClock: RunActions['setClock']
}) {
  const router = useRouter()
  const [isSetting, setIsSetting] = useState(false)
  const isAnalysed = uploads.some((upload) => upload.kind === 'analyser' && upload.state === 'confirmed')
  return (
    <div className="flex flex-wrap gap-x-[22px] gap-y-0.5 text-[12.5px]">
      {uploads.length === 0 ? <span>No files yet.</span> : null}
      {uploads.map((upload) => (
        <span key={upload.id} title={upload.fileName}>
          <b className="font-semibold">{upload.kind === null ? upload.fileName : kinds[upload.kind]}</b>{' '}
          {stateText(upload)}
          {upload.kind === 'analyser' && upload.state === 'confirmed'
            ? `, clock ${clockOffsetS < 0 ? '−' : '+'} ${formatFixed(Math.abs(clockOffsetS), 0)} s`
            : ''}
        </span>
      ))}
      {canSetClock && isAnalysed ? (
        <button
          type="button"
          className="inline-block min-h-6 cursor-pointer border-0 bg-transparent p-0 text-accent"
          onClick={() => setIsSetting(true)}
        >
          Set the clock
        </button>
      ) : null}
      {isSetting ? (
        <ClockDialog
          offsetS={clockOffsetS}
          proposal={clockProposal}
          onClose={() => setIsSetting(false)}
          onConfirm={(offsetS) => setClock(runId, version, offsetS)}
          onDone={() => {
            setIsSetting(false)
            router.refresh()
          }}
        />
      ) : null}
      {canOpen ? (
        <Link href={`/runs/${runId}/intake` as Route} className="inline-block min-h-6">
          Preview and problems
        </Link>
      ) : null}
    </div>
  )
}
