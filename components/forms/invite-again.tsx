'use client'

import { startTransition, useActionState, useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog } from '@/components/ui/dialog'
import { SecretNotice, type SecretState } from './secret-form'

/** A new invitation for one person, in a dialog, as its link is shown once. */
export function InviteAgain({
  action,
  userId,
  name,
  hasPassword,
}: {
  readonly action: (previous: SecretState, data: FormData) => Promise<SecretState>
  readonly userId: string
  readonly name: string
  readonly hasPassword: boolean
}) {
  const [state, dispatch, isPending] = useActionState(action, null)
  const [isOpen, setIsOpen] = useState(false)
  return (
    <>
      <Button onClick={() => setIsOpen(true)} aria-label={`New invitation for ${name}`}>
        Invite again
      </Button>
      <Dialog
        title={`A new invitation for ${name}`}
        isOpen={isOpen}
        onClose={() => setIsOpen(false)}
        foot={
          <Button
            kind="main"
            busyWith={isPending ? 'Making it' : null}
            onClick={() => {
              const data = new FormData()
              data.set('userId', userId)
              startTransition(() => dispatch(data))
            }}
          >
            Make the invitation
          </Button>
        }
      >
        <p>
          {hasPassword
            ? 'With it a lost password is replaced. The present password works until the invitation is taken up; then every session ends.'
            : 'Invitations made earlier stop working.'}
        </p>
        <div className="mt-3">
          {state === null ? null : state.ok ? (
            <SecretNotice shown={state.value} />
          ) : (
            <p role="alert" className="text-fault">
              {state.message}
            </p>
          )}
        </div>
      </Dialog>
    </>
  )
}
