/**
 * Kinds of quantity that a person or a file can state. Exponents are of kilogram, metre, second, mole and kelvin, in that order; two kinds
 * can share exponents (a temperature and a difference of temperatures), which is why the kind is asked for and not guessed.
 */
export const DIMENSIONS = {
  temperature: [0, 0, 0, 0, 1],
  'temperature-difference': [0, 0, 0, 0, 1],
  'temperature-rate': [0, 0, -1, 0, 1],
  pressure: [1, -1, -2, 0, 0],
  mass: [1, 0, 0, 0, 0],
  length: [0, 1, 0, 0, 0],
  'volume-flow': [0, 3, -1, 0, 0],
  'molar-flow': [0, 0, -1, 1, 0],
  'mass-flow': [1, 0, -1, 0, 0],
  time: [0, 0, 1, 0, 0],
  volume: [0, 3, 0, 0, 0],
  fraction: [0, 0, 0, 0, 0],
  'amount-per-mass': [-1, 0, 0, 1, 0],
  'energy-per-amount': [1, 2, -2, -1, 0],
  'rate-per-mass': [-1, 0, -1, 1, 0],
  frequency: [0, 0, -1, 0, 0],
  'area-per-mass': [-1, 2, 0, 0, 0],
  'volume-per-mass': [-1, 3, 0, 0, 0],
  density: [1, -3, 0, 0, 0],
  'molar-mass': [1, 0, 0, -1, 0],
  diffusivity: [0, 2, -1, 0, 0],
  viscosity: [1, -1, -1, 0, 0],
  'thermal-conductivity': [1, 1, -3, 0, -1],
} as const satisfies Readonly<Record<string, readonly [number, number, number, number, number]>>

/** One of the kinds of quantity in {@link DIMENSIONS}. */
export type Dimension = keyof typeof DIMENSIONS
