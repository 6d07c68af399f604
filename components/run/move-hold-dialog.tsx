'use client'

import { useState } from 'react'
import { type HoldWindow } from '@/components/charts/hold-edges'
import { TextField } from '@/components/ui/text-field'
import { type ActionResult } from '@/lib/domain/errors'
import { type NewHoldEdit } from '@/lib/domain/run'
import { ReasonDialog } from './reason-dialog'

interface MoveHoldDialogProps {
  readonly window: HoldWindow
  /** where the log starts and ends */
  readonly logStartS: number
  readonly logEndS: number
  readonly onClose: () => void
  readonly onConfirm: (edit: NewHoldEdit) => Promise<ActionResult<string>>
  readonly onDone: (message: string) => void
}

const hoursText = (seconds: number) => (seconds / 3_600).toFixed(3)

/** Hours as typed, with a point or a comma; null when it is no number. */
function parseHours(text: string): number | null {
  const value = Number(text.trim().replace(',', '.'))
  return text.trim() !== '' && Number.isFinite(value) ? value : null
}

/** Sets a hold's window by numbers; the way without a pointer to what the edges on the trace do. */
export function MoveHoldDialog({ window, logStartS, logEndS, onClose, onConfirm, onDone }: MoveHoldDialogProps) {
  const [start, setStart] = useState(hoursText(window.startS - logStartS))
  const [end, setEnd] = useState(hoursText(window.endS - logStartS))
  const longest = (logEndS - logStartS) / 3_600
  const startH = parseHours(start)
  const endH = parseHours(end)
  const startError =
    startH === null ? 'A number of hours, such as 1.85.' : startH < 0 ? 'The log starts at 0 h.' : undefined
  const endError =
    endH === null
      ? 'A number of hours, such as 2.60.'
      : endH > longest + 1e-3
        ? `The log ends at ${longest.toFixed(3)} h.`
        : startH !== null && endH <= startH
          ? 'The window must end after it starts.'
          : undefined
  return (
    <ReasonDialog
      title={`Move the window of hold ${window.number}`}
      confirmLabel="Move window"
      onClose={onClose}
      onDone={onDone}
      onConfirm={async (reason) => {
        if (startH === null || endH === null || startError !== undefined || endError !== undefined) {
          return { ok: false, code: 'invalid', message: 'Put the start and the end right first.', issues: [] }
        }
        return onConfirm({
          foundStartS: window.foundStartS,
          startS: logStartS + Math.round(startH * 3_600),
          endS: logStartS + Math.round(endH * 3_600),
          reason,
        })
      }}
    >
      <p className="mt-0 mb-3 text-ink-2">
        Only injections inside the window are averaged. The window that the rule found stays on record.
      </p>
      <div className="mb-3 grid grid-cols-2 gap-3">
        <TextField
          name="start"
          label="Starts at, hours of log"
          inputMode="decimal"
          value={start}
          onChange={(event) => setStart(event.target.value)}
          error={startError}
        />
        <TextField
          name="end"
          label="Ends at, hours of log"
          inputMode="decimal"
          value={end}
          onChange={(event) => setEnd(event.target.value)}
          error={endError}
        />
      </div>
    </ReasonDialog>
  )
}
