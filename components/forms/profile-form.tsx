'use client'

import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { TextField } from '@/components/ui/text-field'

export function ProfileForm({
  action,
  displayName,
}: {
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
  readonly displayName: string
}) {
  return (
    <ActionForm action={action} submitLabel="Save the name">
      <TextField
        name="displayName"
        label="Name, as others see it"
        defaultValue={displayName}
        autoComplete="name"
        required
        maxLength={100}
      />
    </ActionForm>
  )
}
