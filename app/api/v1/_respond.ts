import { randomUUID } from 'node:crypto'
import { z } from 'zod'
import { actorFromRequest } from '@/lib/access/actor'
import { onceForKey } from '@/lib/access/idempotency'
import { logSecurityEvent } from '@/lib/auth/security-log'
import { AnalysisError } from '@/lib/analysis/analysis-error'
import { issuesOf, nameAllowedFields } from '@/lib/domain/action-answer'
import { AppError, appErrorCodes, appErrorOf, type AppErrorCode, type FieldIssue } from '@/lib/domain/errors'
import { type Actor } from '@/lib/domain/role'

/** The only table from error to status; a code without a line here does not compile. */
const statusOf: Record<AppErrorCode, number> = {
  'not-signed-in': 401,
  'not-allowed': 403,
  'not-found': 404,
  conflict: 409,
  stale: 412,
  'precondition-required': 428,
  invalid: 400,
  unprocessable: 422,
  'too-large': 413,
  unsupported: 415,
  'too-many-requests': 429,
  'bad-origin': 403,
  busy: 503,
  'storage-full': 507,
}

const titleOf: Record<AppErrorCode, string> = {
  'not-signed-in': 'Not signed in',
  'not-allowed': 'Not allowed',
  'not-found': 'Not found',
  conflict: 'In conflict with what is there',
  stale: 'Changed by somebody else meanwhile',
  'precondition-required': 'If-Match is missing',
  invalid: 'Not a valid request',
  unprocessable: 'Understood, but cannot be done',
  'too-large': 'Too large',
  unsupported: 'Type of content not supported',
  'too-many-requests': 'Too many requests',
  'bad-origin': 'Sent from another origin',
  busy: 'Busy',
  'storage-full': 'No space left',
}

/** What a status of refusal means, in the words of the codes that answer with it. */
export function meaningOf(status: number): string {
  return appErrorCodes
    .filter((code) => statusOf[code] === status)
    .map((code) => titleOf[code])
    .join('; ')
}

const PRIVATE = { 'Cache-Control': 'private, no-store', Vary: 'Cookie, Authorization' } as const
/** Longest JSON request; files go by multipart, which is counted while it streams. */
const MAXIMUM_JSON_BYTES = 1_000_000
/** Marks an answer whose body is for this one reading. */
const HOLDS_SECRET = 'x-shown-once'

interface Problem {
  readonly status: number
  readonly code: string
  readonly title: string
  readonly detail: string
  readonly issues?: readonly FieldIssue[]
  readonly details?: Readonly<Record<string, unknown>>
  readonly retryAfterS?: number | undefined
}

/** A problem as RFC 9457 writes it, with the code, the fields at fault and a reference for the log. */
function problemAnswer(problem: Problem, requestId: string): Response {
  return new Response(
    JSON.stringify({
      type: `urn:inverse-kelvin:problem:${problem.code}`,
      title: problem.title,
      status: problem.status,
      detail: problem.detail,
      code: problem.code,
      issues: problem.issues ?? [],
      ...(problem.details === undefined ? {} : { details: problem.details }),
      requestId,
    }),
    {
      status: problem.status,
      headers: {
        ...PRIVATE,
        'Content-Type': 'application/problem+json',
        'X-Request-Id': requestId,
        ...(problem.status === 401 ? { 'WWW-Authenticate': 'Bearer realm="inverse-kelvin"' } : {}),
        ...(problem.retryAfterS === undefined ? {} : { 'Retry-After': String(Math.ceil(problem.retryAfterS)) }),
      },
    },
  )
}

