import 'server-only'
import path from 'node:path'
import { Worker } from 'node:worker_threads'
import { AppError } from '@/lib/domain/errors'
import { databaseLimits } from '../database-limits'
import { insideTransaction } from '../inside-transaction'

export interface QueryOptions {
  readonly rowMode?: 'array' | 'object'
  /** what `COPY … FROM '/dev/blob'` reads */
  readonly blob?: Uint8Array
}

export interface QueryResult {
  readonly rows: unknown[]
  readonly fields: { readonly name: string; readonly dataTypeID: number }[]
  readonly affectedRows?: number
  /** what `COPY … TO '/dev/blob'` wrote */
  readonly blob?: Uint8Array
}

/** What a transaction's callback and the query builder are given. */
export interface StatementRunner {
  query(sql: string, params?: readonly unknown[], options?: QueryOptions): Promise<QueryResult>
  exec(sql: string): Promise<QueryResult[]>
}

export interface ThreadOptions {
  /** null for a database in memory */
  readonly dataDir: string | null
  /** an archive that a database in memory starts from */
  readonly template?: string
  /** called once when the disk refused to keep what was written; the process must not go on */
  readonly onSyncFailure: (message: string) => void
  /** for the test of the failing disk: syncs that succeed before one fails */
  readonly failSyncAfter?: number
}

export interface ThreadCounters {
  /** statements or transactions ended at their deadline */
  deadlines: number
  /** times the thread was started again */
  reopenings: number
  /** fsync calls that succeeded, as last reported */
  syncs: number
}

type Request =
  | { op: 'query'; sql: string; params: readonly unknown[]; rowMode: string; blob: Uint8Array | undefined }
  | { op: 'exec'; sql: string }
  | { op: 'dump' }
  | { op: 'close' }

interface Call {
  readonly request: Request
  readonly deadlineMs: number
  readonly resolve: (result: unknown) => void
  readonly reject: (error: Error) => void
}

interface OpenTransaction {
  isOpen: boolean
  hasFailedStatement: boolean
  isCommitting: boolean
  /** the thread it runs in, once its turn has come */
  worker: Worker | null
  readonly abort: (error: Error) => void
}

type Entry =
  | { readonly kind: 'call'; readonly call: Call }
  | {
      readonly kind: 'transaction'
      readonly transaction: OpenTransaction
      readonly start: (worker: Worker) => void
      readonly reject: (error: Error) => void
    }
type Waiting = Entry & { readonly timer: NodeJS.Timeout }

type Message =
  | { fatal: 'sync' | 'engine'; message: string }
  | { ready: true; syncCount: number }
  | { created: true }
  | { id: number; result?: unknown; error?: { message: string }; syncCount: number }

/** A statement's error as the server worded it, with `code`, `constraint` and the rest. */
export class StatementError extends Error {
  declare readonly code: string | undefined
  declare readonly constraint: string | undefined
  constructor(fields: { message: string }) {
    super(fields.message)
    Object.assign(this, fields)
    this.name = 'StatementError'
  }
}

/** Statements sent ahead of their turn, so that the thread does not idle between an answer and the next question. */
const SENT_AHEAD = 16

const workerFile = () => path.join(/* turbopackIgnore: true */ process.cwd(), 'db/pglite/worker.mjs')

const tooBusy = (sentence: string) => new AppError('busy', sentence, { retryAfterS: 2 })
const atDeadline = (what: string, milliseconds: number) =>
  tooBusy(`${what} took longer than ${milliseconds / 1000} s and was ended. Nothing of it was kept; try again.`)

/**
 * The database in its own thread, with the interface the query builder wants.
 *
 * Queueing is done on this side of the thread, so it is known which statement runs and for how long. One that passes its deadline cannot be
 * interrupted; the thread is ended and started again, which loses nothing that was acknowledged.
 */
