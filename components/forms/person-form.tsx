'use client'

import { type SelectChoice, SelectField } from '@/components/ui/select-field'
import { TextField } from '@/components/ui/text-field'
import { type Role } from '@/lib/domain/role'
import { SecretForm, type SecretState } from './secret-form'

/** What each house role is for, in the words of the list people choose from. */
export const ROLE_CHOICES: readonly (SelectChoice & { readonly value: Role })[] = [
  { value: 'technician', label: 'technician: logs runs, adds files, hands in' },
  { value: 'researcher', label: 'researcher: reduces, questions, compares' },
  { value: 'lead', label: 'lead: starts campaigns and decides what counts' },
  { value: 'guest', label: 'guest: reads published editions only' },
  { value: 'admin', label: 'admin: people, rigs, backups' },
]

/** Makes a person and shows the invitation to pass on. */
export function PersonForm({
  action,
}: {
  readonly action: (previous: SecretState, data: FormData) => Promise<SecretState>
}) {
  return (
    <SecretForm action={action} submitLabel="Invite" busyLabel="Making the invitation">
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField name="displayName" label="Name" required maxLength={100} />
        <TextField
          name="email"
          label="E-mail address"
          type="email"
          autoCapitalize="none"
          spellCheck={false}
          required
          maxLength={254}
        />
      </div>
      <SelectField
        name="role"
        label="Role in the house"
        choices={ROLE_CHOICES}
        defaultValue="researcher"
        hint="What somebody may do in a campaign is set there, by its lead."
      />
    </SecretForm>
  )
}