function answerToError(error: unknown, requestId: string): Response {
  const expected = appErrorOf(error)
  if (expected !== null) {
    if (expected.code === 'not-allowed' || expected.code === 'bad-origin')
      logSecurityEvent(expected.code, { requestId })
    const { issues, retryAfterS, ...details } = expected.details
    return problemAnswer(
      {
        status: statusOf[expected.code],
        code: expected.code,
        title: titleOf[expected.code],
        detail: expected.message,
        ...(issues === undefined ? {} : { issues }),
        ...(Object.keys(details).length === 0 ? {} : { details }),
        retryAfterS,
      },
      requestId,
    )
  }
  if (error instanceof AnalysisError)
    return problemAnswer(
      {
        status: 422,
        code: error.code,
        title: 'The analysis cannot be done with this input',
        detail: error.message,
        details: error.details,
      },
      requestId,
    )
  if (error instanceof z.ZodError)
    return problemAnswer(
      {
        status: 400,
        code: 'invalid',
        title: titleOf.invalid,
        detail: 'Some fields are missing or not as described; see issues.',
        issues: issuesOf(error),
      },
      requestId,
    )
  console.error(JSON.stringify({ at: new Date().toISOString(), requestId, error: describe(error) }))
  return problemAnswer(
    {
      status: 500,
      code: 'internal',
      title: 'Something went wrong here',
      detail: `The request could not be answered. Look whether it was done before you repeat it; with an Idempotency-Key nothing is done twice. The log has the cause under ${requestId}.`,
    },
    requestId,
  )
}

/** For the log only: name, message and stack, down through the causes. */
function describe(error: unknown): unknown {
  if (!(error instanceof Error)) return { value: String(error) }
  return {
    name: error.name,
    message: error.message,
    stack: error.stack,
    ...(error.cause === undefined ? {} : { cause: describe(error.cause) }),
  }
}

/** JSON with its status and headers; a record that can be edited says its version in the ETag. */
export function answer(
  body: unknown,
  options: {
    readonly status?: number
    readonly record?: { readonly id: string; readonly version: number }
    readonly location?: string
    /** the body holds a secret: a repeated request is told so and does not get it again */
    readonly holdsSecret?: boolean
    readonly headers?: Readonly<Record<string, string>>
  } = {},
): Response {
  const headers = {
    ...PRIVATE,
    ...options.headers,
    ...(options.record === undefined ? {} : { ETag: etagOf(options.record) }),
    ...(options.location === undefined ? {} : { Location: options.location }),
    ...(options.holdsSecret === true ? { [HOLDS_SECRET]: '1' } : {}),
  }
  if (body === undefined || options.status === 204)
    return new Response(null, { status: options.status ?? 204, headers })
  return new Response(JSON.stringify(body), {
    status: options.status ?? 200,
    headers: { ...headers, 'Content-Type': 'application/json; charset=utf-8' },
  })
}

/** Weak, as the same version may be written with other spacing: `W/"<id>.<version>"`. */
export function etagOf(record: { readonly id: string; readonly version: number }): string {
  return `W/"${record.id}.${record.version}"`
}

/** The version an edit was made from. Without If-Match 428; for another record, or something that is no version of ours, 412. */
export function versionFromIfMatch(request: Request, id: string): number {
  const header = request.headers.get('if-match')
  if (header === null)
    throw new AppError(
      'precondition-required',
      'An edit says which version it was made from: send the ETag of the record in the If-Match header.',
    )
  const match = /^(?:W\/)?"(.+)\.(\d{1,9})"$/.exec(header.trim())
  if (match?.[1] !== id)
    throw new AppError(
      'stale',
      'The If-Match header does not name a version of this record. Read it again and repeat the edit.',
    )
  return Number(match[2])
}

const texts = new WeakMap<Request, Promise<string>>()

/** The body as text. It streams by once; who asks again, as for the key of a request and then for its fields, gets what was read. */
function readText(request: Request): Promise<string> {
  const known = texts.get(request)
  if (known !== undefined) return known
  const text = readToLimit(request)
  texts.set(request, text)
  return text
}

/** Reads no further than the limit, whatever length was announced. */
async function readToLimit(request: Request): Promise<string> {
  const chunks: Uint8Array[] = []
  let byteCount = 0
  const reader = request.body?.getReader()
  for (let part = await reader?.read(); part !== undefined && !part.done; part = await reader?.read()) {
    byteCount += part.value.length
    if (byteCount > MAXIMUM_JSON_BYTES) {
      await reader?.cancel()
      throw new AppError(
        'too-large',
        `A JSON request may have ${MAXIMUM_JSON_BYTES} bytes. Files go to the uploads of a run.`,
      )
    }
    chunks.push(part.value)
  }
  return Buffer.concat(chunks, byteCount).toString('utf8')
}

