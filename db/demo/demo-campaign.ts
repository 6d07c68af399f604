import { type NewRig } from '../../lib/domain/rig'

/**
 * The invented demo campaign of the invented Calder Quay Laboratory. Records only: the files beside it go through the same intake as
 * any others, and every number on the screen is computed from them.
 */

export const DEMO_PASSWORD = 'straw bronze violet blue'

export const demoPeople = [
  { key: 'technician', email: 'technician@calderquay.example', displayName: 'Tove Brandt', role: 'technician' },
  { key: 'researcher', email: 'researcher@calderquay.example', displayName: 'Imre Halasz', role: 'researcher' },
  { key: 'lead', email: 'lead@calderquay.example', displayName: 'Noor Verhagen', role: 'lead' },
  { key: 'guest', email: 'guest@calderquay.example', displayName: 'Paulo Reis', role: 'guest' },
  { key: 'admin', email: 'admin@calderquay.example', displayName: 'Ada Lindqvist', role: 'admin' },
] as const

export const demoReaction = {
  code: 'CO2-METH',
  name: 'Carbon dioxide methanation',
  keyReactant: 'CO2',
  steps: [
    { CO2: -1, H2: -4, CH4: 1, H2O: 2 },
    { CO2: -1, H2: -1, CO: 1, H2O: 1 },
  ],
  notes: 'Main step to methane; carbon monoxide forms beside it. Water is condensed before the analyser.',
}

const rig = (code: string, name: string, tubes: [string, number][]) =>
  ({
    code,
    name,
    reactorKind: 'plug-flow',
    // the logs carry no zone: their clocks run on coordinated universal time
    timeZone: 'UTC',
    channels: tubes.map(([channel, tubeInnerDiameterM]) => ({ code: channel, tubeInnerDiameterM })),
    maximumPressurePa: 1e6,
    maximumTemperatureK: 873.15,
    flowReferenceTemperatureK: 273.15,
    flowReferencePressurePa: 101325,
  }) satisfies Partial<NewRig>

export const demoRigs = [
  rig('Rig B', 'Fixed bed, one tube', [['1', 0.0046]]),
  rig('Rig D', 'Fixed bed, narrow and wide tube', [
    ['1', 0.0046],
    ['2', 0.016],
  ]),
]

const pellet = {
  particleDensityKgPerM3: 1250,
  poreFraction: 0.5,
  tortuosity: 3,
  meanPoreRadiusM: 6e-9,
  bedVoidFraction: 0.4,
}

export const demoSamples = [
  {
    code: 'CQ-101',
    name: '5 wt% Ni on alumina, reference lot',
    activeMetal: 'Ni',
    metalMassFraction: 0.05,
    siteDensityMolPerKg: 0.062,
    ...pellet,
  },
  {
    code: 'CQ-102',
    name: '5 wt% Ni, 1 wt% La on alumina',
    activeMetal: 'Ni',
    metalMassFraction: 0.05,
    siteDensityMolPerKg: 0.074,
    ...pellet,
  },
  {
    code: 'CQ-103',
    name: '10 wt% Ni on ceria',
    activeMetal: 'Ni',
    metalMassFraction: 0.1,
    siteDensityMolPerKg: 0.058,
    ...pellet,
  },
  {
    code: 'CQ-104',
    name: '1 wt% Ru on titania',
    activeMetal: 'Ru',
    metalMassFraction: 0.01,
    siteDensityMolPerKg: 0.031,
    ...pellet,
  },
  {
    code: 'CQ-105',
    name: '5 wt% Co on alumina',
    activeMetal: 'Co',
    metalMassFraction: 0.05,
    siteDensityMolPerKg: 0.041,
    ...pellet,
  },
  {
    code: 'CQ-106',
    name: '5 wt% Ni on silica, 2 mm pellets',
    activeMetal: 'Ni',
    metalMassFraction: 0.05,
    siteDensityMolPerKg: 0.055,
    ...pellet,
  },
  {
    code: 'CQ-107',
    name: '5 wt% Ni on silica, lot 2',
    activeMetal: 'Ni',
    metalMassFraction: 0.05,
    siteDensityMolPerKg: 0.06,
    ...pellet,
  },
  {
    code: 'SiC',
    name: 'Silicon carbide, no catalyst',
    activeMetal: null,
    metalMassFraction: null,
    siteDensityMolPerKg: null,
    ...pellet,
  },
] as const

