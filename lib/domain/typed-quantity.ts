import { type Dimension } from '../analysis/units/dimension'
import { practicalUnit } from '../analysis/units/format-quantity'
import { unitFromAlias } from '../analysis/units/unit-from-alias'

/** A stored quantity as a person would have typed it, to stand in a field: `75.5 mg`. Eight digits, none that binary fractions add. */
export function typedQuantity(valueSi: number, dimension: Dimension, unitAlias?: string): string {
  const unit =
    (unitAlias === undefined ? null : unitFromAlias(unitAlias, dimension)) ?? practicalUnit(valueSi, dimension)
  const number = String(Number(unit.fromSi(valueSi).toPrecision(8)))
  return unit.label === '' ? number : `${number} ${unit.label}`
}

/** The same for what may be missing: an empty field. */
export function typedOrEmpty(valueSi: number | null, dimension: Dimension, unitAlias?: string): string {
  return valueSi === null ? '' : typedQuantity(valueSi, dimension, unitAlias)
}
