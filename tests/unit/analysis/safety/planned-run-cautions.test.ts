import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { adiabaticRise } from '@/lib/analysis/safety/adiabatic-rise'
import { widestFlammableRange } from '@/lib/analysis/safety/flammable-limits'
import { mixtureFlammableLimit } from '@/lib/analysis/safety/mixture-flammable-limit'
import { plannedRunCautions, STANDING_SENTENCE } from '@/lib/analysis/safety/planned-run-cautions'
import { type PlannedRunInput } from '@/lib/analysis/safety/planned-run-input'

const relative = (value: number, expected: number) => Math.abs(value / expected - 1)

describe('C66 Le Chatelier', () => {
  const amounts = [0.24, 0.61, 0.15]
  const mix = (limits: readonly number[]) =>
    mixtureFlammableLimit(limits.map((limit, i) => ({ amount: amounts[i] ?? 0, limit })))
  it('is as printed for the worked example in Crowl and Louvar, recomputed in an open property library', () => {
    expect(relative(mix([0.012, 0.053, 0.031]), 0.02751172136637642)).toBeLessThan(1e-12)
    expect(relative(mix([0.075, 0.15, 0.32]), 0.12927551844869378)).toBeLessThan(1e-12)
  })
  it('normalises amounts over the combustibles', () => {
    const limit = mixtureFlammableLimit([
      { amount: 0.8, limit: 0.011 },
      { amount: 2, limit: 0.05 },
      { amount: 0.5, limit: 0.027 },
    ])
    expect(relative(limit, 0.02514366342)).toBeLessThan(1e-9)
  })
  it('refuses empty and impossible mixtures', () => {
    expect(() => mixtureFlammableLimit([])).toThrow(AnalysisError)
    expect(() => mixtureFlammableLimit([{ amount: 0, limit: 0.1 }])).toThrow(AnalysisError)
    expect(() => mixtureFlammableLimit([{ amount: 1, limit: 0 }])).toThrow(AnalysisError)
  })
  it('takes the wider of two editions and names it', () => {
    expect(widestFlammableRange('C3H8')).toEqual({
      lower: 0.017,
      upper: 0.109,
      lowerEdition: 'IEC 60079-20-1:2010',
      upperEdition: 'IEC 60079-20-1:2010',
    })
    expect(widestFlammableRange('N2')).toBeNull()
  })
})

describe('C67 adiabatic rise', () => {
  it('of 1 % CO in air at 500 K is 94.84 K', () => {
    // enthalpy and heat capacity from the 1993 polynomials, computed apart
    expect(relative(adiabaticRise(0.01, -283_657, 29.9087), 94.84076)).toBeLessThan(1e-5)
  })
  it('refuses impossible input', () => {
    expect(() => adiabaticRise(0.01, -1, 0)).toThrow(AnalysisError)
    expect(() => adiabaticRise(1.2, -1, 30)).toThrow(AnalysisError)
  })
})

const base: PlannedRunInput = {
  feed: [
    { species: 'CO2', moleFraction: 0.1 },
    { species: 'H2', moleFraction: 0.4 },
    { species: 'Ar', moleFraction: 0.5 },
  ],
  productsPossible: ['CH4', 'H2O', 'CO'],
  activeMetal: 'Ni',
  temperatureRangeK: { low: 510, high: 600 },
  pressurePa: 130_000,
  rigLimits: { maximumPressurePa: 500_000, maximumTemperatureK: 900 },
  reactionEnthalpyJPerMol: -165_000,
  keyReactant: 'CO2',
  particleDiameterM: 150e-6,
  tubeInnerDiameterM: 4e-3,
  bedLengthM: 12e-3,
}
const codes = (change: Partial<PlannedRunInput>) => plannedRunCautions({ ...base, ...change }).map(({ code }) => code)
const find = (change: Partial<PlannedRunInput>, code: string) =>
  plannedRunCautions({ ...base, ...change }).find((caution) => caution.code === code)

