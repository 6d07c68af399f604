import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { execFileSync } from 'node:child_process'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { expect, test } from 'vitest'

test('the migrations say all that the schema says', () => {
  const folder = mkdtempSync(path.join(tmpdir(), 'migrations-'))
  try {
    cpSync('drizzle', folder, { recursive: true })
    const before = readdirSync(folder)
    const output = execFileSync(
      process.execPath,
      [
        'node_modules/drizzle-kit/bin.cjs',
        'generate',
        '--dialect=postgresql',
        '--schema=./db/schema/index.ts',
        `--out=${path.relative('.', folder)}`,
      ],
      { encoding: 'utf8' },
    )
    expect(output).toContain('No schema changes')
    expect(readdirSync(folder)).toEqual(before)
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
})

test('every unique and check constraint has a sentence', () => {
  const migrations = readdirSync('drizzle')
    .filter((name) => name.endsWith('.sql'))
    .map((name) => readFileSync(path.join('drizzle', name), 'utf8'))
    .join('\n')
  const names = [
    ...migrations.matchAll(/CONSTRAINT "([a-z0-9_]+)" (?:UNIQUE|CHECK)/g),
    ...migrations.matchAll(/CREATE UNIQUE INDEX "([a-z0-9_]+)"/g),
  ].map((match) => match[1] ?? '')
  const source = readFileSync('db/map-database-error.ts', 'utf8')
  expect(names.length).toBeGreaterThan(30)
  expect(names.filter((name) => !source.includes(`  ${name}: `))).toEqual([])
})
