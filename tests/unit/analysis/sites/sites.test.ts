import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { monolayerUptake, PROBE_STOICHIOMETRY, surfaceSites } from '@/lib/analysis/sites/chemisorption'
import { dispersion, meanDiameter, metalContent, ratePerSite } from '@/lib/analysis/sites/dispersion'
import { closeTo } from '../kinetics/close-to'

const TORR = 101_325 / 760

describe('C59 chemisorption: hydrogen on 1.5 wt% Rh, problem data', () => {
  const points = [50, 75, 100, 150, 200, 250, 300, 350, 400].map((torr, i) => ({
    pressurePa: torr * TORR,
    uptakeMolPerKg: ([40, 50, 60, 65, 70, 75, 80, 85, 90][i] ?? NaN) / 1_000,
  }))
  it('extrapolates the straight part to 50 µmol/g: dispersion 0.686', () => {
    const uptake = monolayerUptake(points, 100 * TORR)
    closeTo(uptake.uptakeMolPerKg, 0.05, 1e-12)
    closeTo(uptake.slopeMolPerKgPa * TORR, 1e-4, 1e-10)
    expect(uptake.pointsUsed).toBe(7)
    const sites = surfaceSites(uptake.uptakeMolPerKg, PROBE_STOICHIOMETRY.H2?.atomsPerMolecule ?? NaN)
    closeTo(metalContent(0.015, 'Rh'), 0.1457648036, 1e-7)
    closeTo(dispersion(sites, metalContent(0.015, 'Rh')), 0.6860366667, 1e-7)
  })
  it('the posted 0.41 reads the knee with one atom a molecule: not reproduced', () => {
    const knee = dispersion(surfaceSites(0.06, 1), metalContent(0.015, 'Rh'))
    expect(knee).toBeCloseTo(0.41, 2)
    const ours = dispersion(
      surfaceSites(monolayerUptake(points, 100 * TORR).uptakeMolPerKg, 2),
      metalContent(0.015, 'Rh'),
    )
    expect(ours).toBeGreaterThan(0.6)
  })
  it('refuses what settles nothing', () => {
    expect(() => monolayerUptake(points, 400 * TORR)).toThrow(AnalysisError)
    expect(() => surfaceSites(1, 0)).toThrow(AnalysisError)
    expect(() => dispersion(1, 0)).toThrow(AnalysisError)
    expect(() => metalContent(1.5, 'Rh')).toThrow(AnalysisError)
    expect(() => metalContent(0.5, 'Qq')).toThrow(AnalysisError)
    expect(() => ratePerSite(1, 0.1, 0, 0.1)).toThrow(AnalysisError)
  })
})

describe('sites and sizes', () => {
  it('platinum: about 1.13 nm over the dispersion', () => {
    closeTo((meanDiameter(1, 'Pt') ?? NaN) * 1e9, 1.13, 0.01)
    closeTo((meanDiameter(0.5, 'Pt') ?? NaN) * 1e9, 2.25, 0.01)
    expect(meanDiameter(0.5, 'Zr')).toBeNull()
    expect(() => meanDiameter(0, 'Pt')).toThrow(AnalysisError)
  })
  it('C57, last steps: 1.4314 µmol/g/s on 1 wt% Pt of dispersion 0.45', () => {
    const metal = metalContent(0.01, 'Pt')
    const yield_ = ratePerSite(1.4313989885e-3, 0, metal, 0)
    closeTo(yield_.ratePerS, 0.027924304026)
    closeTo(ratePerSite(1.4313989885e-3, 0, 0.45 * metal, 0).ratePerS, 0.062054008947)
    // flow 1 %, conversion 2 %, mass 0.5 %, dispersion 10 %, metal 2 %
    const rate = Math.sqrt(0.01 ** 2 + 0.02 ** 2 + 0.005 ** 2)
    closeTo(ratePerSite(1, rate, 1, Math.sqrt(0.1 ** 2 + 0.02 ** 2)).relativeStandardUncertainty, 0.1045227248)
  })
})
