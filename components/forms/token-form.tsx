'use client'

import { CheckField } from '@/components/ui/check-field'
import { type SelectChoice, SelectField } from '@/components/ui/select-field'
import { useFieldIssue } from '@/components/ui/form-state'
import { TextField } from '@/components/ui/text-field'
import { SecretForm, type SecretState } from './secret-form'

const LIVES: readonly SelectChoice[] = [
  { value: '7', label: '7 days' },
  { value: '30', label: '30 days' },
  { value: '90', label: '90 days' },
  { value: '366', label: 'a year' },
]

/** Makes an API token for a script or an instrument computer. */
export function TokenForm({
  action,
  campaigns,
}: {
  readonly action: (previous: SecretState, data: FormData) => Promise<SecretState>
  readonly campaigns: readonly SelectChoice[]
}) {
  return (
    <SecretForm action={action} submitLabel="Make a token" busyLabel="Making it">
      <TextField
        name="name"
        label="What will use it"
        hint="A computer or a script, so that you know later which one to stop."
        required
        maxLength={100}
      />
      <Scopes />
      <div className="grid gap-4 sm:grid-cols-2">
        <SelectField name="validDays" label="Works for" choices={LIVES} defaultValue="90" />
        <SelectField name="campaignId" label="Campaign" choices={campaigns} unchosen="All of mine" />
      </div>
    </SecretForm>
  )
}

function Scopes() {
  const issue = useFieldIssue('scopes')
  return (
    <fieldset className="grid gap-1.5">
      <legend className="mb-1 text-[14px] text-ink-2">It may</legend>
      <CheckField name="scopes" value="read" label="read what I can read" defaultChecked />
      <CheckField name="scopes" value="intake" label="add samples, runs and files, and hand runs in" defaultChecked />
      <CheckField name="scopes" value="write" label="do everything else that I may do" />
      {issue === undefined ? null : <p className="text-[13px] text-fault">{issue}</p>}
    </fieldset>
  )
}