export interface DemoRun {
  readonly code: string
  readonly sampleCode: string
  readonly rigCode: string
  readonly channel: string
  readonly kind: 'catalyst' | 'blank'
  readonly startedAt: string
  readonly catalystMassKg: number
  readonly diluentMassKg: number
  readonly particleMinimumM: number
  readonly particleMaximumM: number
  readonly tubeInnerDiameterM: number
  readonly bedLengthM: number
  readonly logFile: string
  readonly analyserFile: string
  readonly decision: { readonly decision: 'counts' | 'set-aside' | 'repeat'; readonly reason: string } | null
  readonly isHandedIn: boolean
}

const run = (
  number: number,
  sampleCode: string,
  rigCode: string,
  day: number,
  massMg: number,
  files: [string, string],
  decision: DemoRun['decision'],
  more: Partial<DemoRun> = {},
): DemoRun => {
  const code = `R-${String(number).padStart(4, '0')}`
  return {
    code,
    sampleCode,
    rigCode,
    channel: '1',
    kind: 'catalyst',
    startedAt: `2026-03-${String(day).padStart(2, '0')}T07:30:00Z`,
    catalystMassKg: massMg * 1e-6,
    diluentMassKg: 450e-6,
    particleMinimumM: 125e-6,
    particleMaximumM: 180e-6,
    tubeInnerDiameterM: 0.0046,
    bedLengthM: 0.018,
    logFile: `${code}-rig.${files[0]}`,
    analyserFile: `${code}-analysis.${files[1]}`,
    decision,
    isHandedIn: true,
    ...more,
  }
}

const counts = (reason: string): DemoRun['decision'] => ({ decision: 'counts', reason })

export const demoRuns: readonly DemoRun[] = [
  run(1, 'CQ-101', 'Rig B', 2, 80.3, ['csv', 'csv'], counts('Balance closed, returned hold within limits')),
  run(
    2,
    'CQ-101',
    'Rig D',
    3,
    78.9,
    ['txt', 'xlsx'],
    counts('Second loading of the reference lot agrees with the first'),
  ),
  run(3, 'CQ-102', 'Rig B', 4, 61.2, ['csv', 'csv'], counts('Balance closed, returned hold within limits')),
  run(4, 'CQ-103', 'Rig D', 5, 49.8, ['txt', 'xlsx'], counts('Balance closed, returned hold within limits')),
  run(5, 'CQ-104', 'Rig D', 6, 40.6, ['csv', 'csv'], counts('Balance closed, returned hold within limits')),
  run(6, 'CQ-105', 'Rig B', 7, 120.4, ['csv', 'csv'], counts('Balance closed, returned hold within limits')),
  run(
    7,
    'CQ-106',
    'Rig D',
    8,
    60.1,
    ['csv', 'csv'],
    { decision: 'repeat', reason: 'Pellets: the line bends; crush to 125 to 180 µm and repeat' },
    {
      channel: '2',
      particleMinimumM: 1.8e-3,
      particleMaximumM: 2.2e-3,
      tubeInnerDiameterM: 0.016,
      bedLengthM: 0.012,
    },
  ),
  run(8, 'CQ-107', 'Rig B', 9, 75.5, ['csv', 'xlsx'], null),
  run(9, 'CQ-102', 'Rig B', 10, 62, ['csv', 'csv'], null),
  // the blank: 450 mg of silicon carbide stand where the catalyst would, so that a rate per gram can be stated
  run(10, 'SiC', 'Rig B', 14, 450, ['csv', 'csv'], counts('Empty of catalyst: what the tube and the diluent do'), {
    kind: 'blank',
    diluentMassKg: 0,
  }),
]

/** 7.2 + 36 + 4.8 + 12 = 60 mL/min at 0 °C and 101.325 kPa. */
export const demoFeed = [
  { species: 'CO2', flowMlPerMin: 7.2, isInternalStandard: false },
  { species: 'H2', flowMlPerMin: 36, isInternalStandard: false },
  { species: 'Ar', flowMlPerMin: 4.8, isInternalStandard: true },
  { species: 'N2', flowMlPerMin: 12, isInternalStandard: false },
] as const

export const demoMethodChange = {
  rateLaw: 'integral-plug-flow',
  rateOrders: [
    { CO2: 0.15, H2: 0.4 },
    { CO2: 0.5, H2: 0 },
  ],
  internalStandard: 'Ar',
  condensedSpecies: ['H2O'],
} as const
