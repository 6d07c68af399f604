import { describe, expect, test } from 'vitest'
import { readRunForm } from '@/lib/domain/read-run-form'
import { openRunForm, type RunFormChoices, type RunFormValues } from '@/lib/domain/run-form'

const choices: RunFormChoices = {
  campaigns: [
    {
      id: 'c1',
      code: 'CQ-METH',
      name: 'Low-temperature CO₂ methanation',
      reaction: {
        name: 'methanation',
        keyReactant: 'CO2',
        steps: [
          { CO2: -1, H2: -4, CH4: 1, H2O: 2 },
          { CO2: -1, H2: -1, CO: 1, H2O: 1 },
        ],
      },
      reactionEnthalpyJPerMol: -164_900,
    },
  ],
  samples: [
    {
      id: 's7',
      code: 'CQ-107',
      name: 'Ni on silica',
      activeMetal: 'Ni',
      campaignIds: ['c1'],
      lots: [{ id: 'l2', code: '2' }],
    },
  ],
  rigs: [
    {
      id: 'r2',
      code: 'Rig B',
      name: 'Rig B',
      reactorKind: 'plug-flow',
      timeZone: 'Europe/London',
      channels: [{ code: '1', tubeInnerDiameterM: 0.0047 }],
      barometerPa: 101_325,
      maximumPressurePa: 1e6,
      maximumTemperatureK: 873.15,
      lineLagS: 0,
      flowReferenceTemperatureK: null,
      flowReferencePressurePa: null,
      notes: '',
      version: 1,
    },
  ],
  bedsIn: [],
  lastRuns: [],
}

/** The form as drawn, filled in by hand. */
function drawn(change: Partial<RunFormValues> = {}): RunFormValues {
  return {
    ...openRunForm(choices, 'r2', 'c1', 'a-key-of-one-try', new Date('2026-03-09T07:30:00Z')),
    sampleId: 's7',
    catalyst: '75.5 mg',
    diluent: '450 mg SiC',
    sieve: '125 to 180 µm',
    bedLength: '18 mm',
    flowReference: '273.15;101325',
    feed: [
      { species: 'CO2', flow: '7,2 mL/min', isStandard: false },
      { species: 'H2', flow: '36 mL/min', isStandard: false },
      { species: 'Ar', flow: '4.8 mL/min', isStandard: true },
      { species: 'N2', flow: '12 mL/min', isStandard: false },
    ],
    pressure: '1.30 bar abs',
    ...change,
  }
}

const issuesOf = (change: Partial<RunFormValues>) =>
  readRunForm(drawn(change), choices).issues.map(({ field }) => field)

