'use client'

import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { TextField } from '@/components/ui/text-field'
import { OneTimeCodeField } from './one-time-code-field'
import { PasswordField } from './password-field'

const PASSWORD_HINT = 'At least 15 characters. Four or five words that do not belong together are easy to keep.'

/** Takes a one-time code and a new password; the first admin says who they are as well. */
export function NewAccountForm({
  action,
  codeLabel,
  codeHint,
  asksWho,
  submitLabel,
}: {
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
  readonly codeLabel: string
  readonly codeHint: string
  readonly asksWho: boolean
  readonly submitLabel: string
}) {
  return (
    <ActionForm action={action} submitLabel={submitLabel} busyLabel="Setting the password" className="grid gap-4">
      <OneTimeCodeField label={codeLabel} hint={codeHint} />
      {asksWho ? (
        <>
          <TextField name="displayName" label="Name, as others see it" autoComplete="name" required maxLength={100} />
          <TextField
            name="email"
            label="E-mail address"
            type="email"
            autoComplete="username"
            autoCapitalize="none"
            spellCheck={false}
            required
          />
        </>
      ) : null}
      <PasswordField name="password" label="New password" hint={PASSWORD_HINT} autoComplete="new-password" />
    </ActionForm>
  )
}
