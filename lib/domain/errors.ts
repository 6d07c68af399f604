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

/** An expected failure whose message may be shown. */
export class AppError extends Error {
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

/** What a form action answers: the value, or the sentence and the fields at fault. Never thrown across the wire. */
export type ActionResult<T> =
  | { readonly ok: true; readonly value: T }
  | {
      readonly ok: false
      readonly code: AppErrorCode
      readonly message: string
      readonly issues: readonly FieldIssue[]
    }
