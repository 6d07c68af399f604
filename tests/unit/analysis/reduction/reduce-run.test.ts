import { beforeAll, describe, expect, test } from 'vitest'
import { reduceRun } from '@/lib/analysis/reduction/reduce-run'
import { type RunReduction } from '@/lib/analysis/reduction/run-reduction'
import truth from '../../../reference/methanation-truth.json'
import { readDemoRun } from '../../../support/read-demo-run'

// Simulated runs whose truth is known (tests/reference/methanation-truth.json): isothermal plug flow with hidden errors in flow, mass, thermocouple
// and response factors. The rate orders are method input; nothing else of the truth goes in but the stated uncertainties.
const reductions = new Map<string, RunReduction>()
const codesOf = (run: RunReduction) => [...run.cautions, ...(run.fit?.cautions ?? [])].map((caution) => caution.code)
const reduced = (code: string): RunReduction => {
  const found = reductions.get(code)
  if (found === undefined) throw new Error(code)
  return found
}

beforeAll(async () => {
  for (const run of truth.runs) reductions.set(run.code, reduceRun(await readDemoRun(run.code)))
}, 120_000)

describe('ten runs with a known truth', () => {
  test.each(['R-0001', 'R-0002', 'R-0003', 'R-0004', 'R-0005', 'R-0006'])(
    '%s gives Ea and ln A within their own 95 % intervals',
    (code) => {
      const expected = truth.runs.find((run) => run.code === code)
      const { fit } = reduced(code)
      const [energyLow, energyHigh] = fit?.intervals.activationEnergyJPerMol ?? [Number.NaN, Number.NaN]
      const [lnLow, lnHigh] = fit?.intervals.lnPreExponential ?? [Number.NaN, Number.NaN]
      const energy = (expected?.apparent_ea_kj_mol ?? Number.NaN) * 1000
      expect(energy).toBeGreaterThan(energyLow)
      expect(energy).toBeLessThan(energyHigh)
      expect((energyHigh - energyLow) / 2).toBeLessThan(1500)
      expect(expected?.ln_a_mol_per_kg_s).toBeGreaterThan(lnLow)
      expect(expected?.ln_a_mol_per_kg_s).toBeLessThan(lnHigh)
      expect(reduced(code).mayCount).toBe(true)
    },
  )

  test.each(truth.runs.filter((run) => run.sample !== 'blank'))(
    '$code finds eight holds, the last one returned, with the conversions that were put in',
    (run) => {
      const { points } = reduced(run.code)
      expect(points.map((point) => Math.round(point.hold.setTemperatureK - 273.15))).toEqual(
        run.holds.map((hold) => hold.temperature_c),
      )
      expect(points.map((point) => point.hold.returnsTo)).toEqual([null, null, null, null, null, null, null, 4])
      points.forEach((point, i) => {
        const ratio = (point.conversion?.value ?? Number.NaN) / (run.holds[i]?.conversion_at_end ?? Number.NaN)
        // 1 % response factors of methane and carbon dioxide, scatter 0.5 %; the decaying run is sampled before its end
        expect(Math.abs(ratio - 1)).toBeLessThan(0.035)
        expect(point.injectionsUsed.length).toBeGreaterThanOrEqual(4)
      })
    },
  )

  test('R-0007, pellets: the line bends and pore diffusion is named', () => {
    expect(codesOf(reduced('R-0007'))).toEqual(expect.arrayContaining(['line-bends', 'pore-diffusion-likely']))
  })

  test('R-0008 decays: the returned hold is 13.5 % low, and the energy with the loss taken out is the true one', () => {
    const run = reduced('R-0008')
    expect(codesOf(run)).toContain('deactivation')
    expect(run.returnedHold?.ratio.value).toBeGreaterThan(0.855)
    expect(run.returnedHold?.ratio.value).toBeLessThan(0.875)
    // put in: 3.5 % an hour
    expect(run.returnedHold?.lossPerH).toBeGreaterThan(0.032)
    expect(run.returnedHold?.lossPerH).toBeLessThan(0.038)
    const said = run.cautions.find((caution) => caution.code === 'deactivation')?.sentence ?? ''
    const corrected = Number(/would be ([\d.]+) kJ/.exec(said)?.[1])
    const expected = truth.runs.find((entry) => entry.code === 'R-0008')?.apparent_ea_kj_mol ?? Number.NaN
    expect(Math.abs(corrected - expected)).toBeLessThan(1.5)
    expect(run.points.at(-1)?.excluded?.by).toBe('rule')
  })

  test('R-0009 lacks 9 % of its carbon: it does not count until a lead decides', () => {
    const run = reduced('R-0009')
    expect(codesOf(run)).toContain('carbon-balance')
    expect(run.meanCarbonBalance).toBeGreaterThan(0.905)
    expect(run.meanCarbonBalance).toBeLessThan(0.92)
    expect(run.mayCount).toBe(false)
  })

  test('R-0010, the blank, has no line and says why', () => {
    const run = reduced('R-0010')
    expect(run.fit).toBeNull()
    expect(run.noFitReason).toMatch(/blank/)
    expect(run.points).toHaveLength(8)
  })
})

