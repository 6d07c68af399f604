import cbrt from '@stdlib/math-base-special-cbrt'
import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { mixtureFlammableLimit } from '../safety/mixture-flammable-limit'
import { fitWeightedLine } from '../statistics/weighted-line'
import {
  slabConcentrationRatio,
  slabEffectiveness,
  sphereEffectiveness,
  thieleModuliOfTwoSizes,
  thieleModulusAt,
} from '../transport/effectiveness-factor'
import { ergunPressureDrop } from '../transport/ergun-pressure-drop'
import { fullerDiffusivity, fullerDiffusivity1966 } from '../transport/fuller-diffusivity'
import { mixtureViscosity } from '../transport/gas-viscosity'
import { coupledMixtureDiffusivity, stagnantMixtureDiffusivity } from '../transport/mixture-diffusivity'
import {
  bosanquetDiffusivity,
  effectiveDiffusivity,
  knudsenDiffusivity,
  knudsenNumber,
} from '../transport/pore-diffusivity'
import {
  filmMassCriterion,
  filmTemperatureRise,
  praterTemperatureRise,
  weiszPraterModulus,
} from '../transport/transport-criteria'
import { wilkeLeeDiffusivity } from '../transport/wilke-lee-diffusivity'
import { type Check, item, once } from './check'

const CM2 = 1e-4
const gas = (massG: number, diameterAngstrom: number, wellK: number) => ({
  molarMassKgPerMol: massG / 1_000,
  diameterAngstrom,
  wellK,
})
const air = gas(29, 3.62, 97)
const ammoniaIn = {
  nitrogen: once(() => wilkeLeeDiffusivity(300, 1e5, gas(17, 2.9, 558.3), gas(28, 3.798, 71.4))),
  hydrogen: once(() => wilkeLeeDiffusivity(300, 1e5, gas(17, 2.9, 558.3), gas(2, 2.827, 59.7))),
}
const partners = once(() => [
  { moleFraction: 0.2, diffusivityM2PerS: ammoniaIn.nitrogen(), stoichiometricNumber: 1 },
  { moleFraction: 0.4, diffusivityM2PerS: ammoniaIn.hydrogen(), stoichiometricNumber: 3 },
])
// the book rounds the Knudsen coefficient to 9700 cm2/s
const rounded = 97 / 97.00539549
const poreOf = (radiusM: number) => bosanquetDiffusivity(0.49 * CM2, rounded * knudsenDiffusivity(radiusM, 493, 32e-3))
const harriott = once(() => effectiveDiffusivity((0.3 * poreOf(40e-10) + 0.15 * poreOf(2_000e-10)) / 0.45, 0.54, 2.5))
const two = once(() => thieleModuliOfTwoSizes(10, 0.2))

const hour = 3_600
const levenspiel = { rate: 1e5 / hour, radius: 1.2e-3, diffusivity: 5e-5 / hour, concentration: 20, enthalpy: -160e3 }

const SHORT_R = 8.314462618
const falsified = (modulus: number) => {
  const t = [470, 480, 490, 500, 510, 520, 530]
  const lnK = (temperature: number) => (-100_000 / SHORT_R) * (1 / temperature - 1 / 500)
  const line = fitWeightedLine(
    t.map((value) => 1 / value),
    t.map((value) => lnK(value) + ln(sphereEffectiveness(modulus * exp(lnK(value) / 2)))),
    null,
  )
  return (-SHORT_R * line.slope) / 1e3
}
const offset = () => {
  const t = [450, 475, 500, 525, 550]
  const line = fitWeightedLine(
    t.map((value) => 1 / (value + 5)),
    t.map((value) => -100_000 / (SHORT_R * value)),
    null,
  )
  return -SHORT_R * line.slope
}
const mixed = (limits: readonly number[]) =>
  mixtureFlammableLimit(limits.map((limit, i) => ({ amount: [0.24, 0.61, 0.15][i] ?? NaN, limit })))

