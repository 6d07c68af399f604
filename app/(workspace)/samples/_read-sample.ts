import { type FormReader } from '@/lib/domain/form-reader'
import { type NewSample } from '@/lib/domain/sample'

/** Fields of a sample's form as a record; what is wrong is left with the reader. */
export function readSample(form: FormReader): Omit<NewSample, 'code' | 'campaignIds'> {
  const activeMetal = form.orNull('activeMetal')
  if (activeMetal !== null && !/^[A-Z][a-z]?$/.test(activeMetal))
    form.fault('activeMetal', 'Write the symbol of one element, for example Ni.')
  return {
    name: form.required('name', 'Name the sample, for example 5 wt% Ni on alumina.'),
    composition: form.text('composition'),
    activeMetal,
    metalMassFraction: form.quantity('metalMassFraction', 'fraction', { fractionOf: 'mass' }),
    particleDensityKgPerM3: form.quantity('particleDensityKgPerM3', 'density'),
    poreFraction: form.quantity('poreFraction', 'fraction'),
    tortuosity:
      form.text('tortuosity') === ''
        ? null
        : form.number('tortuosity', 'Write the tortuosity as a number, for example 3.'),
    meanPoreRadiusM: form.quantity('meanPoreRadiusM', 'length'),
    bedVoidFraction: form.quantity('bedVoidFraction', 'fraction'),
    notes: form.text('notes'),
  }
}
