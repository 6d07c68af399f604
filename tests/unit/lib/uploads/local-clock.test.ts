import { expect, test } from 'vitest'
import { LocalClock } from '@/lib/uploads/dates/local-clock'
import reference from '../../../reference/intake/local-times.json'

// Against Python's zoneinfo: tests/reference/intake/local-times.py. Casablanca moves its clocks by the moon, Lord Howe by half an hour.

const zones = [...new Set(reference.map(([zone]) => String(zone)))]

test.each(zones)('wall-clock times around every change of the clocks in %s', (zone) => {
  const clock = new LocalClock(zone)
  const rows = reference.filter(([name]) => name === zone)
  expect(rows.map(([, local]) => clock.instants(Number(local)))).toEqual(rows.map(([, , instants]) => instants))
})
