import { describe, expect, it } from 'vitest'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { diffusionCollisionIntegral } from '@/lib/analysis/transport/collision-integral'
import { diffusionVolume } from '@/lib/analysis/transport/diffusion-volume'
import {
  effectivenessFromObserved,
  generalThieleModulus,
  slabConcentrationRatio,
  slabEffectiveness,
  sphereEffectiveness,
  thieleModuliOfTwoSizes,
  thieleModulusAt,
} from '@/lib/analysis/transport/effectiveness-factor'
import { ergunPressureDrop } from '@/lib/analysis/transport/ergun-pressure-drop'
import { fullerDiffusivity, fullerDiffusivity1966 } from '@/lib/analysis/transport/fuller-diffusivity'
import { gasViscosity, mixtureThermalConductivity, mixtureViscosity } from '@/lib/analysis/transport/gas-viscosity'
import { LENNARD_JONES } from '@/lib/analysis/transport/lennard-jones'
import { coupledMixtureDiffusivity, stagnantMixtureDiffusivity } from '@/lib/analysis/transport/mixture-diffusivity'
import { packedBedSherwood, sphereSherwood } from '@/lib/analysis/transport/particle-film'
import {
  bosanquetDiffusivity,
  effectiveDiffusivity,
  knudsenDiffusivity,
  knudsenNumber,
} from '@/lib/analysis/transport/pore-diffusivity'
import {
  bedHeatCriterion,
  dilutionError,
  filmHeatCriterion,
  filmMassCriterion,
  filmTemperatureRise,
  pelletHeatCriterion,
  plugFlowBedLength,
  praterTemperatureRise,
  weiszPraterLimit,
  weiszPraterModulus,
} from '@/lib/analysis/transport/transport-criteria'
import { wilkeLeeDiffusivity } from '@/lib/analysis/transport/wilke-lee-diffusivity'
import { molarMass } from '@/lib/analysis/units/molar-mass'

const close = (value: number | null, expected: number, tolerance = 1e-8) =>
  expect(Math.abs((value ?? NaN) / expected - 1), `${String(value)} against ${String(expected)}`).toBeLessThan(
    tolerance,
  )

const CM2 = 1e-4

describe('molar masses and diffusion volumes', () => {
  it('are sums over the formula', () => {
    close(molarMass('CO2'), 0.044009)
    close(molarMass('Ni(CO)4'), 0.1707334, 1e-6)
    expect(() => molarMass('Xy')).toThrow(AnalysisError)
    expect(() => molarMass('')).toThrow(AnalysisError)
    expect(() => molarMass('coke?')).toThrow(AnalysisError)
    close(diffusionVolume('CH4'), 25.14)
    expect(diffusionVolume('Ni(CO)4')).toBeNull()
    // benzene, one aromatic ring: 6 × 15.9 + 6 × 2.31 − 18.3
    close(diffusionVolume('C6H6', 1), 90.96)
  })
})

describe('C43 Fuller', () => {
  it('hydrogen in nitrogen, the form and volumes of 1966: Cussler, Diffusion, example 5.1-2 (printed 0.37, measured 0.38)', () => {
    const old = fullerDiffusivity1966({
      temperatureK: 294,
      pressurePa: 2 * 101_325,
      molarMassAKgPerMol: 2.02e-3,
      molarMassBKgPerMol: 28e-3,
      volumeA: 7.07,
      volumeB: 17.9,
    })
    close(old / CM2, 0.3696938019)
  })
  it('the same in the present form', () => {
    const present = fullerDiffusivity({
      temperatureK: 294,
      pressurePa: 202_650,
      molarMassAKgPerMol: 2.016e-3,
      molarMassBKgPerMol: 28.014e-3,
      volumeA: 6.12,
      volumeB: 18.5,
    })
    close(present / CM2, 0.3794430277)
  })
  it('carbon monoxide in nitrogen at 288 K (handbook 0.192)', () => {
    const value = fullerDiffusivity({
      temperatureK: 288,
      pressurePa: 101_325,
      molarMassAKgPerMol: 28.01e-3,
      molarMassBKgPerMol: 28.014e-3,
      volumeA: 18,
      volumeB: 18.5,
    })
    close(value / CM2, 0.1936423876)
    expect(Math.abs(value / CM2 / 0.192 - 1)).toBeLessThan(0.07)
  })
  it('refuses what cannot be', () => {
    const bad = { temperatureK: 0, pressurePa: 1, molarMassAKgPerMol: 1, molarMassBKgPerMol: 1, volumeA: 1, volumeB: 1 }
    expect(() => fullerDiffusivity(bad)).toThrow(AnalysisError)
    expect(() => fullerDiffusivity1966(bad)).toThrow(AnalysisError)
  })
})

