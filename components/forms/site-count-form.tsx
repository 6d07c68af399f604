import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { SelectField } from '@/components/ui/select-field'
import { TextField } from '@/components/ui/text-field'
import { siteCountMethods } from '@/lib/domain/sample'
import { QuantityField } from './quantity-field'

/** A count of active sites, by whichever method, with how sure it is. */
export function SiteCountForm({
  lots,
  action,
}: {
  readonly lots: readonly { readonly id: string; readonly code: string }[]
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
}) {
  return (
    <ActionForm action={action} submitLabel="Add site count" isEmptiedWhenSaved>
      <div className="grid gap-3 sm:grid-cols-3">
        <SelectField
          name="method"
          label="Counted by"
          choices={siteCountMethods.map((method) => ({ value: method, label: method }))}
        />
        <QuantityField
          name="molPerKg"
          label="Sites per mass of catalyst"
          dimension="amount-per-mass"
          placeholder="120 µmol/g"
        />
        <QuantityField
          name="relativeStandardUncertainty"
          label="One standard uncertainty"
          dimension="fraction"
          placeholder="8 %"
        />
        <SelectField
          name="lotId"
          label="Lot"
          unchosen="The sample as a whole"
          choices={lots.map(({ id, code }) => ({ value: id, label: code }))}
        />
        <SelectField
          name="state"
          label="State"
          choices={[
            { value: 'fresh', label: 'fresh' },
            { value: 'spent', label: 'spent' },
          ]}
        />
        <TextField name="countedAt" label="Counted on" type="date" isOptional />
        <TextField name="notes" label="Notes" isOptional className="sm:col-span-3" />
      </div>
    </ActionForm>
  )
}
