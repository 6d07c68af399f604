#!/usr/bin/env node
// Watches a folder on an instrument's computer and sends every new file that has stopped growing to Inverse Kelvin.
// Needs Node 20 or newer and nothing else. It only reads the folder; the files stay where they are.
//
//   set KELVIN_TOKEN=ik_...            a token with the scopes "read" and "intake", from the page Settings
//   node send-folder.mjs --folder C:\exports --server https://kelvin.laboratory.example --rig "Rig B" --channel 1
//
// A file in a subfolder named like a run (R-0012) goes to that run. Any other file goes to the open run of the rig (and channel) that started last.
// What was sent is written down in sent.jsonl beside the files, so that a restart sends nothing twice; if it did, the server would answer with the file it has.
// While the network is down the files wait. A file that is refused is written down with the reason and is tried again only when it has changed.

import { createHash } from 'node:crypto'
import { appendFileSync, createReadStream, existsSync, openAsBlob, readdirSync, readFileSync, statSync } from 'node:fs'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { parseArgs } from 'node:util'

const { values: options } = parseArgs({
  options: {
    folder: { type: 'string' },
    server: { type: 'string' },
    rig: { type: 'string' },
    channel: { type: 'string' },
    /** seconds between looks; a file is sent when it did not change between two looks */
    every: { type: 'string', default: '10' },
    /** look, send what is ready, and stop: for a task scheduler */
    once: { type: 'boolean', default: false },
  },
})
const token = process.env.KELVIN_TOKEN ?? ''
const everyMs = Number(options.every) * 1_000
for (const [isWrong, sentence] of [
  [options.folder === undefined, 'Say which folder: --folder C:\\exports'],
  [options.server === undefined, 'Say which server: --server https://kelvin.laboratory.example'],
  [token === '', 'Put a token with the scopes read and intake into the variable KELVIN_TOKEN.'],
  [!(everyMs >= 100), 'Say the seconds between two looks as a number: --every 10'],
])
  if (isWrong) {
    console.error(sentence)
    process.exit(2)
  }
const folder = path.resolve(options.folder)
const api = new URL('/api/v1/', options.server)
const ledger = path.join(folder, 'sent.jsonl')
const RUN_CODE = /^R-\d{1,9}$/i
const LONGEST_PAUSE_MS = 60_000

/** path in the folder -> size and time of the file as it was last sent or refused */
const done = new Map()
if (existsSync(ledger))
  for (const line of readFileSync(ledger, 'utf8').split('\n')) {
    if (line.trim() === '') continue
    try {
      const entry = JSON.parse(line)
      done.set(entry.file, entry.stamp)
    } catch {
      // the last line was cut off by a power failure: its file is sent again, and the server knows its bytes
    }
  }

const say = (sentence) => console.log(`${new Date().toISOString()} ${sentence}`)
const stampOf = ({ size, mtimeMs }) => `${size} ${mtimeMs}`

function write(file, stamp, outcome) {
  appendFileSync(ledger, `${JSON.stringify({ file, stamp, at: new Date().toISOString(), ...outcome })}\n`)
  done.set(file, stamp)
}

/** Files of the folder and of its subfolders that are named like runs. */
function filesNow() {
  const found = []
  const look = (inside) => {
    for (const entry of readdirSync(path.join(folder, inside), { withFileTypes: true })) {
      const name = path.join(inside, entry.name)
      if (entry.isDirectory() && inside === '' && RUN_CODE.test(entry.name)) look(name)
      else if (entry.isFile() && name !== 'sent.jsonl' && !/^[.~]|\.(tmp|part|lock)$/i.test(entry.name))
        found.push(name)
    }
  }
  look('')
  return found.sort()
}

class Refused extends Error {}

/** An answer of the server; throws Refused for what will not be better the next time, and any other error for what may be. */
async function call(address, init = {}) {
  const answer = await fetch(new URL(address, api), {
    ...init,
    headers: { Authorization: `Bearer ${token}`, ...init.headers },
    signal: AbortSignal.timeout(600_000),
  })
  if (answer.ok) return answer.json()
  const text = await answer.text()
  let sentence = `the server answered ${answer.status}`
  try {
    sentence = JSON.parse(text).detail ?? sentence
  } catch {
    // not the product's own answer: a proxy's, say
  }
  if ([400, 404, 409, 413, 415, 422].includes(answer.status)) throw new Refused(sentence)
  throw new Error(sentence)
}

async function all(address) {
  const items = []
  for (let next = address; next;) {
    const page = await call(next)
    items.push(...page.items)
    next =
      page.next === null ? '' : `${address}${address.includes('?') ? '&' : '?'}cursor=${encodeURIComponent(page.next)}`
  }
  return items
}

/** The run that a file belongs to; null while there is none, which is no fault of the file. */
async function runFor(file) {
  const code = path.dirname(file)
  if (code !== '.') {
    const runs = await all('runs')
    return runs.find((run) => run.code.toLowerCase() === code.toLowerCase()) ?? null
  }
  if (options.rig === undefined) throw new Refused('it lies in no subfolder named like a run, and no --rig was said')
  const rig = (await all('rigs')).find((one) => one.code === options.rig)
  if (rig === undefined) throw new Error(`there is no rig “${options.rig}”`)
  const runs = await all(`runs?state=open&rigId=${rig.id}`)
  // latest start first
  return runs.find((run) => options.channel === undefined || run.channel === options.channel) ?? null
}

async function sha256Of(file) {
  const hash = createHash('sha256')
  for await (const chunk of createReadStream(file)) hash.update(chunk)
  return hash.digest('hex')
}

async function send(file, stamp) {
  const full = path.join(folder, file)
  const run = await runFor(file)
  if (run === null) {
    say(`${file} waits: there is no run for it yet.`)
    return
  }
  const sha256 = await sha256Of(full)
  const { items } = await call(`runs/${run.id}/uploads`, {
    method: 'POST',
    headers: {
      'Content-Type': 'application/octet-stream',
      'X-File-Name': encodeURIComponent(path.basename(file)),
      'X-File-SHA256': sha256,
    },
    body: await openAsBlob(full),
  })
  const [upload] = items
  write(file, stamp, { run: run.code, upload: upload.id, sha256, isNew: upload.isNew })
  say(`${file} is with ${run.code}${upload.isNew ? '' : ', which had it already'}: ${upload.state}.`)
}

let seen = new Map()
let pauseMs = everyMs
for (let looks = 1; ; looks++) {
  const now = new Map()
  let isDown = false
  for (const file of filesNow()) {
    let stamp = ''
    try {
      stamp = stampOf(statSync(path.join(folder, file)))
    } catch {
      // gone between two looks
      continue
    }
    now.set(file, stamp)
    if (done.get(file) === stamp || seen.get(file) !== stamp || isDown) continue
    try {
      await send(file, stamp)
    } catch (error) {
      if (error instanceof Refused) {
        write(file, stamp, { refused: error.message })
        say(`${file} was refused: ${error.message}`)
      } else {
        isDown = true
        say(`${file} waits: ${error.message}${error.cause ? ` (${error.cause.message})` : ''}`)
      }
    }
  }
  seen = now
  if (options.once && looks >= 2) process.exit(isDown ? 1 : 0)
  pauseMs = isDown ? Math.min(LONGEST_PAUSE_MS, pauseMs * 2) : everyMs
  await wait(pauseMs)
}
