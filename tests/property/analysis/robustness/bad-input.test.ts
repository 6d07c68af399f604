import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { feedDrift } from '@/lib/analysis/acceptance/feed-drift'
import { referenceLimits } from '@/lib/analysis/acceptance/reference-limits'
import { blankAt, subtractBlank } from '@/lib/analysis/acceptance/subtract-blank'
import { varianceComponents } from '@/lib/analysis/acceptance/variance-components'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { amountFromResponse, fitCalibrationLine } from '@/lib/analysis/calibration/calibration-line'
import { compareLines } from '@/lib/analysis/comparison/compare-lines'
import { testCompensation } from '@/lib/analysis/comparison/compensation'
import {
  conversionByInternalStandard,
  conversionByProducts,
  conversionBySingleReaction,
} from '@/lib/analysis/conversion/conversion-routes'
import { bracketedActivity } from '@/lib/analysis/deactivation/activity'
import { fitDecayCorrectedArrhenius } from '@/lib/analysis/deactivation/decay-corrected-arrhenius'
import { fitDecay } from '@/lib/analysis/deactivation/fit-decay'
import { lightOffTemperatures } from '@/lib/analysis/deactivation/light-off'
import { fitEyring } from '@/lib/analysis/kinetics/eyring'
import { fitNonlinearArrhenius } from '@/lib/analysis/kinetics/nonlinear-arrhenius'
import { fitGlobalPowerLaw, fitReactionOrders } from '@/lib/analysis/kinetics/reaction-orders'
import { batchIntegral, plugFlowIntegral, stirredTankIntegral } from '@/lib/analysis/kinetics/reactor-integral'
import { fitYorkLine } from '@/lib/analysis/kinetics/york-line'
import { plannedRunCautions } from '@/lib/analysis/safety/planned-run-cautions'
import { monolayerUptake } from '@/lib/analysis/sites/chemisorption'
import { dispersion, meanDiameter, metalContent, ratePerSite } from '@/lib/analysis/sites/dispersion'
import { effectivenessFromObserved, sphereEffectiveness } from '@/lib/analysis/transport/effectiveness-factor'
import { ergunPressureDrop } from '@/lib/analysis/transport/ergun-pressure-drop'
import { fullerDiffusivity } from '@/lib/analysis/transport/fuller-diffusivity'
import { testSiteSeries } from '@/lib/analysis/transport/koros-nowak'
import { knudsenDiffusivity } from '@/lib/analysis/transport/pore-diffusivity'
import { regimeOfPoint } from '@/lib/analysis/transport/regime-of-point'

/** What files and forms can hand over: wild, zero, negative, missing and not-a-number. */
const wild = fc.oneof(
  { weight: 6, arbitrary: fc.double({ min: 1e-6, max: 1e6, noNaN: true }) },
  { weight: 2, arbitrary: fc.constantFrom(0, -1, 1, NaN, Infinity, -Infinity, 1e-12, 1e12, -1e6) },
)
const list = fc.array(wild, { maxLength: 7 })
const pairs = fc.array(fc.tuple(wild, wild), { maxLength: 7 })
const maybe = fc.option(wild, { nil: null })

/** Every number in an answer, however deep. */
function numbersIn(value: unknown): number[] {
  if (typeof value === 'number') return [value]
  if (Array.isArray(value)) return value.flatMap(numbersIn)
  if (typeof value === 'object' && value !== null) return Object.values(value).flatMap(numbersIn)
  return []
}

/** An answer without NaN or infinity, or a typed error: nothing else. */
function holds<T>(inputs: fc.Arbitrary<T>, run: (input: T) => unknown, numRuns = 300): void {
  fc.assert(
    fc.property(inputs, (input) => {
      let answer: unknown
      try {
        answer = run(input)
      } catch (error) {
        if (error instanceof AnalysisError) {
          expect(error.message.length).toBeGreaterThan(10)
          return
        }
        throw error
      }
      const bad = numbersIn(answer).filter((value) => !Number.isFinite(value))
      expect(
        bad,
        JSON.stringify(answer, (_key, entry: unknown) =>
          typeof entry === 'number' && !Number.isFinite(entry) ? String(entry) : entry,
        ).slice(0, 1_500),
      ).toEqual([])
    }),
    { numRuns },
  )
}

