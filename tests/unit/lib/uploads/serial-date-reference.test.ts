import { describe, expect, it } from 'vitest'
import { serialText } from '@/lib/uploads/formats/workbook/serial-date'

/** Known serials of both systems. Source: ISO/IEC 29500-1:2016, 18.17.4.1; day 60 of the 1900 system never was. */
describe('C68 workbook dates', () => {
  it.each([
    [45_292, false, '2024-01-01T00:00:00'],
    [43_830, true, '2024-01-01T00:00:00'],
    [45_292.75, false, '2024-01-01T18:00:00'],
    [61, false, '1900-03-01T00:00:00'],
    [59, false, '1900-02-28T00:00:00'],
  ] as const)('%s (1904: %s) is %s', (serial, is1904, text) => {
    expect(serialText(serial, 'date', is1904)).toBe(text)
  })
  it('29 February 1900 is no date', () => expect(serialText(60, 'date', false)).toBeNull())
})
