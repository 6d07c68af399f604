// Everything that must hold before a change lands: `npm test`. Each stage prints what it is; the last line counts the tests.
import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'

const OUTPUT = 'tests/.output'
const totals = { passed: 0, failed: 0, skipped: 0 }
const faults = []
const notes = []

function run(title, command, args, options = {}) {
  console.log(`\n── ${title}`)
  const started = process.hrtime.bigint()
  const done = spawnSync(command, args, {
    stdio: 'inherit',
    ...options,
    env: { ...process.env, NEXT_TELEMETRY_DISABLED: '1', ...options.env },
  })
  const seconds = Number(process.hrtime.bigint() - started) / 1e9
  console.log(
    `── ${title}: ${done.status === 0 ? 'ok' : `failed (${done.status ?? done.signal})`}, ${seconds.toFixed(1)} s`,
  )
  if (done.status !== 0) faults.push(title)
  return done.status === 0
}

function vitest(title, project, env = {}) {
  const file = `${OUTPUT}/${title.replaceAll(/[^a-z0-9]+/gi, '-')}.json`
  rmSync(file, { force: true })
  run(
    title,
    'npx',
    ['vitest', 'run', '--project', project, '--reporter=default', '--reporter=json', `--outputFile.json=${file}`],
    { env },
  )
  if (!existsSync(file)) return
  const report = JSON.parse(readFileSync(file, 'utf8'))
  totals.passed += report.numPassedTests
  totals.failed += report.numFailedTests
  totals.skipped += report.numPendingTests + report.numTodoTests
}

/** Debian's package, when this machine can have it; says plainly when it cannot. */
function ensure(binary, packageName, purpose) {
  if (existsSync(binary)) return true
  if (process.getuid?.() === 0 && existsSync('/usr/bin/apt-get')) {
    console.log(`\n── installing Debian's ${packageName} for ${purpose}`)
    spawnSync('apt-get', ['update'], { stdio: 'ignore' })
    spawnSync('apt-get', ['install', '-y', '--no-install-recommends', packageName], {
      stdio: ['ignore', 'ignore', 'inherit'],
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    })
    if (existsSync(binary)) return true
  }
  notes.push(`SKIPPED: ${purpose}, because ${binary} is missing (install Debian's package ${packageName} to run it)`)
  return false
}

mkdirSync(OUTPUT, { recursive: true })
const tool = (name) => `node_modules/.bin/${name}`
run('format', tool('prettier'), ['--check', '--log-level', 'warn', '.'])
run('route types', tool('next'), ['typegen'])
run('types', tool('tsc'), ['--noEmit'])
run('lint', tool('eslint'), ['--max-warnings', '0', '.'])
run('layer rules', tool('depcruise'), [
  '--config',
  'tests/config/layers.cjs',
  'app',
  'components',
  'db',
  'lib',
  'tests',
])
run('migrations match the schema', 'node', ['scripts/check-migrations.mjs'])
vitest('unit', 'unit')
vitest('property', 'property')
vitest('integration on PGlite', 'integration')
if (ensure('/usr/lib/postgresql/15/bin/postgres', 'postgresql', 'integration on a PostgreSQL server'))
  vitest('integration on PostgreSQL', 'integration', { TEST_BACKEND: 'postgres' })
vitest('routes', 'routes')
if (run('build', tool('next'), ['build'])) {
  if (ensure('/usr/bin/chromium', 'chromium', 'browser tests')) vitest('browser', 'browser')
}

console.log('')
for (const note of notes) console.log(note)
if (faults.length > 0) console.log(`failed stages: ${faults.join(', ')}`)
console.log(`${totals.passed} passed, ${totals.failed} failed, ${totals.skipped} skipped`)
process.exit(faults.length > 0 || totals.failed > 0 ? 1 : 0)
