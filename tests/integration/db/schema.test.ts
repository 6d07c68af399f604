import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { expect, test } from 'vitest'

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
