import 'server-only'
import { join } from 'node:path'
import { Worker } from 'node:worker_threads'
import { AppError } from '../domain/errors'

/** Hashing is meant to be slow: two at a time leave the server its breath, and a longer queue would only hide an attack. */
const THREADS = 2
const QUEUE = 20

interface Job {
  readonly id: number
  readonly prepared: string
  readonly cost: number
  /** null makes a hash; else the one to compare with */
  readonly hash: string | null
  readonly done: (value: unknown) => void
  readonly failed: (error: Error) => void
}
interface Thread {
  readonly worker: Worker
  job: Job | null
}
interface Pool {
  readonly threads: Thread[]
  readonly waiting: Job[]
  nextId: number
}
const POOL = Symbol.for('inverse-kelvin.password-threads')

// The server may load this module more than once; the limit holds for the process.
function pool(): Pool {
  const holder: typeof globalThis & { [POOL]?: Pool } = globalThis
  return (holder[POOL] ??= { threads: [], waiting: [], nextId: 1 })
}

function startThread(): Thread {
  const worker = new Worker(join(/* turbopackIgnore: true */ process.cwd(), 'lib', 'auth', 'password-worker.mjs'))
  const thread: Thread = { worker, job: null }
  worker.unref()
  worker.on('message', (answer: { id: number; ok: boolean; value?: unknown; message?: string }) => {
    const job = thread.job
    thread.job = null
    worker.unref()
    if (job !== null && job.id === answer.id) {
      if (answer.ok) job.done(answer.value)
      else job.failed(new Error(answer.message ?? 'hashing failed'))
    }
    pass()
  })
  const lose = (error: Error) => {
    const { threads } = pool()
    const place = threads.indexOf(thread)
    if (place >= 0) threads.splice(place, 1)
    thread.job?.failed(error)
    thread.job = null
    pass()
  }
  worker.on('error', lose)
  worker.on('exit', (code) => lose(new Error(`the password thread ended with code ${code}`)))
  return thread
}

/** Hands waiting jobs to idle threads. */
function pass(): void {
  const { threads, waiting } = pool()
  while (waiting.length > 0) {
    let thread = threads.find((one) => one.job === null)
    if (thread === undefined) {
      if (threads.length >= THREADS) return
      thread = startThread()
      threads.push(thread)
    }
    const job = waiting.shift()
    if (job === undefined) return
    thread.job = job
    thread.worker.ref()
    thread.worker.postMessage({ id: job.id, prepared: job.prepared, cost: job.cost, hash: job.hash })
  }
}

function enqueue(prepared: string, cost: number, hash: string | null): Promise<unknown> {
  const { threads, waiting } = pool()
  const working = threads.filter((one) => one.job !== null).length
  if (working >= THREADS && waiting.length >= QUEUE)
    return Promise.reject(
      new AppError('busy', 'Many people are signing in at this moment. Try again in ten seconds.', { retryAfterS: 10 }),
    )
  return new Promise((done, failed) => {
    waiting.push({ id: pool().nextId++, prepared, cost, hash, done, failed })
    pass()
  })
}

/** The bcrypt hash of a prepared password, made in a thread. */
export async function hashInThread(prepared: string, cost: number): Promise<string> {
  return String(await enqueue(prepared, cost, null))
}

/** Whether a prepared password fits a hash, found in a thread. */
export async function compareInThread(prepared: string, hash: string): Promise<boolean> {
  return (await enqueue(prepared, 0, hash)) === true
}
