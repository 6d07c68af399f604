import { readdirSync } from 'node:fs'
import path from 'node:path'
import { pathToFileURL } from 'node:url'
import { describe, expect, test } from 'vitest'
import { z } from 'zod'

/*
 * A field that a form does not have must be refused, not passed on: otherwise whoever adds `role` or `version` to a request
 * decides what it is. So every object in every schema of the domain is a strict one, looked for here through all its parts.
 */
const FOLDER = path.resolve(import.meta.dirname, '../../../../lib/domain')

interface Found {
  readonly name: string
  readonly schema: z.core.$ZodType
}
const found: Found[] = []
for (const file of readdirSync(FOLDER).filter((name) => name.endsWith('.ts'))) {
  const exported: Record<string, unknown> = await import(pathToFileURL(path.join(FOLDER, file)).href)
  for (const [name, value] of Object.entries(exported))
    if (value instanceof z.ZodType) found.push({ name: `${file} ${name}`, schema: value })
}

/** Every object schema inside a schema, with where it stands. */
function objectsIn(
  schema: z.core.$ZodType,
  at: string,
  seen = new Set<z.core.$ZodType>(),
): [string, z.core.$ZodObject][] {
  if (seen.has(schema)) return []
  seen.add(schema)
  const inner: [string, z.core.$ZodObject][] = schema instanceof z.core.$ZodObject ? [[at, schema]] : []
  const visit = (value: unknown, where: string): void => {
    if (value instanceof z.core.$ZodType) inner.push(...objectsIn(value, where, seen))
    else if (Array.isArray(value)) value.forEach((one, index) => visit(one, `${where}[${index}]`))
    else if (typeof value === 'object' && value !== null && Object.getPrototypeOf(value) === Object.prototype)
      for (const [key, one] of Object.entries(value)) visit(one, `${where}.${key}`)
  }
  visit({ ...schema._zod.def }, at)
  return inner
}

const objects = found.flatMap(({ name, schema }) => objectsIn(schema, name))

test('there are schemas to look at', () => {
  expect(objects.length).toBeGreaterThan(20)
})

describe('a field that is not known is refused', () => {
  test.each(objects.map(([name, schema]) => ({ name, schema })))('$name', ({ schema }) => {
    expect(schema._zod.def.catchall?._zod.def.type).toBe('never')
  })
})
