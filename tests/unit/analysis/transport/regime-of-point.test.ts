import { describe, expect, it } from 'vitest'
import { type RegimeInput } from '@/lib/analysis/transport/regime-input'
import { regimeOfPoint } from '@/lib/analysis/transport/regime-of-point'

/** Methanation over 150 µm particles at 275 °C, 4.7 % conversion: an invented run of which the truth is known to be free of pore diffusion. */
const sieved: RegimeInput = {
  holdNumber: 7,
  temperatureK: 548.15,
  pressurePa: 130_000,
  totalFlowMolPerS: 44.615e-6,
  inletMoleFraction: { CO2: 0.12, H2: 0.6, Ar: 0.08, N2: 0.2 },
  keyReactant: 'CO2',
  stoichiometry: { CO2: -1, H2: -4, CH4: 1, H2O: 2 },
  conversion: 0.0471,
  rateMolPerKgS: 0.00314,
  rateRelativeStandardUncertainty: 0.01,
  orderInKeyReactant: 0.15,
  activationEnergyJPerMol: 84_600,
  reactionEnthalpyJPerMol: -175_000,
  loading: {
    catalystMassKg: 80.3e-6,
    massRelativeStandardUncertainty: 0.003,
    massSourceId: 'mass:1',
    diluentMassKg: 450e-6,
    particleDiameterM: 152.5e-6,
    tubeInnerDiameterM: 4.6e-3,
    bedLengthM: null,
    particleDensityKgPerM3: 1_250,
    poreFraction: 0.5,
    tortuosity: 3,
    meanPoreRadiusM: 6e-9,
    bedVoidFraction: 0.4,
  },
}
/** The same over 2 mm pellets at 12.9 % conversion: known to be limited by pore diffusion. */
const pellets: RegimeInput = {
  ...sieved,
  conversion: 0.1286,
  rateMolPerKgS: 0.01145,
  loading: { ...sieved.loading, catalystMassKg: 60.1e-6, particleDiameterM: 2e-3, tubeInnerDiameterM: 16e-3 },
}
const find = (input: RegimeInput, id: string) => regimeOfPoint(input).criteria.find((criterion) => criterion.id === id)

