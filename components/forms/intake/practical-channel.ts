import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { type PreviewChannel } from '@/lib/domain/upload-preview'

const NAMES: Readonly<Record<string, string>> = {
  bedTemperatureK: 'bed temperature',
  setTemperatureK: 'set temperature',
  wallTemperatureK: 'wall temperature',
  inletPressurePa: 'pressure before the bed, absolute',
  outletPressurePa: 'pressure after the bed, absolute',
  isBypass: 'bypass (1) or reactor (0)',
}

/** A channel in the words and units of the bench. */
export function practicalChannel(channel: PreviewChannel): {
  readonly name: string
  readonly low: string | null
  readonly high: string | null
} {
  const [kind, species] = channel.name.split('.')
  const name =
    kind === 'flowMolPerS'
      ? `flow of ${species ?? ''}`
      : kind === 'area'
        ? `area of ${species ?? ''}`
        : kind === 'moleFraction'
          ? `mole fraction of ${species ?? ''}`
          : (NAMES[channel.name] ?? channel.name)
  const text = (value: number | null) => {
    if (value === null) return null
    if (channel.name.endsWith('TemperatureK')) return `${(value - 273.15).toFixed(1)} °C`
    if (channel.name.endsWith('PressurePa')) return formatQuantity(value, 'pressure', { significantDigits: 4 })
    if (kind === 'flowMolPerS') return `${(value * 1e6).toFixed(3)} µmol/s`
    return String(Number(value.toPrecision(5)))
  }
  return { name, low: text(channel.minimum), high: text(channel.maximum) }
}
