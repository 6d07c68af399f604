import { parseQuantity } from '@/lib/analysis/units/parse-quantity'
import { type FormReader } from '@/lib/domain/form-reader'
import { type NewReaction } from '@/lib/domain/reaction'
import { readEquation } from '@/lib/domain/read-equation'

/** Fields of a reaction's form as a record; what is wrong is left with the reader. */
export function readReaction(form: FormReader): Omit<NewReaction, 'code'> {
  const steps: Record<string, number>[] = []
  const lines = form
    .required('steps', 'Write at least one equation, for example CO2 + 4 H2 = CH4 + 2 H2O.')
    .split('\n')
    .filter((line) => line.trim() !== '')
  if (lines.length > 6) form.fault('steps', 'At most six equations.')
  for (const line of lines) {
    const read = readEquation(line)
    if (read.ok) steps.push({ ...read.stoichiometry })
    else form.fault('steps', read.sentence)
  }
  const keyReactant = form.required('keyReactant', 'Name the key reactant, for example CO2.')
  if (keyReactant !== '' && steps.some((step) => !((step[keyReactant] ?? 0) < 0)))
    form.fault('keyReactant', `Every equation must use up ${keyReactant}: conversion is that of the key reactant.`)
  return {
    name: form.required('name', 'Name the reaction, for example CO2 methanation.'),
    keyReactant,
    steps,
    thermochemistry: readThermochemistry(form),
    notes: form.text('notes'),
  }
}

/** `CH4; -74.6 kJ/mol; 186.3; 35.7; source`, one species a line; empty takes the built-in tables. */
function readThermochemistry(form: FormReader): NewReaction['thermochemistry'] {
  const lines = form
    .text('thermochemistry')
    .split('\n')
    .filter((line) => line.trim() !== '')
  if (lines.length === 0) return null
  const entries: [string, NonNullable<NewReaction['thermochemistry']>[string]][] = []
  for (const line of lines) {
    const [species = '', enthalpy = '', entropy = '', heatCapacity = '', ...source] = line
      .split(';')
      .map((part) => part.trim())
    const read = parseQuantity(enthalpy, 'energy-per-amount')
    const [s, cp] = [entropy, heatCapacity].map((text) => Number(text.replace(',', '.')))
    if (!read.ok) form.fault('thermochemistry', `${species}: ${read.sentence}`)
    else if (
      s === undefined ||
      cp === undefined ||
      !Number.isFinite(s) ||
      !Number.isFinite(cp) ||
      entropy === '' ||
      heatCapacity === ''
    )
      form.fault(
        'thermochemistry',
        `${species}: after the enthalpy come entropy and heat capacity in J mol⁻¹ K⁻¹, then the source.`,
      )
    else
      entries.push([
        species,
        { enthalpyJPerMol: read.valueSi, entropyJPerMolK: s, heatCapacityJPerMolK: cp, source: source.join('; ') },
      ])
  }
  return Object.fromEntries(entries)
}
