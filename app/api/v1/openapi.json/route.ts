import { z } from 'zod'
import { operations, refusalsOf, type Operation } from '../_operations'
import { idInAddress } from '../_path-id'
import { problemRecord } from '../_records'
import { meaningOf } from '../_respond'

/** What is sent may leave fields with a default out; what is answered has them all. */
const json = (schema: z.ZodType, io: 'input' | 'output') => ({
  'application/json': { schema: z.toJSONSchema(schema, { unrepresentable: 'any', io }) },
})

const schemaOf = (schema: z.ZodType) => z.toJSONSchema(schema, { unrepresentable: 'any', io: 'input' })

function parametersOf(operation: Operation) {
  const path = [...operation.path.matchAll(/\{(\w+)\}/g)].map(([, name = '']) => ({
    name,
    in: 'path',
    required: true,
    schema: schemaOf(operation.parts?.[name] ?? idInAddress),
  }))
  const properties: Readonly<Record<string, z.ZodType>> =
    operation.query instanceof z.ZodObject ? operation.query.shape : {}
  const query = Object.entries(properties).map(([name, schema]) => ({
    name,
    in: 'query',
    required: !schema.safeParse(undefined).success,
    schema: schemaOf(schema),
  }))
  const header = (name: string, required: boolean, description: string, more: object = {}) => ({
    name,
    in: 'header',
    required,
    description,
    schema: { type: 'string', ...more },
  })
  return [
    ...path,
    ...query,
    ...(operation.isVersioned === true ? [header('If-Match', true, 'the ETag of what the edit was made from')] : []),
    ...(operation.method === 'post' && operation.body !== undefined && operation.scope !== null
      ? [
          header(
            'Idempotency-Key',
            false,
            'the same key with the same request is answered as the first time, for a day',
            { minLength: 8, maxLength: 200 },
          ),
        ]
      : []),
    ...(operation.bodyType === undefined
      ? []
      : [
          header('X-File-Name', false, 'percent-encoded name of the file that is the body itself'),
          header('X-File-Sha256', false, 'of the one file; other bytes are refused', { pattern: '^[0-9a-fA-F]{64}$' }),
        ]),
  ]
}

const bytes = { type: 'string', format: 'binary' }

function bodyOf(operation: Operation) {
  if (operation.bodyType !== undefined) {
    const form = {
      type: 'object',
      properties: { file: { type: 'array', items: bytes, minItems: 1 } },
      required: ['file'],
    }
    return {
      requestBody: {
        required: true,
        content: { 'multipart/form-data': { schema: form }, 'application/octet-stream': { schema: bytes } },
      },
    }
  }
  return operation.body === undefined ? {} : { requestBody: { required: true, content: json(operation.body, 'input') } }
}

function contentOf({ answer, answerType }: Operation) {
  if (answerType !== undefined) return { content: { [answerType]: { schema: bytes } } }
  return answer === undefined ? {} : { content: json(answer, 'output') }
}

/** Who may ask: anybody, a person at a screen, or these and a token of the scope. */
function doorsOf({ scope, isForPersons }: Operation) {
  if (scope === null) return { security: [] }
  if (isForPersons === true)
    return { security: [{ session: [] }], description: 'For a person signed in at a screen; no token may.' }
  return { 'x-token-scope': scope }
}

const PROBLEM = { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } }

function describe(operation: Operation) {
  const content = contentOf(operation)
  return {
    summary: operation.summary,
    ...doorsOf(operation),
    parameters: parametersOf(operation),
    ...bodyOf(operation),
    responses: {
      [String(operation.status ?? 200)]: { description: 'done', ...content },
      ...(operation.otherStatus === undefined
        ? {}
        : { [operation.otherStatus]: { description: 'was done before', ...content } }),
      ...Object.fromEntries(
        refusalsOf(operation).map((status) => [String(status), { description: meaningOf(status), content: PROBLEM }]),
      ),
      default: { description: 'something else that went wrong', content: PROBLEM },
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
    components: {
      securitySchemes: {
        bearer: { type: 'http', scheme: 'bearer' },
        session: {
          type: 'apiKey',
          in: 'cookie',
          name: '__Host-sid',
          description: 'of the sign-in at a screen; sid-plain where the house runs without TLS',
        },
      },
      schemas: { Problem: z.toJSONSchema(problemRecord) },
    },
    security: [{ bearer: [] }, { session: [] }],
    paths,
  })
}
