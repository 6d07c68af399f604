import { z } from 'zod'
import { AnalysisError } from '../analysis/analysis-error'
import { appErrorOf, type ActionResult, type FieldIssue } from './errors'

const NO_SUCH_FIELD = 'There is no such field here.'

/** What a parse says of fields that do not exist: which ones do. Give it to the parse as `error`. */
export function nameAllowedFields(issue: z.core.$ZodRawIssue): string | undefined {
  if (issue.code !== 'unrecognized_keys') return undefined
  const allowed = issue.inst instanceof z.ZodObject ? Object.keys(issue.inst.shape) : []
  return `${NO_SUCH_FIELD} ${allowed.length === 0 ? 'None is taken.' : `Allowed: ${allowed.join(', ')}.`}`
}

/** The fields at fault out of a failed parse, one entry each, by their path: `feed.0.species`. */
export function issuesOf(error: z.ZodError): FieldIssue[] {
  return error.issues.flatMap((issue) => {
    const path = issue.path.map(String)
    if (issue.code !== 'unrecognized_keys') return [{ field: path.join('.'), message: issue.message }]
    return issue.keys.map((key) => ({
      field: [...path, key].join('.'),
      message: issue.message.startsWith(NO_SUCH_FIELD) ? issue.message : NO_SUCH_FIELD,
    }))
  })
}

/**
 * What a form action answers: the value, or an expected failure as a sentence with the fields at fault. Anything else,
 * redirects of the framework among it, goes on its way.
 */
export async function answerAction<T>(work: () => Promise<T>): Promise<ActionResult<T>> {
  try {
    return { ok: true, value: await work() }
  } catch (error) {
    const expected = appErrorOf(error)
    if (expected !== null)
      return { ok: false, code: expected.code, message: expected.message, issues: expected.details.issues ?? [] }
    if (error instanceof z.ZodError)
      return {
        ok: false,
        code: 'invalid',
        message: 'Some fields are missing or not as described.',
        issues: issuesOf(error),
      }
    if (error instanceof AnalysisError) return { ok: false, code: 'unprocessable', message: error.message, issues: [] }
    throw error
  }
}

/** The named text fields of a form; a field that is missing or a file is empty text. */
export function textFields<const Names extends readonly string[]>(
  data: FormData,
  names: Names,
): Record<Names[number], string> {
  const entries = names.map((name) => {
    const value = data.get(name)
    return [name, typeof value === 'string' ? value : '']
  })
  return Object.fromEntries(entries)
}
