import { type SelectChoice } from '@/components/ui/select-field'
import { FLOW_REFERENCES } from '@/lib/analysis/units/flow-reference'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { referenceFromKey, referenceKey } from '@/lib/domain/run-form'

/** The usual states a gas volume is counted at, and the one in use when it is none of them. */
export function flowReferenceChoices(current: string): SelectChoice[] {
  const usual = FLOW_REFERENCES.map((state) => ({
    value: referenceKey(state),
    label: `${state.label} (${state.usedBy})`,
  }))
  const own = referenceFromKey(current)
  if (own === null || usual.some(({ value }) => value === current)) return usual
  return [
    {
      value: current,
      label: `${formatQuantity(own.temperatureK, 'temperature')}, ${formatQuantity(own.pressurePa, 'pressure', { significantDigits: 6 })}`,
    },
    ...usual,
  ]
}
