/** What can go wrong in a request, by name. The map from code to HTTP status stands in app/api/v1/_respond.ts. */
export const appErrorCodes = [
  'not-signed-in',
  'not-allowed',
  'not-found',
  'conflict',
  'stale',
  'precondition-required',
  'invalid',
  'unprocessable',
  'too-large',
  'unsupported',
  'too-many-requests',
  'bad-origin',
  'busy',
  'storage-full',
] as const
export type AppErrorCode = (typeof appErrorCodes)[number]

export interface FieldIssue {
  readonly field: string
  readonly message: string
}

const brand = Symbol.for('inverse-kelvin.app-error')

/**
 * An expected failure whose message may be shown.
 *
 * One server process holds several copies of this module (start-up, pages, handlers), so `instanceof` asks for the mark, not for the copy.
 */
export class AppError extends Error {
  readonly [brand] = true

  static override [Symbol.hasInstance](value: unknown): boolean {
    return typeof value === 'object' && value !== null && brand in value
  }

  constructor(
    readonly code: AppErrorCode,
    message: string,
    readonly details: {
      readonly issues?: readonly FieldIssue[]
      readonly retryAfterS?: number
      readonly [key: string]: unknown
    } = {},
    options?: { cause?: unknown },
  ) {
    super(message, options)
    this.name = 'AppError'
  }
}

/** The expected failure in an error or in what caused it (the database layer wraps what passes through it), or null. */
export function appErrorOf(error: unknown): AppError | null {
  let at = error
  for (let depth = 0; depth < 8 && at instanceof Error; depth++) {
    if (at instanceof AppError) return at
    at = at.cause
  }
  return null
}

/** What a form action answers: the value, or the sentence and the fields at fault. Never thrown across the wire. */
export type ActionResult<T> =
  | { readonly ok: true; readonly value: T }
  | {
      readonly ok: false
      readonly code: AppErrorCode
      readonly message: string
      readonly issues: readonly FieldIssue[]
    }
