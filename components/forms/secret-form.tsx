'use client'

import { type ReactNode, startTransition, useActionState, useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import { FormStateProvider } from '@/components/ui/form-state'
import { Notice } from '@/components/ui/notice'
import { type ActionResult } from '@/lib/domain/errors'

/** Something that is shown once: after this page it is nowhere to be read. */
export interface ShownSecret {
  readonly title: string
  readonly secret: string
  readonly note: string
}
export type SecretState = ActionResult<ShownSecret> | null

/** A form whose answer holds a secret, to be copied now. */
export function SecretForm({
  action,
  submitLabel,
  busyLabel,
  children,
}: {
  readonly action: (previous: SecretState, data: FormData) => Promise<SecretState>
  readonly submitLabel: string
  readonly busyLabel: string
  readonly children: ReactNode
}) {
  const [state, dispatch, isPending] = useActionState(
    async (previous: SecretState, data: FormData): Promise<SecretState> => {
      const answer = await action(previous, data)
      if (answer?.ok === true) form.current?.reset()
      return answer
    },
    null,
  )
  const form = useRef<HTMLFormElement>(null)
  return (
    <FormStateProvider value={state === null || state.ok ? null : state}>
      <form
        ref={form}
        action={dispatch}
        noValidate
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault()
          const data = new FormData(event.currentTarget)
          startTransition(() => dispatch(data))
        }}
      >
        {children}
        {state === null ? null : state.ok ? (
          <SecretNotice shown={state.value} />
        ) : (
          <Notice kind="fault" isLive title={state.message} />
        )}
        <div>
          <Button type="submit" busyWith={isPending ? busyLabel : null}>
            {submitLabel}
          </Button>
        </div>
      </form>
    </FormStateProvider>
  )
}

/** The secret with a button that copies it. */
export function SecretNotice({ shown }: { readonly shown: ShownSecret }) {
  const [isCopied, setIsCopied] = useState(false)
  return (
    <Notice kind="sound" isLive title={shown.title}>
      <p>{shown.note}</p>
      <p className="mt-2">
        <code className="block border border-line bg-sheet px-2 py-1.5 break-all select-all">{shown.secret}</code>
      </p>
      <div className="mt-2">
        <Button
          onClick={() => {
            void navigator.clipboard?.writeText(shown.secret).then(() => setIsCopied(true))
          }}
        >
          {isCopied ? 'Copied' : 'Copy'}
        </Button>
      </div>
    </Notice>
  )
}
