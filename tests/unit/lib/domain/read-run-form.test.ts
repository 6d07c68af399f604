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

test('a flow that states half of its state is not counted at another one', () => {
  const [gas, ...others] = drawn().feed
  if (gas === undefined) throw new Error('the drawn form has a feed')
  const withFlow = (flow: string) => readRunForm(drawn({ feed: [{ ...gas, flow }, ...others] }), choices)
  const half = withFlow('7.2 mL/min (20 °C)')
  expect(half.run).toBeNull()
  expect(half.issues).toMatchObject([
    {
      field: 'feed.0.flow',
      message:
        '“7.2 mL/min (20 °C)” states only a temperature or only a pressure; a volume is counted at both, so write both, as in 60 mL/min (20 °C, 1013 mbar).',
    },
  ])
  // 7.2 mL/min at 293.15 K and 101.3 kPa by the ideal gas: p V / (R T), R of CODATA 2018
  const whole = withFlow('7.2 mL/min (20 °C, 1013 mbar)')
  const expected = (101_300 * (7.2e-6 / 60)) / (8.314462618 * 293.15)
  expect((whole.run?.feed[0]?.flowMolPerS ?? 0) / expected).toBeCloseTo(1, 8)
})
