import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import {
  activity,
  activityFromConversion,
  bracketedActivity,
  type DecayLaw,
} from '@/lib/analysis/deactivation/activity'
import { fitDecayCorrectedArrhenius } from '@/lib/analysis/deactivation/decay-corrected-arrhenius'
import { fitAllDecays, fitDecay } from '@/lib/analysis/deactivation/fit-decay'
import { lightOffTemperatures } from '@/lib/analysis/deactivation/light-off'
import { coverageFactor } from '@/lib/analysis/statistics/student-t'
import { fitWeightedLine } from '@/lib/analysis/statistics/weighted-line'
import { closeTo } from '../kinetics/close-to'

const R = 8.31446261815324

describe('C38 deactivation in strong pore diffusion: Levenspiel 21.1', () => {
  const hours = [0, 2, 4, 6]
  const ratio = [0.75, 0.64, 0.52, 0.39].map((x) => Math.log(x / (1 - x)))
  const line = fitWeightedLine(hours, ratio, null)
  it('slope, interval, decay constant 0.51 and rate constant 0.27', () => {
    closeTo(line.slope, -0.2566547479)
    closeTo(line.scaled?.slope, 0.002144630876)
    closeTo(line.intercept, 1.096640974)
    const reach = coverageFactor(0.95, 2) * (line.scaled?.slope ?? NaN)
    closeTo(line.slope - reach, -0.2658823498)
    closeTo(line.slope + reach, -0.247427146)
    // the observed rate falls with the root of the activity
    closeTo(-2 * line.slope, 0.5133094957)
    // X/(1 − X) = (τ′/L) √(k D_e/ρ), τ′ = 4000 kg s/m3, L = d/6, d = 2.4 mm, ρ = 1500, D_e = 5e-10
    const root = (Math.exp(line.intercept) * 4e-4) / 4_000
    closeTo((root * root * 1_500) / 5e-10, 0.268937586)
  })
  it('in a stirred tank the activity acts on X/(1 − X), not on X', () => {
    closeTo(activityFromConversion(0.39, 0.75, 'stirred-tank'), 0.39 / 0.61 / 3)
    expect(activityFromConversion(0.39, 0.75, 'stirred-tank')).not.toBeCloseTo(0.39 / 0.75, 2)
    closeTo(activityFromConversion(0.5, 0.75, 'plug-flow'), 0.5)
    expect(() => activityFromConversion(1, 0.9, 'plug-flow')).toThrow(AnalysisError)
    expect(() => activityFromConversion(0.9, 1, 'plug-flow')).toThrow(AnalysisError)
  })
})

describe('laws of decay', () => {
  const plain = (order: 0 | 1 | 2 | 3): DecayLaw => ({ order, hasResidual: false })
  it('closed forms', () => {
    closeTo(activity(plain(0), 0.1, 3), 0.7)
    closeTo(activity(plain(1), 0.1, 3), Math.exp(-0.3))
    closeTo(activity(plain(2), 0.1, 3), 1 / 1.3)
    closeTo(activity(plain(3), 0.1, 3), 1 / Math.sqrt(1.6))
    expect(activity(plain(0), 1, 3)).toBe(0)
    closeTo(activity({ order: 1, hasResidual: true }, 0.1, 1e6, 0.4), 0.4)
    closeTo(activity({ order: 2, hasResidual: true }, 0.1, 0, 0.4), 1)
    expect(() => activity({ order: 3, hasResidual: true }, 0.1, 1, 0.4)).toThrow(AnalysisError)
  })
  it.each([0, 1, 2, 3] as const)('order %s satisfies its differential equation', (order) => {
    const h = 1e-4
    const a = (t: number) => activity(plain(order), 0.1, t)
    closeTo((a(2 - h) - a(2 + h)) / (2 * h), 0.1 * Math.pow(a(2), order), 1e-7)
  })
  it.each([1, 2] as const)('order %s with residue satisfies its differential equation', (order) => {
    const h = 1e-4
    const a = (t: number) => activity({ order, hasResidual: true }, 0.1, t, 0.3)
    closeTo((a(2 - h) - a(2 + h)) / (2 * h), 0.1 * Math.pow(a(2) - 0.3, order), 1e-7)
  })
  it('are brought back by the fit, the true one first', () => {
    const times = [0, 1, 2, 3, 5, 8, 12, 20].map((h) => h * 3_600)
    const noise = [0.002, -0.003, 0.001, 0.002, -0.002, 0.001, -0.001, 0.0005]
    const rates = times.map((t, i) => 5 * activity(plain(2), 0.2 / 3_600, t) * (1 + (noise[i] ?? 0)))
    const fit = fitDecay(times, rates, plain(2))
    closeTo(fit.rateConstantPerS * 3_600, 0.2, 0.01)
    closeTo(fit.startRate, 5, 0.005)
    expect(fit.rateConstantInterval?.[0]).toBeLessThan(0.2 / 3_600)
    expect(fit.rateConstantInterval?.[1]).toBeGreaterThan(0.2 / 3_600)
    expect(fitAllDecays(times, rates)[0]?.law.order).toBe(2)
    const residual = fitDecay(
      times,
      times.map((t) => 5 * activity({ order: 1, hasResidual: true }, 0.3 / 3_600, t, 0.4)),
      { order: 1, hasResidual: true },
    )
    closeTo(residual.residual, 0.4, 1e-6)
    closeTo(residual.rateConstantPerS * 3_600, 0.3, 1e-6)
  })
  it('want points', () => {
    expect(() => fitDecay([0, 1], [1, 0.9], plain(1))).toThrow(AnalysisError)
    expect(() => fitDecay([0, 0, 0], [1, 0.9, 0.8], plain(1))).toThrow(AnalysisError)
    expect(fitAllDecays([0, 1], [1, 0.9])).toEqual([])
  })
})

