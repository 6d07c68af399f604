import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { lnEquilibriumConstant, reactionEnthalpy } from '../equilibrium/approach-to-equilibrium'
import { standardState } from '../equilibrium/thermochemistry'
import { adiabaticRise } from '../safety/adiabatic-rise'
import { GAS_CONSTANT_J_PER_MOL_K as R } from '../units/constants'
import { type Check, item } from './check'

const SHIFT = { CO: -1, H2O: -1, CO2: 1, H2: 1 }
const shiftConstant = (temperatureK: number) => exp(lnEquilibriumConstant(SHIFT, temperatureK))

// The book computes with R = 8.314: energies stretched by the ratio give its numbers from the exact constant.
const stretch = R / 8.314
const entered = {
  A: { enthalpyJPerMol: 0, entropyJPerMolK: 0, heatCapacityJPerMolK: 0 },
  Q: {
    enthalpyJPerMol: -75_300 * stretch,
    entropyJPerMolK: ((-75_300 + 14_130) / 298) * stretch,
    heatCapacityJPerMolK: 0,
  },
}
const isomer = (temperatureK: number) => exp(lnEquilibriumConstant({ A: -1, Q: 1 }, temperatureK, entered))
const isomerConversion = (temperatureK: number) => isomer(temperatureK) / (1 + isomer(temperatureK))

const OXIDATION = { CO: -1, O2: -0.5, CO2: 1 }
const feedHeat = () =>
  0.01 * standardState('CO', 500).heatCapacityJPerMolK +
  0.2079 * standardState('O2', 500).heatCapacityJPerMolK +
  0.7821 * standardState('N2', 500).heatCapacityJPerMolK

const REACTIONS = [
  ['CO + ½ O₂ = CO₂', { CO: -1, O2: -0.5, CO2: 1 }, 700, 16.554],
  ['CO + 3 H₂ = CH₄ + H₂O', { CO: -1, H2: -3, CH4: 1, H2O: 1 }, 600, 6.284],
  ['CO₂ + 4 H₂ = CH₄ + 2 H₂O', { CO2: -1, H2: -4, CH4: 1, H2O: 2 }, 600, 4.833],
  ['N₂ + 3 H₂ = 2 NH₃', { N2: -1, H2: -3, NH3: 2 }, 700, -4.057],
  ['CO + 2 H₂ = CH₃OH', { CO: -1, H2: -2, CH3OH: 1 }, 500, -2.237],
  ['C₃H₈ = C₃H₆ + H₂', { C3H8: -1, C3H6: 1, H2: 1 }, 900, -0.27],
  ['NO + ½ O₂ = NO₂', { NO: -1, O2: -0.5, NO2: 1 }, 600, 1.096],
  ['HCOOH = CO₂ + H₂', { HCOOH: -1, CO2: 1, H2: 1 }, 500, 6.654],
] as const

/** Checks of equilibrium and of the heat of reaction. */
export const EQUILIBRIUM_CHECKS: readonly Check[] = [
  {
    id: 'C39',
    title: 'Water-gas shift, equilibrium constant',
    source: 'NASA TM-4513, 1993; JANAF tables for comparison; worked example in an open course text',
    provenance: 'read',
    published: 'about 58 at 550 K and 1.44 at 1000 K',
    items: [
      ...(
        [
          [500, 137.108834],
          [550, 57.676855],
          [600, 28.272327],
          [700, 9.415216],
          [800, 4.219766],
          [900, 2.300208],
          [1_000, 1.435358],
        ] as const
      ).map(([t, expected]) => item(`at ${String(t)} K`, '1', expected, () => shiftConstant(t), 5e-7)),
      ...(
        [
          [500, 137.7209],
          [700, 9.4842],
          [1_000, 1.4421],
        ] as const
      ).map(([t, expected]) => item(`at ${String(t)} K, against JANAF`, '1', expected, () => shiftConstant(t), 0.01)),
      item('reaction enthalpy at 298.15 K', 'kJ/mol', -41.15, () => reactionEnthalpy(SHIFT, 298.15) / 1e3, 2e-4),
      ...REACTIONS.map(([name, stoichiometry, t, expected]) =>
        // the table states three decimals
        item(
          `log₁₀ K of ${name} at ${String(t)} K`,
          '1',
          expected,
          () => lnEquilibriumConstant(stoichiometry, t) / ln(10),
          0.00055 / Math.abs(expected),
        ),
      ),
    ],
  },
  {
    id: 'C42',
    title: "Van 't Hoff with a constant enthalpy",
    source: 'Levenspiel, Chemical Reaction Engineering, 3rd edition, example 9.2',
    provenance: 'read',
    published: 'X 0.89 at 65 °C; a companion notebook has a slip in R',
    items: [
      item('K at 298 K', '1', 299.814583, () => isomer(298)),
      item('equilibrium conversion at 278 K', '1', 0.9996255532, () => isomerConversion(278)),
      item('at 338 K', '1', 0.8915236601, () => isomerConversion(338)),
      item('at 368 K', '1', 0.4804978961, () => isomerConversion(368)),
    ],
  },
  {
    id: 'C67',
    title: 'Adiabatic rise, 1 % CO in air at 500 K',
    source: 'polynomials of NASA TM-4513',
    provenance: 'computed',
    published: '',
    items: [
      item('reaction enthalpy at 500 K', 'kJ/mol', -283.657, () => reactionEnthalpy(OXIDATION, 500) / 1e3, 2e-6),
      item('heat capacity of the feed', 'J/(mol K)', 29.9087, feedHeat, 2e-6),
      item('rise', 'K', 94.84076, () => adiabaticRise(0.01, reactionEnthalpy(OXIDATION, 500), feedHeat()), 1e-7),
    ],
  },
]
