'use client'

import { type ReactNode, startTransition, useActionState, useEffect, useEffectEvent, useRef } from 'react'
import { Button } from './button'
import { type FormState, FormStateProvider } from './form-state'
import { Notice } from './notice'

/**
 * A form whose action answers with the fields at fault. What was typed stays: the action is started by hand, because a form that the
 * framework submits is emptied afterwards, also when the answer is "no".
 */
export function ActionForm({
  action,
  submitLabel,
  busyLabel = 'Saving',
  extra,
  className,
  isEmptiedWhenSaved = false,
  onSaved,
  children,
}: {
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
  readonly submitLabel: string
  readonly busyLabel?: string
  /** more buttons or links beside the main one */
  readonly extra?: ReactNode
  readonly className?: string
  readonly isEmptiedWhenSaved?: boolean
  readonly onSaved?: () => void
  readonly children: ReactNode
}) {
  const [state, dispatch, isPending] = useActionState(action, null)
  const form = useRef<HTMLFormElement>(null)
  // only a new answer counts, not a new callback
  const onAnswer = useEffectEvent((answer: NonNullable<FormState>) => {
    if (answer.ok) {
      if (isEmptiedWhenSaved) form.current?.reset()
      onSaved?.()
    } else {
      // the first field at fault, so that a keyboard or a screen reader is where the work is
      const field = form.current?.querySelector('[aria-invalid="true"]')
      if (field instanceof HTMLElement) field.focus()
    }
  })
  useEffect(() => {
    if (state !== null) onAnswer(state)
  }, [state])
  return (
    <FormStateProvider value={state}>
      <form
        ref={form}
        action={dispatch}
        noValidate
        className={className}
        onSubmit={(event) => {
          event.preventDefault()
          const data = new FormData(event.currentTarget)
          startTransition(() => dispatch(data))
        }}
      >
        {children}
        <div className="mt-5 grid gap-3">
          {state === null ? null : state.ok ? (
            state.value === '' ? null : (
              <Notice kind="sound" isLive>
                {state.value}
              </Notice>
            )
          ) : (
            <Notice kind="fault" isLive title={state.message}>
              {state.issues.length > 0 ? (
                <ul className="mt-1 list-disc pl-5">
                  {state.issues.map((issue) => (
                    <li key={`${issue.field} ${issue.message}`}>{issue.message}</li>
                  ))}
                </ul>
              ) : null}
            </Notice>
          )}
          <div className="flex flex-wrap gap-2">
            <Button type="submit" kind="main" busyWith={isPending ? busyLabel : null}>
              {submitLabel}
            </Button>
            {extra}
          </div>
        </div>
      </form>
    </FormStateProvider>
  )
}
