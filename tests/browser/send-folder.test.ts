import { spawn, type ChildProcess } from 'node:child_process'
import { appendFileSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { connect, createServer, type Server, type Socket } from 'node:net'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { startServer, type DemoServer } from '@/tests/support/demo-server'

// The script for instrument computers against the built application, through a line that can be cut.

const ROOT = path.resolve(import.meta.dirname, '../..')
const DEMO = path.join(ROOT, 'db/demo/files')
let server: DemoServer
let folder: string
let script: ChildProcess | null = null
let said = ''
let token = ''
let line: Server | null = null
const sockets = new Set<Socket>()

async function callApi(address: string, init: RequestInit = {}) {
  const answer = await fetch(`${server.origin}/api/v1/${address}`, {
    ...init,
    headers: { 'Content-Type': 'application/json', ...(token === '' ? {} : { Authorization: `Bearer ${token}` }) },
  })
  if (!answer.ok) throw new Error(await answer.text())
  return answer.json()
}

/** The network: passes bytes on to the server, until it is closed. */
function openLine(port: number): Promise<Server> {
  const target = Number(new URL(server.origin).port)
  return new Promise((resolve) => {
    const opened = createServer((from) => {
      const to = connect(target, '127.0.0.1')
      for (const socket of [from, to]) {
        sockets.add(socket)
        socket.on('error', () => {})
        socket.on('close', () => sockets.delete(socket))
      }
      from.pipe(to).pipe(from)
    })
    opened.listen(port, '127.0.0.1', () => resolve(opened))
  })
}
async function cutLine(): Promise<void> {
  for (const socket of sockets) socket.destroy()
  await new Promise((resolve) => line?.close(resolve))
  line = null
}

function startScript(port: number): ChildProcess {
  const child = spawn(
    process.execPath,
    [
      'public/send-folder.mjs',
      '--folder',
      folder,
      '--server',
      `http://127.0.0.1:${port}`,
      '--every',
      '0.2',
      '--rig',
      'Rig B',
    ],
    { cwd: ROOT, env: { ...process.env, KELVIN_TOKEN: token } },
  )
  child.stdout.on('data', (text: Buffer) => (said += text.toString()))
  child.stderr.on('data', (text: Buffer) => (said += text.toString()))
  return child
}
const until = (pattern: RegExp) => expect.poll(() => said, { timeout: 60_000, interval: 100 }).toMatch(pattern)
const ledger = (): { file: string; run?: string; isNew?: boolean; refused?: string }[] =>
  readFileSync(path.join(folder, 'sent.jsonl'), 'utf8')
    .split('\n')
    .filter((text) => text !== '')
    .map((text) => JSON.parse(text))

beforeAll(async () => {
  server = await startServer({ data: 'demo' })
  folder = mkdtempSync(path.join(tmpdir(), 'ik-folder-'))
  const made = await callApi('tokens', {
    method: 'POST',
    body: JSON.stringify({
      email: 'technician@calderquay.example',
      password: 'straw bronze violet blue',
      name: 'rig B computer',
      scopes: ['read', 'intake', 'write'],
    }),
  })
  token = made.secret
}, 300_000)
afterAll(async () => {
  script?.kill()
  await cutLine()
  await server?.stop()
  rmSync(folder, { recursive: true, force: true })
})

test('new stable files reach the open run of the rig, over a broken line and a restart, each once', async () => {
  const campaign = (await callApi('campaigns')).items[0].id
  const rig = (await callApi('rigs')).items.find((one: { code: string }) => one.code === 'Rig B').id
  const sample = (await callApi('samples')).items.find((one: { code: string }) => one.code === 'CQ-101').id
  const run = await callApi('runs', {
    method: 'POST',
    body: JSON.stringify({
      campaignId: campaign,
      rigId: rig,
      channel: '1',
      startedAt: '2026-04-02T07:30:00Z',
      loading: { sampleId: sample, catalystMassKg: 80e-6, diluentMassKg: 450e-6 },
    }),
  })
  const port = Number(new URL(server.origin).port) + 1 > 65_000 ? 40_123 : Number(new URL(server.origin).port) + 1

  // the network is down when the first file comes
  const log = readFileSync(path.join(DEMO, 'R-0001-rig.csv'))
  writeFileSync(path.join(folder, 'log.csv'), log.subarray(0, 100_000))
  script = startScript(port)
  await until(/log\.csv waits: fetch failed/)

  // the file is still being written when the network is back: what is sent is the whole of it
  line = await openLine(port)
  for (let from = 100_000; from < log.length; from += 20_000) {
    appendFileSync(path.join(folder, 'log.csv'), log.subarray(from, from + 20_000))
    await new Promise((resolve) => setTimeout(resolve, 60))
  }
  await until(new RegExp(`log\\.csv is with ${run.code}: ready`))

  // a subfolder named like a run sends to that run; one that is not there waits
  mkdirSync(path.join(folder, run.code))
  writeFileSync(path.join(folder, run.code, 'results.csv'), readFileSync(path.join(DEMO, 'R-0001-analysis.csv')))
  mkdirSync(path.join(folder, 'R-9999'))
  writeFileSync(path.join(folder, 'R-9999', 'early.csv'), 'a;b\n1;2\n')
  await until(new RegExp(`results\\.csv is with ${run.code}: ready`))
  await until(/early\.csv waits: there is no run for it yet/)

  // an empty file is refused by the server, said once, and the others go on
  writeFileSync(path.join(folder, 'empty.csv'), '')
  await until(/empty\.csv was refused: /)

  // killed, and its ledger lost: sending again stores nothing twice
  script.kill('SIGKILL')
  const before = ledger().filter((entry) => entry.refused === undefined)
  expect(before.map(({ run: code, isNew }) => [code, isNew])).toEqual([
    [run.code, true],
    [run.code, true],
  ])
  rmSync(path.join(folder, 'sent.jsonl'))
  said = ''
  script = startScript(port)
  await until(/log\.csv is with R-\d+, which had it already: ready/)
  await until(/results\.csv is with R-\d+, which had it already: ready/)
  const { items } = await callApi(`runs/${run.id}/uploads`)
  expect(items.map((one: { fileName: string; byteCount: number }) => [one.fileName, one.byteCount])).toEqual([
    ['log.csv', log.length],
    ['results.csv', readFileSync(path.join(DEMO, 'R-0001-analysis.csv')).length],
  ])

  // a restart with the ledger sends nothing
  script.kill('SIGKILL')
  said = ''
  script = startScript(port)
  writeFileSync(path.join(folder, 'note.csv'), 'time;T bed [C]\n2026-04-02 07:30:00;25,1\n2026-04-02 07:30:10;25,3\n')
  await until(/note\.csv is with/)
  expect(said).not.toMatch(/log\.csv|results\.csv/)
})
