import { ActionForm } from '@/components/ui/action-form'
import { CheckField } from '@/components/ui/check-field'
import { type FormState } from '@/components/ui/form-state'
import { TextArea } from '@/components/ui/text-area'
import { TextField } from '@/components/ui/text-field'
import { type Sample } from '@/lib/domain/sample'
import { typedOrEmpty } from '@/lib/domain/typed-quantity'
import { QuantityField } from './quantity-field'

/** A sample: what it is, and the figures of its particles that transport checks need. */
export function SampleForm({
  sample,
  campaigns,
  action,
}: {
  readonly sample: Sample | null
  /** campaigns a new sample can be put into at once */
  readonly campaigns: readonly { readonly id: string; readonly code: string; readonly name: string }[]
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
}) {
  return (
    <ActionForm action={action} submitLabel={sample === null ? 'Save sample' : 'Save changes'}>
      <div className="grid gap-3 sm:grid-cols-2">
        <TextField
          name="code"
          label="Code"
          defaultValue={sample?.code ?? ''}
          disabled={sample !== null}
          placeholder="CQ-101"
        />
        <TextField name="name" label="Name" defaultValue={sample?.name ?? ''} placeholder="5 wt% Ni on alumina" />
        <TextField
          name="composition"
          label="Composition"
          isOptional
          defaultValue={sample?.composition ?? ''}
          className="sm:col-span-2"
        />
        <TextField
          name="activeMetal"
          label="Active metal"
          isOptional
          defaultValue={sample?.activeMetal ?? ''}
          placeholder="Ni"
          hint="Used for cautions: some metals form toxic carbonyls."
        />
        <QuantityField
          name="metalMassFraction"
          label="Metal content by mass"
          dimension="fraction"
          options={{ fractionOf: 'mass' }}
          isOptional
          placeholder="5 wt%"
          defaultValue={typedOrEmpty(sample?.metalMassFraction ?? null, 'fraction', '%')}
        />
        {sample === null && campaigns.length > 0 ? (
          <fieldset className="sm:col-span-2">
            <legend className="text-[14px] text-ink-2">Tested in</legend>
            {campaigns.map((campaign) => (
              <CheckField
                key={campaign.id}
                name="campaignIds"
                value={campaign.id}
                label={`${campaign.name} (${campaign.code})`}
                defaultChecked={campaigns.length === 1}
              />
            ))}
          </fieldset>
        ) : null}
        <fieldset className="grid gap-3 sm:col-span-2 sm:grid-cols-2">
          <legend className="mb-1 text-[14px] text-ink-2">
            For the checks on heat and mass transport; each may be left empty
          </legend>
          <QuantityField
            name="particleDensityKgPerM3"
            label="Density of the particles, pores included"
            dimension="density"
            placeholder="1.2 g/cm3"
            defaultValue={typedOrEmpty(sample?.particleDensityKgPerM3 ?? null, 'density')}
          />
          <QuantityField
            name="poreFraction"
            label="Pore share of a particle’s volume"
            dimension="fraction"
            placeholder="45 %"
            defaultValue={typedOrEmpty(sample?.poreFraction ?? null, 'fraction', '%')}
          />
          <TextField
            name="tortuosity"
            label="Tortuosity"
            inputMode="decimal"
            placeholder="3"
            defaultValue={sample?.tortuosity === null || sample === null ? '' : String(sample.tortuosity)}
          />
          <QuantityField
            name="meanPoreRadiusM"
            label="Mean pore radius"
            dimension="length"
            placeholder="5 nm"
            defaultValue={typedOrEmpty(sample?.meanPoreRadiusM ?? null, 'length')}
          />
          <QuantityField
            name="bedVoidFraction"
            label="Void share of the bed"
            dimension="fraction"
            placeholder="40 %"
            defaultValue={typedOrEmpty(sample?.bedVoidFraction ?? null, 'fraction', '%')}
          />
        </fieldset>
        <TextArea name="notes" label="Notes" isOptional className="sm:col-span-2" defaultValue={sample?.notes ?? ''} />
      </div>
    </ActionForm>
  )
}
