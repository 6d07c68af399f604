import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, expect, test, vi } from 'vitest'

let folder = ''
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'environment-'))
  vi.resetModules()
  vi.stubEnv('DATA_DIR', path.join(folder, 'data'))
  for (const name of ['SESSION_KEY', 'PEPPER', 'APP_ORIGIN', 'DATABASE_URL', 'MAX_UPLOAD_BYTES']) vi.stubEnv(name, '')
})
afterEach(() => {
  vi.unstubAllEnvs()
  rmSync(folder, { recursive: true, force: true })
})
const read = async () => (await import('@/lib/environment')).environment

test('what is left blank has its default', async () => {
  const environment = await read()
  expect(environment.APP_ORIGIN).toBe('http://localhost:3000')
  expect(environment.MAX_UPLOAD_BYTES).toBe(2 * 1024 ** 3)
  expect(environment.DATABASE_URL).toBeUndefined()
  expect(path.isAbsolute(environment.DATA_DIR)).toBe(true)
})

test('secrets are made once, kept for the owner only, and the same after a new start', async () => {
  const first = await read()
  const { SESSION_KEY, PEPPER } = first
  expect(SESSION_KEY.length).toBeGreaterThanOrEqual(64)
  expect(SESSION_KEY).not.toBe(PEPPER)
  const file = path.join(folder, 'data', 'secrets.json')
  expect(statSync(file).mode & 0o777).toBe(0o600)
  vi.resetModules()
  const second = await read()
  expect([second.SESSION_KEY, second.PEPPER]).toEqual([SESSION_KEY, PEPPER])
})

test('given secrets are used and none are kept', async () => {
  vi.stubEnv('SESSION_KEY', 's'.repeat(40))
  vi.stubEnv('PEPPER', 'p'.repeat(40))
  const environment = await read()
  expect(environment.SESSION_KEY).toBe('s'.repeat(40))
  expect(environment.PEPPER).toBe('p'.repeat(40))
  expect(() => readFileSync(path.join(folder, 'data', 'secrets.json'))).toThrow('ENOENT')
})

test('a damaged file of secrets is not replaced by new ones', async () => {
  const environment = await read()
  expect(environment.PEPPER).toBeTruthy()
  const file = path.join(folder, 'data', 'secrets.json')
  writeFileSync(file, '{"sessionKey":"short"}')
  vi.resetModules()
  const again = await read()
  expect(() => again.PEPPER).toThrow(/is damaged/)
  expect(readFileSync(file, 'utf8')).toBe('{"sessionKey":"short"}')
})

test('the origin is taken without path and slash', async () => {
  vi.stubEnv('APP_ORIGIN', 'https://kelvin.example.org/')
  expect((await read()).APP_ORIGIN).toBe('https://kelvin.example.org')
})

test.each([
  ['APP_ORIGIN', 'kelvin.example.org'],
  ['DATABASE_URL', 'mysql://localhost/x'],
  ['SESSION_KEY', 'too short'],
  ['MAX_UPLOAD_BYTES', '2 GB'],
])('%s=%s is refused by name', async (name, value) => {
  vi.stubEnv(name, value)
  const environment = await read()
  expect(() => environment.DATA_DIR).toThrow(`${name}: `)
})
