import { describe, expect, it } from 'vitest'
import { temperColour, temperCssColour, temperWindow } from '@/components/charts/temper-scale'
import { lightColours } from '@/components/charts/theme-colours'

const window = { lowK: 483.15, highK: 568.15 }

describe('temper scale', () => {
  it('runs from the first stop to the last and holds its ends', () => {
    expect(temperColour(483.15, window, lightColours.temper)).toBe('rgb(234, 210, 138)')
    expect(temperColour(568.15, window, lightColours.temper)).toBe('rgb(28, 54, 104)')
    expect(temperColour(300, window, lightColours.temper)).toBe('rgb(234, 210, 138)')
    expect(temperColour(900, window, lightColours.temper)).toBe('rgb(28, 54, 104)')
  })
  it('mixes neighbours in between, the same on canvas and in CSS', () => {
    // a tenth of the window is half-way between the first two stops
    expect(temperColour(491.65, window, lightColours.temper)).toBe('rgb(225, 186, 99)')
    expect(temperCssColour(491.65, window)).toBe('color-mix(in srgb, var(--temper-0) 50%, var(--temper-1))')
  })
  it('gets darker all the way, so that order is seen without hue', () => {
    const lightness = Array.from({ length: 30 }, (_, index) => {
      const colour = temperColour(483.15 + (85 * index) / 29, window, lightColours.temper)
      const [r = 0, g = 0, b = 0] = colour.match(/\d+/g)?.map(Number) ?? []
      return 0.2126 * r + 0.7152 * g + 0.0722 * b
    })
    for (let index = 1; index < lightness.length; index += 1) {
      expect(lightness[index]).toBeLessThanOrEqual((lightness[index - 1] ?? 0) + 0.5)
    }
  })
  it('makes a window with a margin, and one for no holds', () => {
    expect(temperWindow([488.15, 548.15])).toEqual({ lowK: 483.15, highK: 553.15 })
    expect(temperWindow([]).lowK).toBeLessThan(temperWindow([]).highK)
  })
})
