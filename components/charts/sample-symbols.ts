/** Samples are told apart by shape first; hue never carries that meaning. */
export const sampleSymbols = ['square', 'triangle', 'diamond', 'cross', 'down', 'circle', 'plus', 'star'] as const
export type SampleSymbol = (typeof sampleSymbols)[number]

/** Outlines in a box from −1 to 1, y down, so that canvas and SVG draw the same shape. */
const outlines: Readonly<Record<Exclude<SampleSymbol, 'circle'>, readonly (readonly [number, number])[]>> = {
  square: [
    [-0.9, -0.9],
    [0.9, -0.9],
    [0.9, 0.9],
    [-0.9, 0.9],
  ],
  triangle: [
    [0, -1],
    [1, 0.9],
    [-1, 0.9],
  ],
  down: [
    [0, 1],
    [1, -0.9],
    [-1, -0.9],
  ],
  diamond: [
    [0, -1],
    [1, 0],
    [0, 1],
    [-1, 0],
  ],
  plus: [
    [-0.32, -1],
    [0.32, -1],
    [0.32, -0.32],
    [1, -0.32],
    [1, 0.32],
    [0.32, 0.32],
    [0.32, 1],
    [-0.32, 1],
    [-0.32, 0.32],
    [-1, 0.32],
    [-1, -0.32],
    [-0.32, -0.32],
  ],
  cross: [
    [-0.55, -1],
    [0, -0.45],
    [0.55, -1],
    [1, -0.55],
    [0.45, 0],
    [1, 0.55],
    [0.55, 1],
    [0, 0.45],
    [-0.55, 1],
    [-1, 0.55],
    [-0.45, 0],
    [-1, -0.55],
  ],
  star: [
    [0, -1],
    [0.26, -0.36],
    [0.95, -0.31],
    [0.42, 0.14],
    [0.59, 0.81],
    [0, 0.44],
    [-0.59, 0.81],
    [-0.42, 0.14],
    [-0.95, -0.31],
    [-0.26, -0.36],
  ],
}

/** SVG path of the symbol around (x, y) with half-width `radius`. */
export function symbolPath(symbol: SampleSymbol, x = 0, y = 0, radius = 1): string {
  if (symbol === 'circle') {
    return `M${x - radius} ${y}A${radius} ${radius} 0 1 0 ${x + radius} ${y}A${radius} ${radius} 0 1 0 ${x - radius} ${y}Z`
  }
  const points = outlines[symbol].map(([dx, dy]) => `${x + dx * radius} ${y + dy * radius}`)
  return `M${points.join('L')}Z`
}

/** Shape of the sample at this place in its campaign; the eighth shape is used again after that, and the label decides. */
export function symbolOf(index: number): SampleSymbol {
  return sampleSymbols[index % sampleSymbols.length] ?? 'circle'
}

/** Name that the chart library understands. */
export function chartSymbol(symbol: SampleSymbol): string {
  return symbol === 'circle' ? 'circle' : `path://${symbolPath(symbol, 0, 0, 10)}`
}
