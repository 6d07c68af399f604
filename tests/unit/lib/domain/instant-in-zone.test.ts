import { describe, expect, test } from 'vitest'
import { formatInstant } from '@/lib/domain/format-instant'
import { instantFromLocal, isTimeZone, localFromInstant } from '@/lib/domain/instant-in-zone'

// Changes of clocks: Directive 2000/84/EC, last Sundays of March and October at 01:00 UTC.
describe('a wall clock placed in a zone', () => {
  test.each([
    { local: '2026-03-09T07:30', zone: 'Europe/London', instant: '2026-03-09T07:30:00+00:00', isAmbiguous: false },
    { local: '2026-07-09T07:30', zone: 'Europe/Berlin', instant: '2026-07-09T07:30:00+02:00', isAmbiguous: false },
    { local: '2026-03-29T01:59', zone: 'Europe/Berlin', instant: '2026-03-29T01:59:00+01:00', isAmbiguous: false },
    { local: '2026-03-29T03:00', zone: 'Europe/Berlin', instant: '2026-03-29T03:00:00+02:00', isAmbiguous: false },
    { local: '2026-10-25T02:30', zone: 'Europe/Berlin', instant: '2026-10-25T02:30:00+02:00', isAmbiguous: true },
    { local: '2026-10-25T03:30', zone: 'Europe/Berlin', instant: '2026-10-25T03:30:00+01:00', isAmbiguous: false },
    { local: '2026-01-05T12:00', zone: 'Asia/Kolkata', instant: '2026-01-05T12:00:00+05:30', isAmbiguous: false },
    { local: '2026-01-05T12:00', zone: 'America/St_Johns', instant: '2026-01-05T12:00:00-03:30', isAmbiguous: false },
  ])('$local in $zone', ({ local, zone, instant, isAmbiguous }) => {
    expect(instantFromLocal(local, zone)).toEqual({ ok: true, instant, isAmbiguous })
    expect(localFromInstant(instant, zone)).toBe(local)
  })

  test('an hour that the clocks leap over is refused', () => {
    const read = instantFromLocal('2026-03-29T02:30', 'Europe/Berlin')
    expect(read.ok).toBe(false)
    if (!read.ok) expect(read.sentence).toContain('does not exist')
  })

  test.each(['2026-02-30T10:00', '2026-13-01T10:00', 'tomorrow', ''])('%s is no time', (local) => {
    expect(instantFromLocal(local, 'UTC').ok).toBe(false)
  })

  test('an instant is written the way people there read it', () => {
    expect(formatInstant('2026-03-09T06:30:00Z', 'Europe/Berlin')).toBe('9 Mar 2026 07:30')
    expect(formatInstant('2026-09-01T23:30:00Z', 'Europe/Berlin')).toBe('2 Sep 2026 01:30')
    expect(formatInstant('never', 'UTC')).toBe('not known')
  })

  test('zones the engine does not know are told apart', () => {
    expect(isTimeZone('Europe/Berlin')).toBe(true)
    expect(isTimeZone('Mars/Base')).toBe(false)
  })
})
