import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { TextField } from '@/components/ui/text-field'

/** One batch of a sample. */
export function LotForm({ action }: { readonly action: (previous: FormState, data: FormData) => Promise<FormState> }) {
  return (
    <ActionForm action={action} submitLabel="Add lot" isEmptiedWhenSaved>
      <div className="grid gap-3 sm:grid-cols-3">
        <TextField name="code" label="Lot" placeholder="2" />
        <TextField name="madeAt" label="Made on" type="date" isOptional />
        <TextField name="notes" label="Notes" isOptional />
      </div>
    </ActionForm>
  )
}