/** The JSON body of a request, checked against its schema. */
export async function readJson<T extends z.ZodType>(request: Request, schema: T): Promise<z.output<T>> {
  const type = request.headers.get('content-type') ?? ''
  if (!/^application\/json\s*(;|$)/i.test(type))
    throw new AppError('unsupported', 'Send JSON, with the header Content-Type: application/json.')
  const text = await readText(request)
  let body: unknown
  try {
    body = JSON.parse(text)
  } catch (cause) {
    throw new AppError('invalid', 'The body is not JSON. Check quotes, commas and the encoding (UTF-8).', {}, { cause })
  }
  return schema.parse(body, { error: nameAllowedFields })
}

/** The query of a request, checked against its schema; a parameter given twice is refused rather than guessed. */
export function readQuery<T extends z.ZodType>(request: Request, schema: T): z.output<T> {
  const query = new URL(request.url).searchParams
  const values: Record<string, string> = {}
  for (const name of new Set(query.keys())) {
    const [first, ...more] = query.getAll(name)
    if (more.length > 0) throw new AppError('invalid', `The parameter ${name} is given more than once.`)
    Object.defineProperty(values, name, { value: first ?? '', enumerable: true })
  }
  return schema.parse(values, { error: nameAllowedFields })
}

/** A POST with an Idempotency-Key and a JSON body is run once; its answer is kept for a day. */
async function runOnce(request: Request, actor: Actor, key: string, work: () => Promise<Response>): Promise<Response> {
  const body = await readText(request)
  const { pathname, search } = new URL(request.url)
  let made: Response | null = null
  const stored = await onceForKey(
    actor,
    key,
    { method: request.method, path: pathname + search, body },
    async (isResumed) => {
      made = await work()
      // What holds a secret is answered and not kept: the table of answers would give it away.
      if (made.headers.has(HOLDS_SECRET)) {
        const { status } = made
        // made anew for what was kept with the first try, it would open nothing
        if (isResumed) made = null
        return { status, body: null, headers: { [HOLDS_SECRET]: '1' } }
      }
      const kept: Record<string, string> = {}
      for (const name of ['etag', 'location', 'content-type']) {
        const value = made.headers.get(name)
        if (value !== null) kept[name] = value
      }
      return { status: made.status, body: await made.clone().text(), headers: kept }
    },
  )
  if (made !== null) return made
  if (Object.hasOwn(stored.headers, HOLDS_SECRET))
    throw new AppError(
      'conflict',
      'This was done with the first request. Its answer held a secret, which is shown once and not kept; make a new one if it was lost.',
    )
  const text = typeof stored.body === 'string' && stored.body !== '' ? stored.body : null
  return new Response(text, { status: stored.status, headers: { ...PRIVATE, ...stored.headers } })
}

/**
 * The one shape of a handler: find the actor, run the work, answer. What the work returns becomes JSON, unless it is an
 * answer already (see `answer`).
 */
export async function handle(request: Request, work: (actor: Actor) => Promise<unknown>): Promise<Response> {
  return handlePublic(request, async () => {
    const actor = await actorFromRequest(request)
    const finish = async () => {
      const result = await work(actor)
      return result instanceof Response ? result : answer(result)
    }
    const key = request.headers.get('idempotency-key')
    const isJson = (request.headers.get('content-type') ?? '').toLowerCase().startsWith('application/json')
    return key !== null && request.method === 'POST' && isJson ? runOnce(request, actor, key, finish) : finish()
  })
}

/** The same for the few handlers that need nobody to be signed in. */
export async function handlePublic(request: Request, work: (request: Request) => Promise<unknown>): Promise<Response> {
  const requestId = randomUUID()
  try {
    const result = await work(request)
    return result instanceof Response ? result : answer(result)
  } catch (error) {
    return answerToError(error, requestId)
  }
}