const AIR = { molarMassKgPerMol: 29e-3, diameterAngstrom: 3.62, wellK: 97 }

describe('C45 Wilke-Lee', () => {
  it('collision integral as printed in Benítez, example 1.6', () => {
    expect(diffusionCollisionIntegral(1.283)).toBeCloseTo(1.282, 3)
  })
  it('carbon disulfide in air: Benítez, example 1.6 (printed 0.0952, measured 0.0894)', () => {
    const value = wilkeLeeDiffusivity(273, 1e5, { molarMassKgPerMol: 76e-3, diameterAngstrom: 4.483, wellK: 467 }, AIR)
    close(value / CM2, 0.09522051876)
  })
  it('allyl chloride in air: Benítez, example 1.7 (printed 0.0992, measured 0.098)', () => {
    // σ = 1.18 V_b^(1/3), ε/k = 1.15 T_b with V_b = 87.5 cm3/mol and T_b = 318.3 K
    const value = wilkeLeeDiffusivity(
      298,
      1e5,
      { molarMassKgPerMol: 76.5e-3, diameterAngstrom: 1.18 * Math.cbrt(87.5), wellK: 1.15 * 318.3 },
      AIR,
    )
    close(value / CM2, 0.09915865337)
  })
})

describe('C46 ammonia cracking mixture: Benítez, example 1.11 (printed 0.237, 0.728, 0.457)', () => {
  const gas = (massG: number, diameterAngstrom: number, wellK: number) => ({
    molarMassKgPerMol: massG / 1_000,
    diameterAngstrom,
    wellK,
  })
  const inNitrogen = wilkeLeeDiffusivity(300, 1e5, gas(17, 2.9, 558.3), gas(28, 3.798, 71.4))
  const inHydrogen = wilkeLeeDiffusivity(300, 1e5, gas(17, 2.9, 558.3), gas(2, 2.827, 59.7))
  const partners = [
    { moleFraction: 0.2, diffusivityM2PerS: inNitrogen, stoichiometricNumber: 1 },
    { moleFraction: 0.4, diffusivityM2PerS: inHydrogen, stoichiometricNumber: 3 },
  ]
  it('binary values', () => {
    close(inNitrogen / CM2, 0.2367536889)
    close(inHydrogen / CM2, 0.7277294055)
  })
  it('coupled and stagnant', () => {
    close((coupledMixtureDiffusivity(0.4, -2, partners) ?? NaN) / CM2, 0.4569702538)
    close(stagnantMixtureDiffusivity(0.4, partners) / CM2, 0.4302880756)
  })
  it('refuses a product as the key gas, and no partners', () => {
    expect(() => coupledMixtureDiffusivity(0.4, 2, partners)).toThrow(AnalysisError)
    expect(() => stagnantMixtureDiffusivity(0.4, [])).toThrow(AnalysisError)
    const circling = [{ moleFraction: 0, diffusivityM2PerS: 1, stoichiometricNumber: -2 }]
    expect(coupledMixtureDiffusivity(0.5, -2, circling)).toBeNull()
  })
})

describe('C47 pores', () => {
  it('Knudsen coefficient', () => {
    close(knudsenDiffusivity(1, 1, 1e-3), 97.00539549)
  })
  it('two sizes of pores: Harriott, Chemical Reactor Design, example 4.2', () => {
    // the book rounds the coefficient to 9700 cm2/s; the exact one differs by 5.6e-5
    const rounded = 97 / 97.00539549
    const molecular = 0.49 * CM2
    const at = (radiusM: number) => bosanquetDiffusivity(molecular, rounded * knudsenDiffusivity(radiusM, 493, 32e-3))
    const mean = (0.3 * at(40e-10) + 0.15 * at(2_000e-10)) / 0.45
    const effective = effectiveDiffusivity(mean, 0.54, 2.5)
    close(effective / CM2, 0.0235933499)
    const single = at((2 * 0.45e-6) / 150)
    close(single / CM2, 0.02182640891)
    close((0.54 * single) / effective, 0.4995585985)
  })
  it('Knudsen number: Benítez, example 1.20 (printed 0.022 and 0.014 cm2/s)', () => {
    close(knudsenNumber(373, 10 * 101_325, 3.635e-10, 4_000e-10), 0.02164421353)
    close(effectiveDiffusivity(0.086 * CM2, 0.4, 2.5) / CM2, 0.01376)
  })
})

