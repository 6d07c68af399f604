import { roundTicks } from './arrhenius-chart-option'
import { type TemperWindow } from './temper-scale'

const ZERO_CELSIUS_K = 273.15

export interface RulerTick {
  readonly x: number
  readonly label: string
}

/** Where temperatures lie on a rule that is even in 1/T, cold at the left. */
export interface RulerScale {
  readonly toX: (temperatureK: number) => number
  readonly toTemperatureK: (x: number) => number
  readonly celsiusTicks: readonly (RulerTick & { readonly isMajor: boolean })[]
  readonly inverseTicks: readonly RulerTick[]
}

/** The scale for a width in pixels with this much room at either end; ticks thin out as the width shrinks. */
export function rulerScale(window: TemperWindow, width: number, inset: number): RulerScale {
  const cold = 1_000 / window.lowK
  const hot = 1_000 / window.highK
  const span = Math.max(1, width - 2 * inset)
  const toX = (temperatureK: number) => inset + (span * (cold - 1_000 / temperatureK)) / (cold - hot)
  const toTemperatureK = (x: number) => 1_000 / (cold - ((x - inset) / span) * (cold - hot))
  const lowC = window.lowK - ZERO_CELSIUS_K
  const highC = window.highK - ZERO_CELSIUS_K
  const majors = roundTicks(lowC, highC, Math.max(5, width / 110))
  const [first = 0, second = first + 10] = majors
  const step = second - first
  const minors = roundTicks(lowC, highC, ((highC - lowC) / step) * 2)
  const isNear = (a: number, b: number) => Math.abs(a - b) < step / 100
  const celsiusTicks = [
    ...new Set([...majors, ...minors.filter((minor) => !majors.some((major) => isNear(major, minor)))]),
  ]
    .sort((a, b) => a - b)
    .map((celsius, index) => ({
      x: toX(celsius + ZERO_CELSIUS_K),
      isMajor: majors.some((major) => isNear(major, celsius)),
      label: index >= 0 ? String(Math.round(celsius * 10) / 10).replace('-', '−') : '',
    }))
  const inverse = roundTicks(hot, cold, Math.max(2, width / 170))
  const decimals = (inverse[1] ?? 1) - (inverse[0] ?? 0) < 0.0099 ? 3 : 2
  const inverseTicks = inverse.map((value) => ({ x: toX(1_000 / value), label: value.toFixed(decimals) })).reverse()
  return { toX, toTemperatureK, celsiusTicks, inverseTicks }
}
