import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { TextArea } from '@/components/ui/text-area'
import { TextField } from '@/components/ui/text-field'
import { type Reaction } from '@/lib/domain/reaction'
import { typedEquation } from '@/lib/domain/read-equation'
import { EquationsField } from './equations-field'

/** A reaction: its equations, the reactant that counts, and thermochemistry of its own where the built-in tables do not serve. */
export function ReactionForm({
  reaction,
  action,
}: {
  readonly reaction: Reaction | null
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
}) {
  return (
    <ActionForm action={action} submitLabel={reaction === null ? 'Save reaction' : 'Save changes'}>
      <div className="grid gap-3">
        <div className="grid gap-3 sm:grid-cols-[10rem_1fr]">
          <TextField
            name="code"
            label="Code"
            defaultValue={reaction?.code ?? ''}
            disabled={reaction !== null}
            placeholder="METH"
          />
          <TextField name="name" label="Name" defaultValue={reaction?.name ?? ''} placeholder="CO2 methanation" />
        </div>
        <EquationsField
          name="steps"
          label="Equations, one a line"
          hint="The main reaction first, then side reactions from the same key reactant."
          defaultValue={reaction?.steps.map(typedEquation).join('\n') ?? ''}
        />
        <TextField
          name="keyReactant"
          label="Key reactant"
          defaultValue={reaction?.keyReactant ?? ''}
          placeholder="CO2"
          hint="Conversion, and the rate, are those of this species. Every equation uses it up."
        />
        <TextArea
          name="thermochemistry"
          label="Thermochemistry of your own"
          isOptional
          hint="Only for species that the built-in tables lack. One a line: formula; standard enthalpy at 298.15 K; entropy and heat capacity in J mol⁻¹ K⁻¹; source. Left empty, the built-in tables serve."
          placeholder="C10H22; -249.7 kJ/mol; 545.7; 234; source"
          defaultValue={thermochemistryText(reaction)}
        />
        <TextArea name="notes" label="Notes" isOptional defaultValue={reaction?.notes ?? ''} />
      </div>
    </ActionForm>
  )
}

function thermochemistryText(reaction: Reaction | null): string {
  return Object.entries(reaction?.thermochemistry ?? {})
    .map(
      ([species, entry]) =>
        `${species}; ${String(entry.enthalpyJPerMol / 1000)} kJ/mol; ${String(entry.entropyJPerMolK)}; ${String(entry.heatCapacityJPerMolK)}; ${entry.source}`,
    )
    .join('\n')
}
