import { parseQuantity } from '@/lib/analysis/units/parse-quantity'
import { type FormReader } from '@/lib/domain/form-reader'
import { isTimeZone } from '@/lib/domain/instant-in-zone'
import { type NewRig, reactorKinds } from '@/lib/domain/rig'
import { referenceFromKey } from '@/lib/domain/run-form'

/** Fields of a rig's form as a record; what is wrong is left with the reader. */
export function readRig(form: FormReader): Omit<NewRig, 'code'> {
  const timeZone = form.required('timeZone', 'Name the zone of the rig’s clock, for example Europe/London.')
  if (timeZone !== '' && !isTimeZone(timeZone))
    form.fault('timeZone', `“${timeZone}” is not a zone name; write it like Europe/London, or UTC.`)
  const reference = referenceFromKey(form.text('flowReference'))
  return {
    name: form.required('name', 'Name the rig.'),
    reactorKind: form.choice('reactorKind', reactorKinds, 'Choose the kind of reactor.'),
    timeZone,
    channels: readChannels(form),
    barometerPa: form.requiredQuantity(
      'barometerPa',
      'pressure',
      'Give the usual air pressure, for example 1013 mbar.',
    ),
    maximumPressurePa: form.absolutePressure('maximumPressurePa'),
    maximumTemperatureK: form.quantity('maximumTemperatureK', 'temperature'),
    lineLagS: form.quantity('lineLagS', 'time') ?? 0,
    flowReferenceTemperatureK: reference?.temperatureK ?? null,
    flowReferencePressurePa: reference?.pressurePa ?? null,
    notes: form.text('notes'),
  }
}

/** One channel a line: `A, 4.7 mm`. */
function readChannels(form: FormReader): NewRig['channels'] {
  const lines = form
    .required('channels', 'Name at least one channel, for example A, 4 mm.')
    .split('\n')
    .filter((line) => line.trim() !== '')
  return lines.map((line) => {
    const at = line.search(/[,;]/)
    const code = (at < 0 ? line : line.slice(0, at)).trim()
    const diameter = at < 0 ? '' : line.slice(at + 1).trim()
    if (diameter === '') return { code, tubeInnerDiameterM: null }
    const read = parseQuantity(diameter, 'length')
    if (!read.ok) form.fault('channels', `${code}: ${read.sentence}`)
    return { code, tubeInnerDiameterM: read.ok ? read.valueSi : null }
  })
}
