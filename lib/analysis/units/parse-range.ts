import { type Dimension } from './dimension'
import { parseQuantity, type QuantityOptions, splitNumber } from './parse-quantity'

/** A range as read, or a sentence that says what is wrong and what to write. */
export type RangeReading =
  | {
      readonly ok: true
      /** lower end in the SI unit of the dimension */
      readonly lowSi: number
      /** upper end in the SI unit of the dimension; equal to the lower one for a single value */
      readonly highSi: number
      readonly unitLabel: string
      /** what was understood, in words */
      readonly said: string
    }
  | { readonly ok: false; readonly sentence: string }

const BETWEEN =
  /\s*(?:\bto\b|\bbis\b|\.\.\.?|…|–|—|(?<=[\dA-Za-zµ°%])\s*[-−](?=\s*\d)|(?<=\d)\s*\/\s*(?=\d+\s*mesh))\s*/iu

/**
 * Range behind what a person types: `125 to 180 µm`, `125-180 µm`, `125 µm – 0.18 mm`, `60/80 mesh`, or one value for both ends.
 *
 * The unit of the second number serves the first when that has none.
 * Source: own table, see unit-table.ts; sieve numbers ASTM E11-22.
 *
 * @param text - what was written [-]
 * @param dimension - the kind of quantity expected [-]
 * @param options - what the caller already knows about the writing [-]
 * @returns both ends, the lower first [SI unit of the dimension], or a sentence that says what to write instead
 * @example `parseRange('125 to 180 µm', 'length')` is 125e-6 m to 180e-6 m
 */
export function parseRange(text: string, dimension: Dimension, options: QuantityOptions = {}): RangeReading {
  const pieces = text.trim().split(BETWEEN)
  const [first, second] = pieces
  if (first === undefined || second === undefined || pieces.length > 2 || first === '') {
    const single = parseQuantity(text, dimension, options)
    return single.ok
      ? {
          ok: true,
          lowSi: single.valueSi,
          highSi: single.valueSi,
          unitLabel: single.unitLabel,
          said: `one value, ${single.said}`,
        }
      : single
  }
  const upper = parseQuantity(second, dimension, options)
  if (!upper.ok) return upper
  const hasOwnUnit = (splitNumber(first)?.unit ?? '') !== ''
  const unit = splitNumber(second)?.unit ?? ''
  const lower = parseQuantity(hasOwnUnit || unit === '' ? first : `${first} ${unit}`, dimension, options)
  if (!lower.ok) return lower
  const isUpward = lower.valueSi <= upper.valueSi
  const [low, high] = isUpward ? [lower, upper] : [upper, lower]
  return {
    ok: true,
    lowSi: low.valueSi,
    highSi: high.valueSi,
    unitLabel: upper.unitLabel,
    said: `${low.said} to ${high.said}`,
  }
}
