import { AsyncLocalStorage } from 'node:async_hooks'
import { deserialize, serialize } from 'node:v8'
import { and, eq, isNull, sql } from 'drizzle-orm'
import { AppError } from '@/lib/domain/errors'
import { type Database, type Transaction } from './executor'
import { idempotencyKeys } from './schema/people'

/** A request with a key of its caller's choice, while its work runs. */
export interface KeyedRequest {
  readonly userId: string
  readonly key: string
  /** tells this claim of the key from a later one */
  readonly claimedAt: Date
  /** what the changes gave that an earlier try committed, by the order in which the work asks for transactions */
  readonly done: ReadonlyMap<number, unknown>
}

interface Scope {
  readonly request: KeyedRequest
  readonly counter: { next: number }
  isChange: boolean
}

// one for the process: the server holds several copies of this module, and the open database is shared by all
const slot = Symbol.for('inverse-kelvin.keyed-request')
const shared = globalThis as typeof globalThis & { [slot]?: AsyncLocalStorage<Scope> }
const scope = (shared[slot] ??= new AsyncLocalStorage<Scope>())

/** Runs the work of a keyed request; its changes are remembered under the key, each in its own transaction. */
export function runKeyed<T>(request: KeyedRequest, work: () => Promise<T>): Promise<T> {
  return scope.run({ request, counter: { next: 0 }, isChange: false }, work)
}

/** Said by whatever enters something into history: the transaction that is open is a change. */
export function noteChange(): void {
  const inside = scope.getStore()
  if (inside !== undefined) inside.isChange = true
}

/**
 * Has every change of a keyed request write what it gave beside the key, in the transaction of the change itself. A repeat after the process died
 * between commit and answer is given that instead of a second change. A claim that was taken over meanwhile, or a change that the other of two
 * tries has committed, is rolled back.
 */
export function rememberKeyedChanges(database: Database): Database {
  const transaction = database.transaction.bind(database)
  database.transaction = <T>(work: (tx: Transaction) => Promise<T>, config?: Parameters<typeof transaction>[1]) => {
    const outer = scope.getStore()
    if (outer === undefined) return transaction(work, config)
    const { request, counter } = outer
    const place = counter.next++
    if (request.done.has(place)) return Promise.resolve(request.done.get(place) as T)
    return transaction(async (tx) => {
      const inner: Scope = { request, counter, isChange: false }
      const result = await scope.run(inner, () => work(tx))
      if (inner.isChange) await rememberChange(tx, request, place, result)
      return result
    }, config)
  }
  return database
}

async function rememberChange(tx: Transaction, request: KeyedRequest, place: number, result: unknown): Promise<void> {
  const kept = serialize(result).toString('base64')
  const rows = await tx
    .update(idempotencyKeys)
    .set({
      response: sql`jsonb_build_object('done', coalesce(${idempotencyKeys.response} -> 'done', '{}'::jsonb) || jsonb_build_object(${String(place)}::text, ${kept}::text))`,
    })
    .where(
      and(
        eq(idempotencyKeys.userId, request.userId),
        eq(idempotencyKeys.key, request.key),
        eq(idempotencyKeys.createdAt, request.claimedAt),
        isNull(idempotencyKeys.status),
        sql`(${idempotencyKeys.response} #> array['done', ${String(place)}::text]) is null`,
      ),
    )
    .returning({ key: idempotencyKeys.key })
  if (rows.length === 0)
    throw new AppError('conflict', 'The same request was sent again and is being answered there.', { retryAfterS: 2 })
}

/** The remembered changes of a key that has no answer yet; null where none was committed. */
export function changesOf(response: unknown): ReadonlyMap<number, unknown> | null {
  if (typeof response !== 'object' || response === null || !('done' in response)) return null
  return new Map(
    Object.entries(response.done as Readonly<Record<string, string>>).map(([place, kept]) => [
      Number(place),
      deserialize(Buffer.from(kept, 'base64')) as unknown,
    ]),
  )
}
