import exp from '@stdlib/math-base-special-exp'
import ln from '@stdlib/math-base-special-ln'
import { testCompensation } from '../comparison/compensation'
import {
  conversionByInternalStandard,
  conversionByNormalising,
  conversionByProducts,
  conversionBySingleReaction,
  moleFractionAt,
} from '../conversion/conversion-routes'
import { concentrationByInternalStandard, internalStandardFactor } from '../calibration/internal-standard'
import { lightOffTemperatures } from '../deactivation/light-off'
import { fitLinearModel } from '../kinetics/linear-model'
import { plugFlowIntegral, stirredTankIntegral } from '../kinetics/reactor-integral'
import { fitReactionOrders } from '../kinetics/reaction-orders'
import { monolayerUptake, surfaceSites } from '../sites/chemisorption'
import { dispersion, metalContent, ratePerSite } from '../sites/dispersion'
import { fitWeightedLine } from '../statistics/weighted-line'
import { GAS_CONSTANT_J_PER_MOL_K as R, STANDARD_ATMOSPHERE_PA } from '../units/constants'
import { molarFlowFromVolumeFlow } from '../units/molar-flow-from-volume-flow'
import { type Check, item, once } from './check'

// C32: A → 4 R, ε = 3
const atFeed = 3.2 / (0.082 * 390)
const expandedConversion = (c: number, c0: number) => (1 - c / c0) / (1 + (3 * c) / c0)
const differential = [
  [0.1, 0.084],
  [0.08, 0.07],
  [0.06, 0.055],
  [0.04, 0.038],
] as const
const meanConcentrations = differential.map(([inlet, outlet]) => (inlet + outlet) / 2)
const differentialRates = differential.map(
  ([inlet, outlet]) => (atFeed * 20 * (expandedConversion(outlet, atFeed) - expandedConversion(inlet, atFeed))) / 0.01,
)
const origin = once(() =>
  fitLinearModel(
    meanConcentrations.map((c) => [c]),
    differentialRates,
  ),
)
const integral = once(() =>
  fitWeightedLine(
    [0.02, 0.04, 0.08, 0.16].map((mass) => (mass * 0.1) / 2),
    [0.074, 0.06, 0.044, 0.029].map((c) => plugFlowIntegral(1, expandedConversion(c, 0.1), 3)),
    null,
  ),
)

const azomethane = once(() =>
  fitWeightedLine(
    [0, 1_000, 2_000, 3_000, 4_000],
    [8.2, 5.72, 3.99, 2.78, 1.94].map((p) => -ln(p)),
    null,
  ),
)
const decay = once(() =>
  fitWeightedLine(
    [0, 2, 4, 6],
    [0.75, 0.64, 0.52, 0.39].map((x) => ln(x / (1 - x))),
    null,
  ),
)

const of = (value: number) => ({ value, relativeStandardUncertainty: 0.01 })
const ratio = { value: 0.1 / 0.1012, relativeStandardUncertainty: 0.01 * Math.SQRT2 }
const x2 = once(() => conversionByInternalStandard(of(0.0476), of(0.05), of(0.1012), of(0.1)))
const x4 = once(() => conversionByProducts([{ ...of(0.0038), inFeed: 0, keyPerMole: 1 }], of(0.05), ratio))
const x5 = once(() => conversionByNormalising(of(0.0038), of(0.0476)))

const state = (temperatureK: number, pressurePa = STANDARD_ATMOSPHERE_PA) => ({ temperatureK, pressurePa })
const perCubicCentimetre = (temperatureK: number, pressurePa?: number) => () =>
  molarFlowFromVolumeFlow(1e-6 / 60, state(temperatureK, pressurePa)) * 1e6
const chainRate = (temperatureK: number, pressurePa?: number) =>
  (molarFlowFromVolumeFlow(50e-6 / 60, state(temperatureK, pressurePa)) * 0.05 * 0.0385) / 50e-6
const chainMetal = once(() => metalContent(0.01, 'Pt'))

const TORR = STANDARD_ATMOSPHERE_PA / 760
const rhodium = once(() =>
  monolayerUptake(
    [50, 75, 100, 150, 200, 250, 300, 350, 400].map((torr, i) => ({
      pressurePa: torr * TORR,
      uptakeMolPerKg: ([40, 50, 60, 65, 70, 75, 80, 85, 90][i] ?? NaN) / 1_000,
    })),
    100 * TORR,
  ),
)