describe('"Log a run" as typed', () => {
  test('is read in SI, with decimal comma or point', () => {
    const { run, issues } = readRunForm(drawn(), choices)
    expect(issues).toEqual([])
    if (run === null || !('catalystMassKg' in run.loading)) throw new Error('not read')
    expect(run.loading.catalystMassKg).toBeCloseTo(75.5e-6, 15)
    expect(run.loading.diluentMassKg).toBeCloseTo(450e-6, 15)
    expect(run.loading.diluentMaterial).toBe('SiC')
    expect(run.loading.particleMinimumM).toBeCloseTo(125e-6, 15)
    expect(run.loading.particleMaximumM).toBeCloseTo(180e-6, 15)
    expect(run.pressurePa).toBeCloseTo(130_000, 6)
    expect(run.startedAt).toBe('2026-03-09T07:30:00+00:00')
    // ideal gas at 0 °C and 101.325 kPa: 22 413.969 54 cm³ in a mole (CODATA 2018); 7.2 mL/min is 5.3538 µmol/s
    const flow = run.feed[0]?.flowMolPerS ?? 0
    expect(Math.abs(flow / (7.2 / 60 / 22_413.969_54) - 1)).toBeLessThan(1e-8)
  })

  test('says back shares, totals and the bed, as drawn', () => {
    const reading = readRunForm(drawn(), choices)
    expect(reading.moleFractions.map((share) => share?.toFixed(3))).toEqual(['0.120', '0.600', '0.080', '0.200'])
    expect(reading.feedSentence).toBe(
      '60.0 mL min⁻¹ at 0 °C and 101.325 kPa, 44.6 µmol s⁻¹ in all; 47\u202f700 mL g⁻¹ h⁻¹',
    )
    expect(reading.bedSentence).toContain('118 particles long and 31 wide')
  })

  test('shows the cautions of a hydrogen feed over nickel that can make carbon monoxide', () => {
    const { cautions } = readRunForm(drawn(), choices)
    const codes = cautions.map(({ code }) => code).join(' ')
    expect(codes).toMatch(/flammable/)
    expect(codes).toMatch(/carbonyl/)
    expect(codes).toContain('adiabatic-rise')
    expect(cautions.at(-1)?.code).toBe('standing-sentence')
  })

  test.each([
    { name: 'no sample', change: { sampleId: '' }, field: 'sampleId' },
    { name: 'no unit', change: { catalyst: '75' }, field: 'catalyst' },
    { name: 'no mass of catalyst', change: { catalyst: '' }, field: 'catalyst' },
    { name: 'flows whose state nobody stated', change: { flowReference: '' }, field: 'flowReference' },
    { name: 'a pressure that is neither gauge nor absolute', change: { pressure: '1,3 bar' }, field: 'pressureKind' },
    {
      name: 'a gauge pressure without the air around it',
      change: { pressure: '0.3 barg', barometer: '' },
      field: 'barometer',
    },
    { name: 'no time', change: { start: '' }, field: 'start' },
  ])('asks, and never guesses: $name', ({ change, field }) => {
    expect(issuesOf(change)).toContain(field)
    expect(readRunForm(drawn(change), choices).run).toBeNull()
  })

  test('a gauge pressure is kept as typed, with its barometer, and said back as absolute', () => {
    const { run, said } = readRunForm(drawn({ pressure: '0.30 barg', barometer: '1003 mbar' }), choices)
    expect(run?.pressureKind).toBe('gauge')
    expect(run?.pressurePa).toBeCloseTo(30_000, 6)
    expect(run?.barometerPa).toBeCloseTo(100_300, 6)
    expect(said['pressure']).toContain('1.303 bar absolute')
  })

  test('a blank needs no catalyst', () => {
    expect(issuesOf({ kind: 'blank', catalyst: '' })).toEqual([])
  })
})

describe('a flow with a bracket behind it', () => {
  const [gas, ...others] = drawn().feed
  if (gas === undefined) throw new Error('the drawn form has a feed')
  const withFlow = (flow: string, change: Partial<RunFormValues> = {}) =>
    readRunForm(drawn({ feed: [{ ...gas, flow }, ...others], ...change }), choices)

  // p V / (R T) of an ideal gas for 7.2 mL/min, R of CODATA 2018; the form counts flows at 0 °C and 101.325 kPa
  test.each([
    ['7.2 mL/min', 273.15, 101_325, '5.3538 µmol/s'],
    ['7.2 ml/min (0 °C, 1013 mbar)', 273.15, 101_300, '5.3525 µmol/s'],
    ['7.2 ml/min (20 °C)', 293.15, 101_325, '20 °C and 101.325 kPa (no pressure stated, so standard pressure)'],
    ['7.2 ml/min (25 °C)', 298.15, 101_325, '25 °C and 101.325 kPa (no pressure stated, so standard pressure)'],
    ['7.2 mL/min (25 °C, 1 bar)', 298.15, 100_000, '25 °C and 100 kPa'],
    ['7.2 mL/min (STP)', 273.15, 101_325, '“STP” is used for several states'],
    ['7.2 mL/min (NTP)', 273.15, 101_325, '“NTP” is used for several states'],
  ])('%s is counted at %d K and %d Pa, said back', (flow, kelvin, pascal, words) => {
    const { run, said } = withFlow(flow)
    const expected = (pascal * (7.2e-6 / 60)) / (8.314462618 * kelvin)
    expect((run?.feed[0]?.flowMolPerS ?? 0) / expected).toBeCloseTo(1, 8)
    expect(run?.feed[0]?.referenceTemperatureK).toBeCloseTo(kelvin, 9)
    expect(run?.feed[0]?.referencePressurePa).toBeCloseTo(pascal, 6)
    expect(said['feed.0.flow']).toContain(words)
  })

  test.each(['7.2 mL/min', '7.2 mL/min (STP)', '7.2 mL/min (NTP)', '7.2 sccm'])(
    '%s is asked about where no state was chosen',
    (flow) => {
      const { run, issues } = withFlow(flow, { flowReference: '' })
      expect(run).toBeNull()
      expect(issues.map(({ field }) => field)).toEqual(['flowReference'])
    },
  )

  test.each([
    ['7.2 mL/min (1 bar)', 'states a pressure and no temperature'],
    ['7.2 mL/min (dry)', '“(dry)” is not a state that gas is counted at'],
    ['7.2 mL/min (20 °C, 1 barg)', '“(20 °C, 1 barg)” is not a state that gas is counted at'],
  ])('%s is a fault', (flow, words) => {
    const { run, issues } = withFlow(flow)
    expect(run).toBeNull()
    expect(issues.map(({ field }) => field)).toEqual(['feed.0.flow'])
    expect(issues[0]?.message).toContain(words)
  })
})

