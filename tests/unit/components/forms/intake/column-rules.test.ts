import { describe, expect, test } from 'vitest'
import { columnNeeds, meaningsFor, readUnit, withMeaning, withUnit } from '@/components/forms/intake/column-rules'
import { mappedColumnSchema, type MappedColumn } from '@/lib/domain/column-map'

const column = (part: Partial<MappedColumn>): MappedColumn =>
  mappedColumnSchema.parse({ header: 'h', index: 0, meaning: 'ignore', ...part })

describe('what is asked of a column', () => {
  test.each([
    ['a temperature: its unit', { meaning: 'bed-temperature', unit: 'K' }, 'unit'],
    ['a pressure: unit and what it counts from', { meaning: 'inlet-pressure', unit: 'bar' }, 'unit pressureKind'],
    ['a volume flow: species and state too', { meaning: 'flow', unit: 'mL/min' }, 'unit species flowReference'],
    ['a molar flow has no state to count at', { meaning: 'flow', unit: 'mmol/h' }, 'unit species'],
    ['an area: its species', { meaning: 'area' }, 'species'],
    ['nothing of what is not read', { meaning: 'ignore', unit: 'bar' }, ''],
  ] as const)('%s', (_name, part, asked) => {
    const needs = Object.entries(columnNeeds(column(part), 'wide'))
    expect(needs.flatMap(([name, isNeeded]) => (isNeeded ? [name] : [])).join(' ')).toBe(asked)
  })

  test('where a row is a peak, the species stands in a column of its own', () => {
    expect(columnNeeds(column({ meaning: 'area' }), 'long').species).toBe(false)
    expect(columnNeeds(column({ meaning: 'flow', unit: 'mL/min' }), 'long').species).toBe(true)
  })
})

describe('a typed unit', () => {
  test('is said back as it was understood', () => {
    expect(readUnit(column({ meaning: 'flow', unit: 'ml/min' }))).toEqual({ ok: true, sentence: 'read as mL/min' })
    expect(readUnit(column({ meaning: 'bed-temperature', unit: 'C' }))).toEqual({
      ok: true,
      sentence: '“C” read as °C',
    })
    expect(readUnit(column({ meaning: 'mole-fraction', unit: '' })).ok).toBe(true)
  })

  test('that is none, or one of something else, is told with what to write', () => {
    expect(readUnit(column({ meaning: 'inlet-pressure', unit: 'mL/min' }))).toEqual({
      ok: false,
      sentence: '“mL/min” is not known. Write a pressure, such as bar or kPa.',
    })
    expect(readUnit(column({ meaning: 'bed-temperature', unit: '' })).sentence).toMatch(/^Not stated\./)
  })

  test('brings what it states and forgets nothing that it does not', () => {
    const gauge = withUnit(column({ meaning: 'inlet-pressure', pressureKind: 'absolute' }), 'barg')
    expect(gauge.pressureKind).toBe('gauge')
    expect(withUnit(gauge, 'kPa').pressureKind).toBe('gauge')
    const flow = column({ meaning: 'flow', referenceTemperatureK: 298.15, referencePressurePa: 101_325 })
    expect(withUnit(flow, 'mL/min').referenceTemperatureK).toBe(298.15)
    // 20 °C and 1013 mbar
    expect(withUnit(flow, 'mL/min (20 °C, 1013 mbar)')).toMatchObject({
      referenceTemperatureK: 293.15,
      referencePressurePa: 101_300,
    })
    // a molar flow is an amount already
    expect(withUnit(flow, 'mmol/h').referenceTemperatureK).toBeNull()
  })
})

test('another meaning takes off what only belonged to the old one', () => {
  const flow = column({
    meaning: 'flow',
    unit: 'mL/min',
    species: 'CO2',
    referenceTemperatureK: 273.15,
    referencePressurePa: 101_325,
  })
  expect(withMeaning(flow, 'bed-temperature')).toMatchObject({
    species: null,
    referenceTemperatureK: null,
    referencePressurePa: null,
    unit: 'mL/min',
  })
  expect(withMeaning(flow, 'area').species).toBe('CO2')
  expect(withMeaning(column({ meaning: 'ignore', unit: 'bar(g)' }), 'outlet-pressure').pressureKind).toBe('gauge')
})

test('a log offers no peak areas, but what a column is now stays on the list', () => {
  expect(meaningsFor('rig-log', 'flow')).not.toContain('area')
  expect(meaningsFor('rig-log', 'area')).toContain('area')
  expect(meaningsFor('analyser', 'area')).not.toContain('valve')
})
