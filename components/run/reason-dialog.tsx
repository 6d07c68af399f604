'use client'

import { type ReactNode, useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog } from '@/components/ui/dialog'
import { Notice } from '@/components/ui/notice'
import { TextArea } from '@/components/ui/text-area'
import { type ActionResult } from '@/lib/domain/errors'

interface ReasonDialogProps {
  readonly title: string
  readonly confirmLabel: string
  readonly onClose: () => void
  /** called with the reason; a refusal stays in the dialog with what was typed */
  readonly onConfirm: (reason: string) => Promise<ActionResult<string>>
  readonly onDone: (message: string) => void
  readonly children?: ReactNode
}

const SHORTEST_REASON = 3

/** Asks for the reason of a change that others rely on. Mounted only while it is open. */
export function ReasonDialog({ title, confirmLabel, onClose, onConfirm, onDone, children }: ReasonDialogProps) {
  const [reason, setReason] = useState('')
  const [error, setError] = useState<string | undefined>(undefined)
  const [isBusy, setIsBusy] = useState(false)
  const confirm = async () => {
    if (reason.trim().length < SHORTEST_REASON) {
      setError('Say why, in a few words: others will read it beside the result.')
      return
    }
    setIsBusy(true)
    setError(undefined)
    try {
      const answer = await onConfirm(reason.trim())
      if (answer.ok) onDone(answer.value)
      else setError([answer.message, ...answer.issues.map((issue) => issue.message)].join(' '))
    } catch (cause) {
      setError(`Not stored: ${cause instanceof Error ? cause.message : 'the server gave no answer'}.`)
    } finally {
      setIsBusy(false)
    }
  }
  return (
    <Dialog
      title={title}
      isOpen
      onClose={onClose}
      foot={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="main" onClick={() => void confirm()} busyWith={isBusy ? 'Saving' : null}>
            {confirmLabel}
          </Button>
        </>
      }
    >
      {children}
      <TextArea
        name="reason"
        label="Reason"
        hint="Kept with the change and shown wherever the number is."
        value={reason}
        onChange={(event) => setReason(event.target.value)}
        maxLength={500}
        required
      />
      {error === undefined ? null : (
        <Notice kind="fault" isLive className="mt-3">
          {error}
        </Notice>
      )}
    </Dialog>
  )
}
