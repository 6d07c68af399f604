import { describe, expect, test } from 'vitest'
import { newRunSchema } from '@/lib/domain/run'
import { correctionsOf } from '@/lib/domain/run-corrections'

const run = (more: object = {}, bed: object = {}) =>
  newRunSchema.parse({
    campaignId: 'c',
    rigId: 'g',
    channel: '1',
    startedAt: '2026-03-02T07:30:00+01:00',
    pressurePa: 130_000,
    pressureText: '1.30 bar abs',
    feed: [
      {
        species: 'CO2',
        flowText: '7.2 mL/min',
        flowMolPerS: 5.35e-6,
        referenceTemperatureK: 273.15,
        referencePressurePa: 101_325,
      },
    ],
    loading: { sampleId: 's', catalystMassKg: 80.3e-6, diluentMassKg: 450e-6, ...bed },
    ...more,
  })

describe('what was corrected', () => {
  test('nothing touched is no change', () => {
    expect(correctionsOf(run(), run())).toEqual({ run: {}, bed: {} })
  })
  test('a mass is the bed’s, a pressure the run’s; what stayed is not among them', () => {
    expect(
      correctionsOf(run(), run({ pressurePa: 140_000, pressureText: '1.40 bar abs' }, { catalystMassKg: 83e-6 })),
    ).toEqual({
      run: { pressurePa: 140_000, pressureText: '1.40 bar abs' },
      bed: { catalystMassKg: 83e-6 },
    })
  })
  test('one gas changed is the whole feed, in order', () => {
    const [gas] = run().feed
    const feed = [{ ...gas, flowText: '7.4 mL/min', flowMolPerS: 5.5e-6 }]
    expect(correctionsOf(run(), run({ feed })).run).toEqual({
      feed: [{ ...gas, ...feed[0], isInternalStandard: false }],
    })
  })
  test('an emptied field is a change', () => {
    expect(correctionsOf(run({}, { bedLengthM: 0.018 }), run()).bed).toEqual({ bedLengthM: null })
  })
  test('what the run is never is: sample, rig, channel and name stay', () => {
    expect(correctionsOf(run(), run({ channel: '2', rigId: 'h', code: 'X' }, { sampleId: 't' }))).toEqual({
      run: {},
      bed: {},
    })
  })
  test('of a record that the form cannot say, everything typed is a change', () => {
    expect(Object.keys(correctionsOf(null, run()).run)).toEqual(expect.arrayContaining(['pressurePa', 'feed', 'notes']))
  })
})
