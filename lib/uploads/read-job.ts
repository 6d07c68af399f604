import 'server-only'
import { statSync } from 'node:fs'
import path from 'node:path'
import { Worker } from 'node:worker_threads'
import { type ColumnMapSpecification } from '../domain/column-map'
import { AppError } from '../domain/errors'
import { environment } from '../environment'
import { type Detection, type Problem, type Question } from '../domain/intake'
import { type AppliedReading, emptyReading } from './column-map/applied-reading'
import { LIMITS } from './limits'
import { problem } from './problem-list'
import { type ResponseFactorReading, type ResponseFactorTable } from './read-response-factors'
import { type ReadTask } from './read-task'
import { type ReadingContext } from './reading-context'

/** What has become of the file when its reading fails: uploads stand in the store before they are read, calibrations come after. */
const STANDING = {
  detect: 'The file itself is kept.',
  read: 'The file itself is kept.',
  'response-factors': 'Nothing of it was kept.',
} as const satisfies Record<ReadTask['kind'], string>

/** Reading is all arithmetic: two threads leave a small machine with room to answer. */
const THREADS = 2
const LONGEST_QUEUE = 20
const MEMORY = { maxOldGenerationSizeMb: 256, maxYoungGenerationSizeMb: 32, stackSizeMb: 4 }

export interface JobOptions {
  readonly signal?: AbortSignal
  /** wall clock; by default it grows with the size of the file */
  readonly deadlineMs?: number
}

/** Looks at a file in a thread of its own. What goes wrong there is a problem of the file, and said as one. */
export async function detectInThread(
  file: string,
  name: string,
  context: ReadingContext,
  options: JobOptions = {},
): Promise<{ readonly detections: readonly Detection[]; readonly problems: readonly Problem[] }> {
  const outcome = await runTask<{ detections: Detection[]; problems: Problem[] }>(
    { kind: 'detect', path: file, name, context },
    options,
  )
  return outcome.ok ? outcome.value : { detections: [], problems: [outcome.problem] }
}

/** Reads a file in a thread of its own. */
export async function readInThread(
  file: string,
  name: string,
  specification: ColumnMapSpecification,
  context: ReadingContext,
  options: JobOptions = {},
): Promise<AppliedReading & { readonly questions: readonly Question[] }> {
  const outcome = await runTask<AppliedReading & { questions: Question[] }>(
    { kind: 'read', path: file, name, context, specification },
    options,
  )
  return outcome.ok ? outcome.value : { ...emptyReading(specification, [outcome.problem]), questions: [] }
}

/** Reads a table of response factors in a thread of its own. What keeps it from being taken is refused, with the file's name. */
export async function readResponseFactorsInThread(
  file: string,
  name: string,
  options: JobOptions = {},
): Promise<ResponseFactorTable> {
  const outcome = await runTask<ResponseFactorReading>({ kind: 'response-factors', path: file, name }, options)
  const { table, refusal } = outcome.ok ? outcome.value : { table: null, refusal: outcome.problem.sentence }
  if (table === null) throw new AppError('unprocessable', `${name}: ${refusal}`)
  return table
}

type Outcome<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problem: Problem }

let running = 0
const waiting: (() => void)[] = []

async function runTask<T>(task: ReadTask, options: JobOptions): Promise<Outcome<T>> {
  if (running >= THREADS) {
    if (waiting.length >= LONGEST_QUEUE)
      throw new AppError('busy', `Many files are being read just now. Try again in a minute. ${STANDING[task.kind]}`, {
        retryAfterS: 30,
      })
    await new Promise<void>((resolve) => waiting.push(resolve))
  } else running++
  try {
    return await inThread<T>(task, options)
  } finally {
    const next = waiting.shift()
    // the place is handed on, or given back
    if (next === undefined) running--
    else next()
  }
}

function inThread<T>(task: ReadTask, options: JobOptions): Promise<Outcome<T>> {
  const deadlineMs = options.deadlineMs ?? LIMITS.readingMs(statSync(task.path).size)
  return new Promise((resolve, reject) => {
    const worker = openThread(task)
    let isOver = false
    const end = (finish: () => void): void => {
      if (isOver) return
      isOver = true
      clearTimeout(timer)
      options.signal?.removeEventListener('abort', abort)
      void worker.terminate()
      finish()
    }
    const fail = (code: Problem['code'], sentence: string, found = ''): void =>
      end(() => resolve({ ok: false, problem: problem({ code, severity: 'fatal', found, sentence }) }))
    const abort = (): void => end(() => reject(new AppError('conflict', 'The reading was cancelled.')))
    const timer = setTimeout(
      () =>
        fail(
          'limit-reached',
          `Reading the file took longer than ${String(Math.round(deadlineMs / 1_000))} s and was stopped. Nothing of it was taken in.`,
        ),
      deadlineMs,
    )
    if (options.signal?.aborted === true) abort()
    options.signal?.addEventListener('abort', abort)
    worker.on('message', (message: { ok: true; value: T } | { ok: false; message: string }) => {
      if (message.ok) end(() => resolve({ ok: true, value: message.value }))
      else {
        console.error(JSON.stringify({ at: new Date().toISOString(), reading: task.name, error: message.message }))
        fail(
          'unreadable',
          `The file could not be read: something in it was not foreseen. Tell an admin, who finds the cause in the log. ${STANDING[task.kind]}`,
        )
      }
    })
    worker.on('error', (error: Error & { code?: string }) => {
      if (error.code === 'ERR_WORKER_OUT_OF_MEMORY')
        fail(
          'limit-reached',
          'Reading the file took more memory than is allowed. Divide it, or export the readings as delimited text.',
        )
      else end(() => reject(error))
    })
    worker.on('exit', (code) =>
      fail(
        'unreadable',
        `The reading stopped before its end (code ${String(code)}). Try again. ${STANDING[task.kind]}`,
      ),
    )
  })
}

/** The build makes a file of its own of the thread's code and puts its place here; where sources run as they stand, a loader reads them. */
function openThread(task: ReadTask): Worker {
  const options = { workerData: task, resourceLimits: MEMORY }
  return environment.IS_BUNDLED
    ? new Worker(new URL('./read-worker.ts', import.meta.url), options)
    : new Worker(
        path.join(/* turbopackIgnore: true */ process.cwd(), 'lib/uploads/read-worker-from-source.mjs'),
        options,
      )
}
