'use client'

import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { PasswordField } from './password-field'

export function PasswordChangeForm({
  action,
  email,
}: {
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
  /** tells a password safe which entry this is */
  readonly email: string
}) {
  return (
    <ActionForm
      action={action}
      submitLabel="Change the password"
      busyLabel="Changing"
      isEmptiedWhenSaved
      className="grid gap-4"
    >
      <input type="text" name="username" autoComplete="username" value={email} readOnly hidden />
      <PasswordField name="currentPassword" label="Present password" autoComplete="current-password" />
      <PasswordField
        name="newPassword"
        label="New password"
        autoComplete="new-password"
        hint="At least 15 characters. Four or five words that do not belong together are easy to keep."
      />
    </ActionForm>
  )
}
