'use client'

import { useActionState, useState, startTransition } from 'react'
import { Button } from '@/components/ui/button'
import { type ButtonKind } from '@/components/ui/button-class'
import { Dialog } from '@/components/ui/dialog'
import { type FormState } from '@/components/ui/form-state'

/** A button that does one thing to one record, after a question where it cannot be taken back. What went wrong stands beside it. */
export function ActionButton({
  action,
  fields,
  label,
  describes,
  busyLabel,
  kind = 'plain',
  question,
}: {
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
  readonly fields: Readonly<Record<string, string>>
  readonly label: string
  /** which record, for those who hear the button without its row */
  readonly describes: string
  readonly busyLabel: string
  readonly kind?: ButtonKind
  readonly question?: { readonly title: string; readonly text: string }
}) {
  const [state, dispatch, isPending] = useActionState(action, null)
  const [isAsking, setIsAsking] = useState(false)
  const act = () => {
    const data = new FormData()
    for (const [name, value] of Object.entries(fields)) data.set(name, value)
    startTransition(() => dispatch(data))
  }
  return (
    <>
      <Button
        kind={kind}
        busyWith={isPending ? busyLabel : null}
        aria-label={`${label}: ${describes}`}
        onClick={() => (question === undefined ? act() : setIsAsking(true))}
      >
        {label}
      </Button>
      {question === undefined ? null : (
        <Dialog
          title={question.title}
          isOpen={isAsking}
          onClose={() => setIsAsking(false)}
          foot={
            <>
              <Button onClick={() => setIsAsking(false)}>Leave it</Button>
              <Button
                kind="danger"
                onClick={() => {
                  setIsAsking(false)
                  act()
                }}
              >
                {label}
              </Button>
            </>
          }
        >
          <p>{question.text}</p>
        </Dialog>
      )}
      {state === null || state.ok ? (
        <span role="status" className="sr-only">
          {state?.value ?? ''}
        </span>
      ) : (
        <p role="alert" className="mt-1 text-[13px] text-fault">
          {state.message}
        </p>
      )}
    </>
  )
}