describe('C48 Ergun', () => {
  it('water and gas', () => {
    // the first value stands in the documentation of an open fluid library
    close(
      ergunPressureDrop({
        particleDiameterM: 8e-4,
        bedVoidFraction: 0.4,
        superficialVelocityMPerS: 1e-3,
        densityKgPerM3: 1_000,
        viscosityPaS: 1e-3,
        bedLengthM: 1,
      }),
      1338.8671875,
    )
    close(
      ergunPressureDrop({
        particleDiameterM: 2e-4,
        bedVoidFraction: 0.4,
        superficialVelocityMPerS: 0.05,
        densityKgPerM3: 0.6,
        viscosityPaS: 3e-5,
        bedLengthM: 0.02,
      }),
      635.2734375,
    )
  })
})

describe('C49 effectiveness', () => {
  it.each([
    [0.1, 0.9993339676],
    [0.3, 0.9940509699],
    [0.5, 0.9837204824],
    [1, 0.9391058565],
    [2, 0.8059720811],
    [3, 0.67163649],
    [5, 0.4800544824],
    [10, 0.2700000012],
    [30, 0.09666666667],
  ])('sphere, φ = %s', (modulus, expected) => close(sphereEffectiveness(modulus), expected, 2e-9))
  it('joins its series without a step', () => {
    close(sphereEffectiveness(0.0499999), sphereEffectiveness(0.0500001), 1e-8)
    expect(sphereEffectiveness(0)).toBe(1)
    expect(() => sphereEffectiveness(NaN)).toThrow(AnalysisError)
  })
  it('slab: Coulson and Richardson, problem 10.13 (printed 0.332 and 0.035)', () => {
    close(slabEffectiveness(3), 0.3316849179)
    close(0.15 * slabConcentrationRatio(3, 0.5), 0.03504899573)
    close(slabConcentrationRatio(800, 1), 1)
  })
  it('two pellets: Fogler (radii 10 and 1 mm, rates 1 to 5; printed 16.5 and 1.65, η₂ 0.856)', () => {
    const two = thieleModuliOfTwoSizes(10, 0.2)
    close(two?.larger.thieleModulus ?? null, 16.45613827)
    close(two?.smaller.thieleModulus ?? null, 1.645613827)
    close(two?.larger.effectiveness ?? null, 0.1712246919)
    close(two?.smaller.effectiveness ?? null, 0.8561234594)
    // a posted solution takes the small pellet as free of diffusion: not reproduced
    expect(two?.smaller.effectiveness).toBeLessThan(0.9)
    close(thieleModulusAt(0.95), 0.8985868791)
    close(thieleModulusAt(0.95) / (two?.smaller.thieleModulus ?? NaN), 0.5460496651)
    close(
      (two?.larger.thieleModulus ?? NaN) * (two?.larger.thieleModulus ?? NaN) * (two?.larger.effectiveness ?? NaN),
      46.36841481,
    )
    close(
      (two?.smaller.thieleModulus ?? NaN) * (two?.smaller.thieleModulus ?? NaN) * (two?.smaller.effectiveness ?? NaN),
      2.318420741,
    )
  })
  it('says nothing where diffusion cannot explain the ratio', () => {
    expect(thieleModuliOfTwoSizes(10, 1)).toBeNull()
    expect(thieleModuliOfTwoSizes(10, 0.1)).toBeNull()
  })
  it('from the observed rate', () => {
    const limit = thieleModulusAt(0.95)
    close(limit * limit * 0.95, 0.767, 1e-3)
    close(effectivenessFromObserved(limit * limit * 0.95).effectiveness, 0.95)
    // coth φ is 1 to all digits here, so 3 (φ − 1) = 144 and φ = 49
    close(effectivenessFromObserved(144).effectiveness, 144 / 2401)
    expect(effectivenessFromObserved(0).effectiveness).toBe(1)
    close(generalThieleModulus(1e-3, 1, 4, 1e-6), 2)
  })
})

