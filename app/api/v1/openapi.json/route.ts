import { z } from 'zod'
import { operations, type Operation } from '../_operations'

/** What is sent may leave fields with a default out; what is answered has them all. */
const json = (schema: z.ZodType, io: 'input' | 'output') => ({
  'application/json': { schema: z.toJSONSchema(schema, { unrepresentable: 'any', io }) },
})

function parametersOf(operation: Operation) {
  const path = [...operation.path.matchAll(/\{(\w+)\}/g)].map((found) => ({
    name: found[1],
    in: 'path',
    required: true,
    schema: { type: 'string' },
  }))
  const properties: Readonly<Record<string, z.ZodType>> =
    operation.query instanceof z.ZodObject ? operation.query.shape : {}
  const query = Object.entries(properties).map(([name, schema]) => ({
    name,
    in: 'query',
    required: !schema.safeParse(undefined).success,
    schema: z.toJSONSchema(schema, { unrepresentable: 'any', io: 'input' }),
  }))
  const header =
    operation.isVersioned === true
      ? [{ name: 'If-Match', in: 'header', required: true, schema: { type: 'string' } }]
      : []
  const once =
    operation.method === 'post' && operation.body !== undefined && operation.scope !== null
      ? [
          {
            name: 'Idempotency-Key',
            in: 'header',
            required: false,
            description: 'the same key with the same request is answered as the first time, for a day',
            schema: { type: 'string', minLength: 8, maxLength: 200 },
          },
        ]
      : []
  return [...path, ...query, ...header, ...once]
}

function bodyOf(operation: Operation) {
  if (operation.bodyType !== undefined)
    return {
      requestBody: {
        required: true,
        content: {
          [operation.bodyType]: {
            schema: {
              type: 'object',
              properties: { file: { type: 'array', items: { type: 'string', format: 'binary' } } },
            },
          },
        },
      },
    }
  return operation.body === undefined ? {} : { requestBody: { required: true, content: json(operation.body, 'input') } }
}

function describe(operation: Operation) {
  const status = String(operation.status ?? 200)
  const content =
    operation.answerType !== undefined
      ? { [operation.answerType]: {} }
      : operation.answer !== undefined
        ? json(operation.answer, 'output')
        : undefined
  return {
    summary: operation.summary,
    ...(operation.scope === null
      ? { security: [] }
      : operation.isForPersons === true
        ? { security: [], description: 'For a person signed in at a screen; no token may.' }
        : { 'x-token-scope': operation.scope }),
    parameters: parametersOf(operation),
    ...bodyOf(operation),
    responses: {
      [status]: { description: 'done', ...(content === undefined ? {} : { content }) },
      ...(operation.otherStatus === undefined
        ? {}
        : {
            [operation.otherStatus]: { description: 'was done before', ...(content === undefined ? {} : { content }) },
          }),
      default: { description: 'what went wrong, as RFC 9457 writes it', content: { 'application/problem+json': {} } },
    },
  }
}

/** The API described from the schemas that its handlers parse with. */
export async function GET(): Promise<Response> {
  const paths: Record<string, Record<string, unknown>> = {}
  for (const operation of operations)
    paths[operation.path] = { ...paths[operation.path], [operation.method]: describe(operation) }
  return Response.json({
    openapi: '3.1.0',
    info: {
      title: 'Inverse Kelvin',
      version: '1',
      description:
        'SI units, named in the fields. Edits name the version they were made from in If-Match; a creating request may carry an Idempotency-Key.',
    },
    servers: [{ url: '/api/v1' }],
    components: { securitySchemes: { bearer: { type: 'http', scheme: 'bearer' } } },
    security: [{ bearer: [] }],
    paths,
  })
}
