import { parentPort, workerData } from 'node:worker_threads'
import { type ReadTask } from './read-task'
import { detectFile, readFile } from './read-file'
import { readResponseFactors } from './read-response-factors'

/** Runs one task and ends: a file that broke something breaks nothing else. */
async function run(task: ReadTask): Promise<void> {
  if (task.kind === 'detect') {
    parentPort?.postMessage({ ok: true, value: await detectFile(task.path, task.context) })
    return
  }
  if (task.kind === 'response-factors') {
    parentPort?.postMessage({ ok: true, value: await readResponseFactors(task.path) })
    return
  }
  const reading = await readFile(task.path, task.specification, task.context)
  parentPort?.postMessage(
    { ok: true, value: reading },
    reading.channels.flatMap(({ values }) => (values.buffer instanceof ArrayBuffer ? [values.buffer] : [])),
  )
}

void run(workerData as ReadTask).catch((error: unknown) => {
  parentPort?.postMessage({
    ok: false,
    message: error instanceof Error ? (error.stack ?? error.message) : String(error),
  })
})
