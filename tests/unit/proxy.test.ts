import { NextRequest } from 'next/server'
import { describe, expect, test } from 'vitest'
import { config, proxy } from '@/proxy'

const pass = (path: string, headers: Record<string, string> = {}) =>
  proxy(new NextRequest(`http://localhost:3000${path}`, { headers }))

/** What the framework hands on to the page. */
const handedOn = (response: Response, name: string) => response.headers.get(`x-middleware-request-${name}`)

describe('the content policy', () => {
  test('is exactly this', () => {
    const response = pass('/')
    const nonce = handedOn(response, 'x-nonce') ?? ''
    expect(Buffer.from(nonce, 'base64')).toHaveLength(16)
    expect(response.headers.get('content-security-policy')).toBe(
      `default-src 'none'; script-src 'nonce-${nonce}' 'strict-dynamic'; style-src 'self' 'nonce-${nonce}'; ` +
        `img-src 'self' data: blob:; font-src 'self' data:; connect-src 'self'; worker-src 'self' blob:; ` +
        `manifest-src 'self'; form-action 'self'; base-uri 'none'; frame-ancestors 'none'; object-src 'none'`,
    )
    expect(handedOn(response, 'content-security-policy')).toBe(response.headers.get('content-security-policy'))
  })

  test('has another nonce each time', () => {
    const nonces = Array.from({ length: 100 }, () => handedOn(pass('/'), 'x-nonce'))
    expect(new Set(nonces).size).toBe(100)
  })

  test('a caller sends does not reach the page', () => {
    const response = pass('/', {
      'Content-Security-Policy': `script-src 'nonce-theirs'`,
      'Content-Security-Policy-Report-Only': `script-src 'nonce-theirs'`,
      'X-Nonce': 'theirs"><script>',
      'X-Request-Path': '//evil.example',
    })
    expect([...response.headers].join('\n')).not.toMatch(/theirs|evil/)
    expect(handedOn(response, 'x-request-path')).toBe('/')
  })
})

test('the path is handed on without what the framework adds', () => {
  expect(handedOn(pass('/runs/1?after=x&_rsc=abc'), 'x-request-path')).toBe('/runs/1?after=x')
})

test('nothing is decided about access', () => {
  for (const path of ['/', '/settings', '/api/v1/me']) {
    const response = pass(path)
    expect(response.status).toBe(200)
    expect(response.headers.get('location')).toBeNull()
  }
})

test('every path comes through here, except the uploads of a run', () => {
  const matches = (path: string) => config.matcher.some((one) => new RegExp(`^${one}$`).test(path))
  for (const path of [
    '/',
    '/settings',
    '/api/v1/me',
    '/api/v1/runs/7',
    '/api/v1/runs/7/points',
    '/api/v1/runs/7/uploadsx',
    '/api/v1/runs/uploads',
    '/runs/7/uploads',
    '/_next/data/x.json',
    '/no/such/page',
  ])
    expect(matches(path), path).toBe(true)
  for (const path of ['/api/v1/runs/7/uploads', '/api/v1/runs/7/uploads/3']) expect(matches(path), path).toBe(false)
})
