import { z } from 'zod'
import { AnalysisError } from '../analysis/analysis-error'
import { appErrorOf, type ActionResult, type FieldIssue } from './errors'

/** The fields at fault out of a failed parse, one entry each, by their path: `feed.0.species`. */
export function issuesOf(error: z.ZodError): FieldIssue[] {
  return error.issues.flatMap((issue) => {
    const path = issue.path.map(String)
    if (issue.code !== 'unrecognized_keys') return [{ field: path.join('.'), message: issue.message }]
    return issue.keys.map((key) => ({
      field: [...path, key].join('.'),
      message: 'There is no such field here. Take it out, or look for its name in the description of the interface.',
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
