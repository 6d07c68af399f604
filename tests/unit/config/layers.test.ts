import { spawnSync } from 'node:child_process'
import { cpSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'

const ROOT = path.resolve(import.meta.dirname, '../../..')
const require = createRequire(import.meta.url)

/** A file that breaks the rule of that name, and nothing else that matters here. */
const planted: Record<string, Record<string, string>> = {
  'no-cycles': {
    'lib/domain/a-cycle.ts': "import { b } from './b-cycle'\nexport const a = () => b\n",
    'lib/domain/b-cycle.ts': "import { a } from './a-cycle'\nexport const b = () => a\n",
  },
  'analysis-is-pure': {
    'lib/analysis/impure.ts': "import { readFileSync } from 'node:fs'\nexport const x = readFileSync\n",
  },
  'domain-knows-only-zod-and-analysis': {
    'lib/domain/knows-policy.ts': "import { can } from '../policy/can'\nexport const x = can\n",
    'lib/policy/can.ts': 'export const can = 1\n',
  },
  'policy-knows-only-domain': {
    'lib/policy/reads-analysis.ts': "import { y } from '../analysis/pure'\nexport const x = y\n",
    'lib/analysis/pure.ts': 'export const y = 1\n',
  },
  'parsing-is-independent': {
    'lib/uploads/stores.ts': "import { s } from '../storage/file-store'\nexport const x = s\n",
    'lib/storage/file-store.ts': 'export const s = 1\n',
  },
  'uploads-use-units-not-analysis': {
    'lib/uploads/fits.ts': "import { y } from '../analysis/pure'\nexport const x = y\n",
  },
  'db-knows-only-domain': {
    'db/knows-access.ts': "import { s } from '../lib/storage/file-store'\nexport const x = s\n",
  },
  'only-db-speaks-sql': { 'lib/access/speaks-sql.ts': "import { eq } from 'drizzle-orm'\nexport const x = eq\n" },
  'only-access-reaches-db': {
    'lib/exports/reaches-db.ts': "import type { D } from '../../db/client'\nexport const x: D = 1\n",
    'db/client.ts': 'export type D = number\n',
  },
  'components-stay-in-the-browser': {
    'components/ui/reaches-access.tsx': "import type { A } from '../../lib/access/runs'\nexport const x: A = 1\n",
    'lib/access/runs.ts': 'export type A = number\n',
  },
  'components-reach-no-server-only-module': {
    'components/ui/through-a-chain.tsx': "import { e } from '../../lib/domain/chained'\nexport const x = e\n",
    'lib/domain/chained.ts': "import 'server-only'\nexport const e = 1\n",
  },
  'one-session-reader': {
    'lib/access/reads-cookies.ts': "import { sealData } from 'iron-session'\nexport const x = sealData\n",
  },
  'one-multipart-reader': {
    'lib/access/reads-parts.ts': "import formidable from 'formidable'\nexport const x = formidable\n",
  },
  'grids-only-in-grids': {
    'components/ui/grid.tsx': "import { AgGridReact } from 'ag-grid-react'\nexport const x = AgGridReact\n",
  },
  'charts-only-in-charts': {
    'components/ui/chart.tsx': "import * as echarts from 'echarts'\nexport const x = echarts\n",
  },
  'nobody-imports-tests': {
    'lib/domain/imports-tests.ts': "import { t } from '../../tests/support/t'\nexport const x = t\n",
    'tests/support/t.ts': 'export const t = 1\n',
  },
}

let folder = ''

beforeAll(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'ik-layers-'))
  symlinkSync(path.join(ROOT, 'node_modules'), path.join(folder, 'node_modules'))
  cpSync(path.join(ROOT, 'tsconfig.json'), path.join(folder, 'tsconfig.json'))
  // the packages stand behind a link here: their paths must be read as they are in the real tree
  writeFileSync(
    path.join(folder, 'layers.cjs'),
    `const rules = require(${JSON.stringify(path.join(ROOT, 'tests/config/layers.cjs'))})
module.exports = { ...rules, options: { ...rules.options, preserveSymlinks: true } }
`,
  )
  for (const name of ['app', 'components', 'db', 'lib', 'tests'])
    mkdirSync(path.join(folder, name), { recursive: true })
  for (const files of Object.values(planted))
    for (const [file, text] of Object.entries(files)) {
      mkdirSync(path.join(folder, path.dirname(file)), { recursive: true })
      writeFileSync(path.join(folder, file), text)
    }
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

test('every rule of error severity finds the violation planted for it', { timeout: 60_000 }, () => {
  const rules = (
    require(path.join(ROOT, 'tests/config/layers.cjs')) as { forbidden: { name: string; severity: string }[] }
  ).forbidden
  const done = spawnSync(
    path.join(ROOT, 'node_modules/.bin/depcruise'),
    ['--config', 'layers.cjs', '--output-type', 'json', 'app', 'components', 'db', 'lib', 'tests'],
    { cwd: folder, encoding: 'utf8', maxBuffer: 64e6 },
  )
  const report = JSON.parse(done.stdout) as { summary: { violations: { rule: { name: string; severity: string } }[] } }
  const found = new Set(report.summary.violations.map((violation) => violation.rule.name))
  const errors = rules.filter((rule) => rule.severity === 'error').map((rule) => rule.name)
  expect(Object.keys(planted).sort()).toEqual([...errors].sort())
  expect(errors.filter((name) => !found.has(name))).toEqual([])
})
