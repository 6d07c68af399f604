import { randomBytes } from 'node:crypto'
import { NextResponse, type NextRequest } from 'next/server'
import { contentPolicy } from '@/lib/auth/content-policy'
import { environment } from '@/lib/environment'

/**
 * Gives every answer its content policy with a fresh nonce, and tells the page which path was asked for. It decides
 * nothing about access: each page, action and handler does that for itself, and would do it the same without this file.
 */
export function proxy(request: NextRequest): NextResponse {
  const nonce = randomBytes(16).toString('base64')
  const policy = contentPolicy(nonce, environment.NODE_ENV === 'development')
  const headers = new Headers(request.headers)
  // What a caller sends under these names must not reach the page: a nonce of theirs would run a script of theirs.
  for (const name of ['content-security-policy', 'content-security-policy-report-only', 'x-nonce', 'x-request-path'])
    headers.delete(name)
  headers.set('content-security-policy', policy)
  headers.set('x-nonce', nonce)
  const query = new URLSearchParams(request.nextUrl.search)
  query.delete('_rsc')
  const search = query.toString()
  headers.set('x-request-path', request.nextUrl.pathname + (search === '' ? '' : `?${search}`))
  const response = NextResponse.next({ request: { headers } })
  response.headers.set('content-security-policy', policy)
  return response
}

/*
 * Every path, prefetches and errors included, except the uploads of a run: what passes through here is copied into
 * memory and cut off at 10 MB.
 */
export const config = {
  matcher: ['/((?!api/v1/runs/[^/]+/uploads(?:/|$)).*)'],
}
