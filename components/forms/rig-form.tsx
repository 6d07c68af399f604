import { ActionForm } from '@/components/ui/action-form'
import { type FormState } from '@/components/ui/form-state'
import { SelectField } from '@/components/ui/select-field'
import { TextArea } from '@/components/ui/text-area'
import { TextField } from '@/components/ui/text-field'
import { type Rig } from '@/lib/domain/rig'
import { referenceKey, rigReference } from '@/lib/domain/run-form'
import { typedOrEmpty, typedQuantity } from '@/lib/domain/typed-quantity'
import { flowReferenceChoices } from './flow-reference-choices'
import { QuantityField } from './quantity-field'

const ZONES = [
  'UTC',
  'Europe/London',
  'Europe/Berlin',
  'Europe/Madrid',
  'America/New_York',
  'America/Chicago',
  'America/Los_Angeles',
  'Asia/Tokyo',
  'Asia/Shanghai',
  'Asia/Kolkata',
  'Australia/Sydney',
]

/** A rig: channels, clock, limits, and the state its flow controllers count at. */
export function RigForm({
  rig,
  action,
}: {
  readonly rig: Rig | null
  readonly action: (previous: FormState, data: FormData) => Promise<FormState>
}) {
  const reference = rigReference(rig ?? undefined)
  const current = reference === null ? '' : referenceKey(reference)
  return (
    <ActionForm action={action} submitLabel={rig === null ? 'Save rig' : 'Save changes'}>
      <div className="grid gap-3 sm:grid-cols-2">
        <TextField
          name="code"
          label="Code"
          defaultValue={rig?.code ?? ''}
          disabled={rig !== null}
          placeholder="Rig B"
        />
        <TextField name="name" label="Name" defaultValue={rig?.name ?? ''} placeholder="Methanation rig, room 12" />
        <SelectField
          name="reactorKind"
          label="Reactor"
          defaultValue={rig?.reactorKind ?? 'plug-flow'}
          choices={[
            { value: 'plug-flow', label: 'packed bed, plug flow' },
            { value: 'stirred-tank', label: 'stirred tank, continuous' },
            { value: 'batch', label: 'batch' },
          ]}
        />
        <TextField
          name="timeZone"
          label="Zone of its clock"
          list="zones"
          defaultValue={rig?.timeZone ?? ''}
          placeholder="Europe/London"
          hint="Files without an offset are read in it."
        />
        <datalist id="zones">
          {ZONES.map((zone) => (
            <option key={zone} value={zone} />
          ))}
        </datalist>
        <TextArea
          name="channels"
          label="Channels, one a line: code, inner diameter of the tube"
          className="sm:col-span-2"
          rows={2}
          placeholder="1, 4 mm"
          defaultValue={
            rig?.channels
              .map(({ code, tubeInnerDiameterM }) =>
                tubeInnerDiameterM === null ? code : `${code}, ${typedQuantity(tubeInnerDiameterM, 'length')}`,
              )
              .join('\n') ?? '1'
          }
        />
        <QuantityField
          name="maximumPressurePa"
          label="Highest pressure allowed, absolute"
          dimension="pressure"
          isOptional
          placeholder="10 bar abs"
          defaultValue={
            rig?.maximumPressurePa === null || rig === null
              ? ''
              : `${typedQuantity(rig.maximumPressurePa, 'pressure')} abs`
          }
        />
        <QuantityField
          name="maximumTemperatureK"
          label="Highest temperature allowed"
          dimension="temperature"
          isOptional
          placeholder="600 °C"
          defaultValue={typedOrEmpty(rig?.maximumTemperatureK ?? null, 'temperature')}
        />
        <QuantityField
          name="barometerPa"
          label="Usual air pressure"
          dimension="pressure"
          placeholder="1013 mbar"
          hint="Added to gauge pressures when nothing better is known."
          defaultValue={typedQuantity(rig?.barometerPa ?? 101_325, 'pressure', 'mbar')}
        />
        <QuantityField
          name="lineLagS"
          label="Time from bed to analyser"
          dimension="time"
          isOptional
          placeholder="45 s"
          defaultValue={rig === null ? '' : typedQuantity(rig.lineLagS, 'time')}
        />
        <SelectField
          name="flowReference"
          label="Its flow controllers count volumes at"
          unchosen="Not known: ask with each run"
          defaultValue={current}
          choices={flowReferenceChoices(current)}
          className="sm:col-span-2"
        />
        <TextArea name="notes" label="Notes" isOptional className="sm:col-span-2" defaultValue={rig?.notes ?? ''} />
      </div>
    </ActionForm>
  )
}
