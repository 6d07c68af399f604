import { spawn, type ChildProcess } from 'node:child_process'
import { existsSync, mkdtempSync, readdirSync, rmSync, statSync } from 'node:fs'
import { createServer, type AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'

const dataDir = path.join(mkdtempSync(path.join(tmpdir(), 'start-')), 'data')
let port = 0

interface Started {
  readonly child: ChildProcess
  readonly output: () => string
  readonly exited: Promise<number | null>
}

function start(): Started {
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      ...process.env,
      NODE_ENV: 'production',
      DATA_DIR: dataDir,
      PORT: String(port),
      APP_ORIGIN: `http://localhost:${port}`,
    },
  })
  let output = ''
  child.stdout.on('data', (text) => (output += String(text)))
  child.stderr.on('data', (text) => (output += String(text)))
  return { child, output: () => output, exited: new Promise((resolve) => child.once('close', resolve)) }
}

/** Until the server has said so: `said` is looked for in all its output so far. */
async function saying(server: Started, said: RegExp): Promise<void> {
  if (said.test(server.output())) return
  await new Promise<void>((resolve, reject) => {
    const look = () => said.test(server.output()) && resolve()
    server.child.stdout?.on('data', look)
    server.child.stderr?.on('data', look)
    void server.exited.then(() => reject(new Error(`ended without saying ${said}:\n${server.output()}`)))
  })
}

beforeAll(async () => {
  const probe = createServer()
  port = await new Promise<number>((resolve) => {
    probe.listen(0, '127.0.0.1', () => resolve((probe.address() as AddressInfo).port))
  })
  await new Promise((resolve) => probe.close(resolve))
})
afterAll(() => rmSync(path.dirname(dataDir), { recursive: true, force: true }))

test('first start: a code for the first admin, secrets for the owner only; a second server is refused; SIGTERM closes cleanly', async () => {
  const first = start()
  await saying(first, /Set-up code: code_\S+/)
  expect(first.output()).toContain(`http://localhost:${port}/set-up`)
  expect((await fetch(`http://127.0.0.1:${port}/sign-in`)).status).toBe(200)
  expect(statSync(path.join(dataDir, 'secrets.json')).mode & 0o777).toBe(0o600)
  expect(statSync(path.join(dataDir, 'database')).mode & 0o777).toBe(0o700)

  const second = spawn(process.execPath, ['scripts/start.mjs'], {
    stdio: ['ignore', 'ignore', 'pipe'],
    env: { ...process.env, NODE_ENV: 'production', DATA_DIR: dataDir, PORT: '0' },
  })
  let complaint = ''
  second.stderr.on('data', (text) => (complaint += String(text)))
  expect(await new Promise((resolve) => second.once('close', resolve))).toBe(1)
  expect(complaint).toContain(`process ${first.child.pid} has it`)
  expect(complaint).toContain('set DATA_DIR to another folder')

  // asked to stop while requests are under way: those are answered, then it closes
  const answers = Array.from({ length: 8 }, () =>
    fetch(`http://127.0.0.1:${port}/sign-in`).then((answer) => answer.status),
  )
  await Promise.race(answers)
  first.child.kill('SIGTERM')
  expect(await Promise.all(answers)).toEqual(new Array(8).fill(200))
  expect(await first.exited).toBe(0)
  expect(readdirSync(dataDir)).not.toContain('database.lock')
})

test('killed and started again: the lock does not stand in the way', async () => {
  const killed = start()
  await saying(killed, /Set-up code: code_\S+/)
  killed.child.kill('SIGKILL')
  await killed.exited
  expect(existsSync(path.join(dataDir, 'database.lock'))).toBe(true)
  const again = start()
  await saying(again, /Set-up code: code_\S+/)
  again.child.kill('SIGTERM')
  expect(await again.exited).toBe(0)
})
