import { type Dimension } from '@/lib/analysis/units/dimension'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { speciesText } from '@/lib/domain/species-text'

interface ChannelWords {
  readonly label: string
  /** a value in the unit people use */
  readonly format: (valueSi: number) => string
}

const quantity = (dimension: Dimension) => (valueSi: number) => formatQuantity(valueSi, dimension)
const count = (value: number) => Number(value.toPrecision(4)).toLocaleString('en')

const PLAIN: Readonly<Record<string, ChannelWords>> = {
  setTemperatureK: { label: 'Temperature, set', format: quantity('temperature') },
  bedTemperatureK: { label: 'Temperature of the bed', format: quantity('temperature') },
  wallTemperatureK: { label: 'Temperature of the wall', format: quantity('temperature') },
  inletPressurePa: { label: 'Pressure before the bed, absolute', format: quantity('pressure') },
  outletPressurePa: { label: 'Pressure after the bed, absolute', format: quantity('pressure') },
  isBypass: { label: 'Valve', format: (value) => (value === 0 ? 'reactor' : 'bypass') },
}

/** A stored channel in words, with its values as people write them: `flowMolPerS.CO2` is `Flow of CO₂` in µmol/s. */
export function channelWords(name: string): ChannelWords {
  const [whole = '', branch] = name.split('@')
  const suffix = branch === undefined ? '' : `, channel ${branch}`
  const plain = PLAIN[whole]
  if (plain !== undefined) return { ...plain, label: plain.label + suffix }
  const [quantityName = '', species = ''] = whole.split('.')
  const of = `${speciesText(species)}${suffix}`
  switch (quantityName) {
    case 'flowMolPerS':
      return { label: `Flow of ${of}`, format: quantity('molar-flow') }
    case 'area':
      return { label: `Peak area of ${of}`, format: count }
    case 'moleFraction':
      return { label: `Mole fraction of ${of}`, format: quantity('fraction') }
    case 'height':
      return { label: `Peak height of ${of}`, format: count }
    default:
      return { label: name, format: count }
  }
}
