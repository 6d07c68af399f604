'use client'

import { useState } from 'react'
import { formatFixed } from '@/components/numbers/format-fixed'
import { Button } from '@/components/ui/button'
import { Dialog } from '@/components/ui/dialog'
import { Notice } from '@/components/ui/notice'
import { TextField } from '@/components/ui/text-field'
import { type ClockOffsetProposal } from '@/lib/analysis/reduction/clock-offset'
import { parseQuantity } from '@/lib/analysis/units/parse-quantity'
import { type ActionResult } from '@/lib/domain/errors'
import { typedQuantity } from '@/lib/domain/typed-quantity'

interface ClockDialogProps {
  readonly offsetS: number
  /** what to add to the clock as it is set now, by the turning of the valve */
  readonly proposal: ClockOffsetProposal | null
  readonly onClose: () => void
  readonly onConfirm: (offsetS: number) => Promise<ActionResult<string>>
  readonly onDone: () => void
}

const LARGEST_S = 86_400
const signedMinutes = (seconds: number) => {
  const minutes = formatFixed(Math.abs(seconds) / 60, 1)
  return Number(minutes) === 0 ? '0 min' : `${seconds < 0 ? '−' : '+'}${minutes} min`
}
const signedText = (seconds: number) =>
  seconds < 0 ? `-${typedQuantity(-seconds, 'time')}` : typedQuantity(seconds, 'time')

/** A duration with its sign, as people write it; null where it is none. */
function secondsOf(text: string): number | null {
  const parts = /^\s*([+\-\u2212]?)\s*(.+)$/.exec(text)
  if (parts === null) return null
  const read = parseQuantity(parts[2] ?? '', 'time')
  if (!read.ok || !(Math.abs(read.valueSi) <= LARGEST_S)) return null
  return parts[1] === '' || parts[1] === '+' ? read.valueSi : -read.valueSi
}

/** Sets what is added to the analyser's times so that they are the rig's. Mounted only while it is open. */
export function ClockDialog({ offsetS, proposal, onClose, onConfirm, onDone }: ClockDialogProps) {
  const [text, setText] = useState(signedText(offsetS))
  const [error, setError] = useState<string | undefined>(undefined)
  const [isBusy, setIsBusy] = useState(false)
  const seconds = secondsOf(text)
  const confirm = async () => {
    if (seconds === null) {
      setError('Write a time with its unit, as in +43 min or -20 s; at most a day.')
      return
    }
    setIsBusy(true)
    setError(undefined)
    try {
      const answer = await onConfirm(seconds)
      if (answer.ok) onDone()
      else setError([answer.message, ...answer.issues.map((issue) => issue.message)].join(' '))
    } catch (cause) {
      setError(`Not stored: ${cause instanceof Error ? cause.message : 'the server gave no answer'}.`)
    } finally {
      setIsBusy(false)
    }
  }
  const agrees = proposal !== null && proposal.agreeing === proposal.agreeingAsSet
  return (
    <Dialog
      title="The analyser’s clock"
      isOpen
      onClose={onClose}
      foot={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="main" onClick={() => void confirm()} busyWith={isBusy ? 'Saving' : null}>
            Set the clock
          </Button>
        </>
      }
    >
      <p className="mt-0 mb-3">
        Each injection belongs to the hold that the rig was in when it was taken. Where the two computers’ clocks
        differ, say what to add to the analyser’s.
      </p>
      {proposal === null ? (
        <Notice>
          The bypass valve tells nothing here: it did not turn, is not logged, or the gas does not differ.
        </Notice>
      ) : agrees ? (
        <Notice kind="sound">
          As the clocks are set, {proposal.agreeingAsSet} of {proposal.compared} injections agree with the bypass valve.
          From {signedMinutes(offsetS + proposal.lowS)} to {signedMinutes(offsetS + proposal.highS)} they would do so
          too.
        </Notice>
      ) : (
        <Notice kind="doubt" title={`By the bypass valve: ${signedMinutes(offsetS + proposal.offsetS)}.`}>
          {proposal.agreeing} of {proposal.compared} injections would agree with the valve, as the clocks are set{' '}
          {proposal.agreeingAsSet} do. Anything from {signedMinutes(offsetS + proposal.lowS)} to{' '}
          {signedMinutes(offsetS + proposal.highS)} fits as well: the spacing of the injections allows no more.
          <span className="mt-2 block">
            <Button onClick={() => setText(signedText(Math.round(offsetS + proposal.offsetS)))}>Take it</Button>
          </span>
        </Notice>
      )}
      <TextField
        name="clockOffset"
        label="Add to the analyser’s times"
        className="mt-3"
        value={text}
        placeholder="+43 min"
        understood={seconds === null ? undefined : `${formatFixed(seconds, 0)} s`}
        error={error}
        onChange={(event) => setText(event.target.value)}
      />
    </Dialog>
  )
}