describe('a reduction', () => {
  test('gives the same bits twice and leaves its input as it was', async () => {
    const input = await readDemoRun('R-0001')
    const before = input.log.bedTemperatureK.slice()
    expect(reduceRun(input)).toEqual(reduced('R-0001'))
    expect(input.log.bedTemperatureK).toEqual(before)
  })

  test('a hold left out by a person stays listed, and both lines are given', async () => {
    const input = await readDemoRun('R-0001')
    const atS = reduced('R-0001').points[2]?.hold.foundStartS ?? Number.NaN
    const run = reduceRun({ ...input, exclusions: [{ kind: 'hold', atS, reason: 'valve stuck', by: 'Imre Halasz' }] })
    expect(run.points).toHaveLength(8)
    expect(run.points[2]?.excluded).toEqual({ by: 'Imre Halasz', reason: 'valve stuck' })
    expect(run.fit?.points.filter((point) => point.isUsed)).toHaveLength(7)
    expect(run.fitWithAllPoints?.points.filter((point) => point.isUsed)).toHaveLength(8)
    expect(run.fitWithAllPoints?.activationEnergyJPerMol).toEqual(reduced('R-0001').fit?.activationEnergyJPerMol)
  })

  test('every number of a point has its working', () => {
    for (const point of reduced('R-0002').points)
      for (const field of [
        'temperatureK',
        'conversionByProducts',
        'conversionByReactant',
        'carbonBalance',
        'meanRateMolPerKgS',
        'rateMolPerKgS',
        'turnoverFrequencyPerS',
      ])
        expect(point.workings[field]?.from.length).toBeGreaterThan(0)
  })

  test('a log without bed temperatures, without rows or without the key reactant says what is missing', async () => {
    const input = await readDemoRun('R-0001')
    const empty = { ...input.log, bedTemperatureK: input.log.bedTemperatureK.map(() => Number.NaN) }
    expect(() => reduceRun({ ...input, log: empty })).toThrow(/bed temperature/)
    const noFactor = Object.fromEntries(Object.entries(input.responseFactors).filter(([species]) => species !== 'CO2'))
    expect(() => reduceRun({ ...input, responseFactors: noFactor })).toThrow(/CO2.*response factor/)
  })

  test('the plain differential law is biased low on these runs, by less than a kilojoule', async () => {
    // the integral law is needed: the same run by the differential one gives 0.2 to 0.8 kJ/mol less
    const run = reduceRun(await readDemoRun('R-0004', { rateLaw: 'differential' }))
    const difference =
      (run.fit?.activationEnergyJPerMol.value ?? 0) - (reduced('R-0004').fit?.activationEnergyJPerMol.value ?? 0)
    expect(difference).toBeLessThan(-150)
    expect(difference).toBeGreaterThan(-1000)
  })
})