describe('bracketing', () => {
  const brackets = [
    { timeS: 0, rate: 10, relativeStandardUncertainty: 0.01 },
    { timeS: 100, rate: 8, relativeStandardUncertainty: 0.01 },
    { timeS: 300, rate: 7, relativeStandardUncertainty: 0.01 },
  ]
  it('interpolates exponentially and grows its uncertainty', () => {
    const half = bracketedActivity(brackets, 50)
    closeTo(half.activity, Math.sqrt(0.8))
    // first bracket enters with ½ − 1, the second with ½
    closeTo(half.relativeStandardUncertainty, 0.01 * Math.sqrt(0.5))
    closeTo(bracketedActivity(brackets, 200).activity, Math.sqrt(0.8 * 0.7))
    closeTo(bracketedActivity(brackets, 200).relativeStandardUncertainty, 0.01 * Math.sqrt(1.5))
    expect(bracketedActivity(brackets, 0)).toEqual({
      activity: 1,
      relativeStandardUncertainty: 0,
      isExtrapolated: false,
    })
    closeTo(bracketedActivity(brackets, 300).activity, 0.7)
    expect(bracketedActivity(brackets, 400).isExtrapolated).toBe(true)
    expect(bracketedActivity(brackets, -1).isExtrapolated).toBe(true)
  })
  it('refuses disorder', () => {
    expect(() => bracketedActivity(brackets.slice(0, 1), 1)).toThrow(AnalysisError)
    expect(() => bracketedActivity([...brackets].reverse(), 1)).toThrow(AnalysisError)
    expect(() =>
      bracketedActivity([{ timeS: 0, rate: 0, relativeStandardUncertainty: 0 }, ...brackets.slice(1)], 1),
    ).toThrow(AnalysisError)
  })
})

describe('temperature and decay together', () => {
  const decay = 0.035 / 3_600
  const made = (temperatures: readonly number[]) =>
    temperatures.map((temperatureK, i) => ({
      temperatureK,
      timeS: i * 3_600,
      rate: Math.exp(12 - 80_000 / (R * temperatureK) - decay * i * 3_600),
    }))
  it('are told apart when the series returns', () => {
    const fit = fitDecayCorrectedArrhenius(made([490, 500, 510, 520, 530, 540, 500, 490]))
    closeTo(fit.activationEnergyJPerMol, 80_000, 1e-8)
    closeTo(fit.decayPerS, decay, 1e-8)
    expect(fit.inflation).toBeLessThan(10)
  })
  it('are refused for an ascending series, which alone would give a lower activation energy', () => {
    const ascending = made([490, 500, 510, 520, 530, 540])
    expect(() => fitDecayCorrectedArrhenius(ascending)).toThrow(AnalysisError)
    const naive = fitWeightedLine(
      ascending.map(({ temperatureK }) => 1 / temperatureK),
      ascending.map(({ rate }) => Math.log(rate)),
      null,
    )
    expect(-R * naive.slope).toBeLessThan(79_000)
    expect(() => fitDecayCorrectedArrhenius(made([500, 500, 500, 500]))).toThrow(AnalysisError)
    expect(() => fitDecayCorrectedArrhenius(made([500, 510]))).toThrow(AnalysisError)
  })
})

describe('C69 light-off of a first-order reaction: Ea 80 kJ/mol, kτ(450 K) = 0.05', () => {
  const temperatures = Array.from({ length: 1_001 }, (_v, i) => 440 + 0.15 * i)
  const conversion = (t: number) => 1 - Math.exp(-0.05 * Math.exp((-80_000 / R) * (1 / t - 1 / 450)))
  it('T10 466.25, T50 513.09, T90 548.19 K', () => {
    const read = lightOffTemperatures(temperatures, temperatures.map(conversion))
    for (const [i, expected] of [466.253534, 513.092742, 548.187977].entries())
      closeTo(read.temperatures[i]?.temperatureK, expected, 5e-7)
    expect(read.direction).toBe('heating')
  })
  it('reads a cooling ramp and one that goes back, and extrapolates nothing', () => {
    const cooling = lightOffTemperatures([...temperatures].reverse(), [...temperatures].reverse().map(conversion))
    expect(cooling.direction).toBe('cooling')
    closeTo(cooling.temperatures[1]?.temperatureK, 513.092742, 5e-7)
    const wavy = lightOffTemperatures([400, 410, 420, 430], [0.2, 0.6, 0.4, 0.8], [0.5, 0.9])
    // 0.6 and 0.4 are pooled to 0.5 from 410 K
    expect(wavy.temperatures).toEqual([
      { conversion: 0.5, temperatureK: 410 },
      { conversion: 0.9, temperatureK: null },
    ])
    expect(() => lightOffTemperatures([1], [1])).toThrow(AnalysisError)
    expect(() => lightOffTemperatures([1, 2], [1, NaN])).toThrow(AnalysisError)
    expect(() => lightOffTemperatures([1, 2], [1])).toThrow(AnalysisError)
  })
})
