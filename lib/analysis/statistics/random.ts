import normalQuantile from '@stdlib/stats-base-dists-normal-quantile'

/** A stream of random numbers that a seed fixes for ever. */
export interface RandomStream {
  /** whole number from 0 to 2^32 - 1 */
  readonly nextInteger: () => number
  /** strictly between 0 and 1 */
  readonly nextUniform: () => number
  /** standard normal, by inversion */
  readonly nextNormal: () => number
}

const TWO_TO_26 = 67_108_864
const TWO_TO_52 = 4_503_599_627_370_496

/**
 * Random numbers from 32-bit integer arithmetic alone, the same on every machine.
 *
 * Four words of state, a counter among them, filled by running the generator twenty times from the seed.
 * Source: C. Doty-Humphrey, PractRand 0.94, generator sfc32, public domain.
 *
 * @param seed - whole number; its lower 32 bits count [-]
 * @returns the stream [-]
 */
export function createRandomStream(seed: number): RandomStream {
  let a = 0
  let b = seed | 0
  let c = 0x9e3779b9 | 0
  let counter = 1
  const next = (): number => {
    const result = (((a + b) | 0) + counter) | 0
    counter = (counter + 1) | 0
    a = b ^ (b >>> 9)
    b = (c + (c << 3)) | 0
    c = ((c << 21) | (c >>> 11)) + result
    c |= 0
    return result >>> 0
  }
  for (let i = 0; i < 20; i++) next()
  const nextUniform = (): number => {
    const high = next() >>> 6
    const low = next() >>> 6
    // 52 bits, moved by half a step: exact in a double, and neither 0 nor 1 comes out
    return (high * TWO_TO_26 + low + 0.5) / TWO_TO_52
  }
  return { nextInteger: next, nextUniform, nextNormal: () => normalQuantile(nextUniform(), 0, 1) }
}
