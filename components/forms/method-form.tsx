import { ActionForm } from '@/components/ui/action-form'
import { CheckField } from '@/components/ui/check-field'
import { type FormState } from '@/components/ui/form-state'
import { SelectField } from '@/components/ui/select-field'
import { TextField } from '@/components/ui/text-field'
import { type MethodSettings } from '@/lib/domain/method'
import { methodFields, methodFieldText, writeOrders, type MethodField } from '@/lib/domain/method-fields'

function hintOf(field: MethodField, defaults: MethodSettings): string {
  const usual = methodFieldText(field, defaults)
  const label = field.choices?.find((choice) => choice.value === usual)?.label ?? usual
  return `${field.help} Default: ${field.kind === 'flag' ? (usual === 'true' ? 'yes' : 'no') : label === '' ? 'none' : label}.`
}

function Setting({
  field,
  settings,
  defaults,
}: {
  readonly field: MethodField
  readonly settings: MethodSettings
  readonly defaults: MethodSettings
}) {
  const common = { name: field.key, label: field.label, hint: hintOf(field, defaults) }
  if (field.choices !== undefined)
    return <SelectField {...common} defaultValue={methodFieldText(field, settings)} choices={field.choices} />
  if (field.kind === 'flag') return <CheckField {...common} defaultChecked={settings[field.key] === true} />
  return (
    <TextField
      {...common}
      defaultValue={methodFieldText(field, settings)}
      inputMode={field.kind === 'species' || field.kind === 'species-list' ? 'text' : 'decimal'}
      isOptional={field.kind === 'species' || field.kind === 'species-list'}
    />
  )
}

/** Every setting of a method with what it does and its default. Saving makes the next version; the old one stays. */
export function MethodForm({
  settings,
  defaults,
  steps,
  action,
}: {
  readonly settings: MethodSettings
  readonly defaults: MethodSettings
  /** equations of the reaction's steps, in words, for the orders */
  readonly steps: readonly string[]
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
}) {
  const groups = [...new Set(methodFields.map((field) => field.group))]
  return (
    <ActionForm action={action} submitLabel="Save as the next version">
      {groups.map((group) => (
        <fieldset key={group} className="mt-4 border-t border-line pt-3">
          <legend className="pr-3 font-head text-[17px] font-[560]">{group}</legend>
          <div className="grid gap-x-5 gap-y-3 sm:grid-cols-2">
            {methodFields
              .filter((field) => field.group === group)
              .map((field) => (
                <Setting key={field.key} field={field} settings={settings} defaults={defaults} />
              ))}
            {group === 'Rate'
              ? steps.map((equation, step) => (
                  <TextField
                    key={equation}
                    name={`orders.${step}`}
                    label={`Orders of ${equation}`}
                    hint="In partial pressure, for example CO2 0.15, H2 0.4. Empty: zero order."
                    defaultValue={writeOrders(settings.rateOrders[step] ?? {})}
                    isOptional
                    className="sm:col-span-2"
                  />
                ))
              : null}
          </div>
        </fieldset>
      ))}
      <TextField
        name="reason"
        label="Reason for the new version"
        className="mt-5"
        hint="Stands in the history and beside the version."
      />
    </ActionForm>
  )
}
