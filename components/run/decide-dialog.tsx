'use client'

import { useState } from 'react'
import { type ActionResult } from '@/lib/domain/errors'
import { type NewDecision, type RunDecision } from '@/lib/domain/run'
import { ReasonDialog } from './reason-dialog'

const words: Readonly<Record<RunDecision, { label: string; hint: string }>> = {
  counts: { label: 'Counts', hint: 'its points are part of the sample’s line' },
  'set-aside': { label: 'Set aside', hint: 'kept and shown, part of no line' },
  repeat: { label: 'Repeat', hint: 'to be measured again; part of no line until then' },
}

const choices: readonly RunDecision[] = ['counts', 'set-aside', 'repeat']

interface DecideDialogProps {
  readonly runCode: string
  readonly current: RunDecision | null
  readonly onClose: () => void
  readonly onConfirm: (decision: NewDecision) => Promise<ActionResult<string>>
  readonly onDone: (message: string) => void
}

/** A lead's decision on a run, with its reason. */
export function DecideDialog({ runCode, current, onClose, onConfirm, onDone }: DecideDialogProps) {
  const [decision, setDecision] = useState<RunDecision>(current ?? 'counts')
  return (
    <ReasonDialog
      title={`Decide on ${runCode}`}
      confirmLabel={`Decide: ${words[decision].label.toLowerCase()}`}
      onClose={onClose}
      onDone={onDone}
      onConfirm={(reason) => onConfirm({ decision, reason })}
    >
      <fieldset className="m-0 mb-3 border-0 p-0">
        <legend className="mb-1 p-0 text-[14px] text-ink-2">Decision</legend>
        {choices.map((choice) => (
          <label key={choice} className="flex min-h-8 items-baseline gap-2 touch:min-h-11">
            <input
              type="radio"
              name="decision"
              value={choice}
              checked={decision === choice}
              onChange={() => setDecision(choice)}
              className="accent-accent"
            />
            <span>
              {words[choice].label} <span className="text-[12.5px] text-ink-3">{words[choice].hint}</span>
            </span>
          </label>
        ))}
      </fieldset>
    </ReasonDialog>
  )
}
