import { describe, expect, test } from 'vitest'
import { channelPath } from '@/components/forms/intake/channel-path'
import { channelWords } from '@/components/forms/intake/channel-words'
import { fileSize } from '@/components/forms/intake/file-size'
import { takenInText } from '@/components/forms/intake/taken-in-text'

describe('the path of a channel', () => {
  test('runs from the lower left to the upper right of its box when it rises', () => {
    expect(channelPath({ timeS: [100, 150, 200], values: [1, 2, 3], minimum: 1, maximum: 3 }, 240, 40)).toBe(
      'M0 40L120 20L240 0',
    )
  })
  test('breaks where a value is missing and shows one that stands alone as a dot', () => {
    expect(channelPath({ timeS: [0, 1, 2, 3, 4], values: [0, 1, null, 1, null], minimum: 0, maximum: 1 }, 40, 10)).toBe(
      'M0 10L10 0M30 0h0',
    )
  })
  test('of a channel that never changes is a line through the middle; of an empty one nothing', () => {
    expect(channelPath({ timeS: [0, 1], values: [5, 5], minimum: 5, maximum: 5 }, 10, 10)).toBe('M0 5L10 5')
    expect(channelPath({ timeS: [0], values: [null], minimum: null, maximum: null }, 10, 10)).toBe('')
    expect(channelPath({ timeS: [7], values: [5], minimum: 5, maximum: 5 }, 10, 10)).toBe('M5 5h0')
  })
})

test('channels are named and valued as people say them', () => {
  const flow = channelWords('flowMolPerS.CO2')
  expect(flow.label).toBe('Flow of CO₂')
  // 7.2 mL/min at 0 °C and 101.325 kPa, 22413.97 mL/mol (CODATA 2018): 5.354 µmol/s
  expect(flow.format(7.2 / 60 / 22_413.97)).toBe('5.354 µmol/s')
  expect(channelWords('bedTemperatureK').format(518.15)).toBe('245.0 °C')
  expect(channelWords('moleFraction.CH4@2').label).toBe('Mole fraction of CH₄, channel 2')
  expect(channelWords('area.H2').format(2_502_061.7)).toBe('2,502,000')
  expect(channelWords('isBypass').format(1)).toBe('bypass')
})

test('sizes', () => {
  expect([1, 812, 3_541, 311_000, 999_700, 2_400_000_000].map(fileSize)).toEqual([
    '1 byte',
    '812 bytes',
    '3.54 kB',
    '311 kB',
    '1 MB',
    '2.4 GB',
  ])
})

test('what was taken in is said with what was not', () => {
  expect(takenInText('rig-log', 3_577, [])).toBe('3,577 rows, nothing left out')
  expect(takenInText('analyser', 1, [{ severity: 'note' }])).toBe('1 injection, nothing left out')
  expect(takenInText('rig-log', 20, [{ severity: 'problem' }])).toBe('20 rows, 1 problem, listed below')
  expect(takenInText('attachment', null, [])).toBe('kept beside the run, not read')
})
