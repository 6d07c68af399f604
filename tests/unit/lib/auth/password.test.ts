import { describe, expect, test, vi } from 'vitest'
import { hashPassword, preparePassword, verifyPassword } from '@/lib/auth/password'
import { passwordFault } from '@/lib/auth/password-fault'

vi.mock('@/lib/environment', () => ({ environment: { PEPPER: 'a pepper of at least thirty-two characters' } }))

describe('what bcrypt is given', () => {
  test('is HMAC-SHA-384 in base64, 64 characters', () => {
    // RFC 4231, test case 2: key "Jefe", data "what do ya want for nothing?", HMAC-SHA-384
    const expected = Buffer.from(
      'af45d2e376484031617f78d2b58a6b1b9c7ef464f5a01b47e42ec3736322445e8e2240ca5e69e2c78b3239ecfab21649',
      'hex',
    ).toString('base64')
    expect(preparePassword('what do ya want for nothing?', 'Jefe')).toBe(expected)
    expect(expected).toHaveLength(64)
  })

  test('is the same for both typed forms of an accent, and another for another pepper', () => {
    expect(preparePassword('caf\u00e9 au lait with cake', 'p')).toBe(
      preparePassword('cafe\u0301 au lait with cake', 'p'),
    )
    expect(preparePassword('the same password', 'p')).not.toBe(preparePassword('the same password', 'q'))
  })

  test('differs where bcrypt alone would stop looking: after 72 bytes and after a zero byte', () => {
    const long = 'x'.repeat(72)
    expect(preparePassword(long + 'a', 'p')).not.toBe(preparePassword(long + 'b', 'p'))
    expect(preparePassword('before\u0000after', 'p')).not.toBe(preparePassword('before\u0000other', 'p'))
  })
})

describe('a hash', () => {
  test('fits its password only, exactly as typed, to the last character', async () => {
    const password = `${'long '.repeat(40)}end`
    const hash = await hashPassword(password)
    expect(hash).toMatch(/^\$2[aby]\$12\$.{53}$/)
    expect(await verifyPassword(password, hash)).toBe(true)
    expect(await verifyPassword(`${password} `, hash)).toBe(false)
    expect(await verifyPassword(password.toUpperCase(), hash)).toBe(false)
    expect(await verifyPassword(`${'long '.repeat(40)}enD`, hash)).toBe(false)
  })

  test('of nobody fits nothing, and neither does one that is too long to be a password', async () => {
    expect(await verifyPassword('anything at all here', null)).toBe(false)
    expect(await verifyPassword('', null)).toBe(false)
    const hash = await hashPassword('')
    expect(await verifyPassword('x'.repeat(1025), hash)).toBe(false)
  })

  test('is made two at a time with twenty waiting; the rest are asked to come back', async () => {
    const outcomes = await Promise.allSettled(Array.from({ length: 30 }, () => verifyPassword('x', null)))
    const refused = outcomes.filter((one) => one.status === 'rejected')
    expect(refused).toHaveLength(8)
    for (const one of refused) expect(one.status === 'rejected' && one.reason).toMatchObject({ code: 'busy' })
  }, 60_000)
})

describe('a new password', () => {
  const person = { email: 'marlene.dietz@calder-quay.example', displayName: 'Marlene Dietz' }

  test.each([
    'kettle orbit marzipan tundra',
    'correct horse battery staple',
    'Würzburger Nebelkrähe im Schnee',
    '8f#kQ2!z9x@L4mPw',
    '四つの関係ない言葉を並べる例文です',
    '482910573625194',
    'my grandmother keeps nine geese',
    'x'.repeat(3) + ' otter lagoon velvet ' + 'y'.repeat(900),
  ])('is taken: %j', (password) => {
    expect(passwordFault(password, person)).toBeNull()
  })

  test.each([
    ['fourteen chars', /14 characters/],
    ['', /0 characters/],
    ['é'.repeat(14), /14 characters/],
    ['😀'.repeat(300), /1024 bytes/],
    ['x'.repeat(1025), /1024 bytes/],
    ['aaaaaaaaaaaaaaaa', /repeats/],
    ['abcabcabcabcabcabc', /repeats/],
    ['passwordpassword', /repeats/],
    ['1212121212121212', /repeats/],
    ['password123456789', /common words/],
    ['P@ssw0rd12345678', /common words/],
    ['Welcome2026!!!!!!', /common words/],
    ['abcdefghijklmnop', /common words/],
    ['qwertyuiopasdfgh', /common words/],
    ['123456789012345678', /common words|repeats/],
    ['inversekelvin2026', /common words/],
    ['Inverse Kelvin 1!', /common words/],
    ['catalyst laboratory', /common words/],
    ['marlenedietz2026!', /common words/],
    ['calder-quay-dietz-1', /common words/],
    ['changeme changeme1', /common words/],
    ['SummerAutumnWinter1', /common words/],
  ])('is not: %j', (password, reason) => {
    expect(passwordFault(password, person)).toMatch(reason)
  })
})
