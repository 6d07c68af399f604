/** Temperatures that the scale runs between: cold end to hot end. */
export interface TemperWindow {
  readonly lowK: number
  readonly highK: number
}

const STOP_COUNT = 6

/** Window that holds all these temperatures with a margin, so that the coldest hold is not the paler end itself. */
export function temperWindow(temperaturesK: readonly number[]): TemperWindow {
  const finite = temperaturesK.filter((temperatureK) => Number.isFinite(temperatureK))
  if (finite.length === 0) return { lowK: 473.15, highK: 573.15 }
  const low = finite.reduce((least, temperatureK) => Math.min(least, temperatureK), Infinity)
  const high = finite.reduce((most, temperatureK) => Math.max(most, temperatureK), -Infinity)
  const margin = Math.max(5, (high - low) * 0.08)
  return { lowK: low - margin, highK: high + margin }
}

/** Which two neighbouring stops a temperature lies between, and how far along; held at the ends. */
function temperPosition(temperatureK: number, window: TemperWindow): { index: number; fraction: number } {
  const share = (temperatureK - window.lowK) / (window.highK - window.lowK)
  const along = Math.max(0, Math.min(1, Number.isFinite(share) ? share : 0)) * (STOP_COUNT - 1)
  const index = Math.min(STOP_COUNT - 2, Math.floor(along))
  return { index, fraction: along - index }
}

function channels(hex: string): readonly [number, number, number] {
  const digits = hex.replace('#', '')
  const read = (start: number) => Number.parseInt(digits.slice(start, start + 2), 16)
  return [read(0), read(2), read(4)]
}

/** Colour on a canvas, from the six stops of the theme in use. */
export function temperColour(temperatureK: number, window: TemperWindow, stops: readonly string[]): string {
  const { index, fraction } = temperPosition(temperatureK, window)
  const from = channels(stops[index] ?? '#888888')
  const to = channels(stops[index + 1] ?? '#888888')
  const mix = (start: number, end: number) => Math.round(start + (end - start) * fraction)
  return `rgb(${mix(from[0], to[0])}, ${mix(from[1], to[1])}, ${mix(from[2], to[2])})`
}

/** The same colour as a CSS value that follows the theme by itself, for SVG attributes. */
export function temperCssColour(temperatureK: number, window: TemperWindow): string {
  const { index, fraction } = temperPosition(temperatureK, window)
  const share = Math.round((1 - fraction) * 100)
  return `color-mix(in srgb, var(--temper-${index}) ${share}%, var(--temper-${index + 1}))`
}