describe('cautions for a planned run', () => {
  it('always end with the standing sentence', () => {
    const quiet = plannedRunCautions({ ...base, feed: [], productsPossible: [], activeMetal: '' })
    expect(quiet.map(({ sentence }) => sentence)).toEqual([STANDING_SENTENCE])
    expect(plannedRunCautions(base).at(-1)?.sentence).toBe(STANDING_SENTENCE)
    expect(STANDING_SENTENCE).toContain('a competent or licensed person decide')
  })
  it('point out hydrogen, carbonyl, heat and the used catalyst for methanation over nickel', () => {
    expect(codes({})).toEqual([
      'toxic-CO',
      'carbonyl',
      'adiabatic-rise',
      'flammable-feed',
      'hydrogen-steel',
      'pyrophoric',
      'standing-sentence',
    ])
    // 0.1 × 165 kJ over 0.1 × 45.2 (CO2) + 0.4 × 29.3 (H2) + 0.5 × 20.79 (Ar) J/(mol K) at 510 K: NIST heat capacities
    expect(find({}, 'adiabatic-rise')?.value).toBeGreaterThan(610)
    expect(find({}, 'adiabatic-rise')?.value).toBeLessThan(625)
    expect(find({}, 'adiabatic-rise')?.sentence).not.toContain('lowest heat capacity')
    // 0.1 × 165 kJ over (0.5 × 5/2 + 0.5 × 7/2) R
    const unknown = [
      { species: 'CO2', moleFraction: 0.1 },
      { species: 'C9H9', moleFraction: 0.4 },
      { species: 'Ar', moleFraction: 0.5 },
    ]
    expect(find({ feed: unknown }, 'adiabatic-rise')?.sentence).toContain('lowest heat capacity its gases can have')
    expect(find({ feedHeatCapacityJPerMolK: 33 }, 'adiabatic-rise')?.value).toBeCloseTo(500, 9)
  })
  it.each([
    ['large-catalyst-mass', { catalystMassKg: 0.01 }, { catalystMassKg: 0.08 }, '80'],
    [
      'uncertain-weighing',
      { massRelativeStandardUncertainty: 0.2 },
      { massRelativeStandardUncertainty: 0.25 },
      'uncertain by 25 % of the mass',
    ],
    ['wide-tube', { tubeInnerDiameterM: 0.05 }, { tubeInnerDiameterM: 0.46 }, '460'],
  ])('ask about a figure that is seldom meant: %s', (code, usual, unusual, words) => {
    expect(codes(usual)).not.toContain(code)
    expect(find(unusual, code)?.severity).toBe('caution')
    expect(find(unusual, code)?.sentence).toContain(words)
  })
  it('are grave for carbon monoxide over cold nickel', () => {
    expect(find({ temperatureRangeK: { low: 400, high: 600 } }, 'carbonyl')?.severity).toBe('grave')
    expect(find({ temperatureRangeK: null }, 'carbonyl')?.severity).toBe('grave')
    expect(find({ activeMetal: 'Pt' }, 'carbonyl')).toBeUndefined()
    expect(find({ activeMetal: '5 wt% Ni-Fe' }, 'carbonyl')?.tag).toBe('Ni, Fe carbonyl')
  })
  it.each([
    [0.02, 'flammable-near', 'caution'],
    [0.2, 'flammable-inside', 'grave'],
    [0.78, 'flammable-above-upper', 'grave'],
  ])('hydrogen %s with oxygen is %s', (hydrogen, code, severity) => {
    const feed = [
      { species: 'H2', moleFraction: hydrogen },
      { species: 'O2', moleFraction: 0.05 },
      { species: 'N2', moleFraction: 0.95 - hydrogen },
    ]
    expect(find({ feed }, code)?.severity).toBe(severity)
  })
  it('leave a feed far below a quarter of the limit alone', () => {
    const feed = [
      { species: 'CO', moleFraction: 0.01 },
      { species: 'O2', moleFraction: 0.2 },
      { species: 'N2', moleFraction: 0.79 },
    ]
    expect(codes({ feed, keyReactant: 'CO' }).filter((code) => code.startsWith('flammable'))).toEqual([])
  })
  it('say when the limits are not known or not for this oxidiser', () => {
    const feed = [
      { species: 'C4H10', moleFraction: 0.001 },
      { species: 'H2', moleFraction: 0.001 },
      { species: 'N2O', moleFraction: 0.1 },
      { species: 'He', moleFraction: 0.898 },
    ]
    expect(codes({ feed })).toContain('flammable-limits-unknown')
    expect(find({ feed }, 'flammable-near')?.sentence).toContain('with N2O they are different')
  })
  it('hold the plan against the rig and the bed', () => {
    expect(find({ pressurePa: 600_000 }, 'over-pressure')?.severity).toBe('grave')
    expect(find({ pressurePa: 460_000 }, 'near-pressure-limit')?.severity).toBe('caution')
    expect(find({ temperatureRangeK: { low: 600, high: 950 } }, 'over-temperature')?.severity).toBe('grave')
    expect(find({ particleDiameterM: 2e-3 }, 'tube-per-particle')?.value).toBe(2)
    expect(find({ particleDiameterM: 2e-3 }, 'bed-per-particle')?.value).toBe(6)
  })
  it('name deposits, acetylides, oxygen-rich gas and a feed that does not add up', () => {
    expect(codes({ productsPossible: ['NH3', 'NO'] })).toContain('ammonium-nitrate')
    expect(codes({ productsPossible: ['NH3'] })).toContain('ammonium-carbonate')
    expect(codes({ productsPossible: ['C2H2'], activeMetal: 'Cu' })).toContain('acetylide')
    expect(codes({ feed: [{ species: 'O2', moleFraction: 0.9 }] })).toEqual(
      expect.arrayContaining(['oxygen-enriched', 'feed-sum', 'no-key-reactant']),
    )
  })
  it('put grave ones first', () => {
    const severities = plannedRunCautions({ ...base, pressurePa: 600_000 }).map(({ severity }) => severity)
    expect(severities).toEqual(
      [...severities].sort((a, b) => ['grave', 'caution', 'note'].indexOf(a) - ['grave', 'caution', 'note'].indexOf(b)),
    )
  })
})