describe('regime of a point', () => {
  it('gives every criterion, in order, with a verdict and a source', () => {
    const { criteria } = regimeOfPoint(sieved)
    expect(criteria.map(({ id }) => id)).toEqual([
      'pore-diffusion',
      'film-mass',
      'film-heat',
      'pellet-heat',
      'bed-heat',
      'axial-dispersion',
      'wall-flow',
      'bed-length',
      'pressure-drop',
      'dilution',
      'bed-temperature-span',
    ])
    for (const criterion of criteria) {
      expect(criterion.source).not.toBe('')
      expect(criterion.sentence).not.toContain('NaN')
      if (criterion.value === null) expect(criterion.missing.length).toBeGreaterThan(0)
    }
  })

  it('clears a fine sieve fraction', () => {
    // r‴ R²/(D_e C): 0.00314 × 1250 × (76.25 µm)² over D_e = 0.5/3 × 2.0e-6 m²/s and 3.3 mol/m³
    expect(find(sieved, 'pore-diffusion')?.value).toBeGreaterThan(0.018)
    expect(find(sieved, 'pore-diffusion')?.value).toBeLessThan(0.024)
    expect(find(sieved, 'pore-diffusion')?.verdict).toBe('pass')
    expect(find(sieved, 'film-mass')?.verdict).toBe('pass')
    expect(find(sieved, 'wall-flow')?.verdict).toBe('pass')
    expect(regimeOfPoint(sieved).effectiveness?.value).toBeGreaterThan(0.995)
  })

  it('finds pore diffusion in pellets', () => {
    const pore = find(pellets, 'pore-diffusion')
    expect(pore?.verdict).toBe('fail')
    expect(pore?.limit).toBe(0.6)
    expect(pore?.value).toBeGreaterThan(10)
    expect(pore?.margin).toBeLessThan(0.06)
    expect(pore?.assumed).toEqual([])
    const { effectiveness } = regimeOfPoint(pellets)
    expect(effectiveness?.value).toBeLessThan(0.6)
    expect(effectiveness?.low).toBeLessThan(effectiveness?.value ?? NaN)
    expect(effectiveness?.high).toBeGreaterThan(effectiveness?.value ?? NaN)
    expect(find(pellets, 'wall-flow')?.verdict).toBe('fail')
  })

  it('names what it assumed, and cannot tell near the limit', () => {
    const bare = {
      ...sieved.loading,
      poreFraction: null,
      tortuosity: null,
      meanPoreRadiusM: null,
      particleDensityKgPerM3: null,
    }
    const pore = find({ ...sieved, rateMolPerKgS: 0.06, loading: bare }, 'pore-diffusion')
    expect(pore?.assumed.map(({ name }) => name)).toEqual([
      'particle density',
      'mean pore radius',
      'pore fraction of the particle',
      'tortuosity',
    ])
    expect(pore?.verdict).toBe('cannot-tell')
    expect(pore?.sentence).toContain('too near the limit to tell')
    expect(pore?.sentence).toContain('tortuosity 3.50')
  })

  it('says which input is missing', () => {
    const bare = { ...sieved.loading, particleDiameterM: null, tubeInnerDiameterM: null }
    const report = regimeOfPoint({ ...sieved, loading: bare, reactionEnthalpyJPerMol: null })
    expect(report.effectiveness).toBeNull()
    expect(report.criteria.every(({ verdict }) => verdict === 'cannot-tell')).toBe(true)
    expect(report.criteria[0]?.sentence).toBe('Diffusion in the particle: cannot tell without particle diameter.')
    expect(report.criteria[2]?.missing).toEqual(['particle diameter', 'reaction enthalpy'])
    expect(find({ ...sieved, rateMolPerKgS: null }, 'pore-diffusion')?.missing).toEqual(['rate'])
  })

  it('keeps gases it does not know out of what they do not touch', () => {
    const odd: RegimeInput = { ...sieved, inletMoleFraction: { CO2: 0.12, H2: 0.6, SiH4: 0.28 } }
    expect(regimeOfPoint(odd).state?.unknownSpecies).toEqual(['SiH4'])
    expect(find(odd, 'film-mass')?.verdict).toBe('cannot-tell')
    expect(find(odd, 'pore-diffusion')?.value).not.toBeNull()
  })

  it('judges a measured span and an undiluted bed', () => {
    expect(find({ ...sieved, measuredBedSpanK: 0.5 }, 'bed-temperature-span')?.verdict).toBe('pass')
    expect(find({ ...sieved, measuredBedSpanK: 5 }, 'bed-temperature-span')?.verdict).toBe('fail')
    const undiluted = find({ ...sieved, loading: { ...sieved.loading, diluentMassKg: 0 } }, 'dilution')
    expect([undiluted?.value, undiluted?.margin, undiluted?.verdict]).toEqual([0, null, 'pass'])
  })

  it('has no value for an impossible point, and says why', () => {
    for (const change of [{ temperatureK: 0 }, { totalFlowMolPerS: NaN }, { pressurePa: NaN }, { conversion: 2 }]) {
      const report = regimeOfPoint({ ...sieved, ...change })
      expect(report.criteria.every(({ verdict, value }) => verdict === 'cannot-tell' && value === null)).toBe(true)
      expect(report.state).toBeNull()
    }
    expect(find({ ...sieved, pressurePa: NaN }, 'wall-flow')?.sentence).toBe(
      'Flow along the wall: cannot tell without pressure.',
    )
  })

  it('does without species that are no formula', () => {
    const report = regimeOfPoint({
      ...sieved,
      keyReactant: 'toluene',
      inletMoleFraction: { toluene: 0.1, H2: 0.9 },
      stoichiometry: { toluene: -1, H2: -1, coke: 1 },
    })
    expect(report.state?.unknownSpecies).toContain('toluene')
    expect(report.criteria[0]?.verdict).toBe('cannot-tell')
  })
})
