import { describe, expect, it } from 'vitest'
import { rulerScale } from '@/components/charts/ruler-scale'

const window = { lowK: 481.15, highK: 571.15 }

describe('ruler scale', () => {
  it('is even in 1/T, cold at the left', () => {
    const scale = rulerScale(window, 1_000, 12)
    expect(scale.toX(481.15)).toBeCloseTo(12, 9)
    expect(scale.toX(571.15)).toBeCloseTo(988, 9)
    const middleK = 2 / (1 / 481.15 + 1 / 571.15)
    expect(scale.toX(middleK)).toBeCloseTo(500, 9)
  })
  it('goes back from a place to its temperature', () => {
    const scale = rulerScale(window, 777, 12)
    for (const temperatureK of [485, 523.15, 560]) {
      expect(scale.toTemperatureK(scale.toX(temperatureK))).toBeCloseTo(temperatureK, 9)
    }
  })
  it.each([336, 700, 1_400])('has round, labelled degrees that do not crowd at %d px', (width) => {
    const { celsiusTicks } = rulerScale(window, width, 12)
    const majors = celsiusTicks.filter((tick) => tick.isMajor)
    expect(majors.length).toBeGreaterThanOrEqual(3)
    for (const [index, tick] of majors.entries()) {
      expect(Number(tick.label) % 5).toBe(0)
      const next = majors[index + 1]
      if (next) expect(next.x - tick.x).toBeGreaterThan(40)
    }
  })
})
