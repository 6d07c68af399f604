import { expect } from 'vitest'
import { operations, refusalsOf, type Operation } from '@/app/api/v1/_operations'
import { problemRecord } from '@/app/api/v1/_records'
import { findHandlers } from './find-handlers'

const handlers = (await findHandlers()).filter((one) => one.file.startsWith('app/api/v1/'))

export interface Asked {
  readonly body?: unknown
  readonly headers?: Readonly<Record<string, string>>
  readonly type?: string
}

/** `GET app/api/v1/runs/[runId]/route.ts` → `/runs/{runId}` */
export const pathOf = (file: string) => file.replace(/^app\/api\/v1|\/route\.ts$/g, '').replaceAll(/\[(\w+)\]/g, '{$1}')

/** The handler of an address, literal parts before those that stand for something, and the operation that describes it. */
function find(method: string, pathname: string) {
  const parts = pathname.split('/')
  const found = handlers
    .filter((one) => {
      const pattern = pathOf(one.file).split('/')
      return (
        one.method === method &&
        pattern.length === parts.length &&
        pattern.every((part, n) => part.startsWith('{') || part === parts[n])
      )
    })
    .sort((a, b) => a.parameters.length - b.parameters.length)[0]
  if (found === undefined) throw new Error(`no handler for ${method} ${pathname}`)
  const pattern = pathOf(found.file).split('/')
  const params = Object.fromEntries(
    pattern.flatMap((part, n) =>
      part.startsWith('{') ? [[part.slice(1, -1), decodeURIComponent(parts[n] ?? '')]] : [],
    ),
  )
  const path = pathOf(found.file)
  const operation = operations.find((one) => one.method === method.toLowerCase() && one.path === path)
  if (operation === undefined) throw new Error(`${method} ${path} is not described`)
  return { handler: found, params, operation }
}

function bodyOf(asked: Asked): BodyInit | null {
  if (asked.body === undefined) return null
  return asked.body instanceof FormData || typeof asked.body === 'string' ? asked.body : JSON.stringify(asked.body)
}

/** Asks the handler of an address and holds the answer, success or refusal, to its description. */
export async function askApi(secret: string | null, method: string, address: string, asked: Asked = {}) {
  const url = new URL(`/api/v1${address}`, 'http://localhost:3000')
  const { handler, params, operation } = find(method, url.pathname.slice('/api/v1'.length))
  const body = bodyOf(asked)
  const answer = await handler.call(
    new Request(url, {
      method,
      headers: {
        ...(secret === null ? {} : { Authorization: `Bearer ${secret}` }),
        ...(body === null || body instanceof FormData ? {} : { 'Content-Type': asked.type ?? 'application/json' }),
        ...asked.headers,
      },
      body,
    }),
    { params: Promise.resolve(params) },
  )
  if (!(answer instanceof Response)) throw new Error('no answer')
  const text = await answer.text()
  const isJson = /json/.test(answer.headers.get('content-type') ?? '')
  const said: unknown = text === '' ? null : isJson ? JSON.parse(text) : text
  holdToDescription(operation, answer, said)
  return {
    status: answer.status,
    body: said,
    etag: answer.headers.get('etag'),
    location: answer.headers.get('location'),
    operation,
  }
}

function holdToDescription(operation: Operation, answer: Response, said: unknown): void {
  const { status, headers } = answer
  if (operation.path !== '/openapi.json') expect(headers.get('cache-control')).toBe('private, no-store')
  if (!answer.ok) {
    expect(refusalsOf(operation), `${operation.method} ${operation.path}: ${JSON.stringify(said)}`).toContain(status)
    expect(headers.get('content-type')).toBe('application/problem+json')
    expect(problemRecord.parse(said)).toEqual(said)
    expect(said).toMatchObject({ status })
    return
  }
  if (status !== operation.otherStatus) expect(status).toBe(operation.status ?? 200)
  if (operation.answerType !== undefined) expect(headers.get('content-type')?.split(';')[0]).toBe(operation.answerType)
  else if (operation.answer === undefined) expect(said).toBeNull()
  // a strict schema: neither a field too many nor one too few
  if (operation.answer !== undefined) expect(operation.answer.parse(said)).toEqual(said)
}
