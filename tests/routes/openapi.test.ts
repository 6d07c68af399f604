import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { expect, test } from 'vitest'
import { GET } from '@/app/api/v1/openapi.json/route'
import { operations } from '@/app/api/v1/_operations'

const ROOT = path.resolve(import.meta.dirname, '../../app/api/v1')

/** Every exported handler on disk as `get /runs/{runId}`. */
function handlersOnDisk(): string[] {
  return (readdirSync(ROOT, { recursive: true }) as string[])
    .filter((file) => path.basename(file) === 'route.ts')
    .flatMap((file) => {
      const route = `/${path
        .dirname(file)
        .replaceAll(path.sep, '/')
        .replaceAll(/\[(\w+)\]/g, '{$1}')}`
      const text = readFileSync(path.join(ROOT, file), 'utf8')
      return [...text.matchAll(/export (?:async )?function (GET|POST|PUT|PATCH|DELETE)\b/g)].map(
        (found) => `${(found[1] ?? '').toLowerCase()} ${route}`,
      )
    })
    .sort()
}

test('the description names every handler on disk, and no other', () => {
  expect(operations.map((operation) => `${operation.method} ${operation.path}`).sort()).toEqual(handlersOnDisk())
})

test('every operation says what it answers: a record, bytes of a type, or nothing', () => {
  for (const one of operations)
    expect(
      [one.answer !== undefined, one.answerType !== undefined, one.status === 204].filter(Boolean),
      `${one.method} ${one.path}`,
    ).toHaveLength(1)
})

test('it is OpenAPI 3.1, open to all, and describes a run as its handler parses it', async () => {
  const answer = await GET()
  expect(answer.status).toBe(200)
  const description = (await answer.json()) as {
    openapi: string
    paths: Record<
      string,
      Record<
        string,
        {
          requestBody?: { content: Record<string, { schema: { properties: object } }> }
          parameters: { name: string }[]
        }
      >
    >
  }
  expect(description.openapi).toBe('3.1.0')
  const body = description.paths['/runs']?.['post']?.requestBody?.content['application/json']?.schema.properties ?? {}
  expect(Object.keys(body)).toEqual(
    expect.arrayContaining(['campaignId', 'rigId', 'channel', 'loading', 'startedAt', 'feed']),
  )
  expect(description.paths['/runs/{runId}']?.['patch']?.parameters.map((one) => one.name)).toEqual([
    'runId',
    'If-Match',
  ])
})
