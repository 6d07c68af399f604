import { describe, expect, test } from 'vitest'
import { readDemoChannels } from '@/tests/support/read-demo-run'
import reference from '../../../reference/intake/demo-files.json'

// Against a second reader: tests/reference/intake/read-demo-files.py, Python's own csv, zipfile and ElementTree with each dialect known beforehand.

const sum = (values: Float64Array = new Float64Array()) =>
  values.reduce((total, value) => total + (Number.isNaN(value) ? 0 : value), 0)
const relative = (actual: number, expected: number) => Math.abs(actual - expected) / Math.abs(expected)
/** Sums of thousands of doubles in another order, and units multiplied in another order. */
const ROUNDING = 1e-12

describe('every demo file reads to the values that another reader finds', () => {
  test.each(Object.keys(reference))('%s', async (name) => {
    const expected = reference[name as keyof typeof reference]
    const channels = await readDemoChannels(name)
    if ('rows' in expected) {
      const bed = channels.get('bedTemperatureK') ?? new Float64Array()
      expect(bed).toHaveLength(expected.rows)
      expect(sum(channels.get('isBypass'))).toBe(expected.bypassRows)
      expect(relative(bed[0] ?? Number.NaN, expected.firstBedK)).toBeLessThan(ROUNDING)
      expect(relative(bed.at(-1) ?? Number.NaN, expected.lastBedK)).toBeLessThan(ROUNDING)
      expect(relative(sum(bed), expected.sumBedK)).toBeLessThan(ROUNDING)
      expect(relative(sum(channels.get('inletPressurePa')), expected.sumInletPa)).toBeLessThan(ROUNDING)
      expect(relative(sum(channels.get('flowMolPerS.CO2')), expected.sumFlowCO2MolPerS)).toBeLessThan(ROUNDING)
    } else {
      expect(channels.get('number')).toHaveLength(expected.injections)
      for (const [species, area] of Object.entries(expected.sumArea)) {
        const values = channels.get(`area.${species}`)
        const seen = [...(values ?? [])].filter((value) => !Number.isNaN(value)).length
        expect(seen, species).toBe(expected.seen[species as keyof typeof expected.seen])
        if (area > 0) expect(relative(sum(values), area), species).toBeLessThan(ROUNDING)
      }
    }
  })
})