/** Checks of transport and safety. */
export const TRANSPORT_CHECKS: readonly Check[] = [
  {
    id: 'C43',
    title: 'Fuller diffusivities',
    source: "Cussler, Diffusion, example 5.1-2; Poling, Prausnitz and O'Connell, 5th edition",
    provenance: 'read',
    published: '0.37 cm²/s (measured 0.38); CO in N₂ 0.192 in a handbook',
    items: [
      item(
        'H₂ in N₂, form and volumes of 1966',
        'cm²/s',
        0.3696938019,
        () =>
          fullerDiffusivity1966({
            temperatureK: 294,
            pressurePa: 202_650,
            molarMassAKgPerMol: 2.02e-3,
            molarMassBKgPerMol: 28e-3,
            volumeA: 7.07,
            volumeB: 17.9,
          }) / CM2,
      ),
      item(
        'H₂ in N₂, present form',
        'cm²/s',
        0.3794430277,
        () =>
          fullerDiffusivity({
            temperatureK: 294,
            pressurePa: 202_650,
            molarMassAKgPerMol: 2.016e-3,
            molarMassBKgPerMol: 28.014e-3,
            volumeA: 6.12,
            volumeB: 18.5,
          }) / CM2,
      ),
      item(
        'CO in N₂, 288 K',
        'cm²/s',
        0.1936423876,
        () =>
          fullerDiffusivity({
            temperatureK: 288,
            pressurePa: 101_325,
            molarMassAKgPerMol: 28.01e-3,
            molarMassBKgPerMol: 28.014e-3,
            volumeA: 18,
            volumeB: 18.5,
          }) / CM2,
      ),
    ],
  },
  {
    id: 'C45',
    title: 'Wilke-Lee diffusivities',
    source: 'Benítez, Principles and Modern Applications of Mass Transfer Operations, examples 1.6 and 1.7',
    provenance: 'read',
    published: '0.0952 and 0.0992 cm²/s (measured 0.0894 and 0.098)',
    items: [
      item(
        'carbon disulfide in air',
        'cm²/s',
        0.09522051876,
        () => wilkeLeeDiffusivity(273, 1e5, gas(76, 4.483, 467), air) / CM2,
      ),
      item(
        'allyl chloride in air',
        'cm²/s',
        0.09915865337,
        () => wilkeLeeDiffusivity(298, 1e5, gas(76.5, 1.18 * cbrt(87.5), 1.15 * 318.3), air) / CM2,
      ),
    ],
  },
  {
    id: 'C46',
    title: 'Diffusion in a mixture coupled by reaction',
    source: 'Benítez, example 1.11 (ammonia cracking)',
    provenance: 'read',
    published: '0.237, 0.728, 0.457 cm²/s',
    items: [
      item('NH₃ in N₂', 'cm²/s', 0.2367536889, () => ammoniaIn.nitrogen() / CM2),
      item('NH₃ in H₂', 'cm²/s', 0.7277294055, () => ammoniaIn.hydrogen() / CM2),
      item('coupled', 'cm²/s', 0.4569702538, () => (coupledMixtureDiffusivity(0.4, -2, partners()) ?? NaN) / CM2),
      item('stagnant', 'cm²/s', 0.4302880756, () => stagnantMixtureDiffusivity(0.4, partners()) / CM2),
    ],
  },
  {
    id: 'C47',
    title: 'Pores',
    source: 'Harriott, Chemical Reactor Design, example 4.2; Benítez, example 1.20',
    provenance: 'read',
    published: '0.0236, 0.0218 cm²/s, tortuosity 0.50; Knudsen number 0.022, 0.014 cm²/s',
    items: [
      item('Knudsen coefficient', 'm²/s', 97.00539549, () => knudsenDiffusivity(1, 1, 1e-3)),
      item('effective diffusivity', 'cm²/s', 0.0235933499, () => harriott() / CM2),
      item('diffusivity at the mean radius', 'cm²/s', 0.02182640891, () => poreOf((2 * 0.45e-6) / 150) / CM2),
      item('apparent tortuosity', '1', 0.4995585985, () => (0.54 * poreOf((2 * 0.45e-6) / 150)) / harriott()),
      item('Knudsen number', '1', 0.02164421353, () => knudsenNumber(373, 1_013_250, 3.635e-10, 4_000e-10)),
    ],
  },
  {
    id: 'C48',
    title: 'Ergun pressure drop',
    source: 'documentation of an open fluid library; Ergun 1952',
    provenance: 'read',
    published: '1338.8671875 Pa',
    items: [
      item('water', 'Pa', 1338.8671875, () =>
        ergunPressureDrop({
          particleDiameterM: 8e-4,
          bedVoidFraction: 0.4,
          superficialVelocityMPerS: 1e-3,
          densityKgPerM3: 1_000,
          viscosityPaS: 1e-3,
          bedLengthM: 1,
        }),
      ),
      item('gas', 'Pa', 635.2734375, () =>
        ergunPressureDrop({
          particleDiameterM: 2e-4,
          bedVoidFraction: 0.4,
          superficialVelocityMPerS: 0.05,
          densityKgPerM3: 0.6,
          viscosityPaS: 3e-5,
          bedLengthM: 0.02,
        }),
      ),
    ],
  },
  {
    id: 'C49',
    title: 'Effectiveness factors',
    source: 'Coulson and Richardson, problem 10.13; Fogler, two pellet sizes',
    provenance: 'read',
    published: '0.332, 0.035; moduli 16.5 and 1.65, η 0.856',
    items: [
      item('slab, φ = 3', '1', 0.3316849179, () => slabEffectiveness(3)),
      item('concentration half-way', 'kmol/m³', 0.03504899573, () => 0.15 * slabConcentrationRatio(3, 0.5)),
      ...(
        [
          [0.1, 0.9993339676],
          [1, 0.9391058565],
          [3, 0.67163649],
          [10, 0.2700000012],
          [30, 0.09666666667],
        ] as const
      ).map(([modulus, expected]) =>
        item(`sphere, φ = ${String(modulus)}`, '1', expected, () => sphereEffectiveness(modulus), 2e-9),
      ),
      item('modulus of the larger pellet', '1', 16.45613827, () => two()?.larger.thieleModulus),
      item('effectiveness of the smaller', '1', 0.8561234594, () => two()?.smaller.effectiveness),
      item('modulus at η = 0.95', '1', 0.8985868791, () => thieleModulusAt(0.95)),
    ],
  },
  {
    id: 'C50',
    title: 'Transport criteria',
    source: 'Levenspiel, Chemical Reaction Engineering, 3rd edition, example 18.1',
    provenance: 'read',
    published: '16; 0.1 K in the pellet, 40 K over the film',
    items: [
      item('Φ on V/S', '1', 16, () =>
        weiszPraterModulus(levenspiel.rate, levenspiel.radius / 3, levenspiel.diffusivity, levenspiel.concentration),
      ),
      item('Φ on the radius', '1', 144, () =>
        weiszPraterModulus(levenspiel.rate, levenspiel.radius, levenspiel.diffusivity, levenspiel.concentration),
      ),
      item('film, mass', '1', 0.02, () =>
        filmMassCriterion(1, levenspiel.rate, levenspiel.radius, 300 / hour, levenspiel.concentration),
      ),
      item('pellet', 'K', 0.1, () =>
        praterTemperatureRise(levenspiel.enthalpy, levenspiel.diffusivity, levenspiel.concentration, 1.6e3 / hour),
      ),
      item('film', 'K', 40, () =>
        filmTemperatureRise(
          { reactionEnthalpyJPerMol: levenspiel.enthalpy, rateMolPerM3S: levenspiel.rate, radiusM: levenspiel.radius },
          160e3 / hour,
        ),
      ),
    ],
  },
  {
    id: 'C52',
    title: 'Viscosity of a mixture',
    source: 'documentation of an open property library; Wilke 1950',
    provenance: 'read',
    published: '9.701614885866193e-06 Pa s',
    items: [
      item(
        'viscosity',
        'µPa s',
        9.701614885866193,
        () =>
          1e6 *
          mixtureViscosity([
            { moleFraction: 0.05, viscosityPaS: 1.34e-5, molarMassKgPerMol: 64.06e-3 },
            { moleFraction: 0.95, viscosityPaS: 9.5029e-6, molarMassKgPerMol: 46.07e-3 },
          ]),
      ),
    ],
  },
  {
    id: 'C66',
    title: 'Flammable limits of a mixture',
    source: 'Crowl and Louvar, Chemical Process Safety',
    provenance: 'read',
    published: '0.02751172136637642 and 0.12927551844869378',
    items: [
      item('lower limit', '1', 0.02751172136637642, () => mixed([0.012, 0.053, 0.031])),
      item('upper limit', '1', 0.12927551844869378, () => mixed([0.075, 0.15, 0.32])),
      item('another mixture', '1', 0.02514366342, () =>
        mixtureFlammableLimit([
          { amount: 0.8, limit: 0.011 },
          { amount: 2, limit: 0.05 },
          { amount: 0.5, limit: 0.027 },
        ]),
      ),
    ],
  },
  {
    id: 'C70',
    title: 'Activation energy falsified by pore diffusion',
    source: 'Thiele 1939; computed from true 100 kJ/mol',
    provenance: 'computed',
    published: '“about half” is a limit, not a diagnosis',
    items: [
      ...(
        [
          [0.2, 99.6841],
          [1, 93.4591],
          [3, 73.9569],
          [10, 56.3927],
          [50, 51.1438],
        ] as const
      ).map(([modulus, expected]) =>
        item(`apparent, φ(500 K) = ${String(modulus)}`, 'kJ/mol', expected, () => falsified(modulus), 1e-5),
      ),
      item('thermocouple 5 K too high', 'J/mol', 102030.810147, offset),
    ],
  },
]