const SHORT_R = 8.314462618
const compensation = once(() => {
  const temperatures = [430, 440, 450, 460, 470]
  const rows = [
    [0.1, -0.05, 0.02, -0.08, 0.06],
    [-0.12, 0.04, 0.05, 0.03, -0.1],
    [0.05, 0.1, -0.1, 0.02, -0.06],
    [-0.03, -0.08, 0.06, 0.1, 0.02],
    [0.08, 0.02, -0.04, -0.06, 0.11],
    [-0.1, -0.02, 0.03, 0.05, 0.09],
  ]
  const x = temperatures.map((t) => 1 / t)
  const lines = rows.map((errors) => {
    const line = fitWeightedLine(
      x,
      x.map((value, i) => (-80_000 / SHORT_R) * (value - 1 / 450) + (errors[i] ?? NaN)),
      null,
    )
    return { activationEnergyJPerMol: -SHORT_R * line.slope, lnPreExponential: line.intercept }
  })
  return testCompensation(lines, 5 / x.reduce((sum, value) => sum + value, 0))
})

const orders = once(() => {
  const co = [1, 2, 4, 1, 1, 2, 4, 0.5]
  const o2 = [10, 10, 10, 5, 20, 20, 5, 10]
  return fitReactionOrders(
    [7.92, 4.61, 2.59, 4.31, 14.8, 8.47, 1.4, 13.9].map((rate, i) => ({
      ratePositive: rate,
      pressuresPa: { CO: co[i] ?? NaN, O2: o2[i] ?? NaN },
    })),
    ['CO', 'O2'],
  )
})

const lightOff = once(() => {
  const temperatures = Array.from({ length: 1_001 }, (_unused, i) => 440 + 0.15 * i)
  return lightOffTemperatures(
    temperatures,
    temperatures.map((t) => 1 - exp(-0.05 * exp((-80_000 / R) * (1 / t - 1 / 450)))),
  ).temperatures
})

const factor = once(() =>
  internalStandardFactor({ area: 423, concentration: 0.0837 }, { area: 347, concentration: 0.0666 }),
)
const mixture = once(() =>
  concentrationByInternalStandard(553, { area: 582, concentration: (0.146 * 10) / 25 }, factor()),
)