export class PGliteThread implements StatementRunner {
  readonly counters: ThreadCounters = { deadlines: 0, reopenings: 0, syncs: 0 }
  readonly #options: ThreadOptions
  /** in the order sent, which is the order answered; the first one is running */
  readonly #sent = new Map<number, Call>()
  readonly #waiting = new Set<Waiting>()
  #worker: Worker | null = null
  #opening: Promise<void> | null = null
  #transaction: OpenTransaction | null = null
  #headTimer: NodeJS.Timeout | undefined
  #lastId = 0
  #isClosed = false
  #isReadOnly = false

  private constructor(options: ThreadOptions) {
    this.#options = options
  }

  static async open(options: ThreadOptions): Promise<PGliteThread> {
    const client = new PGliteThread(options)
    await client.#start()
    return client
  }

  /** Makes the folder in a thread of its own, whose memory (most of a gigabyte) goes back when it ends. */
  static async create(dataDir: string): Promise<void> {
    const worker = spawn({ dataDir, create: true, template: null, failSyncAfter: null })
    await new Promise<void>((resolve, reject) => {
      worker.on('message', (message: Message) => {
        if ('created' in message) resolve()
        else if ('fatal' in message) reject(new Error(message.message))
      })
      worker.on('error', reject)
      worker.on('exit', () => reject(new Error(`the database thread ended before ${dataDir} was made`)))
    })
    await worker.terminate()
  }

  query(sql: string, params: readonly unknown[] = [], options: QueryOptions = {}): Promise<QueryResult> {
    return this.#enqueue(queryRequest(sql, params, options)) as Promise<QueryResult>
  }

  exec(sql: string): Promise<QueryResult[]> {
    return this.#enqueue({ op: 'exec', sql }) as Promise<QueryResult[]>
  }

  /** The whole folder as an archive; for the tests' template. */
  dump(): Promise<Uint8Array> {
    return this.#enqueue({ op: 'dump' }) as Promise<Uint8Array>
  }

