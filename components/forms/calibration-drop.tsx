'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { Notice } from '@/components/ui/notice'
import { DropZone } from './intake/drop-zone'

/** Drop a table of response factors: that is all it takes. When its header does not say what a number means, it is asked. */
export function CalibrationDrop({
  rigs,
}: {
  readonly rigs: readonly { readonly value: string; readonly label: string }[]
}) {
  const router = useRouter()
  const [validFrom, setValidFrom] = useState('')
  const [rigId, setRigId] = useState('')
  const [convention, setConvention] = useState('')
  const [isAsked, setIsAsked] = useState(false)
  const [answer, setAnswer] = useState<{ readonly isGood: boolean; readonly text: string } | null>(null)

  async function send(files: readonly File[]): Promise<void> {
    if (validFrom === '') {
      setAnswer({ isGood: false, text: 'Say first from which day the factors hold.' })
      return
    }
    const form = new FormData()
    for (const file of files)
      form.append(
        'file',
        new File([file], file.name, { type: file.type === '' ? 'application/octet-stream' : file.type }),
      )
    const query = new URLSearchParams({
      validFrom: `${validFrom}T00:00:00Z`,
      ...(rigId === '' ? {} : { rigId }),
      ...(convention === '' ? {} : { convention }),
    })
    try {
      const response = await fetch(`/api/v1/calibrations/files?${query.toString()}`, { method: 'POST', body: form })
      const body = (await response.json()) as {
        items?: { name: string; entries: unknown[] }[]
        detail?: string
        issues?: { field: string }[]
      }
      if (response.ok) {
        const words = (body.items ?? []).map((item) => `${item.name}, ${item.entries.length} species`).join('; ')
        setAnswer({ isGood: true, text: `Kept: ${words}.` })
        setIsAsked(false)
        router.refresh()
      } else {
        setIsAsked(body.issues?.some((issue) => issue.field === 'convention') === true)
        setAnswer({ isGood: false, text: body.detail ?? `The server answered ${response.status}.` })
      }
    } catch {
      setAnswer({ isGood: false, text: 'The connection was lost. Drop the file again when you are back.' })
    }
  }

  return (
    <div className="grid gap-3">
      <div className="grid gap-3 sm:grid-cols-2">
        <label className="block text-[14px]">
          The factors hold from
          <input
            className="control"
            type="date"
            value={validFrom}
            onChange={(event) => setValidFrom(event.target.value)}
          />
        </label>
        <label className="block text-[14px]">
          For the analyser of
          <select className="control" value={rigId} onChange={(event) => setRigId(event.target.value)}>
            <option value="">all rigs</option>
            {rigs.map((rig) => (
              <option key={rig.value} value={rig.value}>
                {rig.label}
              </option>
            ))}
          </select>
        </label>
      </div>
      {isAsked ? (
        <label className="block text-[14px]">
          What a number in the table is
          <select className="control" value={convention} onChange={(event) => setConvention(event.target.value)}>
            <option value="">Choose, then drop the file again</option>
            <option value="factor">factor: amount per area</option>
            <option value="sensitivity">sensitivity: area per amount</option>
          </select>
        </label>
      ) : null}
      <DropZone
        label="Drop a table of response factors here"
        hint="One row a species: its formula and its factor; a column with the relative uncertainty if there is one."
        onFiles={(files) => void send(files)}
      />
      {answer === null ? null : (
        <Notice kind={answer.isGood ? 'sound' : 'fault'} isLive title={answer.isGood ? 'Done.' : 'Not kept.'}>
          {answer.text}
        </Notice>
      )}
    </div>
  )
}