/** Checks of reactors, conversions, flows, sites and time on stream. */
export const REACTOR_CHECKS: readonly Check[] = [
  {
    id: 'C32',
    title: 'Plug flow with expansion, three ways',
    source: 'Levenspiel, Chemical Reaction Engineering, 3rd edition, examples 18.2 to 18.6',
    provenance: 'read',
    published:
      '96; 95 to 96; 140 kg; 230 kg. The differential set through the origin gives 97.8, with an intercept 109.4',
    items: [
      item('rate constant, differential, through the origin', 'L/(h kg)', 97.78528788, () => origin().coefficients[0]),
      item('its standard error', 'L/(h kg)', 2.306540217, () => origin().standardErrors[0]),
      item('rate constant, integral', 'L/(h kg)', 96.80362945, () => integral().slope),
      item('its standard error', 'L/(h kg)', 0.4311403969, () => integral().scaled?.slope),
      item('catalyst for 35 %, plug flow', 'kg', 140.2357634, () => (2_000 / 9.6) * plugFlowIntegral(1, 0.35, 3)),
      item('catalyst for 35 %, stirred', 'kg', 229.9679487, () => (2_000 / 9.6) * stirredTankIntegral(1, 0.35, 3)),
    ],
  },
  {
    id: 'C34',
    title: 'Plug-flow integrals',
    source: 'Levenspiel, Chemical Reaction Engineering, 3rd edition, examples 5.4 and 5.5',
    provenance: 'read',
    published: '33.2 s; 0.148 m³',
    items: [
      item('half order, ε = 1, X = 0.8', '1', 1.327295218, () => plugFlowIntegral(0.5, 0.8, 1), 1e-9),
      item('space time', 's', 33.18238045, () => (Math.sqrt(0.0625) / 1e-2) * plugFlowIntegral(0.5, 0.8, 1), 1e-9),
      item(
        'volume for phosphine',
        'm³',
        0.1477454242,
        () => (40 / (10 * (460e3 / (8.314 * 922)))) * plugFlowIntegral(1, 0.8, 0.75),
        1e-9,
      ),
    ],
  },
  {
    id: 'C36',
    title: 'First order in a batch, azomethane',
    source: 'Atkins, Physical Chemistry',
    provenance: 'read',
    published: '3.6e-4 s⁻¹; R² 0.999996',
    items: [
      item('rate constant', '1/s', 3.60441024e-4, () => azomethane().slope),
      item('its standard error', '1/s', 1.262356908e-7, () => azomethane().scaled?.slope),
      item('half-life', 's', 1923.052967, () => ln(2) / azomethane().slope),
    ],
  },
  {
    id: 'C37',
    title: 'Plug-flow integrals at X = 0.3',
    source: 'computed with 50 digits',
    provenance: 'computed',
    published: '',
    items: (
      [
        [0, 0, 0.3],
        [0.5, 0, 0.326679946932],
        [0.5, 0.5, 0.338990392765],
        [0.5, -0.5, 0.313726487994],
        [1, 0, 0.356674943939],
        [1, 0.5, 0.385012415908],
        [1, -0.5, 0.328337471969],
        [2, 0, 0.428571428571],
        [2, 0.5, 0.504273298378],
        [2, -0.5, 0.360480329112],
        [1.375, 0, 0.381628147603],
        [1.375, 0.5, 0.425004311532],
        [1.375, -0.5, 0.33991539463],
      ] as const
    ).map(([order, expansion, expected]) =>
      item(
        `order ${String(order)}, ε = ${String(expansion)}`,
        '1',
        expected,
        () => plugFlowIntegral(order, 0.3, expansion),
        1e-9,
      ),
    ),
  },
  {
    id: 'C38',
    title: 'Deactivation in strong pore diffusion',
    source: 'Levenspiel, Chemical Reaction Engineering, 3rd edition, example 21.1',
    provenance: 'read',
    published: 'k_d 0.51 h⁻¹, k 0.27 m³/(kg s); the observed decay is half the true one',
    items: [
      item('slope', '1/h', -0.2566547479, () => decay().slope),
      item('its standard error', '1/h', 0.002144630876, () => decay().scaled?.slope),
      item('true decay constant', '1/h', 0.5133094957, () => -2 * decay().slope),
      item('rate constant', 'm³/(kg s)', 0.268937586, () => {
        const root = (exp(decay().intercept) * 4e-4) / 4_000
        return (root * root * 1_500) / 5e-10
      }),
    ],
  },
  {
    id: 'C53',
    title: 'Internal standard',
    source: 'Harris, Quantitative Chemical Analysis',
    provenance: 'read',
    published: '0.970; 0.143 mol/L. A copied page has a decimal slip in the standard',
    items: [
      item('relative response', '1', 0.9699730408, factor),
      item('in the mixture', 'mol/L', 0.05720781097, mixture),
      item('unknown', 'mol/L', 0.1430195274, () => (mixture() * 25) / 10),
    ],
  },
  {
    id: 'C55',
    title: 'Routes to a conversion',
    source: 'invented composition, computed by hand',
    provenance: 'computed',
    published: '',
    items: [
      item('by the internal standard', '1', 0.059288537549, () => x2().value),
      item('its standard uncertainty', '1', 0.018814229249, () => x2().standardUncertainty),
      item('by the products', '1', 0.075098814229, () => x4().value),
      item('its standard uncertainty', '1', 0.0015019762846, () => x4().standardUncertainty),
      item('normalised', '1', 0.073929961089, () => x5().value),
      item('its standard uncertainty', '1', 0.0009682317263, () => x5().standardUncertainty),
      item('carbon balance', '1', 1.0158102767, () => 1 - x2().value + x4().value),
    ],
  },
  {
    id: 'C56',
    title: 'Change of mole number, N₂ + 3 H₂',
    source: 'computed by hand',
    provenance: 'computed',
    published: '1 − y/y₀ would give 0.0526 at X = 0.1',
    items: [
      item('nitrogen at X = 0.1', '1', 0.23684210526, () => moleFractionAt(0.25, -1, 0.25, -2, 0.1)),
      item('conversion from it', '1', 0.1, () => conversionBySingleReaction(0.23684210526315788, 0.25, -2)),
      item('ammonia at X = 0.2', '1', 0.11111111111, () => moleFractionAt(0, 2, 0.25, -2, 0.2)),
    ],
  },
  {
    id: 'C57',
    title: 'From a flow to a turnover frequency',
    source: 'invented run, computed by hand',
    provenance: 'computed',
    published: '',
    items: [
      item('rate, 0 °C and 1 atm', 'µmol/(g s)', 1.4313989885, () => chainRate(273.15) * 1e3),
      item('rate, 0 °C and 1 bar', 'µmol/(g s)', 1.4126809657, () => chainRate(273.15, 100_000) * 1e3),
      item('rate, 25 °C and 1 atm', 'µmol/(g s)', 1.3113755952, () => chainRate(298.15) * 1e3),
      item('site-time yield', '1/s', 0.027924304026, () => ratePerSite(chainRate(273.15), 0, chainMetal(), 0).ratePerS),
      item(
        'turnover frequency',
        '1/s',
        0.062054008947,
        () => ratePerSite(chainRate(273.15), 0, 0.45 * chainMetal(), 0).ratePerS,
      ),
      item('relative uncertainty', '1', 0.1045227248, () => {
        const rate = Math.sqrt(0.01 * 0.01 + 0.02 * 0.02 + 0.005 * 0.005)
        return ratePerSite(1, rate, 1, Math.sqrt(0.1 * 0.1 + 0.02 * 0.02)).relativeStandardUncertainty
      }),
    ],
  },
  {
    id: 'C58',
    title: 'Reference states of a gas flow',
    source: 'R = N_A k_B exact; NIST: 1 µmol/s is 1.3448 sccm',
    provenance: 'read',
    published: '1.3448 cm³/min per µmol/s at 0 °C and 1 atm',
    items: [
      item('0 °C, 101.325 kPa', 'µmol/s per cm³/min', 0.74358389, perCubicCentimetre(273.15)),
      item('0 °C, 100 kPa', 'µmol/s per cm³/min', 0.733860242, perCubicCentimetre(273.15, 100_000)),
      item('20 °C, 101.325 kPa', 'µmol/s per cm³/min', 0.692853282, perCubicCentimetre(293.15)),
      item('25 °C, 101.325 kPa', 'µmol/s per cm³/min', 0.681234075, perCubicCentimetre(298.15)),
      item('25 °C, 100 kPa', 'µmol/s per cm³/min', 0.672325759, perCubicCentimetre(298.15, 100_000)),
      item('15 °C, 101.325 kPa', 'µmol/s per cm³/min', 0.704875723, perCubicCentimetre(288.15)),
    ],
  },
  {
    id: 'C59',
    title: 'Chemisorption, extrapolated',
    source: 'problem data: hydrogen on 1.5 wt% Rh',
    provenance: 'read',
    published: 'the posted dispersion of 0.41 reads the knee with one atom a molecule',
    items: [
      item('monolayer', 'µmol/g', 50, () => rhodium().uptakeMolPerKg * 1e3),
      item(
        'dispersion',
        '1',
        0.6860366667,
        () => dispersion(surfaceSites(rhodium().uptakeMolPerKg, 2), metalContent(0.015, 'Rh')),
        1e-7,
      ),
    ],
  },
  {
    id: 'C61',
    title: 'Compensation as an artefact of errors',
    source: 'six replicates of one invented catalyst; R 4.2.2',
    provenance: 'computed',
    published: 'ln A against Ea has r = 0.99993 and means nothing',
    items: [
      item('correlation of ln A and Ea', '1', 0.99993300752, () => compensation().naiveCorrelation),
      item('isokinetic temperature it suggests', 'K', 448.73839698, () => compensation().naiveIsokineticTemperatureK),
      item('correlation at the harmonic mean temperature', '1', 0.15506882782, () => compensation().correlation),
      item('its p', '1', 0.76926117725, () => compensation().correlationPValue),
      item('slope', 'mol/J', 4.8700376839e-7, () => compensation().slope, 2e-8),
      item('lower end', 'mol/J', -3.8200620799e-6, () => compensation().slopeInterval?.[0]),
    ],
  },
  {
    id: 'C62',
    title: 'Orders by logarithms',
    source: 'invented rates; R 4.2.2 lm',
    provenance: 'computed',
    published: '',
    items: [
      item('order in CO', '1', -0.80668257606, () => orders().orders[0]?.order),
      item('its standard error', '1', 0.0036201977879, () => orders().orders[0]?.standardError),
      item('order in O₂', '1', 0.89252249194, () => orders().orders[1]?.order),
      item('upper end', '1', 0.9055799614, () => orders().orders[1]?.interval?.[1]),
      item('ln k', '1', 0.020576311756, () => orders().lnRateConstant, 1e-7),
    ],
  },
  {
    id: 'C69',
    title: 'Light-off of a first-order reaction',
    source: 'closed form: Ea 80 kJ/mol, kτ(450 K) = 0.05',
    provenance: 'computed',
    published: '',
    items: [466.253534, 513.092742, 548.187977].map((expected, i) =>
      item(`temperature of ${['10', '50', '90'][i] ?? ''} %`, 'K', expected, () => lightOff()[i]?.temperatureK, 5e-7),
    ),
  },
]