describe('C50 criteria: Levenspiel, example 18.1', () => {
  // d_p 2.4 mm, D_e 5e-5 m2/h, λ 1.6 kJ/(h m K), h 160 kJ/(h m2 K), k_g 300 m/h, ΔH −160 kJ/mol, C 20 mol/m3, r‴ 1e5 mol/(h m3)
  const hour = 3_600
  const rate = 1e5 / hour
  const radius = 1.2e-3
  const particle = {
    reactionEnthalpyJPerMol: -160e3,
    rateMolPerM3S: rate,
    radiusM: radius,
    activationEnergyJPerMol: 80e3,
    temperatureK: 600,
  }
  it('pore diffusion on both lengths', () => {
    close(weiszPraterModulus(rate, radius, 5e-5 / hour, 20), 144)
    close(weiszPraterModulus(rate, radius / 3, 5e-5 / hour, 20), 16)
  })
  it('film', () => {
    close(filmMassCriterion(1, rate, radius, 300 / hour, 20), 0.02)
    // printed as observed over film rate constant with the length V/S: 0.00667
    close(filmMassCriterion(1, rate, radius / 3, 300 / hour, 20), 0.00666666667)
  })
  it('temperature differences', () => {
    close(praterTemperatureRise(-160e3, 5e-5 / hour, 20, 1.6e3 / hour), 0.1)
    close(filmTemperatureRise(particle, 160e3 / hour), 40)
  })
  it('heat numbers follow from them', () => {
    const sensitivity = 80e3 / (8.31446261815324 * 600 * 600)
    close(filmHeatCriterion(particle, 160e3 / hour), 3 * 40 * sensitivity)
    // |ΔH| r‴ R²/λ = 160e3 × 1e5 × 1.44e-6 / 1.6e3 K
    close(pelletHeatCriterion(particle, 1.6e3 / hour), 14.4 * sensitivity)
    close(
      bedHeatCriterion(particle, {
        voidFraction: 0.4,
        diluentFraction: 0.5,
        tubeRadiusM: 5e-3,
        conductivityWPerMK: 0.25,
        wallBiot: 1,
      }),
      ((160e3 * rate * 0.3 * 25e-6) / 0.25) * sensitivity * (1 + (8 * 1.2) / 5),
    )
  })
  it('bed', () => {
    close(plugFlowBedLength(1, 0.5, 0.1), 40 * 0.105360515657826)
    close(dilutionError(0.8, 0.1, 2e-4, 0.02), (4 * 0.1 * 2e-4) / 0.04)
    expect([null, -0.5, 0, 0.5, 1, 2].map(weiszPraterLimit)).toEqual([0.3, 0.3, 6, 0.6, 0.6, 0.3])
  })
})

describe('C52 viscosity', () => {
  it('of a mixture by Wilke, as in an open property library', () => {
    close(
      mixtureViscosity([
        { moleFraction: 0.05, viscosityPaS: 1.34e-5, molarMassKgPerMol: 64.06e-3 },
        { moleFraction: 0.95, viscosityPaS: 9.5029e-6, molarMassKgPerMol: 46.07e-3 },
      ]),
      9.701614885866193e-6,
      1e-12,
    )
  })
  it.each([
    // NIST reference fluid properties, 300 K and 1 atm: viscosity in µPa s, conductivity in mW/(m K), heat capacity in J/(mol K)
    ['N2', 17.9, 25.9, 29.2],
    ['Ar', 22.7, 17.7, 20.8],
    ['H2', 8.94, 186, 28.9],
    ['CO2', 15.0, 16.8, 37.5],
    ['CH4', 11.1, 34.4, 36.0],
  ])('of %s lies within 5 %, its conductivity within 15 %', (species, viscosity, conductivity, heatCapacity) => {
    const parameters = LENNARD_JONES[species]
    expect(parameters).toBeDefined()
    if (parameters === undefined) return
    const molarMassKgPerMol = molarMass(species)
    const value = gasViscosity(300, molarMassKgPerMol, parameters)
    expect(Math.abs((value * 1e6) / viscosity - 1)).toBeLessThan(0.05)
    const lambda = mixtureThermalConductivity([
      { moleFraction: 1, viscosityPaS: value, molarMassKgPerMol, heatCapacityJPerMolK: heatCapacity },
    ])
    expect(Math.abs((lambda * 1e3) / conductivity - 1)).toBeLessThan(0.15)
  })
})

describe('films', () => {
  it('tend to 2', () => {
    expect(sphereSherwood(0, 1)).toBe(2)
    close(sphereSherwood(100, 1), 8)
    expect(packedBedSherwood(0.5, 1)).toBe(2)
    close(packedBedSherwood(100, 1), 2 + 1.1 * 15.848931924611133)
  })
})
