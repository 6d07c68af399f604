import ln from '@stdlib/math-base-special-ln'
import { type Estimate } from '../estimate'
import { propagate } from '../propagate'
import { type Point } from '../reduction/run-reduction'

/** What is read off between two neighbouring holds. */
export interface BetweenHolds {
  readonly estimate: Estimate
  /** the holds on both sides of it */
  readonly holdNumbers: readonly [number, number]
}

/** Read-off temperature with the way the rate of the bed moves it. */
export interface TemperatureAtConversion extends BetweenHolds {
  /** change of the temperature where the conversion grows by the factor e [K] */
  readonly perLnConversionK: number
}

/**
 * Temperature at which a run reaches a conversion, between two measured holds.
 *
 * 1/T = (1 - w)/T_1 + w/T_2 with w = (ln X - ln X_1) / (ln X_2 - ln X_1); to first order
 * dT = T^2 { [(1 - w) dX_1/X_1 + w dX_2/X_2] q + (1 - w) dT_1/T_1^2 + w dT_2/T_2^2 } with q = (1/T_2 - 1/T_1) / (ln X_2 - ln X_1) < 0.
 * Assumes that ln X is straight in 1/T between the two holds (exact for a rate law of one activation energy while X is small); how far it bends there
 * is not in the uncertainty. Holds without a conversion above zero have no logarithm and are passed over. Nothing is said outside the measured range.
 * Source: JCGM 100:2008, 5.1.2 and 5.2.2 (propagation); the interpolation: common practice.
 *
 * @param points - of one run, in any order [SI]
 * @param target - conversion above 0 [-]
 * @returns the temperature in parts, with the two holds [K]; null where no two neighbouring holds enclose the conversion
 */
export function temperatureAtConversion(points: readonly Point[], target: number): TemperatureAtConversion | null {
  const rising = points
    .flatMap((point) =>
      point.conversion !== null && point.conversion.value > 0
        ? [{ point, conversion: point.conversion, x: 1 / point.temperatureK.value, y: ln(point.conversion.value) }]
        : [],
    )
    .sort((a, b) => b.x - a.x || a.point.hold.number - b.point.hold.number)
  const goal = ln(target)
  for (let i = 0; i + 1 < rising.length; i++) {
    const cold = rising[i]
    const hot = rising[i + 1]
    if (cold === undefined || hot === undefined || cold.y === hot.y || cold.x === hot.x) continue
    if (!(cold.y <= goal && goal <= hot.y)) continue
    const w = (goal - cold.y) / (hot.y - cold.y)
    const T = 1 / (cold.x + w * (hot.x - cold.x))
    const q = (hot.x - cold.x) / (hot.y - cold.y)
    return {
      estimate: propagate(T, [
        [
          { estimate: cold.conversion, sensitivity: (T * T * q * (1 - w)) / cold.conversion.value },
          { estimate: hot.conversion, sensitivity: (T * T * q * w) / hot.conversion.value },
        ],
        [
          { estimate: cold.point.temperatureK, sensitivity: T * T * (1 - w) * cold.x * cold.x },
          { estimate: hot.point.temperatureK, sensitivity: T * T * w * hot.x * hot.x },
        ],
      ]),
      holdNumbers: [cold.point.hold.number, hot.point.hold.number],
      perLnConversionK: T * T * q,
    }
  }
  return null
}

/**
 * Carbon selectivities of a run at a conversion, between two measured holds.
 *
 * S = (1 - w) S_1 + w S_2 with w = (X - X_1) / (X_2 - X_1); to first order dS = (1 - w) (dS_1 - g dX_1) + w (dS_2 - g dX_2), g = (S_2 - S_1) / (X_2 - X_1).
 * Assumes that S is straight in X between the two holds, and that the scatter of S and of X is independent. Nothing is said outside the measured range.
 * Source: JCGM 100:2008, 5.1.2 and 5.2.2 (propagation); comparison at equal conversion: common practice.
 *
 * @param points - of one run, in any order [SI]
 * @param target - conversion [-]
 * @returns selectivity to each product in parts, with the two holds [mol carbon per mol carbon converted to products]; empty where no two neighbouring
 * holds enclose the conversion
 */
export function selectivityAtConversion(
  points: readonly Point[],
  target: number,
): Readonly<Record<string, BetweenHolds>> {
  const sorted = points
    .flatMap((point) => (point.conversion === null ? [] : [{ conversion: point.conversion, point }]))
    .sort((a, b) => a.conversion.value - b.conversion.value || a.point.hold.number - b.point.hold.number)
  for (let i = 0; i + 1 < sorted.length; i++) {
    const low = sorted[i]
    const high = sorted[i + 1]
    if (low === undefined || high === undefined || low.conversion.value === high.conversion.value) continue
    if (low.conversion.value > target || target > high.conversion.value) continue
    const range = high.conversion.value - low.conversion.value
    const w = (target - low.conversion.value) / range
    const found: Record<string, BetweenHolds> = {}
    for (const species of Object.keys(low.point.carbonSelectivity).sort()) {
      const a = low.point.carbonSelectivity[species]
      const b = high.point.carbonSelectivity[species]
      if (a === undefined || b === undefined) continue
      const g = (b.value - a.value) / range
      found[species] = {
        estimate: propagate(a.value + w * (b.value - a.value), [
          [
            { estimate: a, sensitivity: 1 - w },
            { estimate: b, sensitivity: w },
          ],
          [
            { estimate: low.conversion, sensitivity: -g * (1 - w) },
            { estimate: high.conversion, sensitivity: -g * w },
          ],
        ]),
        holdNumbers: [low.point.hold.number, high.point.hold.number],
      }
    }
    return found
  }
  return {}
}
