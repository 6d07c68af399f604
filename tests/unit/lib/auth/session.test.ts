import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import {
  clearSessionSecret,
  isOriginTrustworthy,
  readKnownPeople,
  readSessionSecret,
  rememberDevice,
  writeSessionSecret,
} from '@/lib/auth/session'
import { makeSecret } from '@/lib/auth/secret'

const settings = vi.hoisted(
  (): { APP_ORIGIN: string; SESSION_KEY: string; SESSION_KEY_PREVIOUS: string | undefined } => ({
    APP_ORIGIN: '',
    SESSION_KEY: '',
    SESSION_KEY_PREVIOUS: undefined,
  }),
)
vi.mock('@/lib/environment', () => ({ environment: settings }))

const jar = vi.hoisted(() => new Map<string, { value: string; options: Record<string, unknown> }>())
vi.mock('next/headers', () => ({
  cookies: async () => ({
    get: (name: string) => jar.get(name),
    set: (name: string, value: string, options: Record<string, unknown>) => jar.set(name, { value, options }),
  }),
}))

const KEY = 'a key of the session that is long enough to be one'
const OTHER_KEY = 'another key of the session, just as long as the first'
beforeEach(() => {
  jar.clear()
  Object.assign(settings, { APP_ORIGIN: 'https://bench.example', SESSION_KEY: KEY, SESSION_KEY_PREVIOUS: undefined })
})
afterEach(() => {
  vi.useRealTimers()
})
const onlyCookie = () => {
  const [entry] = jar
  if (entry === undefined || jar.size !== 1) throw new Error(`${jar.size} cookies`)
  return { name: entry[0], ...entry[1] }
}

describe('the session cookie', () => {
  test.each([
    ['https://bench.example', '__Host-sid', true],
    ['http://localhost:3000', '__Host-sid', true],
    ['http://127.0.0.1:3000', '__Host-sid', true],
    ['http://[::1]:3000', '__Host-sid', true],
    ['http://bench.lab:3000', 'sid-plain', false],
    ['http://192.168.7.5', 'sid-plain', false],
    ['http://localhost.evil.example', 'sid-plain', false],
  ])('for %s is %s', async (origin, name, secure) => {
    settings.APP_ORIGIN = origin
    expect(isOriginTrustworthy()).toBe(secure)
    const secret = makeSecret()
    await writeSessionSecret(secret)
    expect(onlyCookie()).toEqual({
      name,
      value: expect.any(String),
      options: { httpOnly: true, secure, sameSite: 'lax', path: '/' },
    })
    expect(await readSessionSecret()).toBe(secret)
    await clearSessionSecret()
    expect(onlyCookie()).toMatchObject({ name, value: '', options: { maxAge: 0, path: '/', secure } })
    expect(await readSessionSecret()).toBeNull()
  })

  test('shows nothing of the secret and fits a browser', async () => {
    const secret = makeSecret()
    await writeSessionSecret(secret)
    const { value } = onlyCookie()
    expect(value).not.toContain(secret)
    expect(value.length).toBeLessThan(600)
  })

  test('opens for twelve hours and not for one second more than the seal allows', async () => {
    vi.useFakeTimers({ now: new Date('2026-03-02T08:00:00Z'), toFake: ['Date'] })
    await writeSessionSecret(makeSecret())
    vi.setSystemTime(new Date('2026-03-02T19:59:59Z'))
    expect(await readSessionSecret()).not.toBeNull()
    // the seal allows a minute for clocks that disagree; the table of sessions allows none
    vi.setSystemTime(new Date('2026-03-02T20:01:01Z'))
    expect(await readSessionSecret()).toBeNull()
  })

  test('opens with the key before this one while keys are being changed, and not after', async () => {
    const secret = makeSecret()
    await writeSessionSecret(secret)
    Object.assign(settings, { SESSION_KEY: OTHER_KEY, SESSION_KEY_PREVIOUS: KEY })
    expect(await readSessionSecret()).toBe(secret)
    settings.SESSION_KEY_PREVIOUS = undefined
    expect(await readSessionSecret()).toBeNull()
  })

  test('opens with none of its characters changed', async () => {
    await writeSessionSecret(makeSecret())
    const { name, value } = onlyCookie()
    for (let at = 0; at < value.length; at += 1) {
      const flipped = `${value.slice(0, at)}${value[at] === 'A' ? 'B' : 'A'}${value.slice(at + 1)}`
      jar.set(name, { value: flipped, options: {} })
      expect(await readSessionSecret(), `character ${at} of ${value}`).toBeNull()
    }
  })

  test.each(['', 'x', 'Fe26.2', 'Fe26.2*1*a*b*c*d*e*f~2', '*'.repeat(200), 'A'.repeat(5_000), '{"sid":"x"}', '\u0000'])(
    'that is none is nobody’s: %j',
    async (value) => {
      jar.set('__Host-sid', { value, options: {} })
      expect(await readSessionSecret()).toBeNull()
    },
  )

  test('is not the cookie of a device, nor the other way round', async () => {
    await rememberDevice('me')
    const { value } = onlyCookie()
    jar.set('__Host-sid', { value, options: {} })
    expect(await readSessionSecret()).toBeNull()
    jar.clear()
    await writeSessionSecret(makeSecret())
    jar.set('__Host-device', { value: onlyCookie().value, options: {} })
    expect(await readKnownPeople()).toEqual([])
  })
})

test('a device knows the eight people who signed in on it last', async () => {
  for (let n = 0; n < 10; n += 1) await rememberDevice(`person-${n}`)
  await rememberDevice('person-4')
  expect(await readKnownPeople()).toEqual([4, 9, 8, 7, 6, 5, 3, 2].map((n) => `person-${n}`))
  expect(onlyCookie().options).toMatchObject({ maxAge: 90 * 86_400, httpOnly: true, secure: true })
})
