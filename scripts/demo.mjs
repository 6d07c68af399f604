// One command from a clean clone to the running demo: build, data folder, migrations, demo campaign, server.
import { spawn, spawnSync } from 'node:child_process'
import path from 'node:path'

const dataDir = path.resolve(process.env.DATA_DIR ?? '.data/demo')
const port = process.env.PORT ?? '3000'
const env = {
  ...process.env,
  DATA_DIR: dataDir,
  PORT: port,
  APP_ORIGIN: process.env.APP_ORIGIN ?? `http://localhost:${port}`,
  NEXT_TELEMETRY_DISABLED: '1',
}

function step(title, command, args) {
  console.log(`${title} …`)
  const done = spawnSync(command, args, { stdio: 'inherit', env })
  if (done.status !== 0) {
    console.error(`${title}: failed. Nothing was started.`)
    process.exit(done.status ?? 1)
  }
}

step('Building the application', 'node_modules/.bin/next', ['build'])
step(`Loading the demo campaign into ${path.relative(process.cwd(), dataDir) || dataDir}`, process.execPath, [
  '--require',
  './scripts/allow-server-only.cjs',
  '--import',
  'tsx',
  'scripts/load-demo.ts',
])

const server = spawn(process.execPath, ['scripts/start.mjs'], { stdio: 'inherit', env })
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => server.kill(signal))
server.on('exit', (code, signal) => process.exit(code ?? (signal ? 1 : 0)))
