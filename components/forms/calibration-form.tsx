import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { SelectField, type SelectChoice } from '@/components/ui/select-field'
import { TextField } from '@/components/ui/text-field'

const KINDS = [
  { value: 'flow-controller', label: 'flow controller: relative uncertainty in %' },
  { value: 'thermocouple', label: 'thermocouple: uncertainty in K' },
  { value: 'balance', label: 'balance: relative uncertainty in %' },
  { value: 'pressure-gauge', label: 'pressure gauge: relative uncertainty in %' },
  { value: 'cylinder', label: 'gas cylinder: relative uncertainty in %' },
]

/** A calibration that says one number: how far an instrument may be off. */
export function CalibrationForm({
  rigs,
  action,
}: {
  readonly rigs: readonly SelectChoice[]
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
}) {
  return (
    <ActionForm action={action} submitLabel="Keep calibration" isEmptiedWhenSaved>
      <div className="grid gap-3 sm:grid-cols-2">
        <SelectField name="kind" label="What was calibrated" unchosen="Choose" choices={KINDS} />
        <TextField name="name" label="Name of the certificate" />
        <SelectField name="rigId" label="Rig" unchosen="All rigs" choices={rigs} isOptional />
        <TextField name="instrument" label="Instrument" isOptional />
        <TextField
          name="uncertainty"
          label="Standard uncertainty"
          inputMode="decimal"
          hint="One standard uncertainty: in %, or in K for a thermocouple."
        />
        <TextField name="standardUsed" label="Standard used" isOptional />
        <TextField name="validFrom" label="Holds from" type="date" />
        <TextField name="validTo" label="Holds to" type="date" isOptional />
      </div>
    </ActionForm>
  )
}
