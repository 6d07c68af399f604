import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { SelectField } from '@/components/ui/select-field'

/** Puts a sample that exists into one more campaign. */
export function AddToCampaignForm({
  campaigns,
  action,
}: {
  readonly campaigns: readonly { readonly id: string; readonly code: string; readonly name: string }[]
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
}) {
  return (
    <ActionForm action={action} submitLabel="Add to campaign" className="max-w-md">
      <SelectField
        name="campaignId"
        label="Test it in another campaign"
        unchosen="Choose a campaign"
        choices={campaigns.map(({ id, code, name }) => ({ value: id, label: `${name} (${code})` }))}
      />
    </ActionForm>
  )
}