describe('what is unusual or half known', () => {
  const codesOf = (change: Partial<RunFormValues>) =>
    readRunForm(drawn(change), choices).cautions.map(({ code }) => code)
  // the rig of these tests is entered for 10 bar and 600 °C
  test.each([
    ['over-pressure', { pressure: '300 bar abs' }],
    ['over-pressure', { pressure: '300 bar', pressureKind: '' as const }],
    ['over-pressure', { pressure: '300 barg', barometer: '' }],
    ['over-temperature', { highestTemperature: '601 °C' }],
    ['large-catalyst-mass', { catalyst: '80 g' }],
    ['uncertain-weighing', { weighing: '20 mg' }],
    ['wide-tube', { tube: '46 cm' }],
  ])('is pointed out as %s', (code, change) => {
    expect(codesOf({})).not.toContain(code)
    expect(codesOf(change)).toContain(code)
  })

  test('a mass, a weighing and a tube that are unusual do not stand in the way', () => {
    expect(issuesOf({ catalyst: '80 g', weighing: '20 g', tube: '46 cm' })).toEqual([])
  })

  test('a share of an unknown total is not shown', () => {
    const feed = drawn().feed.map((row, position) => (position === 2 ? { ...row, flow: '4.8 furlongs' } : row))
    const reading = readRunForm(drawn({ feed }), choices)
    expect(reading.moleFractions).toEqual([null, null, null, null])
    expect(reading.feedSentence).toBe('')
    expect(reading.cautions.map(({ tag }) => tag).join(' ')).not.toContain('%')
    const empty = readRunForm(drawn({ feed: [...drawn().feed, { species: '', flow: '', isStandard: false }] }), choices)
    expect(empty.moleFractions.map((share) => share?.toFixed(2) ?? null)).toEqual([
      '0.12',
      '0.60',
      '0.08',
      '0.20',
      null,
    ])
  })

  test('a gas by its name is its formula, said back, and the same gas', () => {
    const named = drawn().feed.map((row) => (row.species === 'H2' ? { ...row, species: 'Hydrogen' } : row))
    const { run, said } = readRunForm(drawn({ feed: named }), choices)
    expect(run?.feed.map(({ species }) => species)).toEqual(['CO2', 'H2', 'Ar', 'N2'])
    expect(said['feed.1.species']).toBe('Hydrogen read as H₂')
    const twice = [...drawn().feed, { species: 'hydrogen', flow: '1 mL/min', isStandard: false }]
    expect(issuesOf({ feed: twice })).toEqual(['feed.4.species'])
  })

  test('a diluent is understood with its material first or last', () => {
    for (const diluent of ['450 mg SiC', 'SiC 450 mg', 'SiC, 450 mg', 'SiC: 0.45 g']) {
      const { run } = readRunForm(drawn({ diluent }), choices)
      if (run === null || !('catalystMassKg' in run.loading)) throw new Error(`not read: ${diluent}`)
      expect(run.loading.diluentMassKg).toBeCloseTo(450e-6, 15)
      expect(run.loading.diluentMaterial).toBe('SiC')
    }
    const { run } = readRunForm(drawn({ diluent: 'Al2O3 450 mg', tube: '1/4 in' }), choices)
    expect(run?.loading).toMatchObject({ diluentMaterial: 'Al2O3', tubeInnerDiameterM: 0.006_35 })
  })

  test('figures out of range are refused in words of their own, all at once', () => {
    const { issues } = readRunForm(drawn({ weighing: '8', bedLength: '46 m', catalyst: '80 kg' }), choices)
    expect(issues).toEqual([
      { field: 'weighing', message: '“8” without a unit is 800 %; write 8 % if that is meant.' },
      { field: 'catalyst', message: 'This must be below 10 kg.' },
      { field: 'bedLength', message: 'This must be below 10 m.' },
    ])
  })
})
