// The committed SQL must be what the schema says: a generation into a copy of the folder must find nothing to do.
import { spawnSync } from 'node:child_process'
import { cpSync, mkdtempSync, readdirSync, rmSync } from 'node:fs'
import path from 'node:path'

const copy = mkdtempSync(path.join(process.cwd(), 'tests/.output/migrations-'))
cpSync('drizzle', copy, { recursive: true })
const before = readdirSync(copy).length
const out = path.relative(process.cwd(), copy)
const done = spawnSync(
  'node_modules/.bin/drizzle-kit',
  ['generate', '--dialect', 'postgresql', '--schema', './db/schema/index.ts', '--out', out],
  { encoding: 'utf8' },
)
const changed = readdirSync(copy).length !== before || !`${done.stdout}`.includes('No schema changes')
rmSync(copy, { recursive: true, force: true })
if (done.status !== 0 || changed) {
  console.error(
    `${done.stdout}${done.stderr}\nThe schema and the migrations differ: run npm run db:generate and commit its SQL.`,
  )
  process.exit(1)
}
console.log('no schema changes')
