// The one thread that owns the database. It opens the folder, runs what it is sent, one after the other, and answers.
// Plain JavaScript on purpose: a worker file is loaded by path, past the bundler.
import fs from 'node:fs'
import path from 'node:path'
import { parentPort, workerData } from 'node:worker_threads'
import { PGlite, types } from '@electric-sql/pglite'
import { NodeFS } from '@electric-sql/pglite/nodefs'

/** @type {{ dataDir: string | null, create: boolean, template: string | null, failSyncAfter: number | null }} */
const { dataDir, create, template, failSyncAfter } = workerData

let syncCount = 0

function syncPath(target) {
  const handle = fs.openSync(target, 'r')
  try {
    fs.fsyncSync(handle)
  } finally {
    fs.closeSync(handle)
  }
}

/**
 * The stock file system has no fsync, so a commit would be acknowledged while it is still in the kernel's memory. Here every fsync the
 * engine asks for reaches the disk, folders included, and one that fails is reported before anything else happens.
 */
class DurableNodeFS extends NodeFS {
  async init(pg, options) {
    const result = await super.init(pg, options)
    result.emscriptenOpts.preRun.push((module) => {
      module.NODEFS.stream_ops.fsync = (stream) => {
        try {
          if (failSyncAfter !== null && syncCount >= failSyncAfter)
            throw new Error('EIO: i/o error, fsync (made to fail)')
          fs.fsyncSync(stream.nfd)
          syncCount += 1
          return 0
        } catch (error) {
          // posted from inside the running statement: it leaves even when the engine gives up at once
          parentPort.postMessage({ fatal: 'sync', message: String(error?.message ?? error) })
          throw new module.FS.ErrnoError(29)
        }
      }
    })
    return result
  }
}

const asText = (value) => value
/** Dates and the like stay text, as the query builder wants them; binary skips the slow general parser. */
const parsers = {
  ...Object.fromEntries(
    [types.TIMESTAMP, types.TIMESTAMPTZ, types.INTERVAL, types.DATE, 1231, 1115, 1185, 1187, 1182].map((type) => [
      type,
      asText,
    ]),
  ),
  [types.BYTEA]: (text) => {
    const bytes = Buffer.allocUnsafeSlow((text.length - 2) / 2)
    bytes.write(text.slice(2), 'hex')
    return new Uint8Array(bytes.buffer)
  },
}

// wal_sync_method: fdatasync is a no-op in this build. The sizes keep the folder at tens of megabytes and the memory modest.
const durableParams = [
  ...PGlite.defaultStartParams.filter((param) => param !== '-F'),
  ...['wal_sync_method=fsync', 'max_wal_size=64MB', 'min_wal_size=32MB', 'shared_buffers=32MB'].flatMap((setting) => [
    '-c',
    setting,
  ]),
]

async function openFolder(folder) {
  return PGlite.create({ fs: new DurableNodeFS(folder), startParams: durableParams, parsers })
}

function syncTree(folder) {
  for (const entry of fs.readdirSync(folder, { withFileTypes: true })) {
    const target = path.join(folder, entry.name)
    if (entry.isDirectory()) syncTree(target)
    else if (entry.isFile()) syncPath(target)
  }
  syncPath(folder)
}

/** A folder under the final name is always a whole database: it is made beside it, synced, and renamed. */
async function createFolder(folder) {
  const draft = `${folder}.tmp`
  fs.rmSync(draft, { recursive: true, force: true })
  fs.mkdirSync(draft, { mode: 0o700 })
  const made = await openFolder(draft)
  await made.exec('checkpoint')
  await made.close()
  syncTree(draft)
  fs.renameSync(draft, folder)
  syncPath(path.dirname(folder))
}

async function open() {
  if (dataDir !== null) return openFolder(dataDir)
  if (template === null) return PGlite.create({ parsers })
  return PGlite.create({ parsers, loadDataDir: new Blob([fs.readFileSync(template)]) })
}

const errorFields = [
  'code',
  'constraint',
  'detail',
  'hint',
  'table',
  'column',
  'schema',
  'severity',
  'where',
  'routine',
]

function describeError(error) {
  const description = { message: String(error?.message ?? error) }
  for (const field of errorFields) if (typeof error?.[field] === 'string') description[field] = error[field]
  return description
}

async function describeResult({ rows, fields, affectedRows, blob }) {
  const result = { rows, fields, affectedRows }
  if (blob) result.blob = new Uint8Array(await blob.arrayBuffer())
  return result
}

async function run(database, message) {
  switch (message.op) {
    case 'query': {
      const options = { rowMode: message.rowMode }
      if (message.blob) options.blob = new Blob([message.blob])
      return describeResult(await database.query(message.sql, message.params, options))
    }
    case 'exec':
      return Promise.all((await database.exec(message.sql)).map(describeResult))
    case 'dump':
      return new Uint8Array(await (await database.dumpDataDir('none')).arrayBuffer())
    case 'close':
      await database.close()
      return null
    default:
      throw new Error(`unknown operation ${message.op}`)
  }
}

/** The engine has stopped; the owner of this thread starts another one. */
function giveUp(message) {
  parentPort.postMessage({ fatal: 'engine', message })
  process.exit(1)
}

async function answer(database, message) {
  try {
    const result = await run(database, message)
    const transfer = result?.blob ? [result.blob.buffer] : result instanceof Uint8Array ? [result.buffer] : []
    parentPort.postMessage({ id: message.id, result, syncCount }, transfer)
  } catch (error) {
    const description = describeError(error)
    parentPort.postMessage({ id: message.id, error: description, syncCount })
    // an error without a code is not the statement's: the engine itself has stopped
    if (description.code === undefined && message.op !== 'dump') {
      giveUp(description.message)
    }
  }
}

/** In this build nothing starts a checkpoint: without one the log grows for ever, and so does the start after a kill. */
const CHECKPOINT_BYTES = 32 * 1024 * 1024
const ANSWERS_BETWEEN_LOOKS = 32
let answers = 0
let isInTransaction = false
let checkpointedAt = 0

async function logPosition(database) {
  const found = await database.query("select (pg_current_wal_insert_lsn() - '0/0')::float8 as bytes")
  return found.rows[0].bytes
}

async function checkpointWhenDue(database, message) {
  if (message.op === 'close') return
  if (message.op === 'exec' && /^(begin|commit|rollback)$/.test(message.sql)) isInTransaction = message.sql === 'begin'
  answers += 1
  if (isInTransaction || answers < ANSWERS_BETWEEN_LOOKS) return
  answers = 0
  const position = await logPosition(database)
  if (position - checkpointedAt < CHECKPOINT_BYTES) return
  await database.exec('checkpoint')
  checkpointedAt = position
}

if (create) {
  await createFolder(dataDir)
  parentPort.postMessage({ created: true })
} else {
  const database = await open()
  // messages are answered strictly in their order
  let tail = Promise.resolve()
  checkpointedAt = await logPosition(database)
  parentPort.on('message', (message) => {
    tail = tail
      .then(() => answer(database, message))
      .then(() => checkpointWhenDue(database, message))
      .catch((error) => giveUp(String(error?.message ?? error)))
  })
  parentPort.postMessage({ ready: true, syncCount })
}
