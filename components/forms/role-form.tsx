'use client'

import { startTransition, useActionState, useId } from 'react'
import { type FormState } from '@/components/ui/form-state'
import { roles, type Role } from '@/lib/domain/role'
import { Button } from '@/components/ui/button'

/** The house role of one person, changed in its row. */
export function RoleForm({
  action,
  userId,
  name,
  role,
  version,
}: {
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
  readonly userId: string
  readonly name: string
  readonly role: Role
  readonly version: number
}) {
  const [state, dispatch, isPending] = useActionState(action, null)
  const id = useId()
  return (
    <form
      action={dispatch}
      className="flex flex-wrap items-center gap-2"
      onSubmit={(event) => {
        event.preventDefault()
        const data = new FormData(event.currentTarget)
        startTransition(() => dispatch(data))
      }}
    >
      <input type="hidden" name="userId" value={userId} />
      <input type="hidden" name="version" value={version} />
      <label htmlFor={id} className="sr-only">
        Role of {name}
      </label>
      <select id={id} key={`${role} ${version}`} name="role" defaultValue={role} className="control w-auto!">
        {roles.map((one) => (
          <option key={one} value={one}>
            {one}
          </option>
        ))}
      </select>
      <Button type="submit" busyWith={isPending ? 'Setting' : null} aria-label={`Set the role of ${name}`}>
        Set
      </Button>
      {state === null || state.ok ? (
        <span role="status" className="sr-only">
          {state?.value ?? ''}
        </span>
      ) : (
        <p role="alert" className="basis-full text-[13px] text-fault">
          {state.message}
        </p>
      )}
    </form>
  )
}
