import { AnalysisError } from '../analysis-error'

/** Temperatures at which a ramp reaches given conversions. */
export interface LightOff {
  /** conversion asked for → temperature; null where the ramp does not cross it */
  readonly temperatures: readonly { readonly conversion: number; readonly temperatureK: number | null }[]
  readonly direction: 'heating' | 'cooling'
  /** what these temperatures depend on, for the page that shows them */
  readonly remark: string
}

/** What a light-off temperature is not. */
export const LIGHT_OFF_REMARK =
  'Light-off temperatures depend on loading, space velocity, feed and ramp rate, and on heat and storage in the bed; they are no kinetic constants.'

/**
 * Light-off temperatures from a temperature ramp.
 *
 * X(T) is made monotone by pooling neighbours that go back, then read off linearly between points
 *
 * Give with ramp rate, direction, space velocity, feed and place of the thermocouple. Nothing is extrapolated.
 * Source: Barlow, Bartholomew, Bremner and Brunk, Statistical Inference under Order Restrictions, 1972 (pooling of neighbours).
 *
 * @param temperaturesK - at least 2 temperatures in the order of the ramp [K] > 0
 * @param conversions - as many conversions [-]
 * @param wanted - conversions to read off [-]
 * @returns temperature at each [K], null where the ramp does not reach it
 * @throws {AnalysisError} too-few-points | lengths-differ | not-finite
 */
export function lightOffTemperatures(
  temperaturesK: readonly number[],
  conversions: readonly number[],
  wanted: readonly number[] = [0.1, 0.5, 0.9],
): LightOff {
  if (temperaturesK.length !== conversions.length)
    throw new AnalysisError('lengths-differ', 'One conversion for each temperature.')
  if (temperaturesK.length < 2) throw new AnalysisError('too-few-points', 'A ramp needs at least two points.')
  if ([...temperaturesK, ...conversions].some((value) => !Number.isFinite(value)))
    throw new AnalysisError('not-finite', 'Every point of the ramp needs a temperature and a conversion.')
  const direction = (temperaturesK[temperaturesK.length - 1] ?? 0) >= (temperaturesK[0] ?? 0) ? 'heating' : 'cooling'
  const order = temperaturesK
    .map((_unused, i) => i)
    .sort((a, b) => (temperaturesK[a] ?? 0) - (temperaturesK[b] ?? 0) || a - b)
  const sorted = order.map((i) => temperaturesK[i] ?? NaN)
  const smooth = poolNeighbours(order.map((i) => conversions[i] ?? NaN))
  return {
    temperatures: wanted.map((conversion) => ({ conversion, temperatureK: crossing(sorted, smooth, conversion) })),
    direction,
    remark: LIGHT_OFF_REMARK,
  }
}

// Least-squares rising sequence: blocks that go back are replaced by their mean.
function poolNeighbours(values: readonly number[]): number[] {
  const blocks: { mean: number; count: number }[] = []
  for (const value of values) {
    let block = { mean: value, count: 1 }
    for (;;) {
      const last = blocks[blocks.length - 1]
      if (last === undefined || last.mean <= block.mean) break
      blocks.pop()
      const count = last.count + block.count
      block = { mean: (last.mean * last.count + block.mean * block.count) / count, count }
    }
    blocks.push(block)
  }
  return blocks.flatMap(({ mean, count }) => new Array<number>(count).fill(mean))
}

function crossing(temperatures: readonly number[], conversions: readonly number[], wanted: number): number | null {
  for (let i = 1; i < conversions.length; i += 1) {
    const [low, high] = [conversions[i - 1] ?? NaN, conversions[i] ?? NaN]
    if (low <= wanted && wanted <= high && high > low) {
      const [from, to] = [temperatures[i - 1] ?? NaN, temperatures[i] ?? NaN]
      return from + ((wanted - low) / (high - low)) * (to - from)
    }
  }
  return null
}
