'use client'

import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { TextField } from '@/components/ui/text-field'
import { PasswordField } from './password-field'

/** E-mail address and password. */
export function SignInForm({
  action,
  next,
}: {
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
  /** where to go afterwards */
  readonly next: string
}) {
  return (
    <ActionForm action={action} submitLabel="Sign in" busyLabel="Signing in" className="grid gap-4">
      <input type="hidden" name="next" value={next} />
      <TextField
        name="email"
        label="E-mail address"
        type="email"
        autoComplete="username"
        autoCapitalize="none"
        spellCheck={false}
        required
        autoFocus
      />
      <PasswordField name="password" label="Password" autoComplete="current-password" />
    </ActionForm>
  )
}
