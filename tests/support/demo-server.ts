import { spawn, spawnSync, type ChildProcess } from 'node:child_process'
import { cpSync, existsSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs'
import { createServer } from 'node:net'
import path from 'node:path'

const ROOT = path.resolve(import.meta.dirname, '../..')
const CACHE = path.join(ROOT, 'tests/.cache')

export interface DemoServer {
  readonly origin: string
  readonly dataDir: string
  readonly output: () => string
  stop(): Promise<void>
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', reject)
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address()
      probe.close(() => (address && typeof address === 'object' ? resolve(address.port) : reject(new Error('no port'))))
    })
  })
}

/** The demo campaign, loaded once through the real intake and then copied for each server that needs it. */
function demoData(): string {
  const folder = path.join(CACHE, 'demo-data')
  if (existsSync(path.join(folder, 'loaded'))) return folder
  rmSync(folder, { recursive: true, force: true })
  mkdirSync(CACHE, { recursive: true })
  const done = spawnSync(
    process.execPath,
    ['--require', './scripts/allow-server-only.cjs', '--import', 'tsx', 'scripts/load-demo.ts'],
    {
      cwd: ROOT,
      env: { ...process.env, NODE_ENV: 'production', DATA_DIR: folder, APP_ORIGIN: 'http://localhost:3000' },
      encoding: 'utf8',
    },
  )
  if (done.status !== 0) throw new Error(`the demo campaign did not load:\n${done.stdout}\n${done.stderr}`)
  return folder
}

/**
 * The built application on a free loopback port with a data folder of its own. Call `stop` in `afterAll`: the server is a child of a
 * child, so the whole process group is ended.
 */
export async function startServer(options: { data: 'demo' | 'empty' }): Promise<DemoServer> {
  if (!existsSync(path.join(ROOT, '.next/BUILD_ID'))) throw new Error('build first: npm run build')
  mkdirSync(CACHE, { recursive: true })
  const dataDir = mkdtempSync(path.join(CACHE, 'server-'))
  if (options.data === 'demo') cpSync(demoData(), dataDir, { recursive: true })
  const port = await freePort()
  const origin = `http://localhost:${port}`
  let output = ''
  const child: ChildProcess = spawn(process.execPath, ['scripts/start.mjs'], {
    cwd: ROOT,
    detached: true,
    stdio: ['ignore', 'pipe', 'pipe'],
    env: { ...process.env, NODE_ENV: 'production', DATA_DIR: dataDir, PORT: String(port), APP_ORIGIN: origin },
  })
  child.stdout?.on('data', (text: Buffer) => (output += text.toString()))
  child.stderr?.on('data', (text: Buffer) => (output += text.toString()))
  let hasExited = false
  const exited = new Promise<void>((resolve) => child.once('exit', () => ((hasExited = true), resolve())))
  const stop = async () => {
    if (!hasExited && child.pid !== undefined) {
      try {
        process.kill(-child.pid, 'SIGTERM')
      } catch (error) {
        if (!(error instanceof Error && 'code' in error && error.code === 'ESRCH')) throw error
      }
      const timer = setTimeout(() => child.pid !== undefined && process.kill(-child.pid, 'SIGKILL'), 20_000)
      await exited
      clearTimeout(timer)
    }
    rmSync(dataDir, { recursive: true, force: true })
  }
  const deadline = Date.now() + 60_000
  while (Date.now() < deadline && !hasExited) {
    try {
      const answer = await fetch(`${origin}/sign-in`, { redirect: 'manual' })
      if (answer.status < 500) return { origin, dataDir, output: () => output, stop }
    } catch {
      // not listening yet
    }
    await new Promise((resolve) => setTimeout(resolve, 200))
  }
  await stop()
  throw new Error(`the server did not answer within a minute:\n${output}`)
}
