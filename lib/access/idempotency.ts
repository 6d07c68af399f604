import 'server-only'
import { createHash } from 'node:crypto'
import { getDatabase } from '../../db/client'
import { changesOf, runKeyed } from '../../db/keyed-request'
import { claimIdempotencyKey, releaseIdempotencyKey, storeIdempotentAnswer } from '../../db/mutations/people'
import { selectIdempotencyKey } from '../../db/queries/people'
import { AppError } from '../domain/errors'
import { type Actor } from '../domain/role'

const ANSWERED_LIFE_S = 86_400
/** A request that never answered nor changed anything, because the process died under it, frees its key after this. */
const UNANSWERED_LIFE_S = 600
const KEY = /^[\x21-\x7e]{8,200}$/

export interface StoredAnswer {
  readonly status: number
  readonly body: unknown
  readonly headers: Readonly<Record<string, string>>
}

function storedAnswer(status: number, response: unknown): StoredAnswer {
  const { body, headers } =
    typeof response === 'object' && response !== null
      ? { body: null, headers: {}, ...response }
      : { body: null, headers: {} }
  return {
    status,
    body,
    headers: Object.fromEntries(
      Object.entries(headers ?? {}).flatMap(([name, value]) => (typeof value === 'string' ? [[name, value]] : [])),
    ),
  }
}

/**
 * Runs a creating request at most once for its key. The same key with the same request answers what was answered the
 * first time; with another request it is refused; while the first is still running the second is asked to wait. An
 * answer that is not a success is not kept, so that the request may be mended and sent again.
 *
 * What a change gave is written beside the key in the transaction of the change. Where the process died between commit and
 * answer, the work runs again on that: it makes nothing twice and comes to the same answer.
 *
 * @param work - the request; told whether an earlier try of it changed something
 */
export async function onceForKey(
  actor: Actor,
  key: string,
  request: { readonly method: string; readonly path: string; readonly body: string },
  work: (isResumed: boolean) => Promise<StoredAnswer>,
  now = new Date(),
): Promise<StoredAnswer> {
  if (!KEY.test(key))
    throw new AppError(
      'invalid',
      'The Idempotency-Key header needs 8 to 200 visible ASCII characters; a UUID is a good one.',
    )
  const requestHash = createHash('sha256')
    .update(JSON.stringify([request.method, request.path, request.body]))
    .digest('hex')
  const db = await getDatabase()
  const before = (seconds: number) => new Date(now.getTime() - seconds * 1000)
  const isClaimed = await db.transaction((tx) =>
    claimIdempotencyKey(tx, {
      userId: actor.userId,
      key,
      requestHash,
      now,
      answeredBefore: before(ANSWERED_LIFE_S),
      unansweredBefore: before(UNANSWERED_LIFE_S),
    }),
  )
  let claimedAt = now
  let done: ReadonlyMap<number, unknown> = new Map()
  if (!isClaimed) {
    const earlier = await selectIdempotencyKey(db, actor.userId, key)
    if (earlier !== null && earlier.requestHash !== requestHash)
      throw new AppError(
        'unprocessable',
        'This Idempotency-Key was used for another request. Take a new key for a new request.',
      )
    if (earlier !== null && earlier.status !== null) return storedAnswer(earlier.status, earlier.response)
    const changes = earlier === null ? null : changesOf(earlier.response)
    if (earlier === null || changes === null)
      throw new AppError(
        'conflict',
        'The first request with this Idempotency-Key is still running. Send it again in a moment.',
        {
          retryAfterS: 2,
        },
      )
    claimedAt = earlier.createdAt
    done = changes
  }
  const claim = { userId: actor.userId, key, claimedAt }
  try {
    const answer = await runKeyed({ ...claim, done }, () => work(done.size > 0))
    if (answer.status >= 200 && answer.status < 300)
      await storeIdempotentAnswer(db, claim, answer.status, { body: answer.body, headers: answer.headers })
    else await releaseIdempotencyKey(db, claim)
    return answer
  } catch (error) {
    await releaseIdempotencyKey(db, claim)
    throw error
  }
}
