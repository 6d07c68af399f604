// One hash or comparison at a time: bcrypt in plain JavaScript holds its thread for a quarter of a second, so it runs beside the server.
import { compareSync, hashSync } from 'bcryptjs'
import { parentPort } from 'node:worker_threads'

parentPort?.on('message', ({ id, prepared, cost, hash }) => {
  try {
    parentPort.postMessage({
      id,
      ok: true,
      value: hash === null ? hashSync(prepared, cost) : compareSync(prepared, hash),
    })
  } catch (error) {
    parentPort.postMessage({ id, ok: false, message: String(error) })
  }
})
