import { describe, expect, test } from 'vitest'
import { assertSameOrigin } from '@/lib/auth/same-origin'

const OURS = 'https://bench.example'
const check = (method: string, headers: Record<string, string>) => () =>
  assertSameOrigin(method, new Headers(headers), OURS)

describe('a change', () => {
  test.each([
    [{ origin: OURS }],
    [{ origin: OURS, 'sec-fetch-site': 'same-origin' }],
    [{ origin: OURS, 'sec-fetch-site': 'none' }],
    [{ 'sec-fetch-site': 'same-origin' }],
  ])('is taken with %j', (headers) => {
    for (const method of ['POST', 'PUT', 'PATCH', 'DELETE', 'post']) expect(check(method, headers)).not.toThrow()
  })

  test.each([
    [{}],
    [{ origin: 'null' }],
    [{ origin: 'http://bench.example' }],
    [{ origin: 'https://bench.example:8443' }],
    [{ origin: 'https://bench.example.evil.example' }],
    [{ origin: 'https://evil.example', host: 'evil.example', 'x-forwarded-host': 'evil.example' }],
    [{ origin: OURS, 'sec-fetch-site': 'cross-site' }],
    [{ origin: OURS, 'sec-fetch-site': 'same-site' }],
    [{ 'sec-fetch-site': 'cross-site' }],
    [{ 'sec-fetch-site': 'same-site' }],
    [{ 'sec-fetch-site': 'none' }],
    [{ origin: '' }],
    [{ origin: `${OURS}, ${OURS}` }],
  ])('is refused with %j', (headers) => {
    for (const method of ['POST', 'PUT', 'PATCH', 'DELETE', 'PURGE'])
      expect(check(method, headers)).toThrow(expect.objectContaining({ code: 'bad-origin' }))
  })
})

test('reading is taken from anywhere', () => {
  for (const method of ['GET', 'HEAD', 'OPTIONS'])
    expect(check(method, { origin: 'https://evil.example', 'sec-fetch-site': 'cross-site' })).not.toThrow()
})
