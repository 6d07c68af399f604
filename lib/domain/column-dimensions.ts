import { type Dimension } from '../analysis/units/dimension'
import { type ColumnMeaning } from './column-map'

/** Kinds of quantity a column of this meaning can be stated in; empty where no unit is asked. */
export function dimensionsOf(meaning: ColumnMeaning): readonly Dimension[] {
  switch (meaning) {
    case 'set-temperature':
    case 'bed-temperature':
    case 'wall-temperature':
      return ['temperature']
    case 'inlet-pressure':
    case 'outlet-pressure':
      return ['pressure']
    case 'flow':
      return ['volume-flow', 'molar-flow']
    case 'mole-fraction':
      return ['fraction']
    case 'elapsed-time':
      return ['time']
    default:
      return []
  }
}