  async transaction<T>(callback: (transaction: StatementRunner) => Promise<T>): Promise<T> {
    insideTransaction.refuseOuter(this)
    const limits = databaseLimits()
    let abort: (error: Error) => void = () => {}
    const aborted = new Promise<never>((_, reject) => (abort = reject))
    aborted.catch(() => {})
    const transaction: OpenTransaction = {
      isOpen: true,
      hasFailedStatement: false,
      isCommitting: false,
      worker: null,
      abort,
    }
    const worker = await this.#turn(transaction)
    const timer = setTimeout(() => this.#transactionExpired(transaction, limits.transactionMs), limits.transactionMs)
    const send = (request: Request) => this.#send({ request, deadlineMs: limits.callMs }, worker)
    try {
      await send({ op: 'exec', sql: 'begin' })
      const result = await Promise.race([
        insideTransaction.run(this, transaction, () => callback(this.#runner(transaction))),
        aborted,
      ])
      // a swallowed error leaves the transaction dead, and `commit` would then roll back without a word
      if (transaction.hasFailedStatement) await send({ op: 'exec', sql: 'select 1' })
      transaction.isOpen = false
      transaction.isCommitting = true
      await send({ op: 'exec', sql: 'commit' })
      return result
    } catch (error) {
      transaction.isOpen = false
      if (this.#worker === worker) await send({ op: 'exec', sql: 'rollback' }).catch(() => {})
      throw error
    } finally {
      clearTimeout(timer)
      transaction.isOpen = false
      if (this.#transaction === transaction) this.#transaction = null
      this.#pump()
    }
  }

  async close(): Promise<void> {
    if (this.#isClosed) return
    this.#isClosed = true
    await this.#opening?.catch(() => {})
    const worker = this.#worker
    this.#rejectWaiting(new AppError('busy', 'The database is closing.'))
    if (!worker) return
    await this.#send({ request: { op: 'close' }, deadlineMs: databaseLimits().callMs }, worker).catch(() => {})
    this.#worker = null
    await worker.terminate()
  }

  // ---- sending

  #runner(transaction: OpenTransaction): StatementRunner {
    const send = async (request: Request) => {
      if (!transaction.isOpen || !transaction.worker)
        throw new Error('This transaction has ended; its statements must be awaited inside it.')
      try {
        return await this.#send({ request, deadlineMs: databaseLimits().callMs }, transaction.worker)
      } catch (error) {
        transaction.hasFailedStatement = true
        throw error
      }
    }
    return {
      query: (sql, params = [], options = {}) => send(queryRequest(sql, params, options)) as Promise<QueryResult>,
      exec: (sql) => send({ op: 'exec', sql }) as Promise<QueryResult[]>,
    }
  }

  #refuseIfUnusable() {
    if (this.#isReadOnly)
      throw new AppError('storage-full', 'The disk refused to keep a change; the database has stopped.')
    if (this.#isClosed) throw new AppError('busy', 'The database is closed.')
  }

  async #enqueue(request: Request): Promise<unknown> {
    insideTransaction.refuseOuter(this)
    this.#refuseIfUnusable()
    const limits = databaseLimits()
    return new Promise((resolve, reject) => {
      this.#wait({ kind: 'call', call: { request, deadlineMs: limits.callMs, resolve, reject } }, limits.waitMs)
    })
  }

  async #turn(transaction: OpenTransaction): Promise<Worker> {
    this.#refuseIfUnusable()
    return new Promise((resolve, reject) => {
      this.#wait({ kind: 'transaction', transaction, start: resolve, reject }, databaseLimits().waitMs)
    })
  }

  #wait(entry: Entry, waitMs: number) {
    const timer = setTimeout(() => {
      this.#waiting.delete(waiting)
      rejectionOf(waiting)(tooBusy(`The database was busy for ${waitMs / 1000} s; try again in a moment.`))
    }, waitMs)
    const waiting: Waiting = { ...entry, timer }
    this.#waiting.add(waiting)
    if (this.#worker) this.#pump()
    else this.#start().catch((error: Error) => this.#rejectWaiting(error))
  }

  /** Sends what may be sent: nothing from outside while a transaction is open, and a transaction only when all before it is answered. */
  #pump() {
    const worker = this.#worker
    if (!worker) return
    for (const waiting of this.#waiting) {
      if (this.#transaction) return
      if (waiting.kind === 'transaction' ? this.#sent.size > 0 : this.#sent.size >= SENT_AHEAD) return
      this.#waiting.delete(waiting)
      clearTimeout(waiting.timer)
      if (waiting.kind === 'call') this.#post(waiting.call, worker)
      else {
        waiting.transaction.worker = worker
        this.#transaction = waiting.transaction
        waiting.start(worker)
      }
    }
  }

  #send(call: { request: Request; deadlineMs: number }, worker: Worker): Promise<unknown> {
    return new Promise((resolve, reject) => {
      if (this.#worker !== worker)
        return reject(tooBusy('The database started again while this was under way; try again.'))
      this.#post({ ...call, resolve, reject }, worker)
    })
  }

  #post(call: Call, worker: Worker) {
    this.#lastId += 1
    this.#sent.set(this.#lastId, call)
    if (this.#sent.size === 1) this.#watchHead()
    try {
      worker.postMessage({ id: this.#lastId, ...call.request })
    } catch (error) {
      // a parameter that cannot cross to the thread
      this.#sent.delete(this.#lastId)
      call.reject(error instanceof Error ? error : new Error(String(error)))
    }
  }

  /** The clock of a statement starts when the one before it was answered: waiting is not running. */
  #watchHead() {
    clearTimeout(this.#headTimer)
    const head = this.#sent.values().next().value
    if (!head || !Number.isFinite(head.deadlineMs)) return
    this.#headTimer = setTimeout(() => {
      this.counters.deadlines += 1
      this.#restart(atDeadline('A question to the database', head.deadlineMs))
    }, head.deadlineMs)
  }

  #transactionExpired(transaction: OpenTransaction, milliseconds: number) {
    if (transaction.isCommitting || this.#transaction !== transaction) return
    this.counters.deadlines += 1
    const error = atDeadline('A change to the database', milliseconds)
    transaction.isOpen = false
    transaction.abort(error)
    if (this.#sent.size > 0) this.#restart(error)
  }

  // ---- the thread

  #start(): Promise<void> {
    return (this.#opening ??= this.#open().finally(() => (this.#opening = null)))
  }

  async #open(): Promise<void> {
    this.#refuseIfUnusable()
    const { dataDir, template, failSyncAfter } = this.#options
    const worker = spawn({ dataDir, create: false, template: template ?? null, failSyncAfter: failSyncAfter ?? null })
    await new Promise<void>((resolve, reject) => {
      worker.on('message', (message: Message) => {
        if ('ready' in message) resolve()
        else this.#received(message, worker)
      })
      worker.on('error', (error) => {
        reject(error)
        this.#ended(worker, error)
      })
      // terminate() emits nothing but this
      worker.on('exit', (code) => {
        const error = new Error(`the database thread ended (${code})`)
        reject(error)
        this.#ended(worker, error)
      })
    })
    this.#worker = worker
    this.#pump()
  }

  #received(message: Message, worker: Worker) {
    if ('fatal' in message) {
      if (message.fatal === 'sync') this.#syncFailed(message.message)
      return
    }
    if (!('id' in message) || this.#worker !== worker) return
    const call = this.#sent.get(message.id)
    if (!call) return
    this.counters.syncs = message.syncCount
    this.#sent.delete(message.id)
    this.#watchHead()
    if (message.error) call.reject(new StatementError(message.error))
    else call.resolve(message.result)
    this.#pump()
  }

  #syncFailed(message: string) {
    if (this.#isReadOnly) return
    this.#isReadOnly = true
    this.#rejectAll(new AppError('storage-full', 'The disk refused to keep a change; the database has stopped.'))
    this.#options.onSyncFailure(message)
  }

  #ended(worker: Worker, cause: Error) {
    if (this.#worker !== worker || this.#isClosed) return
    this.#worker = null
    this.#rejectAll(
      new AppError(
        'busy',
        'The database stopped and is starting again; try again in a moment.',
        { retryAfterS: 2 },
        { cause },
      ),
    )
    this.#startAgain()
  }

  #restart(error: AppError) {
    const worker = this.#worker
    this.#worker = null
    this.#rejectAll(error)
    if (worker) void worker.terminate().then(() => this.#startAgain())
  }

  #startAgain() {
    if (this.#isClosed || this.#isReadOnly) return
    this.counters.reopenings += 1
    // a failure meets the next caller, who tries again
    this.#start().catch((error: Error) => this.#rejectWaiting(error))
  }

  #rejectAll(error: Error) {
    clearTimeout(this.#headTimer)
    const sent = [...this.#sent.values()]
    this.#sent.clear()
    this.#transaction?.abort(error)
    if (this.#transaction) this.#transaction.isOpen = false
    this.#transaction = null
    for (const call of sent) call.reject(error)
    this.#rejectWaiting(error)
  }

  #rejectWaiting(error: Error) {
    const waiting = [...this.#waiting]
    this.#waiting.clear()
    for (const entry of waiting) {
      clearTimeout(entry.timer)
      rejectionOf(entry)(error)
    }
  }
}

const rejectionOf = (waiting: Waiting) => (waiting.kind === 'call' ? waiting.call.reject : waiting.reject)

const queryRequest = (sql: string, params: readonly unknown[], options: QueryOptions): Request => ({
  op: 'query',
  sql,
  params,
  rowMode: options.rowMode ?? 'object',
  blob: options.blob,
})

const spawn = (workerData: {
  dataDir: string | null
  create: boolean
  template: string | null
  failSyncAfter: number | null
}) => new Worker(workerFile(), { workerData })