describe('bad input gives a typed error or an explicit null, never NaN', () => {
  it('reactor integrals', () => {
    holds(fc.tuple(fc.double({ min: -1, max: 3, noNaN: true }), wild, wild), ([n, x, e]) => plugFlowIntegral(n, x, e))
    holds(fc.tuple(fc.constantFrom(0, 0.5, 1, 2), wild, wild), ([n, x, e]) => stirredTankIntegral(n, x, e))
    holds(fc.tuple(fc.constantFrom(0, 0.5, 1, 2), wild, wild), ([n, a, b]) => batchIntegral(n, a, b))
  })
  it('lines and comparisons', () => {
    holds(pairs, (points) =>
      fitYorkLine(points.map(([x, y]) => ({ x, y, standardUncertaintyX: 1, standardUncertaintyY: 1 }))),
    )
    holds(pairs, (points) =>
      fitEyring(
        points.map(([t]) => t),
        points.map(([, k]) => k),
      ),
    )
    holds(fc.tuple(pairs, pairs), ([a, b]) =>
      compareLines([a, b].map((set) => ({ x: set.map(([x]) => x), y: set.map(([, y]) => y) }))),
    )
    holds(pairs, (points) =>
      testCompensation(
        points.map(([e, a]) => ({ activationEnergyJPerMol: e, lnPreExponential: a })),
        500,
      ),
    )
    holds(
      pairs,
      (points) =>
        fitNonlinearArrhenius(
          points.map(([t]) => t),
          points.map(([, k]) => k),
        ),
      100,
    )
  })
  it('orders', () => {
    holds(pairs, (points) =>
      fitReactionOrders(
        points.map(([p, r]) => ({ ratePositive: r, pressuresPa: { A: p } })),
        ['A'],
      ),
    )
    holds(pairs, (points) =>
      fitGlobalPowerLaw(
        points.map(([p, t]) => ({ ratePositive: p, temperatureK: t, pressuresPa: { A: p } })),
        ['A'],
      ),
    )
  })
  it('time on stream', () => {
    holds(
      pairs,
      (points) =>
        fitDecay(
          points.map(([t]) => t),
          points.map(([, r]) => r),
          { order: 1, hasResidual: false },
        ),
      100,
    )
    holds(pairs, (points) =>
      fitDecayCorrectedArrhenius(points.map(([t, r], i) => ({ temperatureK: t, rate: r, timeS: i * 100 }))),
    )
    holds(pairs, (points) =>
      lightOffTemperatures(
        points.map(([t]) => t),
        points.map(([, x]) => x),
      ),
    )
    holds(fc.tuple(pairs, wild), ([points, t]) =>
      bracketedActivity(
        points.map(([timeS, rate]) => ({ timeS, rate, relativeStandardUncertainty: 0.01 })),
        t,
      ),
    )
  })
  it('calibration, conversion, sites, acceptance', () => {
    holds(fc.tuple(pairs, wild), ([points, y]) => {
      const line = fitCalibrationLine(points.map(([amount, response]) => ({ amount, response })))
      return [line, amountFromResponse(line, y)]
    })
    const of = (value: number) => ({ value, relativeStandardUncertainty: 0.01 })
    holds(fc.tuple(wild, wild, wild, wild), ([a, b, c, d]) => conversionByInternalStandard(of(a), of(b), of(c), of(d)))
    holds(fc.tuple(wild, wild, wild), ([a, b, c]) =>
      conversionByProducts([{ ...of(a), inFeed: 0, keyPerMole: 1 }], of(b), of(c)),
    )
    holds(fc.tuple(wild, wild, wild), ([a, b, c]) => conversionBySingleReaction(a, b, c))
    holds(fc.tuple(pairs, wild), ([points, p]) =>
      monolayerUptake(
        points.map(([pressurePa, uptakeMolPerKg]) => ({ pressurePa, uptakeMolPerKg })),
        p,
      ),
    )
    holds(fc.tuple(wild, wild), ([a, b]) => [
      dispersion(a, b),
      meanDiameter(a, 'Pt'),
      metalContent(b, 'Pt'),
      ratePerSite(a, 0.1, b, 0.1),
    ])
    holds(list, (values) => [
      referenceLimits(values),
      varianceComponents(values.map((value, i) => ({ loading: String(i % 2), value }))),
    ])
    holds(fc.tuple(wild, wild), ([a, b]) => feedDrift(of(a), of(b)))
    holds(fc.tuple(pairs, wild, wild), ([points, t, w]) =>
      subtractBlank(
        1,
        0.1,
        w,
        blankAt(
          points.map(([temperatureK, n]) => ({ temperatureK, consumptionMolPerS: n, standardUncertaintyMolPerS: 0 })),
          t,
        ),
      ),
    )
    holds(pairs, (points) =>
      testSiteSeries(points.map(([sitesMolPerKg, rateMolPerKgS]) => ({ sitesMolPerKg, rateMolPerKgS }))),
    )
  })
  it('transport', () => {
    holds(wild, (phi) => [sphereEffectiveness(phi), effectivenessFromObserved(phi)])
    holds(fc.tuple(wild, wild, wild), ([t, p, m]) =>
      fullerDiffusivity({
        temperatureK: t,
        pressurePa: p,
        molarMassAKgPerMol: m,
        molarMassBKgPerMol: 0.028,
        volumeA: 18,
        volumeB: 18,
      }),
    )
    holds(fc.tuple(wild, wild, wild), ([r, t, m]) => knudsenDiffusivity(r, t, m))
    holds(fc.tuple(wild, wild, wild), ([d, e, u]) =>
      ergunPressureDrop({
        particleDiameterM: d,
        bedVoidFraction: e,
        superficialVelocityMPerS: u,
        densityKgPerM3: 1,
        viscosityPaS: 1e-5,
        bedLengthM: 1,
      }),
    )
    holds(
      fc.record({
        t: wild,
        p: wild,
        f: wild,
        x: wild,
        y: wild,
        r: maybe,
        d: maybe,
        tube: maybe,
        l: maybe,
        rho: maybe,
        e: maybe,
        n: maybe,
        ea: maybe,
        h: maybe,
        span: maybe,
        m: wild,
      }),
      (v) => {
        const { state, ...report } = regimeOfPoint({
          holdNumber: 1,
          temperatureK: v.t,
          pressurePa: v.p,
          totalFlowMolPerS: v.f,
          inletMoleFraction: { CO2: v.y, H2: 0.6, Ar: 0.2 },
          keyReactant: 'CO2',
          stoichiometry: { CO2: -1, H2: -4, CH4: 1, H2O: 2 },
          conversion: v.x,
          rateMolPerKgS: v.r,
          rateRelativeStandardUncertainty: 0.01,
          orderInKeyReactant: v.n,
          activationEnergyJPerMol: v.ea,
          reactionEnthalpyJPerMol: v.h,
          measuredBedSpanK: v.span,
          loading: {
            catalystMassKg: v.m,
            massRelativeStandardUncertainty: 0.01,
            massSourceId: 'mass',
            diluentMassKg: v.m,
            particleDiameterM: v.d,
            tubeInnerDiameterM: v.tube,
            bedLengthM: v.l,
            particleDensityKgPerM3: v.rho,
            poreFraction: v.e,
            tortuosity: v.e,
            meanPoreRadiusM: v.d,
            bedVoidFraction: v.e,
          },
        })
        return [report, state?.keyConcentrationMolPerM3 === 0]
      },
      1_000,
    )
  })
  it('planned runs', () => {
    holds(fc.tuple(wild, wild, maybe, maybe, maybe), ([a, b, p, d, h]) =>
      plannedRunCautions({
        feed: [
          { species: 'H2', moleFraction: a },
          { species: 'O2', moleFraction: b },
          { species: 'CO', moleFraction: a },
        ],
        productsPossible: ['CO2'],
        activeMetal: 'Ni',
        temperatureRangeK: h === null ? null : { low: h, high: h },
        pressurePa: p,
        rigLimits: { maximumPressurePa: p, maximumTemperatureK: d },
        reactionEnthalpyJPerMol: h,
        keyReactant: 'H2',
        particleDiameterM: d,
        tubeInnerDiameterM: p,
        bedLengthM: d,
      }),
    )
  })
})
