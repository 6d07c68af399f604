import { spawn } from 'node:child_process'
import { readFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { startServer, type DemoServer } from '@/tests/support/demo-server'
import truth from '@/tests/reference/methanation-truth.json'

const ROOT = path.resolve(import.meta.dirname, '../..')
let server: DemoServer

beforeAll(async () => {
  server = await startServer({ data: 'demo' })
}, 300_000)
afterAll(async () => {
  await server?.stop()
})

test('the walk of the README runs as it stands and ends in the ranking', async () => {
  const readme = readFileSync(path.join(ROOT, 'README.md'), 'utf8')
  const walk = /```sh\n(BASE=[\s\S]*?)```/.exec(readme)?.[1] ?? ''
  const shell = spawn('bash', ['-euo', 'pipefail', '-c', walk], {
    cwd: ROOT,
    env: { ...process.env, BASE: server.origin },
  })
  let output = ''
  shell.stdout.on('data', (text: Buffer) => (output += text.toString()))
  shell.stderr.on('data', (text: Buffer) => (output += text.toString()))
  const status = await new Promise((resolve) => shell.once('close', resolve))
  expect(status, output).toBe(0)
  expect(output.match(/^ready$/gm), output).toHaveLength(2)
  expect(output.match(/^confirmed$/gm), output).toHaveLength(2)
  const [low, high] = /\[\s*(\d+\.\d+),\s*(\d+\.\d+)\s*\]\s*\n1 /.exec(output)?.slice(1).map(Number) ?? [
    Number.NaN,
    Number.NaN,
  ]
  const expected = (truth.runs.find((run) => run.code === 'R-0001')?.apparent_ea_kj_mol ?? Number.NaN) * 1000
  expect(expected).toBeGreaterThan(low ?? Number.NaN)
  expect(expected).toBeLessThan(high ?? Number.NaN)
  expect(output).toMatch(/^\d+ CQ-108$/m)
})
