'use client'

import { type Route } from 'next'
import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { LinkButton } from '@/components/ui/link-button'
import { type RunDecision, type RunState } from '@/lib/domain/run'
import { DecideDialog } from './decide-dialog'
import { type RunActions, type RunPermissions } from './run-actions'

interface RunButtonsProps {
  readonly runId: string
  readonly runCode: string
  readonly state: RunState
  readonly decision: RunDecision | null
  readonly version: number
  readonly permissions: RunPermissions
  readonly actions: Pick<RunActions, 'handIn' | 'decide'>
}

/** What can be done with the run as a whole. */
export function RunButtons({ runId, runCode, state, decision, version, permissions, actions }: RunButtonsProps) {
  const router = useRouter()
  const [isDeciding, setIsDeciding] = useState(false)
  const [isHandingIn, setIsHandingIn] = useState(false)
  const [refusal, setRefusal] = useState('')
  const handIn = async () => {
    setIsHandingIn(true)
    setRefusal('')
    try {
      const answer = await actions.handIn(runId, version)
      if (answer.ok) router.refresh()
      else setRefusal(answer.message)
    } catch (cause) {
      setRefusal(`Not handed in: ${cause instanceof Error ? cause.message : 'the server gave no answer'}.`)
    } finally {
      setIsHandingIn(false)
    }
  }
  return (
    <>
      {permissions.canAddFiles ? (
        // the part is this run's own id, put together at run time
        <LinkButton href={`/runs/${runId}/intake` as Route}>Add files</LinkButton>
      ) : null}
      {permissions.canEdit ? <LinkButton href={`/runs/${runId}/edit` as Route}>Correct</LinkButton> : null}
      {permissions.canDecide && state !== 'open' ? (
        <Button kind={state === 'handed-in' ? 'main' : 'plain'} onClick={() => setIsDeciding(true)}>
          {decision === null ? 'Decide' : 'Decide again'}
        </Button>
      ) : null}
      {permissions.canHandIn && state === 'open' ? (
        <Button kind="main" onClick={() => void handIn()} busyWith={isHandingIn ? 'Handing in' : null}>
          Hand in run
        </Button>
      ) : null}
      <span role="alert" className="basis-full text-right text-fault empty:hidden">
        {refusal}
      </span>
      {isDeciding ? (
        <DecideDialog
          runCode={runCode}
          current={decision}
          onClose={() => setIsDeciding(false)}
          onConfirm={(next) => actions.decide(runId, version, next)}
          onDone={() => {
            setIsDeciding(false)
            router.refresh()
          }}
        />
      ) : null}
    </>
  )
}
